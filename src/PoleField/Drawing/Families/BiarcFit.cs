using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Place and tangent of a face above a y ≥ 0.</summary>
/// <param name="Place">The point (y, z(y)), mm.</param>
/// <param name="Tangent">Unit tangent towards growing y.</param>
internal readonly record struct FacePoint(Point Place, Point Tangent)
{
    public static FacePoint Above(double y, double z, double slope) => new(new Point(y, z), new Point(1, slope).Unit());
}

/// <summary>
/// Lays pairs of circular arcs with common tangents (biarcs; K. M. Bolton, Computer-Aided Design 7 (1975) 89, recalled from
/// memory) along a face: places and tangents agree with it at the pairs' ends, and it is halved until no point of it lies
/// farther away than the tolerance.
/// </summary>
internal static class BiarcFit
{
    private const int SamplesPerPair = 24;

    // Samples may miss the very largest deviation; its curve is smooth, so a tenth of margin covers that.
    private const double Margin = 0.9;

    /// <summary>Arcs (lines where straight) from y = 0 to a reach.</summary>
    /// <param name="face">The face as a function of y, mm.</param>
    /// <param name="reach">Last y, mm.</param>
    /// <param name="tolerance">Largest distance from the face, mm.</param>
    public static HalfFace Fit(Func<double, FacePoint> face, double reach, double tolerance)
    {
        List<Curve> curves = [];
        Fit(face, (0, reach), Margin * tolerance, curves);
        return new HalfFace(curves);
    }

    private static void Fit(Func<double, FacePoint> face, (double From, double To) range, double tolerance, List<Curve> curves)
    {
        List<Curve> pair = Pair(face(range.From), face(range.To));
        double middle = 0.5 * (range.From + range.To);
        bool canHalve = middle > range.From && middle < range.To;
        if (!canHalve || Deviation(face, range, pair) <= tolerance)
        {
            curves.AddRange(pair);
            return;
        }

        Fit(face, (range.From, middle), tolerance, curves);
        Fit(face, (middle, range.To), tolerance, curves);
    }

    private static double Deviation(Func<double, FacePoint> face, (double From, double To) range, List<Curve> pair)
    {
        double worst = 0;
        for (int i = 1; i < SamplesPerPair; i++)
        {
            Point p = face(range.From + ((range.To - range.From) * i / SamplesPerPair)).Place;
            worst = Math.Max(worst, pair.Min(c => c.DistanceTo(p)));
        }

        return worst;
    }

    // Equal tangent lengths d: |v − d (t0 + t1)| = 2 d.
    private static List<Curve> Pair(FacePoint start, FacePoint end)
    {
        Point v = end.Place - start.Place;
        Point sum = start.Tangent + end.Tangent;
        double turn = 2 * (1 - start.Tangent.Dot(end.Tangent));
        double along = v.Dot(sum);
        double d = v.SquaredLength / (along + Math.Sqrt((along * along) + (turn * v.SquaredLength)));
        Point joint = Point.Between(start.Place + (d * start.Tangent), end.Place - (d * end.Tangent), 0.5);
        return [Arc(start.Place, start.Tangent, joint), Arc(joint, end.Place - joint, end)];
    }

    // Arc leaving its start along a unit tangent.
    private static Curve Arc(Point start, Point tangent, Point end)
    {
        Point chord = end - start;
        return FromHalfSweep(start, end, Math.Atan2(tangent.Cross(chord), tangent.Dot(chord)));
    }

    // Arc arriving at a face point along its tangent.
    private static Curve Arc(Point start, Point chord, FacePoint end) =>
        FromHalfSweep(start, end.Place, Math.Atan2(chord.Cross(end.Tangent), chord.Dot(end.Tangent)));

    private static Curve FromHalfSweep(Point start, Point end, double halfSweep)
    {
        // Below this the arc's rise over its chord is under a billionth of the chord: a line in every respect.
        const double straight = 4e-9;
        return Math.Abs(halfSweep) < straight ? new Line(start, end) : CircularArc.FromBulge(start, end, Math.Tan(halfSweep / 2));
    }
}
