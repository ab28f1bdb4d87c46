// Truth: the published five-parameter fits (T. Roschke, VDI 2000, as printed in the Modelica Standard Library); equation (1) of
// TEAM problem 13; permeability maxima read from the sources; the magnets' energy products from Br²/(4 μ0 μrec).
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class MaterialLibraryTests
{
    private const double Mu0 = PhysicalConstants.Mu0;

    [Theory]
    [InlineData("steel-1008", 1.17, 200, 8100, 2.59, 10)]
    [InlineData("steel-dc03", 1.05, 0, 27790, 16, 10.4)]
    [InlineData("pure-iron", 1.15, 2666, 187000, 4.24, 19)]
    [InlineData("cobalt-iron-49", 1.75, 3850, 11790, 2.63, 15.02)]
    [InlineData("steel-430", 1.1, 274, 970, 1.2, 8.3)]
    public void SampledFitsFollowTheirFormula(string name, double reference, double initial, double a, double b, double power)
    {
        foreach (BhRow row in ((BhCurve)MaterialLibrary.Get(name).Law).Nodes.Skip(1))
        {
            double x = row.FluxDensity / reference;
            double relative = 1 + ((initial - 1 + (a * x)) / (1 + (b * x) + Math.Pow(x, power)));

            // The rows carry five digits.
            Assert.Equal(1, row.FieldStrength * Mu0 * relative / row.FluxDensity, 6e-5);
        }
    }

    // Tail of the same fits computed apart, with the fit's own slope at the join: H1, ΔJ, h.
    [Theory]
    [InlineData("steel-1008", 24375.7, 0.1806, 24933)]
    [InlineData("steel-dc03", 25006.4, 0.1714, 25147)]
    [InlineData("pure-iron", 1437.3, 0.6018, 10598)]
    [InlineData("cobalt-iron-49", 3313.7, 0.1542, 3209)]
    [InlineData("steel-430", 9210.7, 0.2216, 10182)]
    [InlineData("cast-iron", 12154, 0.4768, 19671)]
    public void TailContinuesWithTheSlopeOfTheFit(string name, double start, double missing, double scale)
    {
        BhCurve curve = (BhCurve)MaterialLibrary.Get(name).Law;

        Assert.Equal(start, curve.Tail.Start.FieldStrength, 0.5);
        Assert.Equal(missing, curve.Tail.MissingPolarisation, 6e-5);
        for (double h = start; h < 2e5; h *= 1.3)
        {
            double s = 1 + ((h - start) / (2 * scale));
            double expected = (Mu0 * h) + curve.SaturationPolarisation - (missing / (s * s));
            Assert.Equal(expected, curve.FluxDensityAt(h), 1.5e-3);
        }
    }

    [Theory]
    [InlineData("pure-iron", 34763, 0.98)]
    [InlineData("steel-1008", 2102, 0.93)]
    [InlineData("steel-430", 505, 0.79)]
    [InlineData("cast-iron", 468, 0.33)]
    [InlineData("cobalt-iron-49", 4255, 1.26)]
    public void GreatestPermeabilityIsWhereTheSourceHasIt(string name, double permeability, double at)
    {
        MagneticLaw law = MaterialLibrary.Get(name).Law;
        (double Mu, double B) best = Enumerable.Range(5, 180).Select(i => (Mu: i * 0.01 / (Mu0 * law.At(i * 0.01).FieldStrength), B: i * 0.01)).Max();

        Assert.Equal(1, best.Mu / permeability, 5e-3);
        Assert.Equal(at, best.B, 0.031);
    }

    [Fact]
    public void Team13FollowsItsEquation()
    {
        MagneticLaw law = MaterialLibrary.Get("team13").Law;

        for (double h = 10000; h < 46000; h += 500)
        {
            double expected = (Mu0 * h) + (-2.381e-10 * h * h) + (2.327e-5 * h) + 1.590;
            Assert.Equal(expected, law.FluxDensityAt(h), 1e-3);
        }

        Assert.Equal(1.985293, law.FluxDensityAt(20000), 5e-4);
    }

    [Fact]
    public void EveryNameHasAMaterialWithItsOrigin()
    {
        string[] promised =
        [
            "air", "aluminium", "brass", "carbon-steel-en9", "cast-iron", "cobalt-iron-49", "copper", "mild-steel", "pure-iron",
            "silicon-steel-m310", "silicon-steel-m800", "stainless-316l", "steel-1008", "steel-430", "steel-dc03", "team13",
        ];

        Assert.Equal(promised, MaterialLibrary.Names);
        foreach (string name in MaterialLibrary.Names)
        {
            Material material = MaterialLibrary.Get(name);
            Assert.Equal(name, material.Name);
            Assert.All([material.Description, material.Source, material.State], text => Assert.False(string.IsNullOrWhiteSpace(text)));
            Assert.DoesNotContain("user's", material.Source + material.State, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("steel-1010", "steel-1008")]
    [InlineData("Pure-Iron", "pure-iron")]
    [InlineData("aluminum", "aluminium")]
    [InlineData("mildsteel", "mild-steel")]
    public void MisspeltNameIsAnsweredWithTheNearest(string name, string nearest)
    {
        InputException unknown = Assert.Throws<InputException>(() => MaterialLibrary.Get(name));

        Assert.Contains($"'{nearest}'", unknown.Findings[0].Fix, StringComparison.Ordinal);
        Assert.Equal(nearest, MaterialLibrary.NearestName(name));
    }

    [Fact]
    public void StrangeNameIsAnsweredWithTheList() =>
        Assert.Contains("steel-1008", Assert.Throws<InputException>(() => MaterialLibrary.Get("unobtainium")).Findings[0].Fix, StringComparison.Ordinal);

    [Theory]
    [InlineData("ndfeb-sintered", 900e3, 270.0)]
    [InlineData("sm2co17-sintered", 750e3, 191.2)]
    [InlineData("smco5-sintered", 720e3, 171.0)]
    public void MagnetsHaveTheirCoercivityAndEnergyProduct(string name, double coercivity, double kilojoules)
    {
        MagnetGrade grade = MaterialLibrary.GetMagnet(name);

        Assert.Equal(1, grade.Coercivity / coercivity, 1e-3);
        Assert.Equal(1, 1e-3 * grade.EnergyProduct / kilojoules, 1e-3);
        Assert.Equal(grade.Remanence * (1 + (100 * grade.TemperatureCoefficient)), grade.RemanenceAt(120), 1e-12);
    }
}
