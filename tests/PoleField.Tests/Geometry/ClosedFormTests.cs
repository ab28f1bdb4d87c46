// Truth: lengths and areas in closed form: circles, ellipses (complete elliptic integral by the
// arithmetic-geometric mean), parabola length, Bézier areas, splines that reproduce cubics; orders of convergence.
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Geometry;

public sealed class ClosedFormTests
{
    [Theory]
    [InlineData(1, 1)]
    [InlineData(3, 1)]
    [InlineData(10, 0.1)]
    [InlineData(1, 1e-3)]
    public void The_perimeter_of_an_ellipse_is_the_elliptic_integral(double a, double b)
    {
        var ellipse = new EllipticArc(new Point(1e3, 2), new Point(0, a), b, 0.4, Math.Tau);

        Assert.Equal(Perimeter(a, b), ellipse.Length, 1e-12 * a);
        Assert.Equal(Math.PI * a * b, ellipse.AreaTerm(new Point(5, 5)), 1e-11);
        Assert.Equal(new Box(new Point(1e3 - b, 2 - a), new Point(1e3 + b, 2 + a)), ellipse.Bounds with { Min = Rounded(ellipse.Bounds.Min), Max = Rounded(ellipse.Bounds.Max) });
    }

    [Fact]
    public void Areas_far_from_the_origin_lose_no_digits_about_a_near_origin()
    {
        Point far = new(568053, 5774347);
        Curve[] kinds =
        [
            new CircularArc(far, 0.5, 0, Math.Tau),
            new EllipticArc(far, new Point(1, 0), 0.25, 0, Math.Tau),
        ];

        Assert.All(kinds, c => Assert.Equal(Math.PI / 4, c.AreaTerm(far), 1e-14));
    }

    [Fact]
    public void A_parabola_has_its_known_length_area_and_box()
    {
        // (t, t²) for t in 0..1: length ½√5 + ¼ asinh 2, area between curve and origin ½∫(t·2t − t²)dt = 1/6.
        var parabola = new Nurbs(2, [0, 0, 0, 1, 1, 1], [new(0, 0), new(0.5, 0), new(1, 1)]);

        Assert.Equal((0.5 * Math.Sqrt(5)) + (0.25 * Math.Asinh(2)), parabola.Length, 1e-14);
        Assert.Equal(1.0 / 6, parabola.AreaTerm(default), 1e-16);
        Assert.Equal(2 / Math.Pow(1 + (4 * 0.25), 1.5), parabola.CurvatureAt(0.5), 1e-14);
        Assert.Equal(new Box(default, new Point(1, 1)), parabola.Bounds);
    }

    [Fact]
    public void Bounds_of_a_cubic_are_those_of_its_extrema_not_of_its_control_points()
    {
        var cubic = new Nurbs(3, [0, 0, 0, 0, 1, 1, 1, 1], [new(0, 0), new(0, 4), new(3, 4), new(3, 0)]);

        Assert.Equal(3, cubic.Bounds.Max.Z, 1e-14);
        Assert.Equal(0, cubic.Bounds.Min.Z);
    }

    [Theory]
    [InlineData(3)]
    [InlineData(8)]
    [InlineData(25)]
    public void Splines_of_any_degree_with_equally_spaced_control_points_on_a_line_are_that_line(int degree)
    {
        // Greville abscissae reproduce the identity: control points at knot averages give C(u) = u.
        double[] knots = [.. Enumerable.Repeat(0.0, degree + 1), 0.2, 0.5, 0.5, 0.9, .. Enumerable.Repeat(1.0, degree + 1)];
        Point[] controls = [.. Enumerable.Range(0, degree + 5).Select(i => { double g = knots.Skip(i + 1).Take(degree).Average(); return new Point(g, 2 * g); })];
        var spline = new Nurbs(degree, knots, controls);

        foreach (double t in (double[])[0.1, 0.2, 0.45, 0.5, 0.77, 0.95])
        {
            Assert.Equal(0, spline.At(t).DistanceTo(new Point(t, 2 * t)), 1e-13);
            Assert.Equal(0, spline.Derivative(t).DistanceTo(new Point(1, 2)), 1e-11);
        }

        Assert.Equal(Math.Sqrt(5), spline.Length, 1e-12);
    }

