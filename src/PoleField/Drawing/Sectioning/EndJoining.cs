using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Finds which curve ends are one point: equal ones, loose ends of a layer that were meant to meet, corners of touching parts.</summary>
internal sealed class EndJoining
{
    private readonly IReadOnlyList<UsedLayer> _layers;
    private readonly List<Piece> _curves = [];
    private readonly Reach _reach;
    private readonly SectionLog _log;
    private readonly UnionFind _sets;   // over ends: 2k is the start of curve k, 2k + 1 its end
    private readonly Point[] _moved;    // place of the set, valid at its smallest end
    private readonly bool[] _bent;      // true when a bent curve gave the place, valid at its smallest end

    private EndJoining(IReadOnlyList<UsedLayer> layers, IReadOnlyList<Piece> curves, Reach reach, SectionLog log)
    {
        (_layers, _reach, _log) = (layers, reach, log);
        foreach (Piece c in curves)
        {
            if (c.Curve.Length > reach.Exact)
            {
                _curves.Add(c);
                continue;
            }

            log.Add(
                new Finding(
                    Severity.Note,
                    "short-piece",
                    $"A curve of length {SectionLog.Length(c.Curve.Length)} at {log.Place(c.Curve.Start)} is a point and was dropped.",
                    "Nothing to do.")
                { Size = c.Curve.Length },
                c.Curve.Start,
                c.Source);
        }

        _sets = new UnionFind(2 * _curves.Count);
        _moved = [.. Enumerable.Range(0, 2 * _curves.Count).Select(End)];
        _bent = [.. Enumerable.Range(0, 2 * _curves.Count).Select(e => !IsStraight(e))];
    }

    /// <summary>Joins the ends and moves the curves to the common points.</summary>
    public static Net Join(IReadOnlyList<UsedLayer> layers, IReadOnlyList<Piece> curves, Reach reach, SectionLog log)
    {
        EndJoining joining = new(layers, curves, reach, log);
        joining.JoinEqualEnds();
        joining.JoinLooseEnds();
        joining.JoinTouchingParts();
        return joining.Result();
    }

    private Point End(int end) => (end & 1) == 0 ? _curves[end >> 1].Curve.Start : _curves[end >> 1].Curve.End;

    private bool IsStraight(int end) => _curves[end >> 1].Curve is Line;

    private void JoinEqualEnds()
    {
        PointGrid grid = new(_reach.Exact, _moved.Length);
        List<int> near = [];
        for (int end = 0; end < _moved.Length; end++)
        {
            near.Clear();
            grid.FindNear(End(end), near);
            foreach (int other in near)
            {
                if (_curves[other >> 1].Layer == _curves[end >> 1].Layer)
                {
                    _sets.Union(other, end);
                }
            }

            grid.Add(End(end), end);
        }

        // Radii stay: the end of an arc, where there is one, is the place of all.
        for (int end = 0; end < _moved.Length; end++)
        {
            int set = _sets.Find(end);
            if (!IsStraight(end) && !_bent[set])
            {
                (_moved[set], _bent[set]) = (End(end), true);
            }
        }
    }

    private void JoinLooseEnds()
    {
        int[] sizes = new int[_moved.Length];
        for (int end = 0; end < sizes.Length; end++)
        {
            sizes[_sets.Find(end)]++;
        }

        List<int> loose = [.. Enumerable.Range(0, sizes.Length).Where(e => sizes[_sets.Find(e)] == 1)];
        const double clear = 3; // the second nearest end must be this much farther than the nearest
        PointGrid grid = new(clear * _reach.Join, loose.Count);
        loose.ForEach(e => grid.Add(End(e), e));
        Dictionary<int, int> nearest = [];
        HashSet<int> told = [];
        List<int> near = [];
        foreach (int end in loose)
        {
            near.Clear();
            grid.FindNear(End(end), near);
            List<(double Distance, int End)> candidates = [.. near.Where(o => MayMeet(end, o)).Select(o => (End(end).DistanceTo(End(o)), o)).Order()];
            if (candidates.Count == 0 || candidates[0].Distance > _reach.Join)
            {
                continue;
            }

            (double distance, int first) = candidates[0];
            int second = candidates.FindIndex(1, c => c.Distance > _reach.Fine && c.Distance <= clear * distance && c.End != (first ^ 1));
            if (second > 0)
            {
                if (!told.Add(end) | !told.Add(first) | !told.Add(candidates[second].End))
                {
                    continue;
                }

                _log.Add(SectionMessages.AmbiguousJoint(_log, End(end), End(first), End(candidates[second].End)), End(end), _curves[end >> 1].Source);
                continue;
            }

            nearest[end] = first;
        }

        foreach ((int end, int other) in nearest)
        {
            if (end < other && nearest.GetValueOrDefault(other, -1) == end)
            {
                Heal(end, other);
            }
        }
    }

