namespace PoleField.Geometry;

/// <summary>Common points of two arbitrary curves: boxes that overlap are halved until Newton's method can take over.</summary>
internal sealed class CurveIntersectionSearch
{
    private const int MostPairs = 20_000; // curves that run along each other stop here instead of at the machine's precision
    private const double CalmTurn = 0.3;  // radians; pieces that turn less are fit for Newton's method

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
            double leaf = Math.Max(Leaf(a), Leaf(b));
            if (calm && IsSettled(a, b))
            {
                continue;
            }

            if (Math.Max(a.Box.Diagonal, b.Box.Diagonal) <= leaf)
            {
                AddTouch(a, b, leaf);
                continue;
            }

            foreach (Span p in a.Box.Diagonal > 0.5 * b.Box.Diagonal ? a.Halves(_a) : [a])
            {
                foreach (Span q in b.Box.Diagonal > 0.5 * a.Box.Diagonal ? b.Halves(_b) : [b])
                {
                    waiting.Enqueue((p, q));
                }
            }
        }
    }

    // Pieces so short that they leave their tangent by less than the tolerance cannot be told apart by halving.
    private double Leaf(Span s) => Math.Max(2 * _tolerance, s.Turn > 0 ? Math.Sqrt(_tolerance * s.Box.Diagonal / s.Turn) : 0);

    // True when the pieces meet once for certain: at an angle larger than all they turn.
    private bool IsSettled(Span a, Span b)
    {
        double t = a.Middle, u = b.Middle;
        const int steps = 12;
        for (int i = 0; i < steps; i++)
        {
            Point gap = _b.At(u) - _a.At(t);
            Point d = _a.Derivative(t), e = _b.Derivative(u);
            double cross = d.Cross(e);
            if (!(Math.Abs(cross) > 0))
            {
                return false;
            }

            t = Math.Clamp(t + (gap.Cross(e) / cross), 0, 1);
            u = Math.Clamp(u + (gap.Cross(d) / cross), 0, 1);
        }

        Point along = _a.Derivative(t), across = _b.Derivative(u);
        double sine = Math.Abs(along.Cross(across)) / (along.Length * across.Length);
        bool once = Math.Asin(Math.Min(1, sine)) > a.Turn + b.Turn;
        if (!once || !a.Holds(t) || !b.Holds(u) || _a.At(t).DistanceTo(_b.At(u)) > _tolerance)
        {
            return false;
        }

        Add(t, u, 4 * _tolerance);
        return true;
    }

    private void AddTouch(Span a, Span b, double apart)
    {
        double t = a.Middle, u = b.Middle;
        const int steps = 20;
        for (int i = 0; i < steps; i++)
        {
            u = _b.ClosestParameter(_a.At(t));
            t = _a.ClosestParameter(_b.At(u));
        }

        if (_a.At(t).DistanceTo(_b.At(u)) <= _tolerance)
        {
            Add(t, u, 4 * apart);
        }
    }

    private void Add(double t, double u, double apart)
    {
        Point p = _a.At(t);
        if (!_found.Exists(f => _a.At(f.Item1).DistanceTo(p) <= apart))
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
