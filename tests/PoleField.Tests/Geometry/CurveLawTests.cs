// Truth: laws every curve obeys: a part is the curve restricted, reversal and affine maps commute with evaluation,
// derivatives are limits of difference quotients (order 2), Green's area term is additive and changes sign with the
// sense of travel, bounds enclose and touch the curve, the nearest point beats a dense sample.
using CsCheck;
using PoleField.Geometry;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Geometry;

public sealed class CurveLawTests
{
    private const int Trials = 300;

    [Fact]
    public void A_part_is_the_curve_restricted() => Gen.Select(RandomCurves.Any, Gen.Double[0, 0.6], Gen.Double[0.05, 0.4]).SampleFixed(
        (curve, from, width) =>
        {
            Curve part = curve.Part(from, from + width);

            Assert.Equal(curve.At(from), part.Start);
            Assert.Equal(curve.At(from + width), part.End);
            foreach (double s in (double[])[0.0, 0.2, 0.5, 0.9, 1.0])
            {
                AssertNear(curve.At(from + (s * width)), part.At(s), 1e-12);
                AssertNear(width * curve.Derivative(from + (s * width)), part.Derivative(s), 1e-10);
            }
        },
        iter: Trials);

    [Fact]
    public void Reversal_runs_the_same_points_back_and_twice_is_nothing() => RandomCurves.Any.SampleFixed(
        curve =>
        {
            Curve back = curve.Reversed();

            Assert.Equal(curve.Start, back.End);
            Assert.Equal(curve.End, back.Start);
            foreach (double s in (double[])[0.1, 0.37, 0.5, 0.8])
            {
                AssertNear(curve.At(s), back.At(1 - s), 1e-12);
                AssertNear(-curve.Derivative(s), back.Derivative(1 - s), 1e-11);
                Assert.Equal(-curve.CurvatureAt(s), back.CurvatureAt(1 - s), Close(1e-7, curve.CurvatureAt(s)));
            }

            Assert.Equal(curve.Length, back.Length, 1e-11 * curve.Length);
            Assert.Equal(-curve.AreaTerm(default), back.AreaTerm(default), 1e-11);
        },
        iter: Trials);

    [Fact]
    public void An_affine_image_maps_every_point_and_scales_areas() => Gen.Select(RandomCurves.Any, RandomCurves.Map).SampleFixed(
        (curve, map) =>
        {
            Curve image = curve.Transformed(map);
            Point origin = new(0.3, -0.2);

            Assert.Equal(map.Apply(curve.Start), image.Start);
            Assert.Equal(map.Apply(curve.End), image.End);
            foreach (double s in (double[])[0.2, 0.5, 0.9])
            {
                AssertNear(map.Apply(curve.At(s)), image.At(s), 1e-11);
                AssertNear(map.ApplyToDisplacement(curve.Derivative(s)), image.Derivative(s), 1e-9);
            }

            Assert.Equal(map.Determinant * curve.AreaTerm(origin), image.AreaTerm(map.Apply(origin)), 1e-9);
        },
        iter: Trials);

    [Fact]
    public void Similar_images_of_arcs_stay_arcs() => Gen.Select(RandomCurves.Arc, Gen.Double[0.1, 6], Gen.Double[0.1, 10], Gen.Bool).SampleFixed(
        (curve, angle, scale, mirrored) =>
        {
            Affine turn = Affine.Turn(new Point(1, 2), angle).After(Affine.Scaling(scale));
            Affine map = mirrored ? turn.After(Affine.MirrorInZAxis) : turn;

            var image = Assert.IsType<CircularArc>(curve.Transformed(map));

            Assert.True(map.IsSimilarity);
            Assert.Equal(scale * ((CircularArc)curve).Radius, image.Radius, 1e-12 * scale);
            AssertNear(map.Apply(curve.At(0.3)), image.At(0.3), 1e-11 * (1 + scale));
        },
        iter: Trials);

    [Fact]
    public void Derivatives_are_limits_of_difference_quotients_of_order_two() =>
        Gen.Select(RandomCurves.Any, Gen.Double[0.2, 0.8]).SampleFixed(
            (curve, t) =>
            {
                if (curve is Nurbs n && n.Breaks().Any(b => Math.Abs(b - t) < 0.02))
                {
                    return; // Beside a knot the third derivative jumps.
                }

                (double first, double second) coarse = Errors(curve, t, 1e-2);
                (double first, double second) fine = Errors(curve, t, 5e-3);
                double scale = 1 + curve.Derivative(t).Length + curve.SecondDerivative(t).Length;

                // Halving the step quarters the error, up to rounding (1e-16/h and 1e-16/h² times the size).
                Assert.True(fine.first <= (0.3 * coarse.first) + (1e-12 * scale), $"{fine.first} {coarse.first}");
                Assert.True(fine.second <= (0.3 * coarse.second) + (1e-10 * scale), $"{fine.second} {coarse.second}");
                Assert.True(coarse.first <= 0.05 * scale * scale);
            },
            iter: Trials);