    // The two ends of one curve meet only if the curve is far longer than the gap: a short straight piece is not a ring.
    private bool MayMeet(int end, int other)
    {
        const double longer = 10;
        Piece mine = _curves[end >> 1], its = _curves[other >> 1];
        return end != other && mine.Layer == its.Layer
            && (other != (end ^ 1) || (mine.Curve is not Line && mine.Curve.Length > longer * End(end).DistanceTo(End(other))));
    }

    private void Heal(int end, int other)
    {
        Point a = End(end), b = End(other);
        _sets.Union(end, other);
        Point place = IsStraight(end) == IsStraight(other) ? Point.Between(a, b, 0.5) : IsStraight(end) ? b : a;
        (_moved[_sets.Find(end)], _bent[_sets.Find(end)]) = (place, !(IsStraight(end) && IsStraight(other)));
        _log.AddHealed(place, a.DistanceTo(b), _curves[end >> 1].Source);
    }

    // Corners of different layers within reach; of one layer only within the fine reach, since short edges may be meant.
    private void JoinTouchingParts()
    {
        PointGrid grid = new(_reach.Join, _curves.Count);
        List<(double Distance, int First, int Second)> pairs = [];
        List<int> near = [];
        for (int end = 0; end < _moved.Length; end++)
        {
            if (_sets.Find(end) != end)
            {
                continue;
            }

            near.Clear();
            grid.FindNear(_moved[end], near);
            foreach (int other in near)
            {
                double distance = _moved[end].DistanceTo(_moved[other]);
                if (_curves[end >> 1].Layer != _curves[other >> 1].Layer || (distance <= _reach.Fine && !AreEndsOfOneCurve(end, other)))
                {
                    pairs.Add((distance, other, end));
                }
            }

            grid.Add(_moved[end], end);
        }

        pairs.Sort();
        Dictionary<int, List<int>> layersOf = [];
        foreach ((double distance, int first, int second) in pairs)
        {
            int a = _sets.Find(first), b = _sets.Find(second);
            List<int> mine = layersOf.GetValueOrDefault(a) ?? [_curves[first >> 1].Layer];
            List<int> its = layersOf.GetValueOrDefault(b) ?? [_curves[second >> 1].Layer];
            if (a == b || (distance > _reach.Fine && mine.Intersect(its).Any()))
            {
                continue;
            }

            Point place = _bent[a] == _bent[b] ? _moved[Math.Min(a, b)] : _bent[a] ? _moved[a] : _moved[b];
            bool bent = _bent[a] || _bent[b];
            _sets.Union(a, b);
            int set = _sets.Find(a);
            (_moved[set], _bent[set]) = (place, bent);
            layersOf[set] = [.. mine.Union(its)];
        }
    }

    private bool AreEndsOfOneCurve(int a, int b) => _sets.Find(a ^ 1) == _sets.Find(b) || _sets.Find(b ^ 1) == _sets.Find(a);

    private Net Result()
    {
        Net net = new();
        int[] points = new int[_moved.Length];
        Array.Fill(points, -1);
        foreach (Piece c in _curves)
        {
            int k = net.Pieces.Count;
            int start = PointOf(2 * k), end = PointOf((2 * k) + 1);
            net.Pieces.Add(c with { Start = start, End = end });
        }

        net.Pieces.RemoveAll(p => p.IsClosed && p.Curve is Line);
        net.Refit();
        return net;

        int PointOf(int end)
        {
            int set = _sets.Find(end);
            if (points[set] < 0)
            {
                points[set] = net.Points.Count;
                net.Points.Add(_moved[set]);
            }

            return points[set];
        }
    }
}
