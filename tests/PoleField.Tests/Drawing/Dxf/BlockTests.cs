// Truth: the exchange format's published rules for INSERT: base point, scale, rotation, grids turned and not scaled,
// extrusion, inheritance of layer 0; images of points by hand.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class BlockTests
{
    private const string Unit = "0 LINE; 8 0; 10 0; 20 0; 11 1; 21 0";

    [Theory]
    // Scale 2, turned by 90 degrees, base point (1, 0): (0,0) → (-1,0)·2 → (0,-2) + (10, 5).
    [InlineData("10 10; 20 5; 41 2; 42 3; 50 90", "10 1; 20 0", 10, 3, 10, 5)]
    [InlineData("10 10; 20 5; 41 -1", "10 0; 20 0", 10, 5, 9, 5)]
    [InlineData("10 10; 20 5; 230 -1", "10 0; 20 0", -10, 5, -11, 5)]
    [InlineData("10 10; 20 5; 50 90; 230 -1", "10 0; 20 0", -10, 5, -10, 6)]
    public void Copies_are_moved_scaled_turned_and_mirrored(string insert, string origin, double y0, double z0, double y1, double z1)
    {
        Sketch sketch = Draw($"0 INSERT; 8 A; 2 B; {insert}", HandDrawn.Block("B", Unit, origin));

        Assert.Equal(new Line(new Point(y0, z0), new Point(y1, z1)), Assert.Single(sketch.Curves).Curve);
    }

    [Fact]
    public void Grids_turn_with_the_copy_and_do_not_scale()
    {
        Sketch sketch = Draw("0 INSERT; 8 A; 2 B; 10 0; 20 0; 41 3; 42 3; 50 90; 70 2; 71 2; 44 10; 45 20", HandDrawn.Block("B", Unit));

        Assert.Equal(
            [new Point(0, 0), new Point(0, 10), new Point(-20, 0), new Point(-20, 10)],
            sketch.Curves.Select(c => c.Curve.Start));
    }

    [Fact]
    public void A_circle_under_unequal_scales_is_an_ellipse()
    {
        Sketch sketch = Draw("0 INSERT; 8 A; 2 B; 10 1; 20 2; 41 2; 42 0.5", HandDrawn.Block("B", "0 CIRCLE; 8 0; 10 0; 20 0; 40 3"));

        var ellipse = (EllipticArc)Assert.Single(sketch.Curves).Curve;
        Assert.Equal(6, ellipse.Major.Length, 1e-14);
        Assert.Equal(1.5, ellipse.MinorLength, 1e-14);
        Assert.Equal(Math.PI * 9, ellipse.AreaTerm(default), 1e-13);
    }

    [Fact]
    public void Layer_0_takes_the_layer_of_the_INSERT_through_all_levels()
    {
        Sketch sketch = Draw(
            "0 INSERT; 8 IRON; 2 OUTER; 10 0; 20 0",
            HandDrawn.Block("INNER", Unit + "; 0 LINE; 8 COIL; 10 0; 20 0; 11 0; 21 1"),
            HandDrawn.Block("OUTER", "0 INSERT; 8 0; 2 INNER; 10 0; 20 0"));

        Assert.Equal(["IRON", "COIL"], sketch.Curves.Select(c => c.Layer));
    }

    [Fact]
    public void Blocks_that_nothing_shows_are_not_drawn() =>
        Assert.Single(Draw("0 LINE; 8 A; 10 0; 20 0; 11 1; 21 0", HandDrawn.Block("B", Unit), HandDrawn.Block("*Paper_Space", Unit)).Curves);

    [Fact]
    public void Copies_in_array_of_a_spline_are_affine_images()
    {
        const string spline = "0 SPLINE; 8 0; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 0; 20 0; 10 1; 20 2; 10 2; 20 0";

        Sketch sketch = Draw("0 INSERT; 8 A; 2 B; 10 5; 20 0; 42 2", HandDrawn.Block("B", spline));

        Assert.Equal(new Point(6, 2), Assert.Single(sketch.Curves).Curve.At(0.5));
    }

    [Fact]
    public void Attributes_of_an_INSERT_are_text()
    {
        Sketch sketch = Draw("0 INSERT; 8 A; 66 1; 2 B; 10 0; 20 0; 0 ATTRIB; 8 A; 10 0; 20 0; 1 ENDSEC; 0 SEQEND", HandDrawn.Block("B", Unit));

        Assert.Single(sketch.Curves);
        Assert.Equal("ATTRIB", Assert.Single(sketch.Skipped).Kind);
    }

    [Fact]
    public void External_references_are_told()
    {
        Sketch sketch = Draw("0 INSERT; 8 A; 2 X; 10 0; 20 0", "0 BLOCK; 2 X; 70 4; 10 0; 20 0; 1 other.dwg; 0 ENDBLK");

        Assert.Contains(sketch.Findings, f => f.What == "external" && f.Severity == Severity.Warning && f.Fix.Contains("Bind", StringComparison.Ordinal));
    }

    private static Sketch Draw(string entities, params string[] blocks) =>
        (HandDrawn.With(entities) with { Blocks = string.Join(";", blocks) }).Read();
}
