// Truth: lengths, areas and points of the drawn curves in closed form; the exchange format's published rules for object
// coordinates, bulges, knots and counts.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class EntityTests
{
    [Theory]
    [InlineData("50 0; 51 90", 90, 3, 0)]
    [InlineData("50 350; 51 10", 20, 2.954423259036624, -0.5209445330007912)]
    [InlineData("50 -90; 51 90", 180, 0, -3)]
    [InlineData("50 270; 51 90", 180, 0, -3)]
    [InlineData("50 0; 51 360", 360, 3, 0)]
    [InlineData("50 90; 51 450", 360, 0, 3)]
    [InlineData("50 90; 51 89", 359, 0, 3)]
    public void Arcs_run_counter_clockwise_modulo_360_degrees(string angles, double sweepDegrees, double startY, double startZ)
    {
        var arc = (CircularArc)Single($"0 ARC; 8 A; 10 0; 20 0; 40 3; {angles}");

        Assert.Equal(sweepDegrees * Math.PI / 180, arc.Sweep, 1e-14);
        Assert.Equal(0, arc.Start.DistanceTo(new Point(startY, startZ)), 1e-14);
        Assert.Equal(sweepDegrees == 360, arc.IsFullCircle);
    }

    [Fact]
    public void Arcs_that_end_at_quarters_meet_lines_to_the_bit()
    {
        Curve arc = Single("0 ARC; 8 A; 10 5; 20 20; 40 5; 50 90; 51 180");

        Assert.Equal(new Point(5, 25), arc.Start);
        Assert.Equal(new Point(0, 20), arc.End);
    }

    [Fact]
    public void An_arc_extruded_downwards_is_mirrored()
    {
        Curve arc = Single("0 ARC; 8 A; 10 5; 20 1; 40 2; 50 0; 51 90; 210 0; 220 0; 230 -1");

        Assert.Equal(new Point(-7, 1), arc.Start);
        Assert.Equal(new Point(-5, 3), arc.End);
        Assert.True(((CircularArc)arc).Sweep < 0);
    }

    [Fact]
    public void A_line_extruded_downwards_is_not_mirrored() =>
        Assert.Equal(new Line(new Point(1, 2), new Point(3, 4)), Single("0 LINE; 8 A; 10 1; 20 2; 11 3; 21 4; 230 -1"));

    [Theory]
    [InlineData("", 1)]
    [InlineData("; 230 -1", -1)]
    public void Ellipses_follow_their_parameters_and_their_normal(string normal, int sense)
    {
        var arc = (EllipticArc)Single($"0 ELLIPSE; 8 A; 10 1; 20 2; 11 3; 21 0; 40 0.5; 41 0; 42 1.5707963267948966{normal}");

        Assert.Equal(0, arc.Start.DistanceTo(new Point(4, 2)), 1e-15);
        Assert.Equal(0, arc.End.DistanceTo(new Point(1, 2 + (sense * 1.5))), 1e-15);
        // Quarter ellipse about its centre: πab/4.
        Assert.Equal(sense * Math.PI * 3 * 1.5 / 4, arc.AreaTerm(new Point(1, 2)), 1e-14);
    }

    [Fact]
    public void An_ellipse_whose_parameters_wrap_passes_zero()
    {
        var arc = (EllipticArc)Single("0 ELLIPSE; 8 A; 10 0; 20 0; 11 3; 21 0; 40 0.5; 41 6; 42 1");

        Assert.Equal(1 - 6 + Math.Tau, arc.Sweep, 1e-15);
    }

    [Theory]
    [InlineData("41 0; 42 6.283185307179586")]
    [InlineData("41 0; 42 6.28318530717958")]
    [InlineData("")]
    public void A_whole_ellipse_is_closed(string parameters) =>
        Assert.True(((EllipticArc)Single($"0 ELLIPSE; 8 A; 10 0; 20 0; 11 3; 21 0; 40 0.5; {parameters}")).IsFullEllipse);

    [Fact]
    public void An_ellipse_of_ratio_one_is_a_circle() =>
        Assert.Equal(5, ((CircularArc)Single("0 ELLIPSE; 8 A; 10 0; 20 0; 11 3; 21 4; 40 1")).Radius);

    [Theory]
    [InlineData("0.5", 4 * 0.46364760900080609)] // sweep = 4·atan(bulge)
    [InlineData("-1", -Math.PI)]
    [InlineData("3", 4 * 1.2490457723982544)]
    [InlineData("1e-4", 4e-4)]
    public void Bulges_of_any_size_are_arcs(string bulge, double sweep)
    {
        var arc = (CircularArc)Single($"0 LWPOLYLINE; 8 A; 90 99; 70 0; 10 0; 20 0; 42 {bulge}; 10 2; 20 0");

        Assert.Equal(sweep, arc.Sweep, 1e-11);
        // The height over the chord is bulge times half the chord, to the right of travel for positive bulges.
        Assert.Equal(0, arc.At(0.5).DistanceTo(new Point(1, -double.Parse(bulge, System.Globalization.CultureInfo.InvariantCulture))), 1e-13);
    }

    [Fact]
    public void A_bulge_below_rounding_is_straight() =>
        Assert.IsType<Line>(Single("0 LWPOLYLINE; 8 A; 10 0; 20 0; 42 1e-15; 10 2; 20 0"));

    [Fact]
    public void Two_vertices_with_bulge_one_make_a_circle()
    {
        Sketch sketch = HandDrawn.With("0 LWPOLYLINE; 8 A; 70 1; 10 0; 20 0; 42 1; 10 2; 20 0; 42 1").Read();

        Assert.Equal(Math.PI, sketch.Curves.Sum(c => c.Curve.AreaTerm(default)), 1e-14);
    }

    [Fact]
    public void Repeated_vertices_and_points_without_length_are_dropped_and_told()
    {
        Sketch sketch = HandDrawn.With(
            "0 LWPOLYLINE; 8 A; 70 1; 10 0; 20 0; 42 0.3; 10 0; 20 0; 10 2; 20 0; 10 1; 20 1; 10 0; 20 0",
            "0 LINE; 8 A; 10 1; 20 1; 11 1; 21 1",
            "0 CIRCLE; 8 A; 10 1; 20 1; 40 0",
            "0 LWPOLYLINE; 8 A; 70 1",
            "0 LWPOLYLINE; 8 A; 70 1; 10 4; 20 4").Read();

        Assert.Equal(3, sketch.Curves.Count);
        Assert.All(sketch.Curves, c => Assert.IsType<Line>(c.Curve));
        Assert.Equal(6, sketch.Skipped.Sum(s => s.Count));
        Assert.All(sketch.Skipped, s => Assert.Equal("it has no length", s.Why));
        Assert.Contains(sketch.Findings, f => f.What == "no-length" && f.Severity == Severity.Note);
    }

    [Fact]
    public void Control_frames_of_fitted_polylines_are_not_the_curve()
    {
        Sketch sketch = HandDrawn.With(
            "0 POLYLINE; 8 A; 66 1; 70 4; 0 VERTEX; 70 16; 10 0; 20 9; 0 VERTEX; 70 8; 10 0; 20 0; 0 VERTEX; 70 16; 10 1; 20 9;"
            + "0 VERTEX; 70 8; 10 1; 20 1; 0 VERTEX; 70 8; 10 2; 20 0; 0 SEQEND").Read();

        Assert.Equal([new Line(new Point(0, 0), new Point(1, 1)), new Line(new Point(1, 1), new Point(2, 0))], sketch.Curves.Select(c => c.Curve));
    }

    [Fact]
    public void A_spatial_polyline_is_in_drawing_coordinates()
    {
        Sketch sketch = HandDrawn.With(
            "0 POLYLINE; 8 A; 70 8; 230 -1; 0 VERTEX; 70 32; 10 1; 20 0; 30 2; 0 VERTEX; 70 32; 10 2; 20 1; 30 2; 0 SEQEND").Read();

        Assert.Equal(new Line(new Point(1, 0), new Point(2, 1)), Assert.Single(sketch.Curves).Curve);
    }

    [Fact]
    public void A_rational_quadratic_quarter_is_a_circle()
    {
        Curve curve = Single("0 SPLINE; 8 A; 70 4; 71 2; 72 6; 73 3; 40 2; 40 2; 40 2; 40 7; 40 7; 40 7; 10 1; 20 0; 10 1; 20 1; 10 0; 20 1;"
            + "41 1; 41 0.70710678118654757; 41 1");

        Assert.All(Enumerable.Range(0, 11), i => Assert.Equal(1, curve.At(i / 10.0).Length, 1e-15));
        Assert.Equal(Math.PI / 4, curve.AreaTerm(default), 1e-14);
        Assert.Equal(Math.PI / 2, curve.Length, 1e-13);
    }

    [Fact]
    public void An_unclamped_periodic_spline_is_the_curve_between_its_inner_knots()
    {
        // Uniform cubic with wrapped control points: starts and ends at (P0 + 4P1 + P2)/6.
        Curve curve = Single("0 SPLINE; 8 A; 70 11; 71 3; 40 -3; 40 -2; 40 -1; 40 0; 40 1; 40 2; 40 3; 40 4; 40 5; 40 6; 40 7;"
            + "10 0; 20 0; 10 6; 20 0; 10 6; 20 6; 10 0; 20 6; 10 0; 20 0; 10 6; 20 0; 10 6; 20 6");

        Point expected = new((0 + (4 * 6) + 6) / 6.0, (0 + 0 + 6) / 6.0);
        Assert.Equal(0, curve.Start.DistanceTo(expected), 1e-14);
        Assert.Equal(0, curve.End.DistanceTo(expected), 1e-14);
        Assert.Equal(0, curve.Derivative(0).DistanceTo(curve.Derivative(1)), 1e-12);
    }

    [Fact]
    public void A_spline_with_kinks_comes_in_smooth_pieces()
    {
        Sketch sketch = HandDrawn.With("0 SPLINE; 8 A; 70 8; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 2; 40 2; 40 2;"
            + "10 0; 20 0; 10 1; 20 0; 10 1; 20 1; 10 2; 20 1; 10 2; 20 0").Read();

        Assert.Equal(2, sketch.Curves.Count);
        Assert.Equal(new Point(1, 1), sketch.Curves[0].Curve.End);
        Assert.Equal(new Point(1, 1), sketch.Curves[1].Curve.Start);
        Assert.Equal(0, sketch.Curves[0].Curve.Derivative(1).Y);
        Assert.Equal(0, sketch.Curves[1].Curve.Derivative(0).Z);
    }

    [Fact]
    public void A_spline_of_degree_one_is_lines() => Assert.Equal(
        [new Line(new Point(0, 0), new Point(1, 0)), new Line(new Point(1, 0), new Point(1, 1))],
        HandDrawn.With("0 SPLINE; 8 A; 71 1; 40 0; 40 0; 40 1; 40 2; 40 2; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1").Read().Curves.Select(c => c.Curve));

    [Fact]
    public void A_spline_with_fit_points_only_passes_through_them_and_is_told()
    {
        Sketch sketch = HandDrawn.With("0 SPLINE; 8 A; 70 0; 11 0; 21 0; 11 1; 21 1; 11 2; 21 0; 11 3; 21 1; 11 4; 21 0; 12 0; 22 5").Read();

        Curve curve = Assert.Single(sketch.Curves).Curve;
        foreach (Point p in (Point[])[new(0, 0), new(1, 1), new(2, 0), new(3, 1), new(4, 0)])
        {
            Assert.Equal(0, curve.DistanceTo(p), 1e-12);
        }

        Assert.Equal(0, curve.Derivative(0).Y, 1e-12);
        Assert.Contains(sketch.Findings, f => f.What == "fit-spline" && f.Severity == Severity.Warning && f.Line > 0);
    }

    [Fact]
    public void Control_points_win_over_fit_points()
    {
        Sketch sketch = HandDrawn.With("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 0; 20 0; 10 1; 20 2; 10 2; 20 0; 11 0; 21 0; 11 2; 21 9").Read();

        Assert.Equal(new Point(1, 1), Assert.Single(sketch.Curves).Curve.At(0.5));
        Assert.DoesNotContain(sketch.Findings, f => f.What == "fit-spline");
    }

    private static Curve Single(string entity) => Assert.Single(HandDrawn.With(entity).Read().Curves).Curve;
}