    [Fact]
    public void Interpolation_reproduces_cubics_and_converges_with_order_four()
    {
        // A straight line travelled at uniform speed has chord length as parameter: z must be a cubic of y only to
        // order 4, so the error of a smooth curve falls by 16 when the spacing halves.
        double Error(int n)
        {
            Point[] points = [.. Enumerable.Range(0, n + 1).Select(i => Wave((double)i / n))];
            Curve curve = NurbsInterpolation.Through(points);
            return Enumerable.Range(0, 400).Max(i => curve.DistanceTo(Wave(i / 399.0)));
        }

        double ratio = Error(16) / Error(32);

        Assert.InRange(Math.Log2(ratio), 3.7, 4.6);
    }

    [Fact]
    public void Interpolation_takes_tangents_and_keeps_curvature_continuous()
    {
        Point[] points = [new(0, 0), new(1, 1), new(2.5, 0.5), new(3, 2)];
        var curve = (Nurbs)NurbsInterpolation.Through(points, new Point(0, 3), new Point(5, 0));

        Assert.Equal(0, curve.Derivative(0).Unit().DistanceTo(new Point(0, 1)), 1e-14);
        Assert.Equal(0, curve.Derivative(1).Unit().DistanceTo(new Point(1, 0)), 1e-14);
        foreach (double knot in curve.Breaks()[1..^1])
        {
            Assert.Equal(0, curve.SecondDerivative(knot - 1e-9).DistanceTo(curve.SecondDerivative(knot + 1e-9)), 1e-5);
        }
    }

    [Theory]
    [InlineData(2)]
    [InlineData(3)]
    public void Short_point_lists_make_lines_and_parabolas_through_all_points(int count)
    {
        Point[] points = [.. new Point[] { new(0, 0), new(1, 3), new(2, 0) }.Take(count)];
        Point up = new(0, 1);

        foreach (Curve curve in (Curve[])[NurbsInterpolation.Through(points), NurbsInterpolation.Through(points, up), NurbsInterpolation.Through(points, null, up), NurbsInterpolation.Through(points, up, up)])
        {
            Assert.All(points, p => Assert.Equal(0, curve.DistanceTo(p), 1e-12));
        }
    }

    [Fact]
    public void Closed_interpolation_is_smooth_at_its_seam_and_nearly_a_circle()
    {
        const int n = 24;
        Point[] points = [.. Enumerable.Range(0, n).Select(i => Point.Polar(1, Math.Tau * i / n))];

        var curve = (Nurbs)NurbsInterpolation.ThroughClosed(points);

        Assert.Equal(curve.Start, curve.End);
        Assert.Equal(0, curve.Derivative(0).DistanceTo(curve.Derivative(1)), 1e-12);
        Assert.Equal(0, curve.SecondDerivative(0).DistanceTo(curve.SecondDerivative(1)), 1e-10);
        Assert.Equal(Math.PI, curve.AreaTerm(default), 1e-4);
        Assert.Equal(0, Outline.FromCurves([curve]).Centroid.Length, 1e-12);
    }

    [Theory]
    [InlineData(0.3)]
    [InlineData(1e-3)]
    [InlineData(1e-6)]
    [InlineData(1e-9)]
    public void Shallow_arcs_keep_their_height_and_segment(double bulge)
    {
        var arc = CircularArc.FromBulge(new Point(0, 0), new Point(2, 0), bulge);

        // Height over the chord = bulge · half chord; segment of a parabola-like arc: ⅔·chord·height (1 + bulge²/5 ...).
        Assert.Equal(0, arc.At(0.5).DistanceTo(new Point(1, -bulge)), 1e-15);
        double theta = 4 * Math.Atan(bulge), r = (1 + (bulge * bulge)) / (2 * bulge);
        double segment = bulge > 0.1 ? 0.5 * r * r * (theta - Math.Sin(theta)) : 4.0 / 3 * bulge * (1 + (bulge * bulge / 5));
        Assert.Equal(segment, arc.AreaTerm(default), 1e-12 * segment);
    }

    [Fact]
    public void Gauss_rules_integrate_all_powers_up_to_their_degree()
    {
        for (int n = 1; n <= GaussLegendre.MostPoints; n++)
        {
            for (int power = 0; power < 2 * n; power++)
            {
                double sum = 0;
                foreach ((double node, double weight) in GaussLegendre.Rule(n))
                {
                    Assert.True(weight > 0 && node is > 0 and < 1);
                    sum += weight * Math.Pow(node, power);
                }

                Assert.Equal(1.0 / (power + 1), sum, 1e-14);
            }
        }
    }

