// Truth: mirror symmetry and closure are bitwise properties; parts touch where their edges have equal ends; names are unique.
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Drawing.Families;

public sealed class PoleFamiliesTests
{
    public static TheoryData<string> Names => [.. PoleFamilies.All.Select(f => f.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void OutlinesAreClosedAndSymmetricToTheLastBit(string name)
    {
        StartingSketch family = PoleFamilies.Get(name).Draw();

        foreach (string layer in family.Sketch.Curves.Select(c => c.Layer).Distinct())
        {
            Assert.NotEmpty(FamilyAssert.Outlines(family.Sketch, layer));
        }

        HashSet<Point> corners = [.. family.Sketch.Curves.Where(c => c.Kind != "CIRCLE").Select(c => c.Curve.Start)];
        foreach (Point p in corners)
        {
            Assert.True(corners.Contains(new Point(-p.Y, p.Z)), FormattableString.Invariant($"({p.Y}, {p.Z}) has no mirror image."));
        }
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void EveryPartHasCurvesAndABuiltInMaterialAndTheCurrentsCancel(string name)
    {
        StartingSketch family = PoleFamilies.Get(name).Draw();

        Assert.All(family.Parts, p => Assert.Contains(family.Sketch.Curves, c => c.Layer == p.Layer));
        Assert.All(family.Parts, p => Assert.NotNull(MaterialLibrary.Find(p.Material)));
        Assert.Equal(0, family.Parts.Sum(p => p.Share * FamilyAssert.Outlines(family.Sketch, p.Layer).Count));
        Assert.Equal(1, family.Parts.Where(p => p.Share > 0).Sum(p => p.Share * FamilyAssert.Outlines(family.Sketch, p.Layer).Count));
        Assert.True(FamilyAssert.Outlines(family.Sketch, StartingSketch.BeamLayer)[0].Contains(family.Beam));
    }

    [Theory]
    [InlineData("two-wire")]
    [InlineData("flat-gradient")]
    [InlineData("shifted-quadrupole")]
    public void PolesShareTheirFootWithTheYoke(string name)
    {
        Sketch sketch = PoleFamilies.Get(name).Draw().Sketch;
        HashSet<(Point, Point)> yoke = [.. Edges(sketch, "YOKE"), .. Edges(sketch, "YOKE").Select(e => (e.End, e.Start))];

        Assert.Equal(1, Edges(sketch, "RIDGE").Count(yoke.Contains));
        Assert.Equal(1, Edges(sketch, "GROOVE").Count(yoke.Contains));
    }

    [Fact]
    public void ScaledFrameFitsScaledFaces()
    {
        TwoWirePair doubled = new()
        {
            HalfSpacing = 6,
            RidgeRadius = 6,
            RidgeReach = 6 / Math.Sqrt(2),
            GrooveRadius = 7.2,
            LandEdge = 9,
            Frame = new YokeFrame().Scaled(2),
        };
        StartingSketch large = doubled.Draw();
        StartingSketch small = new TwoWirePair().Draw();

        // At equal ampere-turns the field goes as 1/a and its area as a².
        Assert.Equal(2, small.FieldPerAmpereTurn / large.FieldPerAmpereTurn, 1e-12);
        Assert.Equal(4, FamilyAssert.Outlines(large.Sketch, "RIDGE")[0].Area / FamilyAssert.Outlines(small.Sketch, "RIDGE")[0].Area, 1e-12);
    }

    [Fact]
    public void UnknownFamilyIsAnsweredWithTheNames() =>
        Assert.Contains("two-wire, flat-gradient", Assert.Throws<InputException>(() => PoleFamilies.Get("three-wire")).Findings[0].Fix, StringComparison.Ordinal);

    private static IEnumerable<(Point Start, Point End)> Edges(Sketch sketch, string layer) =>
        sketch.Curves.Where(c => c.Layer == layer).Select(c => (c.Curve.Start, c.Curve.End));
}
