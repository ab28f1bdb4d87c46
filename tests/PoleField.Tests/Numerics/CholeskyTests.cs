// Truth: L Lᵀ = P A Pᵀ entry by entry; known solutions and eigenvectors of the five-point Laplacian; dense fill by definition.
using CsCheck;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public sealed class CholeskyTests
{
    // Rounding of a few hundred operations on numbers of order one.
    private const double Rounding = 1e-12;

    private static readonly Gen<ElementMeshes> _meshes = Gen.OneOf(
        Gen.Select(Gen.Int[1, 50], Gen.Int[0, 50], Gen.Int[0, 10000], ElementMeshes.Arbitrary),
        Gen.Select(Gen.Int[2, 5], Gen.Int[1, 4], Gen.Bool, ElementMeshes.Triangles));

    [Fact]
    public void TheFactorTimesItsTransposeIsTheMatrix() => _meshes.Sample(
        mesh =>
        {
            SymmetricPattern pattern = mesh.Pattern();
            double[] values = ElementMeshes.PositiveDefinite(pattern, mesh.Size);
            double[,] full = DenseMatrix.Of(pattern, values);
            CholeskyAnalysis analysis = CholeskyAnalysis.Analyse(pattern);

            CholeskyFactor factor = analysis.Factor(values);

            int n = pattern.Size;
            int[] unknownAt = analysis.Fronts.UnknownAt;
            Assert.Equal(Enumerable.Range(0, n), unknownAt.Order());
            for (int i = 0; i < n; i++)
            {
                for (int j = 0; j <= i; j++)
                {
                    double sum = 0;
                    for (int k = 0; k <= j; k++)
                    {
                        sum += factor.Entry(i, k) * factor.Entry(j, k);
                    }

                    Assert.Equal(full[unknownAt[i], unknownAt[j]], sum, Rounding * n);
                }
            }
        },
        iter: 60,
        seed: "0000KOIq5tm1");

    [Fact]
    public void FrontsHoldAllFillAndTheRowCountsAreThoseOfElimination() => _meshes.Sample(
        mesh =>
        {
            SymmetricPattern pattern = mesh.Pattern();
            CholeskyAnalysis analysis = CholeskyAnalysis.Analyse(pattern);
            bool[,] fill = DenseMatrix.Fill(pattern, analysis.Fronts.UnknownAt);

            Supernodes fronts = analysis.Fronts;
            for (int s = 0; s < fronts.Count; s++)
            {
                int end = fronts.ColumnStart[s + 1];
                var rows = new SortedSet<int>();
                for (int j = fronts.ColumnStart[s]; j < end; j++)
                {
                    rows.UnionWith(Enumerable.Range(end, pattern.Size - end).Where(i => fill[i, j]));
                }

                Assert.Equal(rows, fronts.Rows[s].ToArray());
            }
        },
        iter: 60,
        seed: "0000KOIq5tm1");

    [Theory]
    [InlineData(30, 1)]
    [InlineData(24, 2)]
    [InlineData(16, 3)]
    [InlineData(12, 4)]
    public void ResidualsAreAtRounding(int m, int order)
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(m, order).Pattern();
        double[] values = ElementMeshes.PositiveDefinite(pattern, 3);
        double[] x = [.. Enumerable.Range(0, pattern.Size).Select(i => Math.Sin(i))];
        double[] b = [.. x];
        CholeskyFactor factor = CholeskyAnalysis.Analyse(pattern).Factor(values);

        factor.Solve(x);

        var product = new double[pattern.Size];
        pattern.Multiply(values, x, product);
        for (int i = 0; i < b.Length; i++)
        {
            Assert.Equal(b[i], product[i], Rounding);
        }
    }

    // u = sin(πi/(m+1)) sin(2πj/(m+1)) has the eigenvalue 4 sin²(π/2(m+1)) + 4 sin²(2π/2(m+1)).
    [Fact]
    public void EigenvectorsOfTheLaplacianAreOnlyScaled()
    {
        const int m = 60;
        (SymmetricPattern pattern, double[] values) = ElementMeshes.Laplacian(m);
        double[] u = [.. Enumerable.Range(0, m * m).Select(i =>
            Math.Sin(Math.PI * ((i % m) + 1) / (m + 1)) * Math.Sin(2 * Math.PI * ((i / m) + 1) / (m + 1)))];
        double eigenvalue = (4 * Math.Pow(Math.Sin(Math.PI / 2 / (m + 1)), 2)) + (4 * Math.Pow(Math.Sin(Math.PI / (m + 1)), 2));
        double[] x = [.. u];

        CholeskyAnalysis.Analyse(pattern).Factor(values).Solve(x);

        for (int i = 0; i < u.Length; i++)
        {
            Assert.Equal(u[i] / eigenvalue, x[i], 1e-10);
        }
    }

    [Fact]
    public void SeveralRightSidesAreSolvedAsOneByOne()
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(14, 3).Pattern();
        CholeskyFactor factor = CholeskyAnalysis.Analyse(pattern).Factor(ElementMeshes.PositiveDefinite(pattern, 5));
        int n = pattern.Size;
        for (int count = 0; count < 20; count += 3)
        {
            double[] together = [.. Enumerable.Range(0, count * n).Select(i => Math.Cos(i * 0.37))];
            double[] single = [.. together];

            factor.Solve(together, count);

            for (int k = 0; k < count; k++)
            {
                factor.Solve(single.AsSpan(k * n, n));
            }

            for (int i = 0; i < single.Length; i++)
            {
                Assert.Equal(single[i], together[i], Rounding);
            }
        }
    }

    [Fact]
    public void ThreadsAndRefactoringDoNotChangeABit()
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(90, 2).Pattern();
        double[] values = ElementMeshes.PositiveDefinite(pattern, 9), others = ElementMeshes.PositiveDefinite(pattern, 10);
        CholeskyAnalysis analysis = CholeskyAnalysis.Analyse(pattern);
        Assert.True(analysis.Plan.IsWorthSharing);
        double[] Solution(CholeskyFactor factor)
        {
            double[] x = [.. Enumerable.Range(0, pattern.Size).Select(i => Math.Sin(i))];
            factor.Solve(x);
            return x;
        }

        double[] one = Solution(analysis.Factor(values));

        CholeskyFactor again = analysis.Factor(others, 3);
        Assert.NotEqual(one, Solution(again));
        again.Refactor(values, 2);
        Assert.Equal(one, Solution(again));
        Assert.Equal(one, Solution(CholeskyAnalysis.Analyse(pattern).Factor(values, 4)));
    }

    [Fact]
    public void TheIdentityIsItsOwnFactor()
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(8, 2).Pattern();
        var values = new double[pattern.EntryCount];
        for (int j = 0; j < pattern.Size; j++)
        {
            values[pattern.PositionOf(j, j)] = 1.0;
        }

        double[] x = [.. Enumerable.Range(0, pattern.Size).Select(i => (double)i)];
        double[] b = [.. x];

        CholeskyAnalysis.Analyse(pattern).Factor(values).Solve(x);

        Assert.Equal(b, x);
    }

    // A single bad unknown whose row is otherwise empty must be named, wherever it is.
    [Theory]
    [InlineData(0.0, 1)]
    [InlineData(-2.0, 1)]
    [InlineData(double.NaN, 1)]
    [InlineData(double.PositiveInfinity, 1)]
    [InlineData(-2.0, 2)]
    public void AnUnknownWithoutPositivePivotIsNamed(double pivot, int threads)
    {
        SymmetricPattern pattern = ElementMeshes.Triangles(60, 2).Pattern();
        CholeskyAnalysis analysis = CholeskyAnalysis.Analyse(pattern);
        foreach (int bad in new[] { 0, pattern.Size / 2, pattern.Size - 1 })
        {
            double[] values = ElementMeshes.PositiveDefinite(pattern, 2);
            for (int j = 0; j < pattern.Size; j++)
            {
                for (int k = pattern.ColumnStart[j]; k < pattern.ColumnStart[j + 1]; k++)
                {
                    values[k] = pattern.Rows[k] != bad && j != bad ? values[k] : j == pattern.Rows[k] ? pivot : 0.0;
                }
            }

            var fault = Assert.Throws<NotPositiveDefiniteException>(() => analysis.Factor(values, threads));

            Assert.Equal(bad, fault.Unknown);
            Assert.Equal(pivot, fault.Pivot);
        }
    }

    [Fact]
    public void AnIndefiniteMatrixWithPositiveDiagonalIsRefused()
    {
        SymmetricPattern pattern = SymmetricPattern.FromElements(2, [0, 2], [0, 1]);

        var fault = Assert.Throws<NotPositiveDefiniteException>(() => CholeskyAnalysis.Analyse(pattern).Factor([1.0, 2.0, 1.0]));

        Assert.Equal(-3.0, fault.Pivot, Rounding);
    }

    [Fact]
    public void EmptyAndUncoupledMatricesWork()
    {
        CholeskyAnalysis.Analyse(SymmetricPattern.FromElements(0, [0], [])).Factor([]).Solve([]);
        double[] x = [3.0, 8.0];

        CholeskyAnalysis.Analyse(SymmetricPattern.FromElements(2, [0], [])).Factor([3.0, 4.0]).Solve(x);

        Assert.Equal([1.0, 2.0], x, (a, b) => Math.Abs(a - b) < 1e-15);
    }
}
