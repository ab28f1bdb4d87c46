namespace PoleField.Geometry;

/// <summary>
/// One polynomial (or rational) piece of a NURBS in Bézier form over the knots <see cref="From"/> to <see cref="To"/>.
/// </summary>
internal sealed class NurbsSpan
{
    // Of one piece; a maximum takes about fifty, and rounding must not make it more.
    private const int MostHalvings = 2000;

    // Homogeneous control points (w·y, w·z, w), places counted from the curve's start so that far drawings lose no digits.
    private readonly (double Y, double Z, double W)[] _control;

    /// <summary>Piece from its control points, relative to <paramref name="origin"/>.</summary>
    public NurbsSpan(double from, double to, ReadOnlySpan<NurbsControl> control, Point origin)
    {
        From = from;
        To = to;
        _control = new (double, double, double)[control.Length];
        Box hull = Box.Empty;
        for (int i = 0; i < control.Length; i++)
        {
            (Point place, double weight) = control[i];
            hull = hull.Including(place);
            Point p = place - origin;
            _control[i] = (weight * p.Y, weight * p.Z, weight);
        }

        Hull = hull;
        IsPolynomial = _control.All(c => c.W == _control[0].W);
    }

    /// <summary>Knot at the start of the piece.</summary>
    public double From { get; }

    /// <summary>Knot at its end.</summary>
    public double To { get; }

    /// <summary>Box around the control points, which holds the piece.</summary>
    public Box Hull { get; }

    /// <summary>True when all weights agree.</summary>
    public bool IsPolynomial { get; }

    /// <summary>Polynomial degree.</summary>
    public int Degree => _control.Length - 1;

    /// <summary>Place relative to the origin of construction and its two derivatives by s in [0, 1] (de Casteljau).</summary>
    public (Point Place, Point First, Point Second) Evaluate(double s)
    {
        int p = Degree;
        Span<(double Y, double Z, double W)> work = stackalloc (double, double, double)[p + 1];
        _control.CopyTo(work);
        (double Y, double Z, double W) first = default, second = default;
        for (int level = p; level >= 1; level--)
        {
            if (level == 2)
            {
                double f = p * (p - 1);
                second = (
                    f * (work[2].Y - (2 * work[1].Y) + work[0].Y),
                    f * (work[2].Z - (2 * work[1].Z) + work[0].Z),
                    f * (work[2].W - (2 * work[1].W) + work[0].W));
            }
            else if (level == 1)
            {
                first = (p * (work[1].Y - work[0].Y), p * (work[1].Z - work[0].Z), p * (work[1].W - work[0].W));
            }

            for (int i = 0; i < level; i++)
            {
                work[i] = Blend(work[i], work[i + 1], s);
            }
        }

        // Quotient rule for (Y, Z)/W.
        double w = work[0].W;
        Point place = new(work[0].Y / w, work[0].Z / w);
        Point d = new((first.Y - (first.W * place.Y)) / w, (first.Z - (first.W * place.Z)) / w);
        Point dd = new(
            (second.Y - (2 * first.W * d.Y) - (second.W * place.Y)) / w,
            (second.Z - (2 * first.W * d.Z) - (second.W * place.Z)) / w);
        return (place, d, dd);
    }

    /// <summary>
    /// Largest value of direction · place, at least <paramref name="known"/>: halves are kept while their control
    /// points reach further than the best point found (convex hull).
    /// </summary>
    public double Reach(Point direction, double known)
    {
        var heights = new (double H, double W)[_control.Length];
        double size = 0;
        for (int i = 0; i < heights.Length; i++)
        {
            (double y, double z, double w) = _control[i];
            heights[i] = ((direction.Y * y) + (direction.Z * z), w);
            size = Math.Max(size, Math.Abs(heights[i].H / w));
        }

        int budget = MostHalvings;
        return Reach(heights, known, 1e-15 * size, ref budget);
    }

    private static double Reach((double H, double W)[] heights, double known, double resolution, ref int budget)
    {
        known = Math.Max(known, Math.Max(heights[0].H / heights[0].W, heights[^1].H / heights[^1].W));
        double most = heights.Max(h => h.H / h.W);
        if (!(most > known + resolution))
        {
            return known;
        }

        // The control points reach at least as far as the piece.
        if (--budget < 0)
        {
            return most;
        }

        int p = heights.Length - 1;
        var left = new (double H, double W)[p + 1];
        var right = ((double H, double W)[])heights.Clone();
        for (int level = p; level >= 0; level--)
        {
            left[p - level] = right[0];
            for (int i = 0; i < level; i++)
            {
                right[i] = (0.5 * (right[i].H + right[i + 1].H), 0.5 * (right[i].W + right[i + 1].W));
            }
        }

        known = Reach(left, known, resolution, ref budget);
        return Reach(right, known, resolution, ref budget);
    }

    private static (double Y, double Z, double W) Blend(
        (double Y, double Z, double W) a, (double Y, double Z, double W) b, double s) =>
        (a.Y + (s * (b.Y - a.Y)), a.Z + (s * (b.Z - a.Z)), a.W + (s * (b.W - a.W)));
}
