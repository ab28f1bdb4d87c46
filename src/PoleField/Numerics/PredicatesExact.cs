using System.Runtime.CompilerServices;

namespace PoleField.Numerics;

/// <content>The slow stages: expansions, sums of doubles that do not overlap, smallest first, whose value is exact.</content>
internal static partial class Predicates
{
    private const double OrientStage2 = (2 + (12 * Epsilon)) * Epsilon;
    private const double InCircleStage2 = (4 + (48 * Epsilon)) * Epsilon;

    [MethodImpl(MethodImplOptions.NoInlining)]
    private static double OrientAdaptive(double ay, double az, double by, double bz, double cy, double cz)
    {
        double acy = ay - cy, acz = az - cz, bcy = by - cy, bcz = bz - cz;
        Span<double> b = stackalloc double[4];
        double estimate = Estimate(b[..ProductDifference(acy, bcz, acz, bcy, b)]);
        double size = Math.Abs(acy * bcz) + Math.Abs(acz * bcy);
        bool differencesExact = DifferenceTail(ay, cy, acy) == 0.0 && DifferenceTail(az, cz, acz) == 0.0
            && DifferenceTail(by, cy, bcy) == 0.0 && DifferenceTail(bz, cz, bcz) == 0.0;
        if (differencesExact || Math.Abs(estimate) >= OrientStage2 * size)
        {
            return estimate;
        }

        // ab + bc + ca of the plain coordinates, each a 2×2 minor of four components.
        Span<double> ab = stackalloc double[4], bc = stackalloc double[4], ca = stackalloc double[4];
        Span<double> two = stackalloc double[8], all = stackalloc double[12];
        int nab = ProductDifference(ay, bz, by, az, ab);
        int nbc = ProductDifference(by, cz, cy, bz, bc);
        int nca = ProductDifference(cy, az, ay, cz, ca);
        int n = Sum(ab[..nab], bc[..nbc], two);
        n = Sum(two[..n], ca[..nca], all);
        return Estimate(all[..n]);
    }

    [MethodImpl(MethodImplOptions.NoInlining)]
    private static double InCircleAdaptive(
        double ay, double az, double by, double bz, double cy, double cz, double dy, double dz)
    {
        double ady = ay - dy, adz = az - dz, bdy = by - dy, bdz = bz - dz, cdy = cy - dy, cdz = cz - dz;
        Span<double> a = stackalloc double[32], b = stackalloc double[32], c = stackalloc double[32];
        Span<double> ab = stackalloc double[64], all = stackalloc double[96], minor = stackalloc double[4];
        int na = Lift(minor[..ProductDifference(bdy, cdz, cdy, bdz, minor)], ady, adz, 1, a);
        int nb = Lift(minor[..ProductDifference(cdy, adz, ady, cdz, minor)], bdy, bdz, 1, b);
        int nc = Lift(minor[..ProductDifference(ady, bdz, bdy, adz, minor)], cdy, cdz, 1, c);
        int n = Sum(a[..na], b[..nb], ab);
        n = Sum(ab[..n], c[..nc], all);
        double estimate = Estimate(all[..n]);
        double permanent =
            ((Math.Abs(bdy * cdz) + Math.Abs(cdy * bdz)) * ((ady * ady) + (adz * adz)))
            + ((Math.Abs(cdy * adz) + Math.Abs(ady * cdz)) * ((bdy * bdy) + (bdz * bdz)))
            + ((Math.Abs(ady * bdz) + Math.Abs(bdy * adz)) * ((cdy * cdy) + (cdz * cdz)));
        bool differencesExact = DifferenceTail(ay, dy, ady) == 0.0 && DifferenceTail(az, dz, adz) == 0.0
            && DifferenceTail(by, dy, bdy) == 0.0 && DifferenceTail(bz, dz, bdz) == 0.0
            && DifferenceTail(cy, dy, cdy) == 0.0 && DifferenceTail(cz, dz, cdz) == 0.0;
        return differencesExact || Math.Abs(estimate) >= InCircleStage2 * permanent
            ? estimate
            : InCircleExact([ay, az, by, bz, cy, cz, dy, dz]);
    }

