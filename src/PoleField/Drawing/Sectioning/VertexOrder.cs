using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Order of the half-edges that leave a point, counter-clockwise.</summary>
internal static class VertexOrder
{
    /// <summary>
    /// Sorts by where the curves first cross a small circle about the point: right for tangent curves too, such as a fillet
    /// that leaves the face it belongs to.
    /// </summary>
    public static void Sort(PlanarMap map, int point, Span<int> leaving)
    {
        if (leaving.Length < 3)
        {
            return;
        }

        double radius = double.PositiveInfinity;
        foreach (int h in leaving)
        {
            radius = Math.Min(radius, CalmReach(map, h));
        }

        double[] angles = new double[leaving.Length];
        for (int i = 0; i < leaving.Length; i++)
        {
            Point d = Crossing(map, leaving[i], radius) - map.Points[point];
            angles[i] = Math.Atan2(d.Z, d.Y);
        }

        angles.AsSpan().Sort(leaving);
    }

    // Distance up to which the curve runs away from its start: until it has turned by half a radian.
    private static double CalmReach(PlanarMap map, int half)
    {
        Curve curve = map.Edges[half >> 1].Curve;
        if (curve is Line)
        {
            return 0.5 * curve.Length;
        }

        const double turn = 0.5;
        bool back = (half & 1) == 1;
        Point tangent = curve.Derivative(back ? 1 : 0);
        double share = 0.5;
        for (int i = 0; i < 40; i++, share *= 0.5)
        {
            Point later = curve.Derivative(back ? 1 - share : share);
            if (Math.Abs(Math.Atan2(tangent.Cross(later), tangent.Dot(later))) < turn)
            {
                break;
            }
        }

        return curve.At(back ? 1 - share : share).DistanceTo(back ? curve.End : curve.Start);
    }

    private static Point Crossing(PlanarMap map, int half, double radius)
    {
        Curve curve = map.Edges[half >> 1].Curve;
        bool back = (half & 1) == 1;
        Point from = back ? curve.End : curve.Start;
        double low = 0, high = 1;
        double share = 1;
        while (share > 1e-12 && curve.At(back ? 1 - (0.5 * share) : 0.5 * share).DistanceTo(from) > radius)
        {
            share *= 0.5;
        }

        high = share;
        for (int i = 0; i < 50; i++)
        {
            double middle = 0.5 * (low + high);
            (low, high) = curve.At(back ? 1 - middle : middle).DistanceTo(from) < radius ? (middle, high) : (low, middle);
        }

        return curve.At(back ? 1 - high : high);
    }
}
