using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Cuts curves where others end on them or cross them and lays equal pieces together, so that pieces meet only at common points.</summary>
internal sealed class Weaving
{
    private readonly Net _net;
    private readonly Reach _reach;
    private readonly SectionLog _log;
    private readonly SortedDictionary<int, List<(double T, int Point)>> _cuts = [];

    private Weaving(Net net, Reach reach, SectionLog log)
    {
        (_net, _reach, _log) = (net, reach, log);
    }

    /// <summary>The edges of the planar map; the net's points are their ends.</summary>
    public static List<WovenEdge> Weave(Net net, Reach reach, SectionLog log)
    {
        Weaving weaving = new(net, reach, log);
        weaving.CutAtPoints();
        weaving.CutAtCrossings();
        return weaving.LayTogether();
    }

    private void CutAtPoints()
    {
        BoxIndex index = new([.. _net.Pieces.Select(p => p.Curve.Bounds)]);
        List<int>[] incident = IncidentPieces();
        List<int> near = [];
        for (int v = 0; v < _net.Points.Count; v++)
        {
            Point p = _net.Points[v];
            near.Clear();
            index.FindOverlaps(new Box(p, p).Inflated(_reach.Join), near);
            near.Sort();
            bool moved = false;
            foreach (int i in near)
            {
                if (_net.Pieces[i].Start != v && _net.Pieces[i].End != v)
                {
                    moved |= CutAt(i, v, incident[v], moved);
                }
            }
        }

        ApplyCuts();
    }

    // Cuts a piece at a point near it. A point of straight curves moves onto the piece, once; tells whether it did.
    private bool CutAt(int i, int v, List<int> incident, bool moved)
    {
        Piece piece = _net.Pieces[i];
        Point p = _net.Points[v];
        double t = piece.Curve.ClosestParameter(p);
        Point foot = piece.Curve.At(t);
        double distance = foot.DistanceTo(p);
        bool loose = incident.Count(k => _net.Pieces[k].Layer == piece.Layer) < 2;
        double toEnds = Math.Min(foot.DistanceTo(piece.Curve.Start), foot.DistanceTo(piece.Curve.End));
        if (distance > (loose ? _reach.Join : _reach.Fine) || toEnds <= _reach.Fine)
        {
            return false;
        }

        Cut(i, t, v);
        if (distance <= _reach.Exact)
        {
            return false;
        }

        _log.AddHealed(p, distance, _net.Pieces[incident[0]].Source);
        bool movable = !moved && incident.TrueForAll(k => _net.Pieces[k].Curve is Line) && !(_net.IsHalf && p.Y == 0);
        if (movable)
        {
            _net.Points[v] = foot;
        }

        return movable;
    }

    private void CutAtCrossings()
    {
        BoxIndex index = new([.. _net.Pieces.Select(p => p.Curve.Bounds)]);
        PointGrid crossings = new(_reach.Fine);
        List<int> near = [], known = [];
        for (int i = 0; i < _net.Pieces.Count; i++)
        {
            near.Clear();
            index.FindOverlaps(_net.Pieces[i].Curve.Bounds.Inflated(_reach.Exact), near);
            near.Sort();
            foreach (int j in near)
            {
                if (j > i && MayCross(_net.Pieces[i], _net.Pieces[j]))
                {
                    CutAtCrossing(i, j, crossings, known);
                }
            }
        }

        ApplyCuts();
    }

    private void CutAtCrossing(int i, int j, PointGrid crossings, List<int> known)
    {
        (Piece a, Piece b) = (_net.Pieces[i], _net.Pieces[j]);
        foreach ((double t, double u) in CurveIntersection.Find(a.Curve, b.Curve, _reach.Exact))
        {
            Point p = a.Curve.At(t);
            if (IsAtEnd(a, p) || IsAtEnd(b, p))
            {
                continue;
            }

            if (a.Layer == b.Layer)
            {
                _log.Add(SectionMessages.SelfCrossing(_log, p, a, b), p, a.Source);
            }

            known.Clear();
            crossings.FindNear(p, known);
            int v = known.Count > 0 ? known.Min() : _net.Points.Count;
            if (v == _net.Points.Count)
            {
                _net.Points.Add(p);
                crossings.Add(p, v);
            }

            Cut(i, t, v);
            Cut(j, u, v);
        }
    }

    // Straight pieces with a common end meet only there.
    private bool MayCross(Piece a, Piece b)
    {
        bool share = a.Start == b.Start || a.Start == b.End || a.End == b.Start || a.End == b.End;
        return !share || !((a.Curve is Line && b.Curve is Line) || AreAlike(a, b));
    }

    private bool IsAtEnd(Piece piece, Point p) =>
        p.DistanceTo(_net.Points[piece.Start]) <= _reach.Fine || p.DistanceTo(_net.Points[piece.End]) <= _reach.Fine;

    private void Cut(int piece, double t, int point)
    {
        if (!_cuts.TryGetValue(piece, out List<(double, int)>? cuts))
        {
            _cuts[piece] = cuts = [];
        }

        if (!cuts.Exists(c => c.Item2 == point))
        {
            cuts.Add((t, point));
        }
    }

