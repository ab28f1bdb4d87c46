// Truth: the definition B = μ0 H + f J(H) evaluated at the same H, quadrature of the scaled law, and the slope's difference quotient.
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class ScaledPolarisationTests
{
    private const double Mu0 = PhysicalConstants.Mu0;

    [Theory]
    [InlineData(1.01)]
    [InlineData(0.99)]
    [InlineData(0.5)]
    [InlineData(3.0)]
    public void PolarisationIsMultipliedAtEqualFieldStrength(double factor)
    {
        BhCurve curve = BhCurveTests.MildSteel();
        MagneticLaw scaled = curve.WithPolarisationScaled(factor);

        for (double h = 1; h < 3e6; h *= 1.4)
        {
            double expected = (Mu0 * h) + (factor * (curve.FluxDensityAt(h) - (Mu0 * h)));
            Assert.Equal(1, scaled.At(expected).FieldStrength / h, 1e-11);
            Assert.Equal(expected, scaled.FluxDensityAt(h), 1e-12 * expected);
        }

        LawfulnessTests.AssertLawful(scaled, 8, 4000);
        Assert.Equal(factor * 2.15, scaled.SaturationPolarisation, 1e-12);
    }

    [Theory]
    [InlineData(0.03)]
    [InlineData(0.83)]
    [InlineData(1.73)]
    [InlineData(2.5)]
    public void SlopeAndEnergyAreThoseOfTheScaledLaw(double b)
    {
        MagneticLaw scaled = BhCurveTests.MildSteel().WithPolarisationScaled(1.02);
        const double step = 1e-5;
        MagneticState below = scaled.At(b - step);
        MagneticState middle = scaled.At(b);
        MagneticState above = scaled.At(b + step);

        // Central differences: error of order step² times the curvature over the slope.
        Assert.Equal(1, (above.FieldStrength - below.FieldStrength) / (2 * step * middle.Slope), 1e-5);
        Assert.Equal(1, (above.Energy - below.Energy) / (2 * step * middle.FieldStrength), 1e-6);
    }

    [Fact]
    public void FactorOneChangesNothing()
    {
        BhCurve curve = BhCurveTests.MildSteel();
        MagneticLaw same = curve.WithPolarisationScaled(1);

        for (double b = 0.01; b < 4; b += 0.037)
        {
            Assert.Equal(1, same.At(b).FieldStrength / curve.At(b).FieldStrength, 1e-13);
            Assert.Equal(1, same.At(b).Energy / curve.At(b).Energy, 1e-13);
        }
    }

    [Fact]
    public void LinearLawScalesItsSusceptibility()
    {
        LinearLaw law = Assert.IsType<LinearLaw>(new LinearLaw(1001).WithPolarisationScaled(1.01));

        Assert.Equal(1011, law.RelativePermeability, 1e-9);
        Assert.False((Material.Air.WithSaturationScaled(1.01)).IsMagnetic);
    }

    [Fact]
    public void MaterialSaysWhatWasDoneToIt()
    {
        Material scaled = MaterialLibrary.Get("steel-1008").WithSaturationScaled(0.99);

        Assert.EndsWith("polarisation times 0.99", scaled.State, StringComparison.Ordinal);
        Assert.Equal(0.99 * 2.15, scaled.Law.SaturationPolarisation, 1e-12);
    }

    [Theory]
    [InlineData(0.0)]
    [InlineData(-1.0)]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    public void ImpossibleFactorIsRefused(double factor)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => BhCurveTests.MildSteel().WithPolarisationScaled(factor));
        Assert.Throws<ArgumentOutOfRangeException>(() => LinearLaw.Vacuum.WithPolarisationScaled(factor));
    }
}
