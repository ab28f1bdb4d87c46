// Truth: George, SIAM J. Numer. Anal. 10 (1973) 345 (from memory): fill O(n log n), operations O(n^1.5) on square grids; elimination by definition.
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public sealed class OrderingTests
{
    // With fill c n log n the quotient fill / (n log₂ n) tends to a constant; with a band order it grows by 1.7 a doubling of m.
    [Fact]
    public void FillGrowsLikeNLogN()
    {
        double[] quotient = [.. new[] { 40, 80, 160 }.Select(m =>
        {
            CholeskyAnalysis analysis = CholeskyAnalysis.Analyse(ElementMeshes.Laplacian(m).Pattern);
            return analysis.FactorEntries / (m * m * Math.Log2(m * m));
        })];

        Assert.InRange(quotient[1] / quotient[0], 0.9, 1.15);
        Assert.InRange(quotient[2] / quotient[1], 0.9, 1.15);

        // His constant for a square grid is 31/4 n log₂ m, that is 31/8 n log₂ n.
        Assert.InRange(quotient[2], 0.5, 31.0 / 8);
    }

    // Operations c n^1.5: eight times for twice m; a band order would take sixteen.
    [Theory]
    [InlineData(2)]
    [InlineData(3)]
    public void OperationsGrowLikeTheThreeHalvesPower(int order)
    {
        double coarse = CholeskyAnalysis.Analyse(ElementMeshes.Triangles(40, order).Pattern()).Operations;
        double fine = CholeskyAnalysis.Analyse(ElementMeshes.Triangles(80, order).Pattern()).Operations;

        Assert.InRange(fine / coarse, 5.0, 10.0);
    }

    [Fact]
    public void ASeparatorSeparates()
    {
        WeightedGraph graph = CompressedGraph.Of(ElementMeshes.Triangles(50, 2).Pattern()).Graph;

        byte[] side = new GraphBisection(graph.Count).Separate(graph);

        for (int v = 0; v < graph.Count; v++)
        {
            foreach (int u in graph.Around(v))
            {
                Assert.NotEqual(1, side[v] + side[u]);
            }
        }

        // The shortest cut of 49 × 49 points with diagonals is one line of 49; a side may hold 60 %.
        Assert.InRange(side.Count(s => s == SeparatorRefinement.Separator), 40, 55);
        Assert.InRange(side.Count(s => s == 0), 0.3 * graph.Count, 0.65 * graph.Count);
    }

    // A path is eliminated without fill from its ends; a star from its tips.
    [Fact]
    public void MinimumDegreeEliminatesTreesWithoutFill()
    {
        int[] start = [0, 1, 4, 5, 7, 8];
        int[] neighbours = [1, 0, 2, 3, 1, 1, 4, 3];
        var graph = new WeightedGraph(5, start, neighbours, [1, 1, 1, 1, 1]);
        int[] order = [0, 1, 2, 3, 4];

        new MinimumDegree(graph).Order(order);

        Assert.Equal([0, 1, 2, 3, 4], order.Order());
        var remaining = new HashSet<int>(order);
        foreach (int v in order)
        {
            remaining.Remove(v);
            Assert.True(graph.Around(v).ToArray().Count(remaining.Contains) <= 1);
        }
    }

    [Fact]
    public void OnlyMeshVerticesAreOrdered()
    {
        CompressedGraph linear = CompressedGraph.Of(ElementMeshes.Triangles(12, 1).Pattern());
        CompressedGraph cubic = CompressedGraph.Of(ElementMeshes.Triangles(12, 3).Pattern());

        // Cubic elements with a fixed rim: the 11 × 11 inner vertices, and edges between two fixed vertices (near corners).
        Assert.Equal(11 * 11, linear.Graph.Count);
        Assert.InRange(cubic.Graph.Count, 11 * 11, (11 * 11) + 4);
    }

    [Fact]
    public void ThreadsDoNotChangeTheOrder()
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(60, 2).Pattern();

        Assert.Equal(
            CholeskyAnalysis.Analyse(pattern).Fronts.UnknownAt, CholeskyAnalysis.Analyse(pattern, 3).Fronts.UnknownAt);
    }
}
