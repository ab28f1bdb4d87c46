// Truth: values of an independent implementation of the same published method (Fritsch–Butland slopes, two-point tail) on the
// TEAM 20 table; the law of approach to saturation; quadrature of the curve itself; the closed Fröhlich law J = Js H/(H + h0).
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class BhCurveTests
{
    private const double Mu0 = PhysicalConstants.Mu0;

    [Theory]
    [InlineData(0.005, 13.92227, 2784.454, 0.004983)]
    [InlineData(0.35, 243.9069, 204.9385, 0.349693)]
    [InlineData(1.05, 609.2401, 1180.714, 1.049234)]
    [InlineData(1.72, 6581.077, 32357.54, 1.711730)]
    [InlineData(1.975, 23622.88, 100915.3, 1.945315)]
    [InlineData(2.27, 119628.9, 471118, 2.119670)]
    [InlineData(2.35, 167506.9, 699105.7, 2.139505)]
    [InlineData(2.5, 280746.3, 780925.6, 2.147204)]
    [InlineData(3, 676715.6, 794999.7, 2.149614)]
    [InlineData(6, 3063746, 795767.7, 2.149983)]
    public void MildSteelHasTheIndependentlyComputedValues(double b, double h, double slope, double polarisation)
    {
        MagneticState state = MildSteel().At(b);

        // The reference states seven digits of H, six or seven of the slope.
        Assert.Equal(1, state.FieldStrength / h, 5e-7);
        Assert.Equal(1, state.Slope / slope, 2e-6);
        Assert.Equal(polarisation, b - (Mu0 * state.FieldStrength), 6e-7);
    }

    [Theory]
    [InlineData(1.0, 297.277)]
    [InlineData(1.5, 824.259)]
    [InlineData(2.0, 5730.214)]
    [InlineData(2.3, 26244.52)]
    public void MildSteelStoresTheIndependentlyComputedEnergy(double b, double energy) =>
        Assert.Equal(1, MildSteel().At(b).Energy / energy, 2e-6);

    [Fact]
    public void TailStartsWithTheIndependentlyComputedConstants()
    {
        SaturationTail tail = MildSteel().Tail;

        Assert.Equal(0.01964600, tail.MissingPolarisation, 5e-9);
        Assert.Equal(44147.82, tail.FieldScale, 0.006);
        Assert.Equal(587667.6, tail.StartSlope, 0.06);
    }

    [Fact]
    public void CurvePassesThroughItsRows()
    {
        BhCurve curve = MildSteel();

        foreach (BhRow row in curve.Nodes)
        {
            Assert.Equal(row.FieldStrength, curve.At(row.FluxDensity).FieldStrength, 1e-9 * (1 + row.FieldStrength));
        }
    }

    [Fact]
    public void ValueAndSlopeAreContinuousAtEveryNodeAndAtTheJoin()
    {
        BhCurve curve = MildSteel();

        foreach (BhRow row in curve.Nodes.Skip(1))
        {
            MagneticState below = curve.At(Math.BitDecrement(row.FluxDensity));
            MagneticState above = curve.At(Math.BitIncrement(row.FluxDensity));
            Assert.Equal(1, above.FieldStrength / below.FieldStrength, 1e-9);
            Assert.Equal(1, above.Slope / below.Slope, 1e-6);
            Assert.Equal(1, above.Energy / below.Energy, 1e-9);
        }
    }

    [Theory]
    [InlineData(0.0, 1.0)]
    [InlineData(1.0, 2.3)]   // up to the join
    [InlineData(2.1, 2.6)]   // across it
    [InlineData(2.4, 12.0)]  // deep in the tail
    public void EnergyIsTheIntegralOfTheFieldStrength(double from, double to)
    {
        BhCurve curve = MildSteel();
        List<double> breaks = [from, .. curve.Nodes.Select(n => n.FluxDensity).Where(b => b > from && b < to), to];
        double integral = 0;
        for (int i = 1; i < breaks.Count; i++)
        {
            integral += Simpson(b => curve.At(b).FieldStrength, breaks[i - 1], breaks[i]);
        }

        Assert.Equal(1, (curve.At(to).Energy - curve.At(from).Energy) / integral, 1e-8);
    }

    [Theory]
    [InlineData(2.31, 2.4)]
    [InlineData(2.5, 2.51)]
    [InlineData(2.7, 4.0)]
    public void TailRebuiltFromLaterPointsOfItselfIsTheSame(double first, double second)
    {
        SaturationTail tail = MildSteel().Tail;
        BhRow a = new(tail.At(first).FieldStrength, first);
        BhRow b = new(tail.At(second).FieldStrength, second);

        SaturationTail again = SaturationTail.Through(a, b, 2.15);

        for (double h = b.FieldStrength; h < 4e6; h *= 1.7)
        {
            // The two points carry rounding of 1e-16 in B; close together they fix h to fewer digits.
            Assert.Equal(tail.FluxDensityAt(h), again.FluxDensityAt(h), second - first > 0.05 ? 1e-12 : 1e-11);
        }
    }

    [Theory]
    [InlineData(1.8, 10.5e-3)]
    [InlineData(2.0, 15.5e-3)]
    public void CutTableIsExtrapolatedToItsOwnRemovedRows(double cut, double worst)
    {
        BhRow[] rows = [.. MildSteel().Nodes];
        BhCurve curve = BhCurve.FromTable(new BhTable("cut", [.. rows.Where(r => r.FluxDensity <= cut)], 2.15));

        double error = rows.Max(r => Math.Abs(curve.FluxDensityAt(r.FieldStrength) - r.FluxDensity));

        Assert.InRange(error, 1e-3, worst);
    }

    [Theory]
    [InlineData(8, 24e-3)]
    [InlineData(12, 5.5e-3)]
    [InlineData(20, 0.95e-3)]
    [InlineData(40, 0.097e-3)]
    public void FroehlichMaterialIsReproducedBetweenItsNodes(int count, double worst)
    {
        BhCurve curve = Froehlich(count);
        double error = 0;

        // Rows whose slope is within a tenth of that of vacuum (above 125 kA/m) belong to the tail.
        for (double h = curve.Nodes[1].FieldStrength; h <= curve.Nodes[^1].FieldStrength; h *= 1.003)
        {
            error = Math.Max(error, Math.Abs(curve.FluxDensityAt(h) - FroehlichB(h)));
        }

        Assert.InRange(error, 0.9 * worst, 1.02 * worst);
    }

    [Fact]
    public void FroehlichTailStaysWithinTwoMillitesla()
    {
        BhCurve curve = Froehlich(20);

        for (double h = curve.Nodes[^1].FieldStrength; h < 3e6; h *= 1.1)
        {
            Assert.Equal(FroehlichB(h), curve.FluxDensityAt(h), 2e-3);
        }
    }

    [Fact]
    public void InverseReturnsTheFluxDensity()
    {
        BhCurve curve = MildSteel();

        for (double b = 1e-4; b < 20; b *= 1.05)
        {
            Assert.Equal(1, curve.FluxDensityAt(curve.At(b).FieldStrength) / b, 1e-13);
        }
    }

    [Fact]
    public void ValuesTakeNoMemory()
    {
        BhCurve curve = MildSteel();
        double sum = curve.At(1).Energy;
        long before = GC.GetAllocatedBytesForCurrentThread();

        for (double b = 0; b < 4; b += 1e-3)
        {
            sum += curve.At(b).Energy;
        }

        Assert.Equal(0, GC.GetAllocatedBytesForCurrentThread() - before);
        Assert.True(sum > 0);
    }

    [Fact]
    public void FluxDensityJustBelowTheJoinIsServed()
    {
        // Products rounded up to the last bucket's edge must find their piece; last rows of many widths hit the case.
        for (int i = 1; i < 400; i++)
        {
            double end = 1 + (i * 1e-3);
            BhCurve curve = BhCurve.FromTable(new BhTable("end", [new(0, 0), new(100, 0.5), new(400, end - 0.1), new(2000, end)], 2.1));
            double below = Math.BitDecrement(end);

            Assert.Equal(2000, curve.At(below).FieldStrength, 1e-6);
        }
    }

    internal static BhCurve MildSteel() => (BhCurve)MaterialLibrary.Get("mild-steel").Law;

    private static double FroehlichB(double h) => (Mu0 * h) + (2.0 * h / (h + 1000));

    private static BhCurve Froehlich(int count)
    {
        List<BhRow> rows = [new(0, 0)];
        for (int i = 0; i < count; i++)
        {
            double h = 10 * Math.Pow(2e4, i / (count - 1.0));
            rows.Add(new BhRow(h, FroehlichB(h)));
        }

        return BhCurve.FromTable(new BhTable("Fröhlich", rows, 2.0));
    }

    private static double Simpson(Func<double, double> f, double from, double to)
    {
        const int steps = 400;
        double h = (to - from) / steps;
        double sum = f(from) + f(to);
        for (int i = 1; i < steps; i++)
        {
            sum += (i % 2 == 1 ? 4 : 2) * f(from + (i * h));
        }

        return sum * h / 3;
    }
}
