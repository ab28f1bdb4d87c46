// Truth: line currents ±10 kA at ∓3 mm give 0.54644809 T and −179.16331 T/m at (0, 1.2 a) (closed form).
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Families;

public sealed class RoundWirePairTests
{
    [Fact]
    public void FieldAndGradientAreThoseOfLineCurrents()
    {
        StartingSketch pair = new RoundWirePair().Draw();

        Assert.Equal(0.54644809, 1e4 * pair.FieldPerAmpereTurn, 1e-8);
        Assert.Equal(-179.16331, 1e4 * pair.FieldPerAmpereTurn * pair.GradientPerField, 1e-5);
        Assert.Equal(1e4, pair.AmpereTurnsFor(0.54644809, pair.Parts.Single(p => p.Layer == "WIRE LEFT")), 1e-3);
    }

    [Fact]
    public void WiresAreWholeCirclesOfCopper()
    {
        StartingSketch pair = new RoundWirePair { WireRadius = 1.5 }.Draw();

        CircularArc right = Assert.IsType<CircularArc>(Assert.Single(pair.Sketch.Curves, c => c.Layer == "WIRE RIGHT").Curve);
        Assert.True(right.IsFullCircle);
        Assert.Equal(new Point(3, 0), right.Centre);
        Assert.Equal(Math.PI * 2.25, FamilyAssert.Outlines(pair.Sketch, "WIRE LEFT")[0].Area, 1e-12);
        Assert.All(pair.Parts, p => Assert.Equal("copper", p.Material));
    }

    [Theory]
    [InlineData(3.0, 1.2)]   // wires touch
    [InlineData(2.9, 0.4)]   // beam inside a wire
    [InlineData(double.NaN, 1.2)]
    [InlineData(2.0, double.NaN)]
    public void ImpossiblePairIsRefused(double radius, double place) =>
        Assert.Single(Assert.Throws<InputException>(new RoundWirePair { WireRadius = radius, BeamPlace = place }.Draw).Findings);
}
