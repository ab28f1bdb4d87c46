using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Cuts boundary curves into pieces so short that no chord can come between another chord and its curve: whatever is split
/// later stays uncrossed, because the hull of every piece touches no other hull.
/// </summary>
internal sealed class Polygonisation
{
    private readonly IReadOnlyList<BoundaryCurve> _curves;
    private readonly Func<Point, double> _size;
    private readonly double _turn;
    private readonly CancellationToken _cancellation;
    private List<Span> _spans = [];

    private Polygonisation(
        IReadOnlyList<BoundaryCurve> curves, Func<Point, double> size, double turn, CancellationToken cancellation)
    {
        _curves = curves;
        _size = size;
        _turn = turn;
        _cancellation = cancellation;
    }

    /// <summary>Pieces of every curve in order, as (curve, from, to).</summary>
    public static List<(int Curve, double From, double To)> Cut(
        IReadOnlyList<BoundaryCurve> curves, Func<Point, double> size, double turn, CancellationToken cancellation)
    {
        Polygonisation p = new(curves, size, turn, cancellation);
        for (int c = 0; c < curves.Count; c++)
        {
            p.CutBySize(c);
        }

        p.SplitUntilApart();
        return [.. p._spans.OrderBy(s => s.Curve).ThenBy(s => s.From).Select(s => (s.Curve, s.From, s.To))];
    }

    // Marches with the wanted density (pieces per parameter), then spreads the pieces evenly in it.
    private void CutBySize(int c)
    {
        const int most = 2_000_000;
        List<double> steps = [0];
        double t = 0, rest = 0;
        while (steps.Count < most)
        {
            double step = 1 / Density(c, t);
            step = 1 / Density(c, Math.Min(1, t + (0.5 * Math.Min(step, 1 - t))));
            if (t + step >= 1)
            {
                rest = (1 - t) / step;
                break;
            }

            t += step;
            steps.Add(t);
        }

        double total = steps.Count - 1 + rest;
        bool closed = _curves[c].Start == _curves[c].End;
        int pieces = Math.Max(closed ? 3 : 1, (int)Math.Ceiling(total * Margin(_curves[c])));
        double from = 0;
        for (int k = 1; k <= pieces; k++)
        {
            double at = total * k / pieces;
            int i = Math.Min((int)at, steps.Count - 1);
            double until = i + 1 < steps.Count ? steps[i + 1] : 1;
            double length = i + 1 < steps.Count ? 1 : rest;
            double to = k == pieces ? 1 : steps[i] + ((until - steps[i]) * (at - i) / length);
            _spans.Add(new Span(_curves[c], c, from, to));
            from = to;
        }
    }

    // Straight pieces may be a little longer than wanted, arcs are counted exactly, and the march over other curves needs
    // some room so that no piece turns more than it may.
    private static double Margin(BoundaryCurve curve) =>
        curve.IsStraight ? 0.9 : curve.Curve is CircularArc ? 1 - 1e-9 : 1.05;

    private double Density(int c, double t)
    {
        Curve curve = _curves[c].Curve;
        double curvature = _curves[c].IsStraight ? 0 : Math.Abs(curve.CurvatureAt(t));
        return curve.Derivative(t).Length * Math.Max(1 / _size(curve.At(t)), curvature / _turn);
    }

    private void SplitUntilApart()
    {
        // Every round halves what is in conflict; sagitta falls by four. 50 halvings exhaust a double.
        for (int round = 0; round < 50; round++)
        {
            _cancellation.ThrowIfCancellationRequested();
            SortedDictionary<int, double> splits = FindConflicts();
            if (splits.Count == 0)
            {
                return;
            }

            List<Span> next = new(_spans.Count + splits.Count);
            for (int i = 0; i < _spans.Count; i++)
            {
                Span s = _spans[i];
                if (splits.TryGetValue(i, out double at))
                {
                    next.Add(new Span(_curves[s.Curve], s.Curve, s.From, at));
                    next.Add(new Span(_curves[s.Curve], s.Curve, at, s.To));
                }
                else
                {
                    next.Add(s);
                }
            }

            _spans = next;
        }

        Span stuck = _spans[FindConflicts().Keys.First()];
        throw new MeshingException(FormattableString.Invariant(
            $"Curves meet or come closer than the arithmetic can tell near ({stuck.A.Y:g9}, {stuck.A.Z:g9}) m; they may meet only at common end points."), stuck.A);
    }

    private SortedDictionary<int, double> FindConflicts()
    {
        SortedDictionary<int, double> splits = [];
        for (int i = 0; i < _spans.Count; i++)
        {
            if (_spans[i].Turn > (1 + 1e-6) * _turn)
            {
                splits[i] = _spans[i].Middle;
            }
        }

        foreach ((int i, int j) in new BoxTree([.. _spans.Select(s => s.Hull)]).Pairs(0))
        {
            if (!_spans[i].IsStraight)
            {
                Compare(i, j, splits);
            }
            else if (!_spans[j].IsStraight)
            {
                Compare(j, i, splits);
            }
        }

        return splits;
    }

