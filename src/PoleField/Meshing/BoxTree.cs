using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Boxes in a tree of halves: finds all pairs that overlap in O(n log n + pairs).</summary>
internal sealed class BoxTree
{
    private const int LeafBoxes = 4;
    private readonly Box[] _boxes;
    private readonly int[] _order; // indices into _boxes, leaf by leaf
    private readonly List<(Box Box, int From, int To, int Second)> _nodes = []; // children of node i: i + 1 and Second

    public BoxTree(Box[] boxes)
    {
        _boxes = boxes;
        _order = [.. Enumerable.Range(0, boxes.Length)];
        if (boxes.Length > 0)
        {
            Build(0, boxes.Length);
        }
    }

    /// <summary>Calls with the index of every box that overlaps the given one.</summary>
    public void ForEachOverlap(Box box, Action<int> found)
    {
        if (_nodes.Count == 0)
        {
            return;
        }

        Stack<int> waiting = new([0]);
        while (waiting.TryPop(out int at))
        {
            (Box around, int from, int to, int second) = _nodes[at];
            if (!around.Overlaps(box))
            {
                continue;
            }

            if (second >= 0)
            {
                waiting.Push(second);
                waiting.Push(at + 1);
                continue;
            }

            for (int i = from; i < to; i++)
            {
                if (_boxes[_order[i]].Overlaps(box))
                {
                    found(_order[i]);
                }
            }
        }
    }

    private int Build(int from, int to)
    {
        Box around = Box.Empty;
        Box centres = Box.Empty;
        for (int i = from; i < to; i++)
        {
            around = around.Including(_boxes[_order[i]]);
            centres = centres.Including(_boxes[_order[i]].Centre);
        }

        int index = _nodes.Count;
        _nodes.Add((around, from, to, -1));
        if (to - from <= LeafBoxes || centres.Diagonal == 0.0)
        {
            return index;
        }

        bool wide = centres.Width >= centres.Height;
        Array.Sort(_order, from, to - from, Comparer<int>.Create((a, b) =>
        {
            Point p = _boxes[a].Centre, q = _boxes[b].Centre;
            int c = wide ? p.Y.CompareTo(q.Y) : p.Z.CompareTo(q.Z);
            return c != 0 ? c : a.CompareTo(b);
        }));
        int middle = (from + to) / 2;
        Build(from, middle);
        int second = Build(middle, to);
        _nodes[index] = (around, from, to, second);
        return index;
    }
}
