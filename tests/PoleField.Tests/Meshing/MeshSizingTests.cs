// Truth: distances and radii of the model problem computed by hand from its dimensions; similarity of figures.
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Meshing;

public sealed class MeshSizingTests
{
    private static readonly int[] Iron = [0];

    [Fact]
    public void TheScalesAreThoseOfTheGap()
    {
        MeshSizing scales = MeshSizing.Measure(ProblemP.Section(), ProblemP.Aperture, Iron);

        // The aperture's lower edge lies at z = 3.6 over the nose's top at 3: gap 0.6; its middle at 4.1: 1.1 above the nose.
        Assert.Equal(0.6e-3, scales.Gap, 1e-8);
        Assert.Equal(2.2e-3, scales.Reach, 1e-8);
    }

    [Fact]
    public void EveryPlaceGetsTheSizeOfItsRule()
    {
        SizeField size = MeshSizing.For(ProblemP.Section(), ProblemP.Aperture, Iron);
        double a = 2.2e-3;
        double t = 3e-3 / Math.Sqrt(2);
        double lipHeight = 1e-3 * (Math.Sqrt((3.6 * 3.6) - 9) + 1.8);

        Assert.InRange(size.At(new Point(0, 4.1e-3)), 0, 0.2e-3 * 1.2); // aperture: gap/3
        Assert.InRange(size.At(new Point(0, 3e-3)), 0, 0.6e-3 / 2.5 * 1.1); // nose under the aperture: gap/2.5, between sources
        Assert.InRange(size.At(new Point(4.5e-3, lipHeight)), 0.03 * a, 0.05 * a); // lip
        Assert.InRange(size.At(new Point(50e-3, 49e-3)), 0.1 * a, 0.13 * a); // window corner
        Assert.InRange(size.At(new Point(15e-3, -41e-3)), 0.1 * a, 0.13 * a); // pole root
        Assert.InRange(size.At(new Point(0, 1e-3)), 0, 0.33 * a); // pole iron under the tip, 0.3 between sources
        Assert.True(size.At(new Point(62e-3, 4e-3)) > 2 * a); // yoke
        Assert.True(size.At(new Point(200e-3, 200e-3)) > 10 * a); // far air

        // Where nose and flank join smoothly there is no corner: only the nose's own size counts, 0.15 of its radius.
        Assert.True(size.At(new Point(t, t)) > 0.1 * a);
    }

    [Fact]
    public void ElementsAtTheApertureOwnNoPlaceOfAnyPart()
    {
        CrossSection section = ProblemP.Section();
        Mesh mesh = Mesher.Mesh(section, MeshSizing.For(section, ProblemP.Aperture, Iron));
        const double inflation = 0.25 * 0.6e-3;
        HashSet<int> onParts = [.. mesh.CurveEdges.SelectMany(e => new[] { e.A, e.B })];

        int near = 0;
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            int[] corners = [mesh.Triangles[3 * t], mesh.Triangles[(3 * t) + 1], mesh.Triangles[(3 * t) + 2]];
            bool touches = corners.Any(v => ProblemP.Aperture.Contains(mesh.Vertices[v])
                || ProblemP.Aperture.DistanceToEdge(mesh.Vertices[v]) <= inflation);
            if (touches)
            {
                near++;
                Assert.DoesNotContain(corners, onParts.Contains);
            }
        }

        Assert.True(near > 30);
    }

    [Fact]
    public void SimilarSectionsGetSimilarSizes()
    {
        Affine larger = Affine.Scaling(1000);
        CrossSection section = ProblemP.Section();
        SectionFixture fixture = new();
        foreach (string part in section.Parts)
        {
            fixture.Region(part);
        }

        foreach (SectionEdge e in section.Edges)
        {
            fixture.Edge(e.Curve.Transformed(larger), e.Left, e.Right);
        }

        SizeField small = MeshSizing.For(section, ProblemP.Aperture, Iron);
        SizeField large = MeshSizing.For(
            fixture.Build(), Outline.FromCurves([.. ProblemP.Aperture.Curves.Select(c => c.Transformed(larger))]), Iron);

        foreach (Point p in new Point[] { new(0, 3e-3), new(4.5e-3, 3.8e-3), new(0.05, 0.049), new(0.062, 0.004), new(0.2, 0.2) })
        {
            Assert.Equal(1, large.At(larger.Apply(p)) / (1000 * small.At(p)), 1e-3);
        }
    }

    [Fact]
    public void FinenessScalesSmoothSizesInProportionAndCornersFaster()
    {
        SizeField rule = MeshSizing.For(ProblemP.Section(), ProblemP.Aperture, Iron);
        SizeField fine = MeshSizing.For(ProblemP.Section(), ProblemP.Aperture, Iron, fineness: 0.5);

        // At the lip's corner: 0.5 to the power 6/1.3. At the aperture's corner: in proportion.
        Point lip = new(4.5e-3, 3.79e-3);
        Assert.InRange(fine.At(lip) / rule.At(lip), 0.5 * Math.Pow(0.5, 4.6), 2 * Math.Pow(0.5, 4.6));
        Assert.InRange(fine.At(ProblemP.Aperture.Curves[0].Start) / rule.At(ProblemP.Aperture.Curves[0].Start), 0.45, 0.55);
        Assert.Equal(0.5 * rule.Ceiling, fine.Ceiling, 1e-12);
        Assert.Throws<ArgumentOutOfRangeException>(() => MeshSizing.For(ProblemP.Section(), ProblemP.Aperture, Iron, 0));
    }
}
