using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Cuts curves where others end on them or cross them and lays equal pieces together, so that pieces meet only at common points.</summary>
internal sealed class Weaving
{
    private readonly Net _net;
    private readonly Reach _reach;
    private readonly SectionLog _log;
    private readonly SortedDictionary<int, List<(double T, int Point)>> _cuts = [];
    private IReadOnlyList<(int First, int Second)> _near = []; // pieces whose boxes come within the join length

    private Weaving(Net net, Reach reach, SectionLog log)
    {
        (_net, _reach, _log) = (net, reach, log);
    }

    /// <summary>The edges of the planar map; the net's points are their ends.</summary>
    public static List<WovenEdge> Weave(Net net, Reach reach, SectionLog log)
    {
        Weaving weaving = new(net, reach, log);
        weaving.FindNear();
        weaving.CutAtPoints();
        weaving.CutAtCrossings();
        return Overlay.LayTogether(net, reach, log);
    }

    private void FindNear() => _near = new BoxTree([.. _net.Pieces.Select(p => p.Curve.Bounds)]).Pairs(_reach.Join);

    private void CutAtPoints()
    {
        List<(int Point, int Piece)> near = PointsNearPieces();
        Dictionary<int, List<int>> incident = near.Select(n => n.Point).Distinct().ToDictionary(v => v, _ => new List<int>());
        for (int i = 0; near.Count > 0 && i < _net.Pieces.Count; i++)
        {
            incident.GetValueOrDefault(_net.Pieces[i].Start)?.Add(i);
            incident.GetValueOrDefault(_net.Pieces[i].End)?.Add(i);
        }

        HashSet<int> moved = [];
        foreach ((int v, int i) in near)
        {
            CutAt(i, v, incident[v], moved);
        }

        if (ApplyCuts())
        {
            FindNear();
        }
    }

    // Ends of pieces within the join length of the box of another piece, each pair once, in increasing order.
    private List<(int Point, int Piece)> PointsNearPieces()
    {
        List<(int, int)> near = [];
        foreach ((int i, int j) in _near)
        {
            (Piece a, Piece b) = (_net.Pieces[i], _net.Pieces[j]);
            AddIfNear(a.Start, j);
            AddIfNear(a.End, j);
            AddIfNear(b.Start, i);
            AddIfNear(b.End, i);
        }

        return [.. near.Distinct().Order()];

        void AddIfNear(int v, int i)
        {
            Piece piece = _net.Pieces[i];
            if (piece.Start != v && piece.End != v && piece.Curve.Bounds.Inflated(_reach.Join).Contains(_net.Points[v]))
            {
                near.Add((v, i));
            }
        }
    }

    // Cuts a piece at a point near it. A point of straight curves moves onto the piece, once.
    private void CutAt(int i, int v, List<int> incident, HashSet<int> moved)
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
            return;
        }

        Cut(i, t, v);
        if (distance <= _reach.Exact)
        {
            return;
        }

        _log.AddHealed(p, distance, _net.Pieces[incident[0]].Source);
        bool movable = incident.TrueForAll(k => _net.Pieces[k].Curve is Line) && !(_net.IsHalf && p.Y == 0);
        if (movable && moved.Add(v))
        {
            _net.Points[v] = foot;
        }
    }

    private void CutAtCrossings()
    {
        PointGrid crossings = new(_reach.Fine, 0);
        List<int> known = [];
        foreach ((int i, int j) in _near)
        {
            if (MayCross(_net.Pieces[i], _net.Pieces[j]))
            {
                CutAtCrossing(i, j, crossings, known);
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
        return !share || !((a.Curve is Line && b.Curve is Line) || Overlay.AreAlike(a, b, _reach));
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

    // True when there were any.
    private bool ApplyCuts()
    {
        if (_cuts.Count == 0)
        {
            return false;
        }

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
        return true;
    }
}
