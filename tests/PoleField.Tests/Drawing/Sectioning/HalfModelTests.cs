// Truth: a half drawing completed by its mirror image has the areas, edges and symmetry of the whole one.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class HalfModelTests
{
    private static SectionRequest Half(params string[] layers) => Parts(layers) with { MirrorLeftRight = true };

    private static SketchCurve[] OpenPole(double shift = 0) =>
    [
        Line("POLE", shift, 10, 8, 10), Line("POLE", 8, 10, 8, 4),
        Arc("POLE", new Point(0, 4), 8, 0, -90 + (shift == 0 ? 0 : 1e-4)),
    ];

    [Fact]
    public void OutlineThatEndsOnTheAxisBecomesOneRegion()
    {
        CrossSection s = Sound(Sketch(OpenPole()), Half("POLE"));

        Assert.Equal((16 * 6) + (0.5 * Math.PI * 64), Areas(s, "POLE").Single(), 9);
        Assert.Equal(6, s.Edges.Count);
        Assert.False(s.Regions[1].MirrorImage);
        Assert.Equal(-0.008, s.Regions[1].Bounds.Min.Y);
    }

    [Fact]
    public void DrawingTheAxisEdgeChangesNothing()
    {
        CrossSection without = Sound(Sketch(OpenPole()), Half("POLE"));
        CrossSection with = Sound(Sketch(OpenPole(), [Line("POLE", 0, -4, 0, 10)]), Half("POLE"));

        Assert.Equal(without.Vertices.Order(ByPlace), with.Vertices.Order(ByPlace));
        Assert.Equal(without.Regions[1].Area, with.Regions[1].Area, 15);
    }

    [Fact]
    public void CentreLineOnTheAxisIsNoFault()
    {
        CrossSection s = Sound(Sketch(OpenPole(), [Line("POLE", 0, -40, 0, 40)]), Half("POLE"));

        Assert.Equal(6, s.Edges.Count);
    }

    [Fact]
    public void VerticesAreSymmetricToTheLastBit()
    {
        CrossSection s = Sound(Sketch(OpenPole(), [Circle("COIL", 11.3, 7.1, 1.7)]), Half("POLE", "COIL"));

        HashSet<Point> all = [.. s.Vertices];
        Assert.All(s.Vertices, v => Assert.Contains(new Point(0 - v.Y, v.Z), all));
        Assert.Equal(
            s.Edges.Select(e => e.Curve).OfType<CircularArc>().Select(a => (Math.Abs(a.Centre.Y), a.Centre.Z, a.Radius)).Distinct().Count(),
            s.Edges.Count(e => e.Curve is CircularArc) / 2);
    }

    [Fact]
    public void RegionsClearOfTheAxisGetAnImage()
    {
        CrossSection s = Sound(Sketch(Rectangle("COIL", 5, 0, 7, 3)), Half("COIL") with { CurrentLayers = ["COIL"] });

        Assert.Equal([false, false, true], s.Regions.Select(r => r.MirrorImage));
        Assert.Equal([6, 6], Areas(s, "COIL"), (a, b) => Math.Abs(a - b) < 1e-9);
        Assert.Equal(-0.007, s.Regions[2].Bounds.Min.Y);
    }

    [Fact]
    public void HollowYokeIsClosedInTwoStretches()
    {
        Sketch sketch = Sketch(
            [Arc("YOKE", new Point(0, 0), 20, -90, 180), Arc("YOKE", new Point(0, 0), 15, -90, 180), Circle("PIN", 0, 0, 3)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Half("YOKE"));
        CrossSection s = Sound(Sketch(sketch.Curves.Take(2)), Half("YOKE"));

        Assert.Equal(2, reading.Findings.Count(f => f.What == "closed-on-symmetry"));
        Assert.Equal(Math.PI * (400 - 225), Areas(s, "YOKE").Single(), 9);
        Assert.Equal(4, s.Edges.Count);
    }

    [Fact]
    public void RimAndBeamAreCompletedToo()
    {
        Sketch sketch = Sketch(
            OpenPole(),
            [Line("BOX", 0, -30, 30, -30), Line("BOX", 30, -30, 30, 30), Line("BOX", 30, 30, 0, 30)],
            [Line("BEAM", 0, -10, 2, -10), Line("BEAM", 2, -10, 2, -9), Line("BEAM", 2, -9, 0, -9)]);

        SectionRequest request = Half("POLE") with { RimLayer = "BOX", BeamLayer = "BEAM" };
        CrossSection s = Sound(sketch, request);
        Outline beam = PoleField.Drawing.Sectioning.Read(sketch, request).Beam!;

        Assert.Equal(3600 - 96 - (32 * Math.PI), s.Regions[0].Area * 1e6, 8);
        Assert.Equal(4, beam.Area * 1e6, 9);
        Assert.Equal(0, beam.Centroid.Y, 15);
    }

    [Fact]
    public void EndsWithinTheJoinToleranceOfTheAxisArePutOnIt()
    {
        CrossSection s = Sound(
            Sketch([Line("POLE", 0.001, 10, 8, 10), Line("POLE", 8, 10, 8, 4), Line("POLE", 8, 4, -0.0015, 4)]), Half("POLE"));

        Assert.Equal(96, Areas(s, "POLE").Single(), 9);
    }

    [Fact]
    public void CircleThatTouchesTheAxisMeetsItsImageInOnePoint()
    {
        CrossSection s = Sound(Sketch([Circle("PIN", 3, 1, 3)]), Half("PIN"));

        Assert.Equal([9 * Math.PI, 9 * Math.PI], Areas(s, "PIN"), (a, b) => Math.Abs(a - b) < 1e-9);
        Assert.Equal(0.001, s.Vertices.Single(v => v.Y == 0).Z, 15);
    }

    [Fact]
    public void WhatReachesAcrossOrPutsACoilOnTheAxisIsAFault()
    {
        Sketch sketch = Sketch(Rectangle("POLE", -3, 0, 3, 4), Rectangle("COIL", 0, 10, 3, 12));

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Half("POLE", "COIL") with { CurrentLayers = ["COIL"] });

        Assert.Equal(["across-symmetry", "coil-on-symmetry"], Faults(reading).Order());
        Assert.Equal(
            "Layer POLE reaches across the symmetry line, to (-3, 0) mm; a sketch that is mirrored left-right shows y >= 0 only.",
            reading.Findings.Single(f => f.What == "across-symmetry").Text);
        Assert.Equal(
            "The coil on layer COIL touches the symmetry line at (0, 11) mm; its image would carry the opposite current in the same place.",
            reading.Findings.Single(f => f.What == "coil-on-symmetry").Text);
    }

    private static Comparer<Point> ByPlace { get; } = Comparer<Point>.Create((a, b) => (a.Y, a.Z).CompareTo((b.Y, b.Z)));
}
