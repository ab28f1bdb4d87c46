// Truth: closed-form areas, independent of where the drawing lies and of how many curves it has.
using PoleField.Drawing;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class ScaleTests
{
    [Theory]
    [InlineData(0, 0)]
    [InlineData(568053, 5774347)] // mm: national grids, half a kilometre and more from zero
    public void PlaceCostsNoArea(double y, double z)
    {
        Sketch sketch = Sketch(
            Rectangle("IRON", y, z, y + 10, z + 10), [Circle("IRON", y + 5, z + 5, 2), Circle("PIN", y + 5, z + 5, 2), Circle("WIRE", y + 20, z, 3)]);

        CrossSection s = Sound(sketch, Parts("IRON", "PIN", "WIRE"));

        Assert.Equal(100 - (4 * Math.PI), Areas(s, "IRON").Single(), 5);
        Assert.Equal(4 * Math.PI, Areas(s, "PIN").Single(), 5);
        Assert.Equal(9 * Math.PI, Areas(s, "WIRE").Single(), 5);
    }

    [Fact]
    public void ManyCurvesMakeOneOutline()
    {
        const int sides = 20_000;
        double Step(int i) => Math.Tau * i / sides;
        Sketch sketch = Sketch(
            Polygon("IRON", [.. Enumerable.Range(0, sides).Select(i => (100 * Math.Cos(Step(i)), 100 * Math.Sin(Step(i))))]));

        CrossSection s = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON")).Section!;

        Assert.Equal(sides, s.Edges.Count);
        Assert.Equal(0.5 * sides * 1e4 * Math.Sin(Step(1)), Areas(s, "IRON").Single(), 5);
    }

    [Fact]
    public void ManyHolesAreAllFound()
    {
        const int rows = 60;
        Sketch sketch = Sketch(
            Rectangle("IRON", -1, -1, rows, rows),
            Enumerable.Range(0, rows * rows).Select(i => Circle("IRON", i / rows, i % rows, 0.25)));

        CrossSection s = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON")).Section!;

        Assert.Equal(2, s.Regions.Count);
        Assert.Equal(((rows + 1) * (rows + 1)) - (rows * rows * Math.PI / 16), Areas(s, "IRON").Single(), 8);
    }

    [Theory]
    [InlineData("mm", 1e-3)]
    [InlineData("in", 0.0254)]
    [InlineData("um", 1e-6)]
    [InlineData("m", 1.0)]
    public void UnitsScaleLengths(string name, double metres)
    {
        Sketch sketch = Sketch(Rectangle("IRON", 0, 0, 4.5 / metres, 2 / metres)) with { Unit = new LengthUnit(name, metres) };

        CrossSection s = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON")).Section!;

        Assert.Equal(9, s.Regions[1].Area, 12);
    }
}
