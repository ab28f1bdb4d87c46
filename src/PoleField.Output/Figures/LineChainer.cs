using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Joins loose pieces of line to polylines; ends closer than a tolerance are one point. The result depends on the order of adding only.</summary>
internal sealed class LineChainer(double tolerance)
{
    private readonly List<Point> _nodes = [];
    private readonly List<List<int>> _piecesAt = []; // pieces at node n
    private readonly List<(int A, int B, IReadOnlyList<Point> Points)> _pieces = [];
    private readonly List<IReadOnlyList<Point>> _closed = [];
    private readonly Dictionary<(long, long), int> _newestIn = []; // newest node in a cell of the size of the tolerance
    private readonly List<int> _olderInCell = []; // node before node n in its cell, or −1

    /// <summary>Adds a piece of two points or more; a straight one shorter than the tolerance is dropped.</summary>
    public void Add(IReadOnlyList<Point> piece)
    {
        int from = Node(piece[0]);
        int to = Node(piece[^1]);
        if (from != to)
        {
            _piecesAt[from].Add(_pieces.Count);
            _piecesAt[to].Add(_pieces.Count);
            _pieces.Add((from, to, piece));
        }
        else if (piece.Count > 2)
        {
            _closed.Add(piece);
        }
    }

    /// <summary>The polylines: open ones first, then closed ones.</summary>
    public IEnumerable<IReadOnlyList<Point>> Lines()
    {
        bool[] used = new bool[_pieces.Count];
        for (int pass = 0; pass < 2; pass++)
        {
            for (int node = 0; node < _nodes.Count; node++)
            {
                if (pass == 0 && _piecesAt[node].Count % 2 == 0)
                {
                    continue;
                }

                while (_piecesAt[node].Exists(s => !used[s]))
                {
                    yield return Walk(node, used);
                }
            }
        }

        foreach (IReadOnlyList<Point> line in _closed)
        {
            yield return line;
        }
    }

    private List<Point> Walk(int node, bool[] used)
    {
        List<Point> line = [_nodes[node]];
        int piece = _piecesAt[node].Find(s => !used[s]);
        while (true)
        {
            used[piece] = true;
            (int a, int b, IReadOnlyList<Point> points) = _pieces[piece];
            bool forwards = node == a;
            node = forwards ? b : a;
            for (int i = 1; i < points.Count - 1; i++)
            {
                line.Add(points[forwards ? i : points.Count - 1 - i]);
            }

            line.Add(_nodes[node]);
            int next = _piecesAt[node].FindIndex(s => !used[s]);
            if (next < 0)
            {
                return line;
            }

            piece = _piecesAt[node][next];
        }
    }

    private int Node(Point p)
    {
        long column = (long)Math.Floor(p.Y / tolerance);
        long row = (long)Math.Floor(p.Z / tolerance);
        (double nearest, int found) = (tolerance, -1);
        for (long c = column - 1; c <= column + 1; c++)
        {
            for (long r = row - 1; r <= row + 1; r++)
            {
                for (int n = _newestIn.GetValueOrDefault((c, r), -1); n >= 0; n = _olderInCell[n])
                {
                    double distance = _nodes[n].DistanceTo(p);
                    (nearest, found) = distance <= nearest ? (distance, n) : (nearest, found);
                }
            }
        }

        if (found >= 0)
        {
            return found;
        }

        _olderInCell.Add(_newestIn.GetValueOrDefault((column, row), -1));
        _newestIn[(column, row)] = _nodes.Count;
        _nodes.Add(p);
        _piecesAt.Add([]);
        return _nodes.Count - 1;
    }
}
