// Truth: closed forms: copper's heat rho j^2 A; forces and energy times the length.
using PoleField.Cli.Case;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests;

public sealed class CautionTests
{
    [Fact]
    public void ForceEnergyAndHeatCarryTheLengthOfTheMagnet()
    {
        CaseFile file = CaseReader.Read(Cases.Small, new CaseSurroundings("magnet.toml", ["air", "pure-iron"], _ => true)).Case!;

        string text = string.Join("\n", Cautions.Of(file, Steps.Report, 1.4));

        // 1200 N/m and 14.2 J/m over 0.2 m; (6.94 A/mm2)^2 / 58e6 S/m * 600 mm2 * 0.6 = 298.9 W/m.
        Assert.Contains("RIDGE is pulled with 1200 N per metre, 240 N over its length", text, StringComparison.Ordinal);
        Assert.Contains("14.2 J per metre, 2.84 J over its length", text, StringComparison.Ordinal);
        Assert.Contains("299 W per metre at 20 °C, 59.8 W over its length", text, StringComparison.Ordinal);
        Assert.Contains("up to 1.4 m", text, StringComparison.Ordinal);
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
