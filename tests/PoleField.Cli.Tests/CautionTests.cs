// Truth: closed forms: copper's heat rho j^2 A; forces and energy times the length.
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests;

public sealed class CautionTests
{
    [Fact]
    public void ForceEnergyAndHeatCarryTheLengthOfTheMagnet()
    {
        var operation = new OperationReport
        {
            Setup = OperationSetup.Default with { Length = 0.2 },
            Coils = [new CoilReport("COIL", 3.6e-4, 6.94e6)],
            Stray = [new StrayReach(0.5e-3, 1.4), new StrayReach(3e-3, 0.7)],
            Circuit = Steps.Report.Circuit,
        };

        string text = string.Join("\n", Cautions.Of(Steps.Report, operation));

        // 1150 N/m, 1200 N/m and 14.2 J/m over 0.2 m; (6.94 A/mm2)^2 / 58e6 S/m * 360 mm2 = 298.9 W/m; 1 + 0.00393 * 60 K = 1.24;
        // 4.5 uH/m * 2500 A * 0.2 m = 2.25 mWb in 1 ms.
        Assert.Contains("the poles pull each other with 1150 N per metre, 230 N over its length", text, StringComparison.Ordinal);
        Assert.Contains("RIDGE is pulled with 1200 N per metre, 240 N over its length", text, StringComparison.Ordinal);
        Assert.Contains("14.2 J per metre, 2.84 J over its length", text, StringComparison.Ordinal);
        Assert.Contains("2.2 V in each turn", text, StringComparison.Ordinal);
        Assert.Contains("299 W per metre, 59.8 W over its length at 20 °C, 1.24 times as much at 80 °C", text, StringComparison.Ordinal);
        Assert.Contains("above 0.5 mT up to 1.4 m", text, StringComparison.Ordinal);
        Assert.Contains("Local safety rules", text, StringComparison.Ordinal);
    }

    [Fact]
    public void AVerdictInsideTheErrorBarSaysSo()
    {
        Limit Gradient(double bound) => new(BeamQuantity.All.Single(q => q.Name == "gradient"), true, bound);

        Assert.Equal((true, false), Pair(Gradient(300).Judge(Steps.Report)));
        Assert.Equal((true, true), Pair(Gradient(312.39).Judge(Steps.Report)));
        Assert.Equal((false, true), Pair(Gradient(312.41).Judge(Steps.Report)));

        static (bool Met, bool Within) Pair(Verdict v) => (v.Met, v.IsWithinError);
    }

    [Fact]
    public void ABoundOnSomethingTheMagnetLacksIsNotMet()
    {
        var limit = new Limit(BeamQuantity.All.Single(q => q.Name == "iron_field"), false, 1.9);

        Assert.False(limit.Judge(Steps.Report with { Parts = [] }).Met);
    }
}
