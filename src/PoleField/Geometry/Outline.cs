namespace PoleField.Geometry;

/// <summary>A closed chain of curves, each starting where the one before ended, travelled counter-clockwise.</summary>
/// <remarks>Every instance is closed and has positive area. That it does not cross itself is checked where outlines are made from drawings.</remarks>
public sealed class Outline
{
    private Outline(IReadOnlyList<Curve> curves, double area)
    {
        Curves = curves;
        Area = area;
        Box box = Box.Empty;
        foreach (Curve c in curves)
        {
            box = box.Including(c.Bounds);
        }

        Bounds = box;
    }

    /// <summary>The curves, counter-clockwise, end to start.</summary>
    public IReadOnlyList<Curve> Curves { get; }

    /// <summary>Enclosed area, square of the length unit, exact (Green's theorem on the curves), &gt; 0.</summary>
    public double Area { get; }

    /// <summary>Smallest upright box around the outline.</summary>
    public Box Bounds { get; }

    /// <summary>Area-weighted middle.</summary>
    public Point Centroid
    {
        get
        {
            // Divergence theorem over flattened curves would lose digits; the curves' own samples by Gauss points do not.
            Point origin = Bounds.Centre;
            double y = 0, z = 0;
            foreach (Curve c in Curves)
            {
                // Pieces never straddle a knot, where a spline's higher derivatives jump.
                const int pieces = 4;
                double[] breaks = c is Nurbs spline ? spline.Breaks() : [0.0, 0.25, 0.5, 0.75, 1.0];
                for (int i = 0; i < pieces * (breaks.Length - 1); i++)
                {
                    double from = breaks[i / pieces];
                    double width = (breaks[(i / pieces) + 1] - from) / pieces;
                    foreach ((double node, double weight) in Gauss5)
                    {
                        double t = from + (width * ((i % pieces) + (0.5 * (1 + node))));
                        Point p = c.At(t) - origin;
                        Point d = c.Derivative(t);
                        double w = 0.5 * weight * width;
                        y += w * 0.5 * p.Y * p.Y * d.Z;
                        z -= w * 0.5 * p.Z * p.Z * d.Y;
                    }
                }
            }

            // Rounding beside a middle of zero would show as a place of its own.
            Point middle = origin + new Point(y / Area, z / Area);
            double nothing = 1e-12 * Bounds.Diagonal;
            return new Point(
                Math.Abs(middle.Y) < nothing ? 0.0 : middle.Y, Math.Abs(middle.Z) < nothing ? 0.0 : middle.Z);
        }
    }

    // Gauss-Legendre nodes and weights on [-1, 1], five points (Abramowitz & Stegun, table 25.4).
    private static IReadOnlyList<(double Node, double Weight)> Gauss5 { get; } =
    [
        (-0.9061798459386640, 0.2369268850561891),
        (-0.5384693101056831, 0.4786286704993665),
        (0.0, 0.5688888888888889),
        (0.5384693101056831, 0.4786286704993665),
        (0.9061798459386640, 0.2369268850561891),
    ];

    /// <summary>Closes a chain of curves; turns it round if it runs clockwise.</summary>
    /// <exception cref="ArgumentException">The curves do not join end to start, or enclose no area.</exception>
    public static Outline FromCurves(IReadOnlyList<Curve> curves)
    {
        if (curves.Count == 0)
        {
            throw new ArgumentException("An outline needs at least one curve.", nameof(curves));
        }

        Point origin = curves[0].Start;
        double area = 0;
        for (int i = 0; i < curves.Count; i++)
        {
            if (curves[i].End != curves[(i + 1) % curves.Count].Start)
            {
                throw new ArgumentException(FormattableString.Invariant(
                    $"Curve {i} of the outline ends at ({curves[i].End.Y}, {curves[i].End.Z}), the next starts elsewhere."), nameof(curves));
            }

            area += curves[i].AreaTerm(origin);
        }

        if (!(Math.Abs(area) > 0.0))
        {
            throw new ArgumentException("The outline encloses no area.", nameof(curves));
        }

        return area > 0
            ? new Outline([.. curves], area)
            : new Outline([.. curves.Reverse().Select(c => c.Reversed())], -area);
    }

    /// <summary>The upright rectangle around a centre.</summary>
    /// <exception cref="ArgumentException">Width or height is not positive.</exception>
    public static Outline Rectangle(Point centre, double width, double height)
    {
        Point a = centre + new Point(-width / 2, -height / 2);
        Point b = centre + new Point(width / 2, -height / 2);
        Point c = centre + new Point(width / 2, height / 2);
        Point d = centre + new Point(-width / 2, height / 2);
        return FromCurves([new Line(a, b), new Line(b, c), new Line(c, d), new Line(d, a)]);
    }

    /// <summary>Distance from a point to the outline itself (not to the enclosed area).</summary>
    public double DistanceToEdge(Point p)
    {
        double best = double.PositiveInfinity;
        foreach (Curve c in Curves)
        {
            best = Math.Min(best, c.DistanceTo(p));
        }

        return best;
    }

    /// <summary>True when the point lies inside (winding number of the curves, counted along a ray towards +y).</summary>
    public bool Contains(Point p)
    {
        if (!Bounds.Contains(p))
        {
            return false;
        }

        // Total angle swept by the curves as seen from p: 2π inside, 0 outside; adaptive so that no step turns by more than 90 degrees.
        double angle = 0;
        foreach (Curve c in Curves)
        {
            angle += SweptAngle(c, p);
        }

        return Math.Abs(angle) > Math.PI;
    }

    /// <summary>Signed angle under which a curve is seen from a point off it, radians.</summary>
    internal static double SweptAngle(Curve curve, Point p) => SweptAngle(curve, p, 0, 1, 0);

    private static double SweptAngle(Curve c, Point p, double from, double to, int depth)
    {
        Point a = c.At(from) - p;
        Point b = c.At(to) - p;
        Point m = c.At(0.5 * (from + to)) - p;
        double first = Math.Atan2(a.Cross(m), a.Dot(m));
        double second = Math.Atan2(m.Cross(b), m.Dot(b));
        const double quarter = Math.PI / 2;
        bool straight = c is Line;
        bool calm = Math.Abs(first) < quarter && Math.Abs(second) < quarter;
        if (straight || (calm && depth >= 4) || depth > 40)
        {
            return first + second;
        }

        double middle = 0.5 * (from + to);
        return SweptAngle(c, p, from, middle, depth + 1) + SweptAngle(c, p, middle, to, depth + 1);
    }
}
