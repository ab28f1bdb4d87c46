// Truth: the definitions of the units (1 in = 25.4 mm, 1 G = 1e-4 T, 0 degC = 273.15 K, muB and u of CODATA 2022).
using PoleField.Cli.Case;

namespace PoleField.Cli.Tests.Case;

public sealed class QuantityTests
{
    [Theory]
    [InlineData("3 mm", 0.003)]
    [InlineData("4.5 mm", 0.0045)] // exact: 4.5 * 1e-3 would be 0.0045000000000000005
    [InlineData("2 um", 2e-6)]
    [InlineData("2 \u00b5m", 2e-6)] // micro sign
    [InlineData("2 \u03bcm", 2e-6)] // Greek mu
    [InlineData("2.5cm", 0.025)]
    [InlineData("1 m", 1)]
    [InlineData("1 in", 0.0254)]
    [InlineData("40 mil", 0.001016)]
    [InlineData("  -.5   mm ", -0.0005)]
    [InlineData("1e-3 m", 0.001)]
    [InlineData("\u22121 mm", -0.001)] // typographic minus
    public void LengthsAreReadInMetres(string text, double metres) => Assert.Equal(metres, Read(text, Dimension.Length));

    [Theory]
    [InlineData("1.2 T", 1.2)]
    [InlineData("12 mT", 0.012)]
    [InlineData("50 uT", 5e-5)]
    [InlineData("5 G", 5e-4)]
    [InlineData("12 kG", 1.2)]
    public void FieldsAreReadInTesla(string text, double tesla) => Assert.Equal(tesla, Read(text, Dimension.Field));

    [Theory]
    [InlineData("300 T/m", 300)]
    [InlineData("300 mT/mm", 300)]
    [InlineData("3 T/cm", 300)]
    [InlineData("30000 G/cm", 300)]
    [InlineData("30 kG/cm", 300)]
    [InlineData("0.3 T/mm", 300)]
    public void GradientsAreReadInTeslaPerMetre(string text, double gradient) => Assert.Equal(gradient, Read(text, Dimension.Gradient));

    [Fact]
    public void TheOtherKindsAreReadInSi()
    {
        Assert.Equal(2400, Read("2.4 kA", Dimension.Current));
        Assert.Equal(0.0024, Read("2.4 mA", Dimension.Current));
        Assert.Equal(2500, Read("2500", Dimension.AmpereTurns));
        Assert.Equal(5e6, Read("5 A/mm^2", Dimension.CurrentDensity));
        Assert.Equal(478, Read("478 K", Dimension.Temperature));
        Assert.Equal(478.15, Read("205 degC", Dimension.Temperature), 12);
        Assert.Equal(39 * 1.66053906892e-27, Read("39 u", Dimension.Mass));
        Assert.Equal(9.2740100657e-24, Read("1 muB", Dimension.Moment));
        Assert.Equal(900, Read("0.9 km/s", Dimension.Speed));
        Assert.Equal(Math.PI / 2, Read("90 deg", Dimension.Angle));
        Assert.Equal(0.0005, Read("0.5 mrad", Dimension.Angle));
        Assert.Equal(Math.PI / 2, Read("90", Dimension.Direction));
        Assert.Equal(0.02, Read("2 %", Dimension.Ratio));
        Assert.Equal(5e-5, Read("50 ppm", Dimension.Ratio));
        Assert.Equal(0.02, Read("0.02", Dimension.Ratio));
    }

    [Theory]
    [InlineData("1,5 mm", "decimal-comma", "\"1.5\u00a0mm\"")]
    [InlineData("3", "missing-unit", "um, mm, cm, m, in, mil")]
    [InlineData("3 T", "wrong-unit", "um, mm, cm, m, in, mil")]
    [InlineData("3 parsec", "unknown-unit", "um, mm, cm, m, in, mil")]
    [InlineData("3 MM", "unknown-unit", "\"3 mm\"")]
    [InlineData("mm", "not-a-quantity", "\"3 mm\"")]
    [InlineData("", "not-a-quantity", "\"3 mm\"")]
    [InlineData("nan mm", "not-a-quantity", "\"3 mm\"")]
    [InlineData("1e999 mm", "not-a-quantity", "\"3 mm\"")]
    [InlineData("1 500 mm", "digit-groups", "without gaps")]
    [InlineData("1'500 mm", "digit-groups", "without gaps")]
    public void MistakesAreNamedAndTheFixIsSpelledOut(string text, string what, string fix)
    {
        Mistake? mistake = Quantity.Read(text, Dimension.Length, out _);

        Assert.Equal(what, mistake?.What);
        Assert.Contains(fix.Replace('\u00a0', ' '), mistake!.Fix, StringComparison.Ordinal);
    }

    [Fact]
    public void ShowingAValueInItsUnitUndoesReadingIt()
    {
        foreach (Dimension dimension in new[] { Dimension.Length, Dimension.Field, Dimension.Temperature, Dimension.Ratio, Dimension.Angle })
        {
            foreach (Unit unit in dimension.Units)
            {
                Assert.Equal(7.25, unit.FromSi(unit.ToSi(7.25)), 12);
            }
        }
    }

    private static double Read(string text, Dimension dimension)
    {
        Mistake? mistake = Quantity.Read(text, dimension, out double value);
        Assert.Null(mistake);
        return value;
    }
}
