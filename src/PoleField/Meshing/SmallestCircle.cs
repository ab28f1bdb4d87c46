using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>The smallest circle around places (Welzl 1991, in the order given, moving deciders to the front).</summary>
internal static class SmallestCircle
{
    private const double Slack = 1 + 1e-12;

    public static OpenCircle Around(IReadOnlyList<Point> places)
    {
        // A fixed shuffle keeps the expected cost linear and the result the same every time.
        Point[] p = [.. places];
        uint seed = 12345;
        for (int i = p.Length - 1; i > 0; i--)
        {
            seed = (seed * 1664525) + 1013904223;
            int j = (int)((seed >> 8) % (uint)(i + 1));
            (p[i], p[j]) = (p[j], p[i]);
        }

        OpenCircle c = new(p[0], 0);
        for (int i = 1; i < p.Length; i++)
        {
            if (!Holds(c, p[i]))
            {
                c = Through(p.AsSpan(0, i), p[i]);
            }
        }

        return c;
    }

    private static OpenCircle Through(ReadOnlySpan<Point> p, Point a)
    {
        OpenCircle c = new(a, 0);
        for (int j = 0; j < p.Length; j++)
        {
            if (!Holds(c, p[j]))
            {
                c = Through(p[..j], a, p[j]);
            }
        }

        return c;
    }

    private static OpenCircle Through(ReadOnlySpan<Point> p, Point a, Point b)
    {
        Point middle = Point.Between(a, b, 0.5);
        OpenCircle c = new(middle, Math.Max(middle.DistanceTo(a), middle.DistanceTo(b)));
        foreach (Point q in p)
        {
            if (!Holds(c, q))
            {
                Point centre = a + Circumcentre(b - a, q - a);
                c = centre.IsFinite ? new OpenCircle(centre, centre.DistanceTo(a)) : c;
            }
        }

        return c;
    }

    /// <summary>Centre of the circle through the origin and two places; not finite when they are collinear.</summary>
    public static Point Circumcentre(Point b, Point c)
    {
        double scale = 0.5 / b.Cross(c);
        double bb = b.SquaredLength, cc = c.SquaredLength;
        return new Point(scale * ((c.Z * bb) - (b.Z * cc)), scale * ((b.Y * cc) - (c.Y * bb)));
    }

    private static bool Holds(OpenCircle c, Point p) => c.Centre.DistanceTo(p) <= c.Radius * Slack;
}
