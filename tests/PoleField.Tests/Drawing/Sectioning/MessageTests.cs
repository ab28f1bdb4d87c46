// Truth: the sketch as drawn, place and size of each fault known from its coordinates.
using PoleField.Drawing;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class MessageTests
{
    [Fact]
    public void OpenOutlineNamesBothEnds() => Says(
        Sketch([Line("IRON", 0, 0, 22, -14) with { Line = 212 }, Line("IRON", 22, -14.05, 0, -30) with { Line = 340 }, Line("IRON", 0, -30, 0, 0)]),
        Parts("IRON"),
        "open-outline",
        "An outline is open on layer IRON: ends (22, -14) mm and (22, -14.05) mm are 0.05 mm apart (join tolerance 2 µm; LINE near line 212; LINE near line 340).");

    [Fact]
    public void OverlapHasAreaAndFirstPlace() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("COIL", 8, 3, 14, 7)),
        Parts("IRON", "COIL"),
        "overlap",
        "Layers IRON and COIL overlap by 8 mm², first at (8, 3) mm; parts of different material may touch or lie one inside the other, not overlap in part.");

    [Fact]
    public void SameOutlineOnTwoLayersIsAnOverlap() => Says(
        Sketch([Circle("IRON", 0, 0, 5), Circle("COIL", 0, 0, 5)]),
        Parts("IRON", "COIL"),
        "overlap",
        "Layers IRON and COIL overlap by 78.5398 mm², first at (5, 0) mm; parts of different material may touch or lie one inside the other, not overlap in part.");

    [Fact]
    public void CurvesOfOneLayerMustNotCross() => Says(
        Sketch([Line("IRON", 0, 0, 10, 10), Line("IRON", 10, 10, 10, 0), Line("IRON", 10, 0, 0, 10), Line("IRON", 0, 10, 0, 0)]),
        Parts("IRON"),
        "self-crossing",
        "Curves of one layer cross at (5, 5) mm (LINE; LINE).");

    [Fact]
    public void MissingLayerListsWhatThereIs() => Says(
        Sketch(Rectangle("POLE_TIP", 0, 0, 10, 10), [Circle("Layer1", 0, 0, 1), Line("NOTES", 0, 0, 1, 1)]),
        Parts("POLETIP"),
        "missing-layer",
        "Layer POLETIP, named as a part, holds no curve of the sketch. Layers found: Layer1 (1 curve, 1 closed outline, 3.14159 mm²), NOTES (1 curve, no closed outline), POLE_TIP (4 curves, 1 closed outline, 100 mm²).",
        "Did you mean POLE_TIP?");

    [Fact]
    public void FrozenLayerIsNamedAsTheReason() => Says(
        Sketch(Rectangle("POLE", 0, 0, 10, 10)) with { Skipped = [new SkippedEntities("COIL", "LINE", "layer is frozen", 4)] },
        Parts("POLE", "COIL"),
        "missing-layer",
        "Layer COIL, named as a part, holds no curve of the sketch (skipped: 4 LINE, layer is frozen). Layers found: POLE (4 curves, 1 closed outline, 100 mm²).",
        "Name one of these layers.");

    [Fact]
    public void TwoCandidatesForAJointAreToldApart() => Says(
        Sketch([Line("IRON", 0, 0, 10, 0), Line("IRON", 10, 0.001, 10, 10), Line("IRON", 10, 10, 0, 0), Line("IRON", 10.0015, 0, 20, 0)]),
        Parts("IRON"),
        "ambiguous-joint",
        "The open end (10, 0) mm could meet two others, (10, 0.001) mm (1 µm away) and (10.0015, 0) mm (1.5 µm away).");

    [Fact]
    public void RimMustEncloseTheParts() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("BOX", -5, -5, 7, 15)),
        Parts("IRON") with { RimLayer = "BOX" },
        "outside-rim",
        "30 mm² of layer IRON lie outside the rim on layer BOX, first at (7, 0) mm.");

    [Fact]
    public void RimIsOneOutline() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("BOX", -5, -5, 15, 15), Rectangle("BOX", -6, -6, 16, 16)),
        Parts("IRON") with { RimLayer = "BOX" },
        "outline-count",
        "Layer BOX, named as the rim, holds 2 closed outlines; exactly one is allowed.");

    [Fact]
    public void BeamIsOneOutline() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("BEAM", 20, 0, 21, 1), Rectangle("BEAM", 22, 0, 23, 1)),
        Parts("IRON") with { BeamLayer = "BEAM" },
        "outline-count",
        "Layer BEAM, named as the beam, holds 2 closed outlines; exactly one is allowed.");

    [Fact]
    public void LayerHasOnePurpose() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10)),
        Parts("IRON") with { BeamLayer = "iron" },
        "layer-twice",
        "Layer iron is named for two purposes.");

    [Fact]
    public void LayerOfPointsHoldsNoOutline() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), [Line("PIN", 3, 3, 3, 3 + 1e-9)]),
        Parts("IRON", "PIN"),
        "no-outline",
        "Layer PIN, named as a part, holds no closed outline.");

    [Fact]
    public void CurveBetweenOutlinesBoundsNothing() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("IRON", 20, 0, 30, 10), [Line("IRON", 10, 5, 20, 5)]),
        Parts("IRON"),
        "loose-curve",
        "A curve on layer IRON bounds nothing at (15, 5) mm (LINE).");

    [Fact]
    public void PlacesAreInDrawingUnitsAndMillimetres() => Says(
        Sketch(Rectangle("IRON", 0, 0, 1, 1), Rectangle("COIL", 0.5, 0.5, 2, 2)) with { Unit = new LengthUnit("in", 0.0254) },
        Parts("IRON", "COIL"),
        "overlap",
        "Layers IRON and COIL overlap by 161.29 mm², first at (0.5, 0.5) in = (12.7, 12.7) mm; parts of different material may touch or lie one inside the other, not overlap in part.");

    [Fact]
    public void UnlikelySizeIsAWarning() => Says(
        Sketch(Rectangle("IRON", 0, 0, 140, 150)) with { Unit = new LengthUnit("in", 0.0254) },
        Parts("IRON"),
        "unlikely-size",
        "The parts span 3556 x 3810 mm, read with 1 in = 25.4 mm; magnets of 5 mm to 3 m are expected.");

    [Fact]
    public void UnusedLayerThatLooksLikeACoilIsHinted() => Says(
        Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("COIL LEFT", 20, 0, 30, 10), Rectangle("ENVIRONMENT", 20, 0, 30, 10)),
        Parts("IRON"),
        "unused-layer",
        "Layer COIL LEFT looks like a coil and is not among the parts.");

    [Fact]
    public void FarOriginIsANote() => Says(
        Sketch(Rectangle("IRON", 568053, 5774347, 568063, 5774357)),
        Parts("IRON"),
        "far-origin",
        "The sketch lies far from its origin, about (568058, 5774352) mm; lengths are kept, to the digits its coordinates still hold.");

    [Fact]
    public void FaultsAreCountedUpToFifty()
    {
        SectionReading reading = PoleField.Drawing.Sectioning.Read(
            Sketch(Enumerable.Range(0, 60).SelectMany(i => new[] { Line("IRON", 10 * i, 0, (10 * i) + 5, 0), Line("IRON", (10 * i) + 5, 0, 10 * i, 4) })), Parts("IRON"));

        Assert.Equal(50, Faults(reading).Length);
        Assert.Equal("10 more faults are not shown.", reading.Findings.Single(f => f.What == "more-faults").Text);
    }

    private static void Says(Sketch sketch, SectionRequest request, string what, string text, string? fix = null)
    {
        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, request);

        Finding finding = Assert.Single(reading.Findings, f => f.What == what);
        Assert.Equal(text, finding.Text);
        Assert.Equal("test.dxf", finding.File);
        Assert.Equal(finding.Severity != Severity.Fault && !reading.Findings.Any(f => f.Severity == Severity.Fault), reading.IsSound);
        Assert.Equal(fix ?? finding.Fix, finding.Fix);
    }
}
