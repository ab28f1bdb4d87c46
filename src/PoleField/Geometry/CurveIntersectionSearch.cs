namespace PoleField.Geometry;

/// <summary>Common points of two arbitrary curves: boxes that overlap are halved until Newton's method can take over.</summary>
internal sealed class CurveIntersectionSearch
{
    private const int MostPairs = 20_000; // curves that run along each other stop here instead of at the machine's precision
    private const double CalmTurn = 0.3;  // radians; pieces that turn less and cross squarely meet once

    private readonly Curve _a;
    private readonly Curve _b;
    private readonly double _tolerance;
    private readonly List<(double, double)> _found = [];

    private CurveIntersectionSearch(Curve a, Curve b, double tolerance)
    {
        _a = a;
        _b = b;
        _tolerance = tolerance;
    }

    public static List<(double OnFirst, double OnSecond)> Find(Curve a, Curve b, double tolerance)
    {
        CurveIntersectionSearch search = new(a, b, tolerance);
        search.Run();
        return [.. search._found.Order()];
    }

    private void Run()
    {
        Queue<(Span A, Span B)> waiting = new();
        waiting.Enqueue((new Span(_a, 0, 1), new Span(_b, 0, 1)));
        for (int pairs = 0; pairs < MostPairs && waiting.TryDequeue(out (Span A, Span B) pair); pairs++)
        {
            (Span a, Span b) = pair;
            if (!a.Box.Inflated(_tolerance).Overlaps(b.Box))
            {
                continue;
            }

            bool calm = a.Turn < CalmTurn && b.Turn < CalmTurn;
            if (calm && TryNewton(a, b))
            {
                continue;
            }

            if (Math.Max(a.Box.Diagonal, b.Box.Diagonal) <= _tolerance)
            {
                Add(a.Middle, b.Middle);
                continue;
            }

            foreach (Span p in a.Box.Diagonal > _tolerance ? a.Halves(_a) : [a])
            {
                foreach (Span q in b.Box.Diagonal > _tolerance ? b.Halves(_b) : [b])
                {
                    waiting.Enqueue((p, q));
                }
            }
        }
    }

    // True when the pieces are settled: they meet squarely once, or their straight hulls cannot meet.
    private bool TryNewton(Span a, Span b)
    {
        double t = a.Middle, u = b.Middle;
        const int steps = 12;
        const double square = 0.3; // sine of the crossing angle above which one crossing is all
        for (int i = 0; i < steps; i++)
        {
            Point gap = _b.At(u) - _a.At(t);
            Point d = _a.Derivative(t), e = _b.Derivative(u);
            double cross = d.Cross(e);
            if (!(Math.Abs(cross) > square * d.Length * e.Length))
            {
                return false;
            }

            double dt = gap.Cross(e) / cross, du = gap.Cross(d) / cross;
            t = Math.Clamp(t + dt, 0, 1);
            u = Math.Clamp(u + du, 0, 1);
        }

        double miss = _a.At(t).DistanceTo(_b.At(u));
        if (miss > _tolerance)
        {
            // Stuck at an end: the pieces miss each other if the end lies outside both; halving decides.
            return false;
        }

        if (a.Holds(t) && b.Holds(u))
        {
            Add(t, u);
        }

        return true;
    }

    private void Add(double t, double u)
    {
        Point p = _a.At(t);
        if (!_found.Exists(f => _a.At(f.Item1).DistanceTo(p) <= 4 * _tolerance) && p.DistanceTo(_b.At(u)) <= 2 * _tolerance)
        {
            _found.Add((t, u));
        }
    }

    private sealed class Span
    {
        public Span(Curve curve, double from, double to)
        {
            (From, To) = (from, to);
            Curve part = from == 0 && to == 1 ? curve : curve.Part(from, to);
            Box = part.Bounds;
            const int samples = 4;
            Point tangent = curve.Derivative(from);
            for (int i = 1; i <= samples; i++)
            {
                Point next = curve.Derivative(from + ((to - from) * i / samples));
                Turn += Math.Abs(Math.Atan2(tangent.Cross(next), tangent.Dot(next)));
                tangent = next;
            }
        }

        public double From { get; }

        public double To { get; }

        public Box Box { get; }

        public double Turn { get; }

        public double Middle => 0.5 * (From + To);

        // A little beyond the ends, so that a crossing at a cut is not lost between two pieces.
        public bool Holds(double t) => t >= From - (0.01 * (To - From)) && t <= To + (0.01 * (To - From));

        public Span[] Halves(Curve curve) => [new Span(curve, From, Middle), new Span(curve, Middle, To)];
    }
}
