// Truth: closed-form areas of the figures that were meant; radii and short edges that must survive unchanged.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class HealingTests
{
    private const double Gap = 0.001; // mm, half the join tolerance

    [Fact]
    public void GapBetweenLinesClosesAtItsMiddleAndIsTold()
    {
        Sketch sketch = Sketch([Line("IRON", 0, 0, 10, 0), Line("IRON", 10 + Gap, 0, 10, 10), Line("IRON", 10, 10, 0, 0)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON"));

        Finding joint = Assert.Single(reading.Findings, f => f.What == "healed-joint");
        Assert.Equal("Ends 1 µm apart at (10.0005, 0) mm were joined.", joint.Text);
        Assert.Equal(1e-6, joint.Size!.Value, 15);
        Assert.Empty(CrossSectionCheck.Faults(reading.Section!));
        Assert.Equal(50.0025, Areas(reading.Section!, "IRON").Single(), 9);
    }

    [Fact]
    public void LineMovesToTheArcWhoseRadiusStays()
    {
        Sketch sketch = Sketch([Arc("POLE", new Point(0, 0), 5, 0, 180), Line("POLE", -5, Gap, 5, -Gap)]);

        CrossSection s = Sound(sketch, Parts("POLE"));

        CircularArc arc = Assert.Single(s.Edges.Select(e => e.Curve).OfType<CircularArc>());
        Assert.Equal(0.005, arc.Radius);
        Assert.Equal(new Point(0, 0), arc.Centre);
        Assert.Equal(12.5 * Math.PI, Areas(s, "POLE").Single(), 9);
    }

    [Fact]
    public void ArcsKeepTheirRadiiWhenTheirGapCloses()
    {
        Sketch sketch = Sketch(
            [Arc("POLE", new Point(0, 0), 5, 0, 120), Arc("POLE", new Point(Gap, 0), 5, 120, 120), Arc("POLE", new Point(0, Gap), 5, 240, 120)]);

        CrossSection s = Sound(sketch, Parts("POLE"));

        Assert.All(s.Edges, e => Assert.Equal(0.005, ((CircularArc)e.Curve).Radius, 15));
        Assert.Equal(25 * Math.PI, Areas(s, "POLE").Single(), 0.1);
    }

    [Fact]
    public void CircleDrawnNotQuiteClosedBecomesWhole()
    {
        CrossSection s = Sound(Sketch([Arc("PIN", new Point(0, 0), 5, 0, 359.99)]), Parts("PIN"));

        Assert.Equal(25 * Math.PI, Areas(s, "PIN").Single(), 9);
        Assert.Single(s.Vertices);
    }

    [Fact]
    public void ShortEdgesThatAreMeantSurvive()
    {
        const double chamfer = 0.0015; // mm, shorter than the join tolerance
        CrossSection s = Sound(
            Sketch(Polygon("IRON", (0, 0), (10, 0), (10, 10 - chamfer), (10 - chamfer, 10), (0, 10))), Parts("IRON"));

        Assert.Equal(5, s.Edges.Count);
        Assert.Equal(100 - (0.5 * chamfer * chamfer), Areas(s, "IRON").Single(), 10);
    }

    [Fact]
    public void RepeatedCurvesAreCountedAndDropped()
    {
        Sketch sketch = Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("IRON", 0, 0, 10, 10), [Line("IRON", 3, 0, 7, 0)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("IRON"));

        Assert.Equal(100, Areas(reading.Section!, "IRON").Single(), 9);
        Assert.Equal(3, reading.Findings.Count(f => f.What == "duplicate"));
        Assert.Contains(reading.Findings, f => f.What == "overlap-merged");
        Assert.Equal(
            "A curve of length 10 mm through (10, 5) mm is drawn more than once; one was kept.",
            reading.Findings.First(f => f.What == "duplicate").Text);
        Assert.Equal(
            "Curves lie on each other over 3 mm about (1.5, 0) mm; one was kept.",
            reading.Findings.First(f => f.What == "overlap-merged").Text);
    }

    [Fact]
    public void OverlappingArcsOfOneCircleAreOne()
    {
        CrossSection s = Sound(Sketch([Arc("PIN", new Point(1, 1), 2, 0, 250), Arc("PIN", new Point(1, 1), 2, 200, 220)]), Parts("PIN"));

        Assert.Equal(4 * Math.PI, Areas(s, "PIN").Single(), 9);
    }

    [Fact]
    public void PointsAreDropped()
    {
        SectionReading reading = PoleField.Drawing.Sectioning.Read(
            Sketch(Rectangle("IRON", 0, 0, 10, 10), [Line("IRON", 5, 5, 5, 5 + 1e-9)]), Parts("IRON"));

        Assert.Equal(
            "A curve of length 0.001 nm at (5, 5) mm is a point and was dropped.", reading.Findings.Single(f => f.What == "short-piece").Text);
        Assert.NotNull(reading.Section);
    }

    [Theory]
    [InlineData(0.0015)]   // a gap between the parts
    [InlineData(-0.0015)]  // an overlap
    [InlineData(0)]
    public void PartsThatNearlyTouchShareOneEdge(double off)
    {
        Sketch sketch = Sketch(Rectangle("IRON", 0, 0, 10, 10), Polygon("COIL", (10 + off, 2), (14, 2), (14, 8), (10 + off, 8), (10 + (0.5 * off), 5)));

        CrossSection s = Sound(sketch, Parts("IRON", "COIL"));

        Assert.Equal(100, Areas(s, "IRON").Single(), 1);
        Assert.Equal(24, Areas(s, "COIL").Single(), 1);
        Assert.Equal(2, s.Edges.Count(e => e.Left > 0 && e.Right > 0));
    }

    [Fact]
    public void OutlinesOfOneLayerThatShareAnEdgeStayTwo()
    {
        // Three curves of the layer meet at the ends of the common edge: both sides are material.
        Sketch sketch = Sketch(
            Polygon("COIL", (0, 0), (4, 0), (8, 0), (8, 3), (4, 3), (0, 3)), [Line("COIL", 4, 0, 4, 3)]);

        CrossSection s = Sound(sketch, Parts("COIL"));

        Assert.Equal([12, 12], Areas(s, "COIL"), (a, b) => Math.Abs(a - b) < 1e-9);
    }

    [Fact]
    public void LooseEndsOnAnotherCurveAreTJoints()
    {
        Sketch sketch = Sketch(
            Rectangle("COIL", 0, 0, 8, 3), [Line("COIL", 4, 0.0012, 4, 3.001)]);

        CrossSection s = Sound(sketch, Parts("COIL"));

        Assert.Equal([12, 12], Areas(s, "COIL"), (a, b) => Math.Abs(a - b) < 0.01);
    }

    [Fact]
    public void RoundedCoordinatesAreJoinedAndOnlyCounted()
    {
        // Six decimals of a millimetre, three curves of one layer at a point.
        const double ulp = 1e-6;
        Sketch sketch = Sketch(
            Polygon("COIL", (0, 0), (4, 0), (8, 0), (8, 3), (4, 3), (0, 3)), [Line("COIL", 4 + ulp, 0, 4, 3 - ulp)],
            [Line("PIN", 20, 0, 21, 0), Line("PIN", 21 + (0.5 * ulp), 0, 21, 1), Line("PIN", 21, 1, 20, 0)]);

        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Parts("COIL", "PIN"));

        Assert.Equal([12, 12], Areas(reading.Section!, "COIL"), (a, b) => Math.Abs(a - b) < 1e-4);
        Assert.Equal(
            "1 joint with less than 1 nm between the ends closed on layer PIN.",
            reading.Findings.Single(f => f.What == "healed-joint" && f.Layer == "PIN").Text);
    }

    [Fact]
    public void CellsOfAGridOnOneLayerAreAllMaterial()
    {
        IEnumerable<SketchCurve> lines = Enumerable.Range(0, 4).SelectMany(i => new[] { Line("COIL", 0, i, 3, i), Line("COIL", i, 0, i, 3) });

        // Inner lines cross; drawn cell by cell they share edges instead.
        IEnumerable<SketchCurve> cells = Enumerable.Range(0, 9).SelectMany(i => Rectangle("COIL", i % 3, i / 3, (i % 3) + 1, (i / 3) + 1));

        Assert.Equal(4, Faults(PoleField.Drawing.Sectioning.Read(Sketch(lines), Parts("COIL"))).Count(f => f == "self-crossing"));
        Assert.Equal(9, Areas(Sound(Sketch(cells), Parts("COIL")), "COIL").Length);
    }
}
