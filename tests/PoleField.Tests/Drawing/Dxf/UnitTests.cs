// Truth: the codes of $INSUNITS and their lengths (international inch 25.4 mm exactly); the order of trust.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class UnitTests
{
    private const string Line = "0 LINE; 8 A; 10 0; 20 0; 11 25; 21 0";

    [Theory]
    [InlineData("9 $INSUNITS; 70 4; 9 $MEASUREMENT; 70 1", "mm", 1e-3, UnitOrigin.InsertUnits)]
    [InlineData("9 $INSUNITS; 70 1", "in", 0.0254, UnitOrigin.InsertUnits)]
    [InlineData("9 $INSUNITS; 70 5", "cm", 1e-2, UnitOrigin.InsertUnits)]
    [InlineData("9 $INSUNITS; 70 13", "um", 1e-6, UnitOrigin.InsertUnits)]
    [InlineData("9 $INSUNITS; 70 0; 9 $MEASUREMENT; 70 1", "mm", 1e-3, UnitOrigin.Measurement)]
    [InlineData("9 $INSUNITS; 70 99; 9 $MEASUREMENT; 70 1", "mm", 1e-3, UnitOrigin.Measurement)]
    [InlineData("9 $MEASUREMENT; 70 0", "mm", 1e-3, UnitOrigin.Assumed)]
    [InlineData("", "mm", 1e-3, UnitOrigin.Assumed)]
    public void The_unit_comes_from_INSUNITS_then_MEASUREMENT_then_millimetres(string header, string name, double metres, UnitOrigin origin)
    {
        Sketch sketch = (HandDrawn.With(Line) with { Header = header }).Read();

        Assert.Equal((name, metres, origin), (sketch.Unit.Name, sketch.Unit.Metres, sketch.UnitOrigin));
        Assert.Equal(25, sketch.Curves[0].Curve.Length);
        Finding told = Assert.Single(sketch.Findings, f => f.What == "unit");
        Assert.Equal(origin == UnitOrigin.Assumed || header.Contains("99", StringComparison.Ordinal), told.Severity == Severity.Warning);
    }

    [Fact]
    public void The_case_overrides_the_drawing_and_says_so()
    {
        var options = new DxfReadOptions { Unit = LengthUnit.Millimetre };

        Sketch sketch = (HandDrawn.With(Line) with { Header = "9 $INSUNITS; 70 1" }).Read(options);

        Assert.Equal((LengthUnit.Millimetre, UnitOrigin.CaseFile), (sketch.Unit, sketch.UnitOrigin));
        Assert.Equal(new Point(25, 0), sketch.Curves[0].Curve.End);
        Assert.Contains(sketch.Findings, f => f.What == "unit" && f.Text.Contains("$INSUNITS says in", StringComparison.Ordinal));
    }

    [Fact]
    public void Disagreement_of_the_two_is_told()
    {
        Sketch sketch = (HandDrawn.With(Line) with { Header = "9 $INSUNITS; 70 4; 9 $MEASUREMENT; 70 0" }).Read();

        Assert.Equal("mm", sketch.Unit.Name);
        Assert.Contains(sketch.Findings, f => f.Text.Contains("$MEASUREMENT=0 disagrees", StringComparison.Ordinal));
    }

    [Theory]
    [InlineData("9 $INSUNITS; 70 6", true)] // 25 m
    [InlineData("9 $INSUNITS; 70 12", true)] // 25 nm
    [InlineData("9 $INSUNITS; 70 4", false)] // 25 mm
    public void Unlikely_sizes_are_warned_of(string header, bool isWarned) => Assert.Equal(
        isWarned, (HandDrawn.With(Line) with { Header = header }).Read().Findings.Any(f => f.What == "size" && f.Severity == Severity.Warning));
}
