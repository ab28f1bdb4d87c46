// Truth: the definition of assembly, done densely: A = sum of the element matrices.
using CsCheck;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public sealed class SymmetricPatternTests
{
    private static readonly Gen<ElementMeshes> _meshes =
        Gen.Select(Gen.Int[1, 40], Gen.Int[0, 40], Gen.Int[0, 10000], ElementMeshes.Arbitrary);

    [Fact]
    public void HoldsExactlyTheCouplingsOfTheElementsSortedWithTheDiagonal() => _meshes.Sample(
        mesh =>
        {
            SymmetricPattern pattern = mesh.Pattern();

            var expected = new SortedSet<(int, int)>(Enumerable.Range(0, mesh.Size).Select(i => (i, i)));
            for (int e = 0; e + 1 < mesh.Start.Length; e++)
            {
                int[] own = [.. mesh.Unknowns[mesh.Start[e]..mesh.Start[e + 1]].Where(u => u >= 0)];
                expected.UnionWith(own.SelectMany(i => own.Where(j => j <= i).Select(j => (j, i))));
            }

            var found = new List<(int, int)>();
            for (int j = 0; j < pattern.Size; j++)
            {
                found.AddRange(pattern.Rows[pattern.ColumnStart[j]..pattern.ColumnStart[j + 1]].Select(i => (j, i)));
            }

            Assert.Equal(expected, found);
        },
        iter: 100,
        seed: "0000KOIq5tm1");

    [Fact]
    public void TheScatterMapSendsEveryEntryToItsPosition() => _meshes.Sample(
        mesh =>
        {
            SymmetricPattern pattern = mesh.Pattern();

            int[] map = pattern.ScatterMap();

            int k = 0;
            for (int e = 0; e + 1 < mesh.Start.Length; e++)
            {
                int[] own = mesh.Unknowns[mesh.Start[e]..mesh.Start[e + 1]];
                for (int i = 0; i < own.Length; i++)
                {
                    for (int j = 0; j <= i; j++, k++)
                    {
                        int expected = own[i] < 0 || own[j] < 0
                            ? -1
                            : pattern.PositionOf(Math.Max(own[i], own[j]), Math.Min(own[i], own[j]));
                        Assert.Equal(expected, map[k]);
                    }
                }
            }

            Assert.Equal(k, map.Length);
        },
        iter: 100,
        seed: "0000KOIq5tm1");

    [Fact]
    public void MultipliesLikeTheFullMatrix()
    {
        SymmetricPattern pattern = ElementMeshes.Arbitrary(30, 40, 7).Pattern();
        double[] values = ElementMeshes.PositiveDefinite(pattern, 7);
        double[,] full = DenseMatrix.Of(pattern, values);
        double[] x = [.. Enumerable.Range(0, 30).Select(i => Math.Cos(i))];
        var product = new double[30];

        pattern.Multiply(values, x, product);

        for (int i = 0; i < 30; i++)
        {
            double expected = Enumerable.Range(0, 30).Sum(j => full[i, j] * x[j]);
            Assert.Equal(expected, product[i], 1e-13);
        }
    }

    [Fact]
    public void RefusesWhatIsNotThere()
    {
        SymmetricPattern pattern = SymmetricPattern.FromElements(3, [0, 2], [0, 1]);

        Assert.Throws<ArgumentException>(() => pattern.PositionOf(2, 0));
        Assert.Throws<ArgumentException>(() => pattern.PositionOf(0, 1));
        Assert.Throws<ArgumentException>(() => SymmetricPattern.FromElements(2, [0, 2], [0, 2]));
        Assert.Throws<ArgumentException>(() => SymmetricPattern.FromElements(2, [0, 1], [0, 1]));
        Assert.Throws<ArgumentException>(() => SymmetricPattern.FromElements(2, [0, 2, 1, 2], [0, 1]));
    }
}
