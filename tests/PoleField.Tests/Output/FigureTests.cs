// Truth: closed forms (the place of the largest value, zero deviation of an even gradient), and the words a reader needs.
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Output.Figures;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class FigureTests
{
    [Fact]
    public void TheSaturationFigureFindsTheLargestFieldOfTheIronOnly()
    {
        // In the iron the two-conductor field is largest on the ridge's flanks, at the conductors' height; the larger
        // values at the conductors themselves must not count.
        Figure figure = SaturationFigure.Draw(TwoConductorScene.Scene(cells: 100));

        Assert.Contains("in RIDGE", figure.Caption, StringComparison.Ordinal);
        Assert.Matches("y = −?2\\.[3-9][0-9]? mm", figure.Caption);
    }

    [Fact]
    public void AnEvenGradientHasNoDeviationLines()
    {
        Aperture aperture = Aperture.Rectangle(new Point(0, 3e-3), 2e-3, 1e-3);

        Figure figure = GradientMapFigure.Draw(aperture, p => new BeamValues(p, 0, 1 + (10 * p.Z), 0, 10), new ApertureStatistics(10, 10, 10, 0));

        Assert.Contains("spread 0 %", figure.Caption, StringComparison.Ordinal);
        string svg = FigureWriter.SvgText(figure);
        Assert.DoesNotContain("+0", svg, StringComparison.Ordinal);
    }

    [Fact]
    public void TheGradientMapLabelsItsContoursWithTheirSigns()
    {
        Aperture aperture = Aperture.Rectangle(new Point(0, 0), 2e-3, 2e-3);

        // Gradient 100 (1 + z/10 mm): from −10 % at the lower edge to +10 % at the upper one.
        Figure figure = GradientMapFigure.Draw(aperture, p => new BeamValues(p, 0, 1, 0, 100 * (1 + (100 * p.Z))), new ApertureStatistics(100, 90, 110, 0.058));

        string svg = FigureWriter.SvgText(figure);
        Assert.Contains("+6 %", svg, StringComparison.Ordinal);
        Assert.Contains("−6 %", svg, StringComparison.Ordinal);
        Assert.Contains("spread 10 %", figure.Caption, StringComparison.Ordinal);
    }

    [Fact]
    public void FlattenedCurvesStayWithinTheToleranceOfTheCurve()
    {
        CircularArc circle = new(new Point(1e-3, 2e-3), 3e-3, 0.3, Math.Tau);

        IReadOnlyList<Point> points = SectionDrawing.Flatten(circle, 1e-6);

        Assert.All(Enumerable.Range(1, points.Count - 1), i => Assert.InRange(3e-3 - Point.Between(points[i - 1], points[i], 0.5).DistanceTo(circle.Centre), -1e-15, 1e-6));
        Assert.Equal(Math.Tau * 3e-3, Enumerable.Range(1, points.Count - 1).Sum(i => points[i].DistanceTo(points[i - 1])), 1e-5);
    }

    [Fact]
    public void TheExcitationCurveMarksItsOnset()
    {
        string svg = FigureWriter.SvgText(ExcitationFigure.Draw(SampleRamp.Make(), "Onset at 2 %."));

        Assert.Contains("onset of saturation at 2.4 kA", svg, StringComparison.Ordinal);
        Assert.Contains("ampere-turns (kA)", svg, StringComparison.Ordinal);
        Assert.Contains("k = aG/B", svg, StringComparison.Ordinal);
    }

    [Fact]
    public void ALinearMaterialHasAFlatPermeabilityAndNoTail()
    {
        Figure figure = MaterialFigure.Draw(new Material("ferrite", new LinearLaw(1000), "A linear part", "case file", "stated"), []);

        string svg = FigureWriter.SvgText(figure);
        Assert.Contains("H (A/m)", svg, StringComparison.Ordinal);
        Assert.DoesNotContain("tail", svg, StringComparison.Ordinal);
    }

    [Fact]
    public void TheSketchListsEveryFindingWithItsNumber()
    {
        Sketch sketch = new(
            "ridge.dxf", LengthUnit.Millimetre, UnitOrigin.Assumed, [new SketchCurve(new Line(new Point(0, 0), new Point(10, 5)), "RIDGE", "LINE", null, 1)], [], []);
        Finding[] findings =
        [
            new(Severity.Note, "healed-joint", "Two ends were joined.", "") { AtDrawing = new Point(0, 0) },
            new(Severity.Fault, "open-outline", "The outline is open.", "Close it.") { Layer = "RIDGE", Line = 42, AtDrawing = new Point(10, 5) },
        ];

        string svg = FigureWriter.SvgText(SketchFigure.Draw(sketch, findings));

        Assert.Contains("1. Fault, layer RIDGE, line 42. The outline is open.", svg, StringComparison.Ordinal);
        Assert.Contains("2. Note. Two ends were joined.", svg, StringComparison.Ordinal);
    }

    [Fact]
    public void WrappedTextKeepsItsWordsAndItsWidth()
    {
        const string text = "Neighbouring field lines enclose one milliweber per metre of length in this picture.";

        IReadOnlyList<string> lines = TextWidths.Wrap(text, 11, 200);

        Assert.Equal(text, string.Join(' ', lines));
        Assert.All(lines, line => Assert.True(TextWidths.Width(line, 11) <= 200));
    }
}
