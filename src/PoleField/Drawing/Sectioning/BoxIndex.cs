using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Boxes halved again and again by their middles: all boxes that overlap another one in logarithmic time.</summary>
internal sealed class BoxIndex
{
    private const int LeafSize = 8;

    private readonly Box[] _boxes;
    private readonly int[] _order;
    private readonly List<Box> _around = []; // of the ranges of _order, in the order of their halving
    private readonly Stack<(int From, int To, int Node)> _waiting = new();

    public BoxIndex(IReadOnlyList<Box> boxes)
    {
        _boxes = [.. boxes];
        _order = [.. Enumerable.Range(0, boxes.Count)];
        Halve(0, boxes.Count, 0);
    }

    /// <summary>Adds the indices of all boxes that share a point with the given one.</summary>
    public void FindOverlaps(Box box, List<int> found)
    {
        _waiting.Push((0, _order.Length, 0));
        while (_waiting.TryPop(out (int From, int To, int Node) at))
        {
            if (!_around[at.Node].Overlaps(box))
            {
                continue;
            }

            if (at.To - at.From <= LeafSize)
            {
                for (int i = at.From; i < at.To; i++)
                {
                    if (_boxes[_order[i]].Overlaps(box))
                    {
                        found.Add(_order[i]);
                    }
                }

                continue;
            }

            int middle = (at.From + at.To) / 2;
            _waiting.Push((middle, at.To, (2 * at.Node) + 2));
            _waiting.Push((at.From, middle, (2 * at.Node) + 1));
        }
    }

    private void Halve(int from, int to, int node)
    {
        Box around = Box.Empty, middles = Box.Empty;
        for (int i = from; i < to; i++)
        {
            around = around.Including(_boxes[_order[i]]);
            middles = middles.Including(_boxes[_order[i]].Centre);
        }

        while (_around.Count <= node)
        {
            _around.Add(Box.Empty);
        }

        _around[node] = around;
        if (to - from <= LeafSize)
        {
            return;
        }

        bool wide = middles.Width >= middles.Height;
        double[] keys = new double[to - from];
        for (int i = from; i < to; i++)
        {
            Point centre = _boxes[_order[i]].Centre;
            keys[i - from] = wide ? centre.Y : centre.Z;
        }

        keys.AsSpan().Sort(_order.AsSpan(from, to - from));
        int middle = (from + to) / 2;
        Halve(from, middle, (2 * node) + 1);
        Halve(middle, to, (2 * node) + 2);
    }
}
