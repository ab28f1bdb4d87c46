namespace PoleField.Geometry;

/// <summary>Places where two curves meet: closed forms for lines and circular arcs, subdivision and Newton for the rest.</summary>
internal static class CurveIntersection
{
    /// <summary>
    /// Parameters of all isolated common points, on the first and on the second curve, ends included. Curves that run along
    /// each other over a stretch share no isolated point there and give none.
    /// </summary>
    /// <param name="a">First curve.</param>
    /// <param name="b">Second curve.</param>
    /// <param name="tolerance">Distance below which curves that just miss each other count as touching, &gt; 0.</param>
    public static List<(double OnFirst, double OnSecond)> Find(Curve a, Curve b, double tolerance)
    {
        if (a is (Line or CircularArc) && b is (Line or CircularArc))
        {
            List<(double, double)> found = [];
            foreach (Point p in SupportPoints(a, b, tolerance))
            {
                double t = a.ClosestParameter(p), u = b.ClosestParameter(p);
                if (a.At(t).DistanceTo(p) <= tolerance && b.At(u).DistanceTo(p) <= tolerance)
                {
                    found.Add((t, u));
                }
            }

            return found;
        }

        return CurveIntersectionSearch.Find(a, b, tolerance);
    }

    private static IEnumerable<Point> SupportPoints(Curve a, Curve b, double tolerance) => (a, b) switch
    {
        (Line p, Line q) => Lines(p, q),
        (Line p, CircularArc q) => LineAndCircle(p, q, tolerance),
        (CircularArc p, Line q) => LineAndCircle(q, p, tolerance),
        (CircularArc p, CircularArc q) => Circles(p, q, tolerance),
        _ => throw new InvalidOperationException("Only lines and circular arcs have closed forms here."),
    };

    private static IEnumerable<Point> Lines(Line a, Line b)
    {
        Point d = a.End - a.Start, e = b.End - b.Start;
        double cross = d.Cross(e);
        const double parallel = 1e-14; // sine of the angle that rounding cannot tell from zero
        if (Math.Abs(cross) > parallel * d.Length * e.Length)
        {
            yield return a.Start + (((b.Start - a.Start).Cross(e) / cross) * d);
        }
    }

    private static IEnumerable<Point> LineAndCircle(Line line, CircularArc arc, double tolerance)
    {
        Point along = (line.End - line.Start).Unit();
        Point foot = line.Start + ((arc.Centre - line.Start).Dot(along) * along);
        double away = Math.Abs((arc.Centre - line.Start).Cross(along));
        return OnBothSides(foot, along, arc.Radius - away, arc.Radius + away, tolerance);
    }

    private static IEnumerable<Point> Circles(CircularArc a, CircularArc b, double tolerance)
    {
        Point d = b.Centre - a.Centre;
        double apart = d.Length;
        const double concentric = 1e-12;
        if (apart <= concentric * Math.Max(a.Radius, b.Radius))
        {
            return [];
        }

        // Outer and inner clearance of the two circles; negative where they miss each other.
        double overlap = Math.Min(a.Radius + b.Radius - apart, apart - Math.Abs(a.Radius - b.Radius));
        if (overlap < -tolerance)
        {
            return [];
        }

        double along = 0.5 * (apart + ((a.Radius - b.Radius) * (a.Radius + b.Radius) / apart));
        Point unit = (1 / apart) * d;
        return OnBothSides(
            a.Centre + (along * unit), unit.Perpendicular, a.Radius - Math.Abs(along), a.Radius + Math.Abs(along), tolerance);
    }

    // The half chord is √(less·more): written so, a grazing one keeps its digits.
    private static IEnumerable<Point> OnBothSides(Point foot, Point along, double less, double more, double tolerance)
    {
        if (less < -tolerance)
        {
            yield break;
        }

        double half = Math.Sqrt(Math.Max(0, less) * more);
        if (half <= tolerance)
        {
            yield return foot;
            yield break;
        }

        yield return foot - (half * along);
        yield return foot + (half * along);
    }
}