    // The 4×4 determinant of the plain coordinates (Shewchuk 1997, section 4.4): lifts times 3×3 minors.
    private static double InCircleExact(ReadOnlySpan<double> p)
    {
        Span<double> ab = stackalloc double[4], bc = stackalloc double[4], cd = stackalloc double[4];
        Span<double> da = stackalloc double[4], ac = stackalloc double[4], bd = stackalloc double[4];
        int nab = ProductDifference(p[0], p[3], p[2], p[1], ab);
        int nbc = ProductDifference(p[2], p[5], p[4], p[3], bc);
        int ncd = ProductDifference(p[4], p[7], p[6], p[5], cd);
        int nda = ProductDifference(p[6], p[1], p[0], p[7], da);
        int nac = ProductDifference(p[0], p[5], p[4], p[1], ac);
        int nbd = ProductDifference(p[2], p[7], p[6], p[3], bd);
        Span<double> aTerm = stackalloc double[96], bTerm = stackalloc double[96];
        Span<double> cTerm = stackalloc double[96], dTerm = stackalloc double[96];
        Span<double> eight = stackalloc double[8], minor = stackalloc double[12];

        int n = Sum(Sum(cd[..ncd], da[..nda], eight), eight, ac[..nac], minor);
        int nb = Lift(minor[..n], p[2], p[3], -1, bTerm);
        n = Sum(Sum(da[..nda], ab[..nab], eight), eight, bd[..nbd], minor);
        int nc = Lift(minor[..n], p[4], p[5], 1, cTerm);
        Negate(ac);
        Negate(bd);
        n = Sum(Sum(ab[..nab], bc[..nbc], eight), eight, ac[..nac], minor);
        int nd = Lift(minor[..n], p[6], p[7], -1, dTerm);
        n = Sum(Sum(bc[..nbc], cd[..ncd], eight), eight, bd[..nbd], minor);
        int na = Lift(minor[..n], p[0], p[1], 1, aTerm);

        Span<double> first = stackalloc double[192], second = stackalloc double[192], all = stackalloc double[384];
        int n1 = Sum(aTerm[..na], bTerm[..nb], first);
        int n2 = Sum(cTerm[..nc], dTerm[..nd], second);
        return Estimate(all[..Sum(first[..n1], second[..n2], all)]);
    }

    private static int Sum(int count, Span<double> e, ReadOnlySpan<double> f, Span<double> result) =>
        Sum(e[..count], f, result);

    // sign · e · (y² + z²); room for 8 components per component of e.
    private static int Lift(ReadOnlySpan<double> e, double y, double z, int sign, Span<double> result)
    {
        Span<double> once = stackalloc double[24], yy = stackalloc double[48], zz = stackalloc double[48];
        int n = Scale(e, y, once);
        int ny = Scale(once[..n], sign * y, yy);
        n = Scale(e, z, once);
        int nz = Scale(once[..n], sign * z, zz);
        return Sum(yy[..ny], zz[..nz], result);
    }

    private static void Negate(Span<double> e)
    {
        foreach (ref double x in e)
        {
            x = -x;
        }
    }

    private static double Estimate(ReadOnlySpan<double> e)
    {
        double sum = 0;
        foreach (double x in e)
        {
            sum += x;
        }

        return sum;
    }

    private static (double Sum, double Tail) TwoSum(double a, double b)
    {
        double sum = a + b;
        double bVirtual = sum - a;
        return (sum, (a - (sum - bVirtual)) + (b - bVirtual));
    }

    private static double DifferenceTail(double a, double b, double difference)
    {
        double bVirtual = a - difference;
        return (a - (difference + bVirtual)) + (bVirtual - b);
    }

    private static (double Product, double Tail) TwoProduct(double a, double b)
    {
        double product = a * b;
        return (product, Math.FusedMultiplyAdd(a, b, -product));
    }

    // a·b − c·d, at most four components, zeros left out.
    private static int ProductDifference(double a, double b, double c, double d, Span<double> result)
    {
        (double plus, double plusTail) = TwoProduct(a, b);
        (double minus, double minusTail) = TwoProduct(c, d);
        return Sum([plusTail, plus], [-minusTail, -minus], result);
    }

    // Exact sum, zeros left out (grow-expansion by merging, Shewchuk 1997, fast expansion sum, figure 6).
    private static int Sum(ReadOnlySpan<double> e, ReadOnlySpan<double> f, Span<double> result)
    {
        int i = 0, j = 0, n = 0;
        double carry = 0;
        while (i < e.Length || j < f.Length)
        {
            bool takeE = j >= f.Length || (i < e.Length && Math.Abs(e[i]) <= Math.Abs(f[j]));
            double next = takeE ? e[i++] : f[j++];
            (carry, double tail) = TwoSum(carry, next);
            if (tail != 0.0)
            {
                result[n++] = tail;
            }
        }

        if (carry != 0.0)
        {
            result[n++] = carry;
        }

        return n;
    }

    // Exact product with one double, zeros left out (Shewchuk 1997, scale-expansion, figure 13).
    private static int Scale(ReadOnlySpan<double> e, double factor, Span<double> result)
    {
        int n = 0;
        double carry = 0;
        foreach (double x in e)
        {
            (double product, double productTail) = TwoProduct(x, factor);
            (double sum, double low) = TwoSum(carry, productTail);
            if (low != 0.0)
            {
                result[n++] = low;
            }

            (carry, double tail) = TwoSum(product, sum);
            if (tail != 0.0)
            {
                result[n++] = tail;
            }
        }

        if (carry != 0.0)
        {
            result[n++] = carry;
        }

        return n;
    }
}