    [Fact]
    public void Outlines_know_their_area_centroid_and_inside()
    {
        // A quarter disc of radius 3: area 9π/4, centroid at 4r/(3π) from both straight sides.
        var arc = new CircularArc(default, 3, 0, Math.PI / 2);
        var arcEnds = arc.WithEnds(new Point(3, 0), new Point(0, 3));
        Outline quarter = Outline.FromCurves([new Line(new Point(0, 3), default), new Line(default, new Point(3, 0)), arcEnds]);
        Outline clockwise = Outline.FromCurves([arcEnds.Reversed(), new Line(new Point(3, 0), default), new Line(default, new Point(0, 3))]);

        foreach (Outline outline in (Outline[])[quarter, clockwise])
        {
            Assert.Equal(9 * Math.PI / 4, outline.Area, 1e-14);
            Assert.Equal(0, outline.Centroid.DistanceTo(new Point(4 / Math.PI, 4 / Math.PI)), 1e-13);
            Assert.True(outline.Contains(new Point(2, 2)));
            Assert.True(outline.Contains(new Point(1e-9, 1e-9)));
            Assert.False(outline.Contains(new Point(2.2, 2.2)));
            Assert.False(outline.Contains(new Point(-1e-9, 1)));
            Assert.Equal(0.5, outline.DistanceToEdge(new Point(0.5, 1)), 1e-15);
        }
    }

    [Fact]
    public void Circles_and_ellipses_alone_are_outlines()
    {
        Outline circle = Outline.FromCurves([new CircularArc(new Point(1, 1), 2, 0.3, -Math.Tau)]);
        Outline ellipse = Outline.FromCurves([new EllipticArc(new Point(1, 1), new Point(2, 0), 1, 0.3, Math.Tau)]);

        Assert.Equal(4 * Math.PI, circle.Area, 1e-13);
        Assert.Equal(2 * Math.PI, ellipse.Area, 1e-13);
        Assert.True(circle.Contains(new Point(1, 1)) && ellipse.Contains(new Point(2.9, 1)));
        Assert.False(ellipse.Contains(new Point(1, 2.1)));
        Assert.Equal(0, ellipse.Centroid.DistanceTo(new Point(1, 1)), 1e-13);
    }

    [Fact]
    public void Curves_that_do_not_exist_are_refused()
    {
        Point p = new(1, 1);
        Assert.Throws<ArgumentException>(() => new Line(p, p));
        Assert.Throws<ArgumentException>(() => new CircularArc(p, 0, 0, 1));
        Assert.Throws<ArgumentException>(() => new CircularArc(p, 1, 0, 7));
        Assert.Throws<ArgumentException>(() => new EllipticArc(p, default, 1, 0, 1));
        Assert.Throws<ArgumentException>(() => new EllipticArc(p, p, double.NaN, 0, 1));
        Assert.Throws<ArgumentException>(() => CircularArc.FromBulge(p, p, 1));
        Assert.Throws<ArgumentException>(() => new Nurbs(2, [0, 0, 0, 1, 1, 1], [p, p, p]));
        Assert.Throws<ArgumentException>(() => new Nurbs(2, [0, 0, 0, 1, 1, 2, 2, 2], [p, default, p, default, p]));
        Assert.Throws<ArgumentException>(() => new CircularArc(p, 1, 0, 1).Transformed(new Affine(1, 1, 1, 1, 0, 0)));
        Assert.Throws<ArgumentException>(() => Outline.FromCurves([new Line(p, default)]));
        Assert.Throws<ArgumentException>(() => NurbsInterpolation.Through([p, p, default]));
    }

    private static Point Wave(double t) => new(t, 0.2 * Math.Sin(5 * t));

    private static Point Rounded(Point p) => new(Math.Round(p.Y, 10), Math.Round(p.Z, 10));

    // Gauss: perimeter = 2π (a² − Σ 2ⁿ⁻¹ cₙ²) / M(a, b) with c₀² = a² − b² (Abramowitz & Stegun 17.6).
    private static double Perimeter(double a, double b)
    {
        double x = a, y = b, sum = 0.5 * ((a * a) - (b * b)), power = 1;
        while (Math.Abs(x - y) > 1e-14 * x)
        {
            double c = 0.5 * (x - y);
            (x, y) = (0.5 * (x + y), Math.Sqrt(x * y));
            sum += power * c * c;
            power *= 2;
        }

        return Math.Tau * ((a * a) - sum) / x;
    }
}
