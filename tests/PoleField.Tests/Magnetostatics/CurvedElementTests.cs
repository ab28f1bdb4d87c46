// Truth: the triangle (0, 0), (1, 0), (0, 1) whose lower side is the parabola y = 4 d x (1 − x) is the image of the reference
// triangle under (ξ, η + 4 d ξ (1 − ξ − η)) in every order from 2 on: det J = 1 − 4 d ξ, positive everywhere for d < 1/4 only.
// Areas are the curves' own.
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Tests.Meshing;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Magnetostatics;

public class CurvedElementTests
{
    [Theory]
    [InlineData(2, 0.2499)]
    [InlineData(3, 0.2499)]
    [InlineData(4, 0.2499)]
    [InlineData(3, -3.0)]
    public void AnElementThatDoesNotFoldIsAccepted(int order, double height)
    {
        FiniteElementSpace space = Bent(order, height);

        // The parabola's own area, 2/3 of height times chord, leaves the triangle.
        Assert.Equal(0.5 - (2 * height / 3), Area(space, 0), 1e-14);
        Assert.True(new JacobianProof(space).IsPositive(0));
    }

    [Theory]
    [InlineData(2, 0.2501)]
    [InlineData(3, 0.2501)]
    [InlineData(4, 0.2501)]
    public void AnElementThatFoldsIsRefused(int order, double height)
    {
        MeshingException fault = Assert.Throws<MeshingException>(() => Bent(order, height));

        Assert.Contains("folds over", fault.Message, StringComparison.Ordinal);
    }

    // With the side y = 6 c x² (1 − x)², flat at both ends, det J = 1 + 6 c ξ (1 − ξ) (1/2 − 2 ξ) along it, exactly in order 4: least
    // at ξ = 0.7171, where it vanishes for c = 0.8794, while at the node ξ = 3/4 it stays positive up to c = 8/9.
    [Theory]
    [InlineData(0.878, true)]
    [InlineData(0.884, false)]
    public void AFoldBetweenTheNodesIsFound(double bulge, bool accepted)
    {
        var side = new Nurbs(
            4, [0, 0, 0, 0, 0, 1, 1, 1, 1, 1], [new(0, 0), new(0.25, 0), new(0.5, bulge), new(0.75, 0), new(1, 0)]);
        Assert.True(1 + (6 * bulge * 0.75 * 0.25 * (0.5 - 1.5)) > 0); // at the node

        Assert.Equal(accepted, Record.Exception(() => Space(4, side)) is null);
    }

    [Theory]
    [InlineData(2)]
    [InlineData(3)]
    [InlineData(4)]
    public void CurvedMeshesHaveTheirCurvesArea(int order)
    {
        Magnet magnet = new Drawn().Circle("IRON", 0, 0, 10).Linear("IRON", 100).Magnet();
        Mesh mesh = Mesher.Mesh(magnet.Section, SizeField.Uniform(3e-3));
        FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), order);

        double area = Enumerable.Range(0, space.ElementCount).Where(e => mesh.Regions[e] > 0).Sum(e => Area(space, e));

        // Interpolating a circle in p + 1 places over the angle s leaves less than s^(2p) of its area (p even gains one order).
        double turn = 20 * Math.PI / 180;
        Assert.Equal(1.0, area / (Math.PI * 1e-4), Math.Pow(turn, 2 * order) + 1e-13);
    }

    private static double Area(FiniteElementSpace space, int element)
    {
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + 2));
        return Enumerable.Range(0, table.Count).Sum(q =>
            table.Quadrature.Weights[q] * space.JacobianAt(element, table.XiRow(q), table.EtaRow(q)).Determinant);
    }

    private static FiniteElementSpace Bent(int order, double height) =>
        Space(order, new Nurbs(2, [0, 0, 0, 1, 1, 1], [new(0, 0), new(0.5, 2 * height), new(1, 0)]));

    private static FiniteElementSpace Space(int order, Curve bottom)
    {
        Mesh mesh = OneTriangle(bottom);
        return FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), order);
    }

    private static Mesh OneTriangle(Curve bottom)
    {
        Point[] corners = [new(0, 0), new(1, 0), new(0, 1)];
        return new Mesh(ProblemP.Section(), corners, [0, 1, 2], [0], [new CurveEdge(0, 1, bottom, 0, 1, 0)], null, -1);
    }
}
