// Truth: a deliberately spoilt table must be refused with the spoilt rows named; published TEAM 24 Table I, whose last six rows
// have the slope of vacuum within measuring error.
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class BhTableFaultTests
{
    [Fact]
    public void SaturatedRowsOfTeam24AreDroppedAndReported()
    {
        BhRow[] full =
        [
            .. ((BhCurve)MaterialLibrary.Get("carbon-steel-en9").Law).Nodes.Select((r, i) => r with { Line = i + 1 }),
            new(208180, 2.240, 16), new(240200, 2.281, 17), new(272230, 2.321, 18),
            new(304260, 2.361, 19), new(336290, 2.400, 20), new(396340, 2.472, 21),
        ];

        BhCurve curve = BhCurve.FromTable(new BhTable("EN9", full, 1.98));

        Finding dropped = Assert.Single(curve.Findings, f => f.What == "bh-rows-dropped");
        Assert.Equal(Severity.Note, dropped.Severity);
        Assert.Contains("last 6 rows", dropped.Text, StringComparison.Ordinal);
        Assert.Equal(16, dropped.Line);
        Assert.Equal(176150, curve.Nodes[^1].FieldStrength);
    }

    [Fact]
    public void SwappedColumnsAreRefusedOnce()
    {
        BhRow[] swapped = [.. Steel().Select(r => new BhRow(r.FluxDensity, r.FieldStrength, r.Line))];

        Finding fault = Assert.Single(Faults(swapped, 2.15));

        Assert.Equal("bh-swapped", fault.What);
        Assert.Contains("columns are swapped", fault.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void GaussWithoutAUnitIsRefused()
    {
        BhRow[] gauss = [.. Steel().Select(r => r with { FluxDensity = 1e4 * r.FluxDensity })];

        Assert.Equal("bh-unit", Assert.Single(Faults(gauss, 2.15)).What);
    }

    [Fact]
    public void PolarisationAboveJsIsRefused()
    {
        Finding fault = Assert.Single(Faults(Steel(), 2.1));

        Assert.Equal("bh-above-saturation", fault.What);
        Assert.Contains("2.1 T", fault.Text, StringComparison.Ordinal);
    }

    [Fact]
    public void EveryRowOutOfOrderIsNamed()
    {
        BhRow[] rows = Steel();
        (rows[5], rows[6]) = (rows[6], rows[5]);
        rows[20] = rows[20] with { FluxDensity = rows[19].FluxDensity };

        IReadOnlyList<Finding> faults = Faults(rows, 2.15);

        Assert.All(faults, f => Assert.Equal("bh-not-rising", f.What));
        Assert.Equal([rows[6].Line, rows[20].Line], faults.Select(f => f.Line!.Value));
        Assert.StartsWith("Row 7 ", faults[0].Text, StringComparison.Ordinal);
    }

    [Fact]
    public void InteriorSlopeBelowVacuumIsAFaultUnlessSmoothingIsAsked()
    {
        BhRow[] rows = Steel();
        rows[30] = rows[30] with { FluxDensity = rows[29].FluxDensity + (0.9 * PhysicalConstants.Mu0 * (rows[30].FieldStrength - rows[29].FieldStrength)) };

        Finding fault = Assert.Single(Faults(rows, 2.15));
        BhCurve smoothed = BhCurve.FromTable(new BhTable("steel", rows, 2.15), new BhCurveOptions { Smooth = true });

        Assert.Equal("bh-below-vacuum", fault.What);
        Assert.Equal(rows[30].Line, fault.Line);
        Assert.Contains(smoothed.Findings, f => f.What == "bh-smoothed");
        LawfulnessTests.AssertLawful(smoothed, 4, 4000);
    }

    [Fact]
    public void NegativeAndUnreadableValuesAreAllNamed()
    {
        BhRow[] rows = Steel();
        rows[3] = rows[3] with { FieldStrength = -1 };
        rows[9] = rows[9] with { FluxDensity = double.NaN };

        Assert.Equal(["bh-negative", "bh-not-a-number"], Faults(rows, 2.15).Select(f => f.What));
    }

    [Fact]
    public void LoopBranchIsRefused() =>
        Assert.Equal("bh-remanence", Assert.Single(Faults([new(0, 0.9), new(100, 1.2), new(1000, 1.5), new(6000, 1.7)], 2.15)).What);

    [Fact]
    public void TableOfVacuumIsRefused() =>
        Assert.Equal("bh-below-vacuum", Assert.Single(Faults([new(0, 0), new(1e4, 0.0126), new(2e4, 0.0252), new(3e4, 0.0378)], 2.15)).What);

    [Fact]
    public void TooFewRowsAreRefused() => Assert.Equal("bh-too-few-rows", Assert.Single(Faults([new(0, 0), new(100, 1)], 2.15)).What);

    [Theory]
    [InlineData(0.0)]
    [InlineData(-2.15)]
    [InlineData(21500.0)]
    [InlineData(double.NaN)]
    public void ImpossibleJsIsRefused(double js) => Assert.Contains(Faults(Steel(), js), f => f.What == "bh-saturation");

    [Fact]
    public void MissingJsIsTakenFromTheLastRowsAndSaid()
    {
        BhCurve curve = BhCurve.FromTable(new BhTable("steel", Steel()));

        // J_n = 2.3 − μ0·135000 = 2.130354; its last rise times H_n gives 0.0994 T (by hand from the two last rows).
        double rise = (0.05 / 25000) - PhysicalConstants.Mu0;
        Assert.Equal(2.3 - (PhysicalConstants.Mu0 * 135000) + (135000 * rise), curve.SaturationPolarisation, 1e-12);
        Assert.Equal(Severity.Warning, Assert.Single(curve.Findings).Severity);
        Assert.Equal("bh-saturation-assumed", curve.Findings[0].What);
    }

    [Fact]
    public void ShortTableIsWarnedAbout() =>
        Assert.Contains(BhCurve.FromTable(new BhTable("steel", Steel()[..20], 2.15)).Findings, f => f.What == "bh-short-table");

    [Fact]
    public void MissingOriginIsAdded()
    {
        BhCurve curve = BhCurve.FromTable(new BhTable("steel", Steel()[1..], 2.15));

        Assert.Equal(new BhRow(0, 0), curve.Nodes[0]);
        Assert.Contains(curve.Findings, f => f.What == "bh-origin-added");
    }

    [Fact]
    public void SharpCornerIsSaidAndStaysLawful()
    {
        BhCurve curve = BhCurve.FromTable(new BhTable("elbow", [new(0, 0), new(500, 1.9), new(50000, 1.9 + (50000 * 1.2 * PhysicalConstants.Mu0))], 2.15));

        Assert.Contains(curve.Findings, f => f.What == "bh-kink");
        LawfulnessTests.AssertLawful(curve, 4, 20000);
    }

    [Fact]
    public void AnhystereticStartMakesReluctivityMonotone()
    {
        BhCurve virgin = BhCurve.FromTable(new BhTable("steel", Steel(), 2.15));
        BhCurve anhysteretic = BhCurve.FromTable(new BhTable("steel", Steel(), 2.15), new BhCurveOptions { AnhystereticStart = true });

        Assert.False(ReluctivityRises(virgin));
        Assert.True(ReluctivityRises(anhysteretic));
        Assert.Equal(virgin.At(2.0).FieldStrength, anhysteretic.At(2.0).FieldStrength, 1e-9);
    }

    private static bool ReluctivityRises(BhCurve curve)
    {
        double previous = 0;
        for (double b = 0.01; b < 3; b += 0.01)
        {
            double nu = curve.At(b).FieldStrength / b;
            if (nu < previous * (1 - 1e-12))
            {
                return false;
            }

            previous = nu;
        }

        return true;
    }

    private static BhRow[] Steel() => [.. BhCurveTests.MildSteel().Nodes];

    private static IReadOnlyList<Finding> Faults(IReadOnlyList<BhRow> rows, double js)
    {
        InputException refused = Assert.Throws<InputException>(() => BhCurve.FromTable(new BhTable("steel", rows, js)));
        return [.. refused.Findings.Where(f => f.Severity == Severity.Fault)];
    }
}
