using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>A triangle with a value at each corner, linear between.</summary>
internal readonly record struct ValueTriangle(Point P0, Point P1, Point P2, double V0, double V1, double V2);

/// <summary>A line of equal value.</summary>
/// <param name="Level">The value.</param>
/// <param name="Points">The line, metres; first equals last when closed.</param>
internal sealed record LevelLine(double Level, IReadOnlyList<Point> Points);

/// <summary>
/// Lines of equal value through triangles by linear interpolation on their edges, chained to long polylines. Of the
/// vector potential these are field lines, and equal steps of level enclose equal flux.
/// </summary>
internal static class LevelLines
{
    /// <summary>Traces all levels that are multiples of a step.</summary>
    /// <param name="triangles">Triangles; neighbours meet edge to edge.</param>
    /// <param name="step">Distance of levels, &gt; 0.</param>
    /// <param name="tolerance">Largest distance, metres, between a line and its simplified form.</param>
    /// <param name="join">
    /// Ends closer than this, metres, are joined; null for values that are the same on both sides of an edge. Values that jump
    /// a little from element to element, such as |B|, need about the width of a line.
    /// </param>
    public static IReadOnlyList<LevelLine> Trace(
        IEnumerable<ValueTriangle> triangles, double step, double tolerance, double? join = null)
    {
        SortedDictionary<long, LineChainer> chains = [];
        foreach (ValueTriangle t in triangles)
        {
            double low = Math.Min(t.V0, Math.Min(t.V1, t.V2));
            double high = Math.Max(t.V0, Math.Max(t.V1, t.V2));
            for (long k = (long)Math.Ceiling(low / step); k * step <= high; k++)
            {
                if (!chains.TryGetValue(k, out LineChainer? chain))
                {
                    chain = new LineChainer(tolerance * 1e-2);
                    chains.Add(k, chain);
                }

                Cut(t, k * step, chain);
            }
        }

        return
        [
            .. chains.SelectMany(c => Joined(c.Value, join).Select(points => new LevelLine(c.Key * step, Simplify(points, tolerance)))),
        ];
    }

    private static IEnumerable<IReadOnlyList<Point>> Joined(LineChainer pieces, double? join)
    {
        if (join is not double distance)
        {
            return pieces.Lines();
        }

        LineChainer joined = new(distance);
        foreach (IReadOnlyList<Point> piece in pieces.Lines())
        {
            joined.Add(piece);
        }

        return joined.Lines();
    }

    private static void Cut(in ValueTriangle t, double level, LineChainer chain)
    {
        ReadOnlySpan<(Point At, double Value)> corners = [(t.P0, t.V0), (t.P1, t.V1), (t.P2, t.V2)];
        Span<Point> ends = stackalloc Point[3];
        int count = 0;
        for (int k = 0; k < 3; k++)
        {
            (Point At, double Value) a = corners[k], b = corners[(k + 1) % 3];
            if ((a.Value >= level) != (b.Value >= level))
            {
                ends[count++] = Crossing(a, b, level);
            }
        }

        if (count == 2)
        {
            chain.Add([ends[0], ends[1]]);
        }
    }

    // From the lower place always, so that both triangles of an edge find the same point.
    private static Point Crossing((Point At, double Value) a, (Point At, double Value) b, double level)
    {
        bool swap = a.At.Y > b.At.Y || (a.At.Y == b.At.Y && a.At.Z > b.At.Z);
        (Point At, double Value) from = swap ? b : a, to = swap ? a : b;
        return Point.Between(from.At, to.At, (level - from.Value) / (to.Value - from.Value));
    }

    /// <summary>Leaves out points that lie within the tolerance of the line without them (Douglas and Peucker 1973).</summary>
    public static IReadOnlyList<Point> Simplify(IReadOnlyList<Point> points, double tolerance)
    {
        if (points.Count < 3)
        {
            return points;
        }

        bool[] kept = new bool[points.Count];
        kept[0] = kept[^1] = true;
        Stack<(int From, int To)> open = new([(0, points.Count - 1)]);
        while (open.TryPop(out (int From, int To) piece))
        {
            (double worst, int at) = (tolerance, -1);
            for (int i = piece.From + 1; i < piece.To; i++)
            {
                double distance = DistanceToSegment(points[i], points[piece.From], points[piece.To]);
                if (distance > worst)
                {
                    (worst, at) = (distance, i);
                }
            }

            if (at >= 0)
            {
                kept[at] = true;
                open.Push((piece.From, at));
                open.Push((at, piece.To));
            }
        }

        return [.. points.Where((_, i) => kept[i])];
    }

    private static double DistanceToSegment(Point p, Point a, Point b)
    {
        Point along = b - a;
        double squared = along.SquaredLength;
        double t = squared > 0 ? Math.Clamp((p - a).Dot(along) / squared, 0, 1) : 0;
        return p.DistanceTo(Point.Between(a, b, t));
    }
}