    private void Compare(int i, int j, SortedDictionary<int, double> splits)
    {
        Span p = _spans[i], q = _spans[j];
        bool startShared = p.A == q.A || p.A == q.B;
        bool endShared = p.B == q.A || p.B == q.B;
        bool apart;
        if (startShared && endShared)
        {
            apart = false;
        }
        else if (startShared || endShared)
        {
            Point common = startShared ? p.A : p.B;
            if (p.CornerAt(common) == Corner.Cusp && q.CornerAt(common) == Corner.Cusp)
            {
                MatchAtCusp(i, j, common, splits);
                return;
            }

            Point u = p.Other(common) - common, v = q.Other(common) - common;
            double angle = Math.Abs(Math.Atan2(u.Cross(v), u.Dot(v)));
            apart = angle > p.Deviation + q.Deviation;
        }
        else
        {
            // Half as much again, so that rounding and sampling do not decide.
            apart = Distance(p, q) > 1.5 * (p.Sagitta + q.Sagitta);
        }

        if (!apart)
        {
            int larger = p.Sagitta >= q.Sagitta ? i : j;
            splits[larger] = _spans[larger].Middle;
        }
    }

    // Curves that touch without an angle get first pieces of one length: their chords then keep the order of the curves.
    private void MatchAtCusp(int i, int j, Point common, SortedDictionary<int, double> splits)
    {
        double first = common.DistanceTo(_spans[i].Other(common)), second = common.DistanceTo(_spans[j].Other(common));
        const double equal = 1e-6;
        if (Math.Abs(first - second) <= equal * Math.Max(first, second))
        {
            return;
        }

        int longer = first > second ? i : j;
        Span s = _spans[longer];
        splits[longer] = PieceSplitting.AtDistance(
            _curves[s.Curve].Curve, s.From, s.To, s.A == common, Math.Min(first, second));
    }

    private static double Distance(Span p, Span q)
    {
        double ends = Math.Min(
            Math.Min(ToChord(p.A, q), ToChord(p.B, q)), Math.Min(ToChord(q.A, p), ToChord(q.B, p)));
        Point d = p.B - p.A, e = q.B - q.A;
        bool cross = d.Cross(q.A - p.A) > 0 != d.Cross(q.B - p.A) > 0 && e.Cross(p.A - q.A) > 0 != e.Cross(p.B - q.A) > 0;
        return cross ? 0 : ends;
    }

    private static double ToChord(Point p, Span s)
    {
        Point d = s.B - s.A;
        double t = Math.Clamp((p - s.A).Dot(d) / d.SquaredLength, 0, 1);
        return p.DistanceTo(Point.Between(s.A, s.B, t));
    }

    // A piece with bounds of how far the curve leaves its chord.
    private sealed class Span
    {
        private readonly BoundaryCurve _curve;

        public Span(BoundaryCurve curve, int index, double from, double to)
        {
            (_curve, Curve, From, To) = (curve, index, from, to);
            (A, B) = (curve.Curve.At(from), curve.Curve.At(to));
            if (!IsStraight)
            {
                (Sagitta, Turn) = Measure();
            }

            Hull = Box.Around(A, B).Inflated(1.5 * Sagitta);
        }

        public int Curve { get; }

        public double From { get; }

        public double To { get; }

        public Point A { get; }

        public Point B { get; }

        public bool IsStraight => _curve.IsStraight;

        public double Sagitta { get; }

        public double Turn { get; }

        // Tangent against chord: half the turn on arcs, at most all of it elsewhere.
        public double Deviation => (_curve.Curve is CircularArc ? 0.51 : 1) * Turn;

        public double Middle => PieceSplitting.Middle(_curve.Curve, From, To);

        public Box Hull { get; }

        public Point Other(Point p) => p == A ? B : A;

        public Corner CornerAt(Point p) => p == A && From == 0 ? _curve.AtStart
            : p == B && To == 1 ? _curve.AtEnd : Corner.Open;

        // Largest distance from the chord and whole turn of the tangent, from samples; arcs are exact at the middle one.
        private (double Sagitta, double Turn) Measure()
        {
            const int samples = 8;
            Point chord = B - A;
            double length = chord.Length;
            double sagitta = 0, turn = 0;
            Point tangent = _curve.Curve.Derivative(From);
            for (int i = 1; i <= samples; i++)
            {
                double t = From + ((To - From) * i / samples);
                Point next = _curve.Curve.Derivative(t);
                turn += Math.Abs(Math.Atan2(tangent.Cross(next), tangent.Dot(next)));
                tangent = next;
                if (i < samples && length > 0)
                {
                    sagitta = Math.Max(sagitta, Math.Abs(chord.Cross(_curve.Curve.At(t) - A)) / length);
                }
            }

            return (sagitta, turn);
        }
    }
}
