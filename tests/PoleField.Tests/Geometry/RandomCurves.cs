using CsCheck;
using PoleField.Geometry;

namespace PoleField.Tests.Geometry;

/// <summary>Random curves of every kind, of sizes around 1, near and far from the origin.</summary>
internal static class RandomCurves
{
    private static readonly Gen<double> Coordinate = Gen.Double[-2, 2];

    public static Gen<Point> Point { get; } = Gen.Select(Coordinate, Coordinate, (y, z) => new Point(y, z));

    public static Gen<Affine> Map { get; } =
        Gen.Select(Gen.Double[0, Math.Tau], Gen.Double[0.3, 3], Gen.Double[-3, -0.3], Gen.Bool, Point, Coordinate).Select(
            (angle, a, b, mirrored, shift, shear) => Affine.Turn(default, angle)
                .After(new Affine(a, shear, 0, mirrored ? b : -b, shift.Y, shift.Z)));

    public static Gen<Curve> Line { get; } = Gen.Select(Point, Point)
        .Where((a, b) => a.DistanceTo(b) > 0.1)
        .Select((a, b) => (Curve)new Line(a, b));

    public static Gen<Curve> Arc { get; } = Gen.Select(Point, Gen.Double[0.2, 2], Gen.Double[-7, 7], Gen.Double[0.05, Math.Tau], Gen.Bool)
        .Select((c, r, from, sweep, clockwise) => (Curve)new CircularArc(c, r, from, clockwise ? -sweep : sweep));

    public static Gen<Curve> EllipticArc { get; } =
        Gen.Select(Point, Point.Where(p => p.Length > 0.3), Gen.Double[0.3, 2], Gen.Double[-7, 7], Gen.Double[0.05, Math.Tau], Gen.Bool)
            .Select((c, major, minor, from, sweep, clockwise) =>
                (Curve)new EllipticArc(c, major, minor, from, clockwise ? -sweep : sweep));

    /// <summary>Splines of degree 2 to 5 whose control points advance, so that they are regular.</summary>
    public static Gen<Curve> Spline { get; } = Gen.Select(Gen.Int[2, 5], Gen.Int[0, 6], Gen.Bool, Gen.Int[0, int.MaxValue])
        .Select((degree, inner, rational, seed) => (Curve)MakeSpline(degree, inner, rational, new Random(seed)));

    public static Gen<Curve> Any { get; } = Gen.OneOf(Line, Arc, EllipticArc, Spline);

    private static Nurbs MakeSpline(int degree, int inner, bool rational, Random random)
    {
        int count = degree + 1 + inner;
        double[] interior = [.. Enumerable.Range(1, inner).Select(i => i + (0.6 * random.NextDouble()) - 0.3)];
        double last = inner + 1;
        double[] knots = [.. Enumerable.Repeat(0.0, degree + 1), .. interior, .. Enumerable.Repeat(last, degree + 1)];
        Point[] controls = [.. Enumerable.Range(0, count).Select(i => new Point(i + (0.4 * random.NextDouble()), 2 * random.NextDouble()))];
        double[] weights = [.. Enumerable.Range(0, count).Select(_ => rational ? 0.5 + random.NextDouble() : 1.0)];
        return new Nurbs(degree, knots, controls, weights);
    }
}