    private void ApplyCuts()
    {
        List<Piece> pieces = new(_net.Pieces.Count + _cuts.Count);
        for (int i = 0; i < _net.Pieces.Count; i++)
        {
            Piece piece = _net.Pieces[i];
            if (!_cuts.TryGetValue(i, out List<(double T, int Point)>? cuts))
            {
                pieces.Add(piece);
                continue;
            }

            cuts.Sort();
            double from = 0;
            int start = piece.Start;
            foreach ((double t, int point) in cuts.Append((1.0, piece.End)))
            {
                // Two points may fall on one place of the curve; the piece between them is nothing.
                if (t > from && _net.Points[start] != _net.Points[point])
                {
                    pieces.Add(piece with { Curve = piece.Curve.Part(from, t), Start = start, End = point, Whole = false });
                    (from, start) = (t, point);
                }
            }
        }

        _cuts.Clear();
        _net.Pieces = pieces;
        _net.Refit();
    }

    private List<WovenEdge> LayTogether()
    {
        // Pieces sorted by their ends; a run of equal ends may hold pieces that lie on each other. Edges keep the order of drawing.
        Piece[] pieces = [.. _net.Pieces];
        long[] ends = [.. pieces.Select(p => ((long)Math.Min(p.Start, p.End) * _net.Points.Count) + Math.Max(p.Start, p.End))];
        int[] order = [.. Enumerable.Range(0, pieces.Length)];
        Array.Sort(order, (i, j) => ends[i] != ends[j] ? ends[i].CompareTo(ends[j]) : i.CompareTo(j));
        SortedDictionary<int, List<Piece>> several = []; // by the first piece of the run
        bool[] alone = new bool[pieces.Length];
        for (int from = 0, to; from < order.Length; from = to)
        {
            for (to = from + 1; to < order.Length && ends[order[to]] == ends[order[from]]; to++)
            {
            }

            alone[order[from]] = to == from + 1;
            if (!alone[order[from]])
            {
                several[order[from]] = [.. order[from..to].Select(i => pieces[i])];
            }
        }

        List<WovenEdge> edges = new(pieces.Length);
        for (int i = 0; i < pieces.Length; i++)
        {
            if (alone[i])
            {
                edges.Add(Edge(pieces[i], [pieces[i].Layer]));
            }
            else if (several.TryGetValue(i, out List<Piece>? run))
            {
                LayTogether(run, edges);
            }
        }

        return edges;
    }

    private void LayTogether(List<Piece> rest, List<WovenEdge> edges)
    {
        while (rest.Count > 0)
        {
            // A bent piece keeps its shape against a straight one; of equals the first drawn of the first layer.
            Piece keep = rest.FirstOrDefault(p => p.Curve is not Line) ?? rest[0];
            ILookup<bool, Piece> alike = rest.ToLookup(p => ReferenceEquals(p, keep) || AreAlike(keep, p));
            NoteRepeats([.. alike[true]]);
            edges.Add(Edge(keep, [.. alike[true].Select(p => p.Layer).Distinct().Order()]));
            rest = [.. alike[false]];
        }
    }

    private static WovenEdge Edge(Piece p, IReadOnlyList<int> layers) => new(p.Curve, p.Start, p.End, layers, p.Source);

    private void NoteRepeats(List<Piece> alike)
    {
        foreach (IGrouping<int, Piece> drawn in alike.GroupBy(p => p.Layer))
        {
            Piece? first = null;
            foreach (Piece p in drawn)
            {
                if (first is not null)
                {
                    Point at = p.Curve.At(0.5);
                    _log.Add(SectionMessages.Repeat(_log, at, p.Curve.Length, first.Whole && p.Whole), at, p.Source);
                }

                first ??= p;
            }
        }
    }

    // Same ends, and nowhere farther apart than the reach: sampled at the quarters, where arcs between two points differ most.
    private bool AreAlike(Piece a, Piece b)
    {
        if (Math.Min(a.Start, a.End) != Math.Min(b.Start, b.End) || Math.Max(a.Start, a.End) != Math.Max(b.Start, b.End))
        {
            return false;
        }

        double reach = a.Layer == b.Layer ? _reach.Fine : _reach.Join;
        return (a.Curve is Line && b.Curve is Line)
            || (a.Curve.DistanceTo(b.Curve.At(0.25)) <= reach && a.Curve.DistanceTo(b.Curve.At(0.5)) <= reach
                && a.Curve.DistanceTo(b.Curve.At(0.75)) <= reach);
    }

    private List<int>[] IncidentPieces()
    {
        List<int>[] incident = [.. _net.Points.Select(_ => new List<int>(2))];
        for (int i = 0; i < _net.Pieces.Count; i++)
        {
            incident[_net.Pieces[i].Start].Add(i);
            incident[_net.Pieces[i].End].Add(i);
        }

        return incident;
    }
}
