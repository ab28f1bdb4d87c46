using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Joins loose segments to polylines; ends closer than a tolerance are one point. The result depends on the order of adding only.</summary>
internal sealed class LineChainer(double tolerance)
{
    private readonly List<Point> _nodes = [];
    private readonly List<List<int>> _segmentsAt = []; // segments at node n
    private readonly List<(int A, int B)> _segments = [];
    private readonly Dictionary<(long, long), int> _cells = []; // node in a cell of the size of the tolerance

    public void Add(Point a, Point b)
    {
        int from = Node(a);
        int to = Node(b);
        if (from == to)
        {
            return;
        }

        _segmentsAt[from].Add(_segments.Count);
        _segmentsAt[to].Add(_segments.Count);
        _segments.Add((from, to));
    }

    /// <summary>The polylines: open ones first, then closed ones.</summary>
    public IEnumerable<IReadOnlyList<Point>> Lines()
    {
        bool[] used = new bool[_segments.Count];
        for (int pass = 0; pass < 2; pass++)
        {
            for (int node = 0; node < _nodes.Count; node++)
            {
                if (pass == 0 && _segmentsAt[node].Count % 2 == 0)
                {
                    continue;
                }

                while (_segmentsAt[node].Exists(s => !used[s]))
                {
                    yield return Walk(node, used);
                }
            }
        }
    }

    private List<Point> Walk(int node, bool[] used)
    {
        List<Point> line = [_nodes[node]];
        int segment = _segmentsAt[node].Find(s => !used[s]);
        while (true)
        {
            used[segment] = true;
            (int a, int b) = _segments[segment];
            node = node == a ? b : a;
            line.Add(_nodes[node]);
            int next = _segmentsAt[node].FindIndex(s => !used[s]);
            if (next < 0)
            {
                return line;
            }

            segment = _segmentsAt[node][next];
        }
    }

    private int Node(Point p)
    {
        long column = (long)Math.Floor(p.Y / tolerance);
        long row = (long)Math.Floor(p.Z / tolerance);
        for (long dc = -1; dc <= 1; dc++)
        {
            for (long dr = -1; dr <= 1; dr++)
            {
                if (_cells.TryGetValue((column + dc, row + dr), out int found) && _nodes[found].DistanceTo(p) <= tolerance)
                {
                    return found;
                }
            }
        }

        _nodes.Add(p);
        _segmentsAt.Add([]);
        _cells[(column, row)] = _nodes.Count - 1;
        return _nodes.Count - 1;
    }
}