    [Fact]
    public void Area_terms_and_lengths_add_up() => Gen.Select(RandomCurves.Any, Gen.Double[0.1, 0.9], RandomCurves.Point).SampleFixed(
        (curve, t, origin) =>
        {
            Curve first = curve.Part(0, t), second = curve.Part(t, 1);

            Assert.Equal(curve.AreaTerm(origin), first.AreaTerm(origin) + second.AreaTerm(origin), 1e-11);
            Assert.Equal(curve.Length, first.Length + second.Length, 1e-10 * curve.Length);
        },
        iter: Trials);

    [Fact]
    public void Area_terms_agree_with_the_integral_and_lengths_with_fine_polygons() => Gen.Select(RandomCurves.Any, RandomCurves.Point).SampleFixed(
        (curve, origin) =>
        {
            // Midpoint rule of ½(P − o)×P′, error O(h²); polygon length from below, O(h²).
            const int n = 4000;
            double area = 0, length = 0;
            for (int i = 0; i < n; i++)
            {
                double t = (i + 0.5) / n;
                area += 0.5 * (curve.At(t) - origin).Cross(curve.Derivative(t)) / n;
                length += curve.At((double)i / n).DistanceTo(curve.At((i + 1.0) / n));
            }

            double size = curve.Length + origin.Length + 5;
            Assert.Equal(area, curve.AreaTerm(origin), 1e-5 * size * size);
            Assert.InRange(length, curve.Length * (1 - 1e-5), curve.Length * (1 + 1e-12));
        },
        iter: 60);

    [Fact]
    public void Bounds_enclose_the_curve_and_touch_it() => RandomCurves.Any.SampleFixed(
        curve =>
        {
            Box box = curve.Bounds;
            Box sampled = Box.Empty;
            const int n = 2000;
            for (int i = 0; i <= n; i++)
            {
                sampled = sampled.Including(curve.At((double)i / n));
            }

            // A sample misses an extremum by at most |C″|h²/8.
            const double slack = 3e-5;
            Assert.True(box.Inflated(1e-12).Contains(sampled.Min) && box.Inflated(1e-12).Contains(sampled.Max));
            Assert.True(sampled.Inflated(slack).Contains(box.Min) && sampled.Inflated(slack).Contains(box.Max), $"{box} {sampled}");
        },
        iter: Trials);

    [Fact]
    public void The_nearest_point_beats_a_dense_sample_and_is_square_to_the_curve() =>
        Gen.Select(RandomCurves.Any, RandomCurves.Point).SampleFixed(
            (curve, p) =>
            {
                double t = curve.ClosestParameter(p);
                double distance = p.DistanceTo(curve.At(t));

                Assert.InRange(t, 0, 1);
                for (int i = 0; i <= 1000; i++)
                {
                    Assert.True(distance <= p.DistanceTo(curve.At(i / 1000.0)) + 1e-12);
                }

                if (t is > 0 and < 1)
                {
                    Point d = curve.Derivative(t);
                    Assert.Equal(0, (curve.At(t) - p).Dot(d) / d.Length, 1e-7);
                }
            },
            iter: Trials);

    [Fact]
    public void A_point_of_the_curve_is_its_own_nearest_point() => Gen.Select(RandomCurves.Any, Gen.Double[0, 1]).SampleFixed(
        (curve, t) => Assert.Equal(0, curve.DistanceTo(curve.At(t)), 1e-9),
        iter: Trials);

    private static (double First, double Second) Errors(Curve curve, double t, double h)
    {
        Point before = curve.At(t - h), here = curve.At(t), after = curve.At(t + h);
        Point first = (0.5 / h) * (after - before);
        Point second = (1 / (h * h)) * (after - here - (here - before));
        return ((first - curve.Derivative(t)).Length, (second - curve.SecondDerivative(t)).Length);
    }

    private static double Close(double relative, double size) => relative * (1 + Math.Abs(size));

    private static void AssertNear(Point expected, Point actual, double tolerance) =>
        Assert.True(expected.DistanceTo(actual) <= tolerance * (1 + expected.Length), $"{expected} {actual}");
}
