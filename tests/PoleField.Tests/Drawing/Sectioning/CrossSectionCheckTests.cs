// Truth: sections broken on purpose, one promise at a time.
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class CrossSectionCheckTests
{
    private static CrossSection Good { get; } =
        Sound(Sketch(Rectangle("IRON", 0, 0, 10, 10), Rectangle("COIL", 10, 2, 14, 8)), Parts("IRON", "COIL"));

    [Fact]
    public void SwappedSidesAreSeen() =>
        Assert.Contains(CrossSectionCheck.Faults(With(e => e with { Left = e.Right, Right = e.Left })), f => f.Contains("share a sector"));

    [Fact]
    public void WrongAreaIsSeen()
    {
        CrossSection broken = new(
            Good.Vertices, Good.Edges, [.. Good.Regions.Select(r => r with { Area = r.Area * (1 + 1e-4) })], Good.Parts, false);

        Assert.Contains(CrossSectionCheck.Faults(broken), f => f.Contains("states an area"));
    }

    [Fact]
    public void EndOffItsVertexIsSeen() =>
        Assert.Contains(
            CrossSectionCheck.Faults(With(e => e with { Curve = new Line(e.Curve.Start, e.Curve.End + new Point(0, 1e-18)) })),
            f => f.Contains("does not end"));

    [Fact]
    public void CrossingIsSeen()
    {
        Line across = new(Good.Vertices[0], new Point(0.012, 0.007));
        CrossSection broken = new(
            [.. Good.Vertices, across.End],
            [.. Good.Edges, new SectionEdge(0, Good.Vertices.Count, across, 1, 0)],
            Good.Regions,
            Good.Parts,
            false);

        Assert.Contains(CrossSectionCheck.Faults(broken), f => f.Contains("no common end"));
    }

    [Fact]
    public void MissingEdgeIsSeen()
    {
        CrossSection broken = new(Good.Vertices, [.. Good.Edges.Skip(1)], Good.Regions, Good.Parts, false);

        Assert.NotEmpty(CrossSectionCheck.Faults(broken));
    }

    private static CrossSection With(Func<SectionEdge, SectionEdge> change) =>
        new(Good.Vertices, [change(Good.Edges[0]), .. Good.Edges.Skip(1)], Good.Regions, Good.Parts, false);
}
