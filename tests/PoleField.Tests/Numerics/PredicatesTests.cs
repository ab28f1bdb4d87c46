// Truth: the same determinants in exact rational arithmetic (integers of any length), and the determinants' symmetries.
using System.Numerics;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public sealed class PredicatesTests
{
    private const int Seed = 20240611;
    private const int Cases = 3000;

    [Theory]
    [InlineData(0)] // any points
    [InlineData(1)] // points of a coarse grid: many exact zeros
    [InlineData(2)] // third point on the line but for rounding
    [InlineData(3)] // third point a few ulps off the line
    [InlineData(4)] // far from the origin, small differences
    public void OrientHasTheSignOfExactArithmetic(int kind)
    {
        Random random = new(Seed + kind);
        int zeros = 0;
        for (int i = 0; i < Cases; i++)
        {
            double[] p = Points(random, kind, 3);
            if (kind is 2 or 3)
            {
                double t = random.NextDouble() * 3;
                p[4] = Nudge(p[0] + (t * (p[2] - p[0])), kind == 3 ? random.Next(-3, 4) : 0);
                p[5] = Nudge(p[1] + (t * (p[3] - p[1])), kind == 3 ? random.Next(-3, 4) : 0);
            }

            int expected = ExactOrient(p);
            zeros += expected == 0 ? 1 : 0;

            Assert.Equal(expected, Math.Sign(Predicates.Orient(p[0], p[1], p[2], p[3], p[4], p[5])));
        }

        Assert.True(kind != 1 || zeros > 20, "the grid must hold collinear cases");
    }

    [Theory]
    [InlineData(0)] // any points
    [InlineData(1)] // points of a coarse grid: many exact zeros
    [InlineData(2)] // fourth point on the circle but for rounding
    [InlineData(3)] // fourth point a few ulps off the circle
    [InlineData(4)] // far from the origin, small differences
    public void InCircleHasTheSignOfExactArithmetic(int kind)
    {
        Random random = new(Seed + 10 + kind);
        int zeros = 0;
        for (int i = 0; i < Cases; i++)
        {
            double[] p = Points(random, kind, 4);
            if (kind is 2 or 3)
            {
                double y = random.NextDouble(), z = random.NextDouble(), radius = random.NextDouble();
                for (int k = 0; k < 4; k++)
                {
                    (double s, double c) = Math.SinCos(random.NextDouble() * Math.Tau);
                    p[2 * k] = Nudge(y + (radius * c), kind == 3 ? random.Next(-3, 4) : 0);
                    p[(2 * k) + 1] = Nudge(z + (radius * s), kind == 3 ? random.Next(-3, 4) : 0);
                }
            }

            int expected = ExactInCircle(p);
            zeros += expected == 0 ? 1 : 0;

            Assert.Equal(expected, Math.Sign(InCircle(p, 0, 1, 2, 3)));
        }

        Assert.True(kind != 1 || zeros > 20, "the grid must hold cocircular cases");
    }

    [Fact]
    public void SignsFollowPermutations()
    {
        Random random = new(Seed + 20);
        for (int i = 0; i < Cases; i++)
        {
            double[] p = Points(random, i % 2 == 0 ? 1 : 4, 4);
            int abc = Math.Sign(Predicates.Orient(p[0], p[1], p[2], p[3], p[4], p[5]));

            Assert.Equal(abc, Math.Sign(Predicates.Orient(p[2], p[3], p[4], p[5], p[0], p[1])));
            Assert.Equal(-abc, Math.Sign(Predicates.Orient(p[2], p[3], p[0], p[1], p[4], p[5])));

            int abcd = Math.Sign(InCircle(p, 0, 1, 2, 3));
            Assert.Equal(abcd, Math.Sign(InCircle(p, 1, 2, 0, 3)));
            Assert.Equal(-abcd, Math.Sign(InCircle(p, 1, 0, 2, 3)));
            Assert.Equal(-abcd, Math.Sign(InCircle(p, 1, 2, 3, 0)));
        }
    }

    private static double InCircle(double[] p, int a, int b, int c, int d) => Predicates.InCircle(
        p[2 * a], p[(2 * a) + 1], p[2 * b], p[(2 * b) + 1], p[2 * c], p[(2 * c) + 1], p[2 * d], p[(2 * d) + 1]);

    private static double[] Points(Random random, int kind, int count)
    {
        double[] p = new double[2 * count];
        for (int i = 0; i < p.Length; i++)
        {
            p[i] = kind switch
            {
                1 => random.Next(0, 6) / 10.0,
                4 => 1e3 + (random.Next(0, 40) * 1e-12),
                _ => random.NextDouble() - 0.5,
            };
        }

        return p;
    }

    private static double Nudge(double x, int ulps)
    {
        for (; ulps > 0; ulps--)
        {
            x = Math.BitIncrement(x);
        }

        for (; ulps < 0; ulps++)
        {
            x = Math.BitDecrement(x);
        }

        return x;
    }

    // Every double used here is a multiple of 2^-1074 or coarser: scaled to integers, products are exact.
    private static BigInteger Exact(double x)
    {
        long bits = BitConverter.DoubleToInt64Bits(x);
        int exponent = (int)((bits >> 52) & 0x7ff);
        long mantissa = bits & 0xfffffffffffffL;
        BigInteger value = exponent == 0 ? mantissa : (mantissa | (1L << 52));
        BigInteger scaled = value << Math.Max(exponent, 1);
        return bits < 0 ? -scaled : scaled;
    }

    private static int ExactOrient(double[] p)
    {
        BigInteger[] q = [.. p.Select(Exact)];
        return (((q[0] - q[4]) * (q[3] - q[5])) - ((q[1] - q[5]) * (q[2] - q[4]))).Sign;
    }

    private static int ExactInCircle(double[] p)
    {
        BigInteger[] q = [.. p.Select(Exact)];
        BigInteger ay = q[0] - q[6], az = q[1] - q[7], by = q[2] - q[6], bz = q[3] - q[7], cy = q[4] - q[6], cz = q[5] - q[7];
        BigInteger a = (ay * ay) + (az * az), b = (by * by) + (bz * bz), c = (cy * cy) + (cz * cz);
        return ((a * ((by * cz) - (cy * bz))) + (b * ((cy * az) - (ay * cz))) + (c * ((ay * bz) - (by * az)))).Sign;
    }
}
