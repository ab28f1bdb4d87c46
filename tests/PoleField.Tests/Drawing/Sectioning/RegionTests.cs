// Truth: areas of rectangles, discs and rings in closed form.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class RegionTests
{
    private const int Digits = 9; // of mm², for figures of some hundred mm²

    [Fact]
    public void RectangleIsOneRegion()
    {
        CrossSection s = Sound(Sketch(Rectangle("IRON", 0, 0, 4.5, 2)), Parts("IRON"));

        Assert.Equal(9, Areas(s, "IRON").Single(), Digits);
        Assert.Equal(4, s.Edges.Count);
        Assert.Contains(new Point(0.0045, 0.002), s.Vertices);
        Assert.True(double.IsPositiveInfinity(s.Regions[CrossSection.Air].Area));
    }

    [Fact]
    public void CircleHasOneVertexAndOneEdge()
    {
        CrossSection s = Sound(Sketch([Circle("WIRE", 1, 2, 3)]), Parts("WIRE"));

        Assert.Equal(9 * Math.PI, Areas(s, "WIRE").Single(), Digits);
        Assert.Single(s.Vertices);
        Assert.Single(s.Edges);
    }

    [Fact]
    public void OutlinesInOutlinesAlternateBetweenMaterialAndHole()
    {
        Sketch sketch = Sketch(
            Rectangle("YOKE", -20, -20, 20, 20), Rectangle("YOKE", -15, -15, 15, 15), [Circle("YOKE", 0, 0, 5), Circle("YOKE", -17.5, -17.5, 1)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("YOKE"));
        CrossSection s = Sound(sketch, Parts("YOKE"));

        Assert.Equal([1600 - 900 - Math.PI, 25 * Math.PI], Areas(s, "YOKE"), (a, b) => Math.Abs(a - b) < 1e-9);
        Assert.Equal(4, reading.Parts.Single().Outlines);
    }

    [Fact]
    public void InnerPartDisplacesTheOuterOne()
    {
        Sketch sketch = Sketch(Rectangle("IRON", -10, -10, 10, 10), [Circle("MAGNET", 2, 0, 3)], Rectangle("CORE", 1, -1, 3, 1));

        CrossSection s = Sound(sketch, Parts("IRON", "MAGNET", "CORE"));

        Assert.Equal(400 - (9 * Math.PI), Areas(s, "IRON").Single(), Digits);
        Assert.Equal((9 * Math.PI) - 4, Areas(s, "MAGNET").Single(), Digits);
        Assert.Equal(4, Areas(s, "CORE").Single(), Digits);
    }

    [Fact]
    public void CoilInAWindowLeavesAirAroundIt()
    {
        Sketch sketch = Sketch(
            Rectangle("YOKE", -20, -20, 20, 20), Rectangle("YOKE", -15, -15, 15, 15), Rectangle("COIL", -10, -10, 10, 10));

        CrossSection s = Sound(sketch, Parts("YOKE", "COIL"));

        Assert.Equal(700, Areas(s, "YOKE").Single(), Digits);
        Assert.Equal(400, Areas(s, "COIL").Single(), Digits);
        Assert.Equal(12, s.Edges.Count);
    }

    [Fact]
    public void RimBoundsTheAir()
    {
        Sketch sketch = Sketch(Rectangle("IRON", 0, 0, 10, 10), [Circle("BOX", 5, 5, 20)]);

        CrossSection s = Sound(sketch, Parts("IRON") with { RimLayer = "BOX" });

        Assert.True(s.HasRim);
        Assert.Equal((400 * Math.PI) - 100, s.Regions[CrossSection.Air].Area * 1e6, Digits);
        Assert.Contains(s.Edges, e => e.Right == CrossSection.Outside || e.Left == CrossSection.Outside);
    }

    [Fact]
    public void BeamIsReadAndIsNoPart()
    {
        Sketch sketch = Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("BEAM", 9, 4, 15, 6));

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON") with { BeamLayer = "BEAM" });

        Assert.NotNull(reading.Section);
        Assert.Equal(12e-6, reading.Beam!.Area, 15);
        Assert.Equal(4, reading.Section.Edges.Count);
    }

    [Theory]
    [InlineData(true)]
    [InlineData(false)]
    public void TouchingPartsShareTheirEdgeOnce(bool drawnTwice)
    {
        IEnumerable<SketchCurve> coil = drawnTwice
            ? Rectangle("COIL", 10, 2, 14, 8)
            : [Line("COIL", 10, 2, 14, 2), Line("COIL", 14, 2, 14, 8), Line("COIL", 14, 8, 10, 8)];

        CrossSection s = Sound(Sketch(Rectangle("IRON", 0, 0, 10, 10), coil), Parts("IRON", "COIL"));

        Assert.Equal(100, Areas(s, "IRON").Single(), Digits);
        Assert.Equal(24, Areas(s, "COIL").Single(), Digits);
        Assert.Equal(9, s.Edges.Count);
    }

    [Fact]
    public void FilletThatLeavesASharedFaceTangentiallyKeepsItsSide()
    {
        // A quarter-round foot: arcs leave the yoke's face along the face itself.
        Sketch sketch = Sketch(
            Rectangle("YOKE", -10, -5, 10, 0),
            [Arc("POLE", new Point(-5, 3), 3, 270, 90), Line("POLE", -2, 3, 2, 3), Arc("POLE", new Point(5, 3), 3, 180, 90), Line("POLE", 5, 0, -5, 0)]);

        CrossSection s = Sound(sketch, Parts("YOKE", "POLE"));

        Assert.Equal(100, Areas(s, "YOKE").Single(), Digits);
        Assert.Equal((10 * 3) - (0.5 * Math.PI * 9), Areas(s, "POLE").Single(), Digits);
    }

    // A tip on a frame, one flank missing: its foot lies on the frame's edge, which must not close it.
    [Theory]
    [InlineData(0)]
    [InlineData(1)]
    [InlineData(2)]
    public void OutlineThatEndsInTheOpenLeansOnNothing(int missing)
    {
        SketchCurve[] sides = [Line("TIP", 6, 2, 6, 8), Line("TIP", 6, 8, 10, 8), Line("TIP", 10, 8, 10, 2)];
        Sketch sketch = Sketch(
            Rectangle("FRAME", 0, 0, 16, 16), Rectangle("FRAME", 2, 2, 14, 14), [Line("TIP", 6, 2, 10, 2)], sides.Where((_, i) => i != missing));

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("FRAME", "TIP"));

        Assert.Equal(["open-outline"], Faults(reading));
        Assert.DoesNotContain(reading.Findings, f => f.What == "closed-by-neighbour");
        Assert.Equal(["FRAME"], reading.Parts.Select(p => p.Layer));
    }

    [Fact]
    public void CoilCutInTwoIsAFaultAndAHoleInItIsNot()
    {
        Sketch cut = Sketch(Rectangle("COIL", 0, 0, 20, 6), Rectangle("PIN", 8, 0, 12, 6));
        Sketch holed = Sketch(Rectangle("COIL", 0, 0, 20, 6), Rectangle("PIN", 8, 1, 12, 5));
        SectionRequest request = Parts("COIL", "PIN") with { CurrentLayers = ["COIL"] };

        Finding fault = Assert.Single(PoleField.Drawing.Sectioning.Read(cut, request).Findings, f => f.Severity == Severity.Fault);
        Assert.Equal(("coil-cut", "COIL"), (fault.What, fault.Layer));
        Assert.Contains("cut into 2 pieces by other parts, first at (12, 3) mm", fault.Text, StringComparison.Ordinal);
        Sound(holed, request);
        Sound(cut, request with { CurrentLayers = [] });
    }

    [Fact]
    public void OverlapMissingLayerAndOpenOutlineAreAllToldAtOnce()
    {
        Sketch sketch = Sketch(
            Rectangle("IRON", 0, 0, 10, 10),
            Rectangle("COIL", 8, 3, 14, 7),
            [Line("MAGNET", 20, 0, 30, 0), Line("MAGNET", 30, 0, 30, 10), Line("MAGNET", 30, 10, 20, 0.05)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON", "COIL", "MAGNET", "YOKE"));

        Assert.Null(reading.Section);
        Assert.Equal(["missing-layer", "open-outline", "overlap"], Faults(reading).Order());
        Assert.Equal(8e-6, reading.Findings.Single(f => f.What == "overlap").Size!.Value, 12);
    }

    [Fact]
    public void PartsOfOneMaterialMayOverlap()
    {
        Sketch sketch = Sketch(Rectangle("LEFT", 0, 0, 10, 10), Rectangle("RIGHT", 8, 2, 14, 8));

        CrossSection s = Sound(sketch, Parts("LEFT", "RIGHT") with { MaterialKeys = ["steel", "steel"] });

        Assert.Equal(100, Areas(s, "LEFT").Single(), Digits);
        Assert.Equal(24, Areas(s, "RIGHT").Single(), Digits);
    }

    [Fact]
    public void OpenWindowOutlineWithTwoMeaningsIsNotClosed()
    {
        // A wall across a window: either half of the window could be meant.
        Sketch sketch = Sketch(Rectangle("YOKE", 0, 0, 20, 20), Rectangle("YOKE", 5, 5, 15, 15), [Line("COIL", 10, 5, 10, 15)]);

        Assert.Equal(["open-outline"], Faults(PoleField.Drawing.Sectioning.Read(sketch, Parts("YOKE", "COIL"))));
    }

    [Fact]
    public void FreeFormOutlineKeepsItsArea()
    {
        // A cubic arch over its chord: the area under a Bezier curve with controls (0,0), (0,4), (6,4), (6,0) is 3/5·4·6.
        Nurbs arch = new(3, [0, 0, 0, 0, 1, 1, 1, 1], [new(0, 0), new(0, 4), new(6, 4), new(6, 0)]);
        Sketch sketch = Sketch([new SketchCurve(arch, "POLE", "SPLINE", null, 0), Line("POLE", 6, 0, 0, 0)], Rectangle("COIL", 2.5, 1, 3.5, 2));

        CrossSection s = Sound(sketch, Parts("POLE", "COIL"));

        Assert.Equal(14.4 - 1, Areas(s, "POLE").Single(), Digits);
    }

    [Fact]
    public void EmptySketchIsToldPlainly()
    {
        SectionReading reading = PoleField.Drawing.Sectioning.Read(Sketch(), Parts("IRON") with { BeamLayer = "BEAM", RimLayer = "BOX" });

        Assert.Equal(["missing-layer", "missing-layer", "missing-layer"], Faults(reading));
        Assert.EndsWith("Layers found: none.", reading.Findings[0].Text, StringComparison.Ordinal);
    }

    [Fact]
    public void LayerNamesIgnoreCaseAndUnusedLayersAreListed()
    {
        Sketch sketch = Sketch(Rectangle("Iron", 0, 0, 10, 10), Rectangle("NOTES", 0, 0, 1, 1));

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON"));

        Assert.Equal(["IRON"], reading.Section!.Parts);
        Assert.Equal([("NOTES", 4)], reading.IgnoredLayers);
    }
}
