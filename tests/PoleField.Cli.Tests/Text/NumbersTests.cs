// Truth: rounding by hand.
using PoleField.Cli.Case;
using PoleField.Cli.Text;

namespace PoleField.Cli.Tests.Text;

public sealed class NumbersTests
{
    [Theory]
    [InlineData(312.4567, 0.25, "312.46 ± 0.25")]
    [InlineData(312.4567, 0.0996, "312.46 ± 0.10")] // the error bar rounds up a decade
    [InlineData(-0.73184, 0.00012, "-0.73184 ± 0.00012")]
    [InlineData(1234.5, 3, "1234.5 ± 3.0")]
    [InlineData(1234.5, 0, "1234.5")]
    [InlineData(1234.5, double.NaN, "1234.5")]
    public void AnErrorBarDecidesTheDigits(double value, double error, string text) => Assert.Equal(text, Numbers.WithError(value, error));

    [Theory]
    [InlineData(0, "0")]
    [InlineData(1.0, "1.0000")]
    [InlineData(1234.56, "1234.6")]
    [InlineData(-0.00012345, "-0.00012345")]
    [InlineData(1.2345e-7, "1.2345e-7")]
    [InlineData(1.2345e9, "1.2345e9")]
    [InlineData(double.NaN, "-")]
    public void FiveDigitsAreShown(double value, string text) => Assert.Equal(text, Numbers.Significant(value));

    [Theory]
    [InlineData(300.0, "300")]
    [InlineData(0.3, "0.3")]
    [InlineData(1e-7, "1e-7")]
    public void ShortFormDropsZerosAtTheEnd(double value, string text) => Assert.Equal(text, Numbers.Short(value));

    [Fact]
    public void ZeroNeverCarriesAMinus() => Assert.Equal("0.000", Numbers.Fixed(-1e-9, 3));

    [Fact]
    public void QuantitiesAreShownInTheirUnit()
    {
        Assert.Equal("0.3 mm", Numbers.InUnit(3e-4, Dimension.Length));
        Assert.Equal("2 %", Numbers.InUnit(0.02, Dimension.Ratio));
        Assert.Equal("312.40 ± 0.31 T/m", Numbers.InUnit(new Measured(312.4, 0.31), Dimension.Gradient));
    }
}
