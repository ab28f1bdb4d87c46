// Truth: the triple loop that defines each operation.
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public sealed unsafe class FrontKernelTests
{
    // Sums of up to 100 products of numbers below one, rounded differently.
    private const double Rounding = 1e-13;

    [Theory]
    [InlineData(1)]
    [InlineData(7)]
    [InlineData(100)]
    public void VectorsOfEightAndOfFourSubtractTheSameProduct(int depth)
    {
        double[] a = Random(8 * depth, 1), b = Random(8 * depth, 2), wide = Random(64, 3), narrow = [.. wide];
        double[] expected = [.. wide.Select((c, k) =>
            c - Enumerable.Range(0, depth).Sum(p => a[(8 * p) + (k % 8)] * b[(8 * p) + (k / 8)]))];

        fixed (double* pa = a, pb = b, pw = wide, pn = narrow)
        {
            FrontKernels.Subtract512(pw, pa, pb, depth);
            FrontKernels.Subtract256(pn, pa, pb, depth, 4);
            FrontKernels.Subtract256(pn + 32, pa, pb + 4, depth, 4);
        }

        AssertNear(expected, wide);
        AssertNear(expected, narrow);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(6)]
    public void ColumnsBeyondThoseAskedForStay(int columns)
    {
        double[] a = Random(40, 1), b = Random(40, 2), tile = Random(64, 3), before = [.. tile];

        fixed (double* pa = a, pb = b, pt = tile)
        {
            FrontKernels.Subtract(pt, pa, pb, 5, columns);
        }

        Assert.Equal(before[(8 * columns)..], tile[(8 * columns)..]);
        Assert.DoesNotContain(Enumerable.Range(0, 8 * columns), i => tile[i] == before[i]);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(5)]
    [InlineData(8)]
    public void FactorAndSolveUndoTheProduct(int size)
    {
        double[] l = Random(64, 4), x = Random(64, 5), tile = new double[64], product = new double[64];
        for (int j = 0; j < size; j++)
        {
            l[9 * j] += 2.0;
            for (int i = 0; i < 8; i++)
            {
                tile[(8 * j) + i] = i < size ? Enumerable.Range(0, Math.Min(i, j) + 1).Sum(k => l[(8 * k) + i] * l[(8 * k) + j]) : 0.0;
                product[(8 * j) + i] = Enumerable.Range(0, j + 1).Sum(k => x[(8 * k) + i] * l[(8 * k) + j]);
            }
        }

        double* inverse = stackalloc double[8];
        fixed (double* pt = tile, pp = product)
        {
            Assert.Equal(-1, FrontKernels.Factor(pt, size, inverse));
            FrontKernels.SolveRight(pp, pt, inverse, size);
        }

        for (int j = 0; j < size; j++)
        {
            for (int i = 0; i < 8; i++)
            {
                Assert.Equal(i < j || i >= size ? 0.0 : l[(8 * j) + i], tile[(8 * j) + i], Rounding);
                Assert.Equal(x[(8 * j) + i], product[(8 * j) + i], Rounding);
            }
        }
    }

    private static double[] Random(int count, int seed)
    {
        var random = new Random(seed);
        return [.. Enumerable.Range(0, count).Select(_ => random.NextDouble() - 0.5)];
    }

    private static void AssertNear(double[] expected, double[] actual)
    {
        for (int i = 0; i < expected.Length; i++)
        {
            Assert.Equal(expected[i], actual[i], Rounding);
        }
    }
}
