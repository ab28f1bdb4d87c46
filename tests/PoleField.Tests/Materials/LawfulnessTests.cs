// Truth: thermodynamics and Maxwell's equations allow 0 < dH/dB ≤ 1/μ0 only; random tables must give lawful curves or be refused.
using CsCheck;
using PoleField.Materials;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Materials;

public sealed class LawfulnessTests
{
    private const double Nu0 = PhysicalConstants.Nu0;

    public static TheoryData<string> Curves
    {
        get
        {
            TheoryData<string> names = [];
            foreach (string name in MaterialLibrary.Names.Where(n => MaterialLibrary.Get(n).Law is BhCurve))
            {
                names.Add(name);
            }

            return names;
        }
    }

    [Theory]
    [MemberData(nameof(Curves))]
    public void EveryBuiltInCurveIsLawful(string name)
    {
        BhCurve curve = (BhCurve)MaterialLibrary.Get(name).Law;

        AssertLawful(curve, 8.0, 20_000);
        Assert.DoesNotContain(curve.Findings, f => f.What is "bh-kink" or "bh-saturation-assumed" or "bh-origin-added");
    }

    [Theory]
    [MemberData(nameof(Curves))]
    public void EveryBuiltInCurveSaturates(string name)
    {
        BhCurve curve = (BhCurve)MaterialLibrary.Get(name).Law;

        MagneticState state = curve.At(6.0);

        Assert.InRange((Nu0 / state.Slope) - 1, 0, 3e-5);
        Assert.InRange(curve.SaturationPolarisation - (6.0 - (PhysicalConstants.Mu0 * state.FieldStrength)), 0, 7e-5);
    }

    [Fact]
    public void RandomTablesGiveLawfulCurves()
    {
        Gen<(double B, double Share)[]> steps = Gen.Select(Gen.Double[1e-4, 0.4], Gen.Double[-5, -0.05], (b, e) => (b, Math.Pow(10, e))).Array[2, 30];

        // Each step rises by b in B with a secant dH/dB of share × ν0, in (0, 0.891 ν0): any order, however wild.
        steps.SampleFixed(
            table =>
            {
                List<BhRow> rows = [new(0, 0)];
                foreach ((double b, double share) in table)
                {
                    rows.Add(new BhRow(rows[^1].FieldStrength + (share * Nu0 * b), rows[^1].FluxDensity + b));
                }

                double js = Math.Min(3, rows[^1].Polarisation + 0.01);
                if (rows[^1].FluxDensity < 10 && js > rows[^1].Polarisation)
                {
                    AssertLawful(BhCurve.FromTable(new BhTable("random", rows, js)), rows[^1].FluxDensity + 1, 2000);
                }
            },
            iter: 10000);
    }

    [Fact]
    public void RandomNoisyTablesAreMadeLawfulBySmoothing()
    {
        Gen.Double[-1, 1].Array[38].SampleFixed(
            noise =>
            {
                BhRow[] rows = [.. BhCurveTests.MildSteel().Nodes];
                for (int i = 1; i < rows.Length; i++)
                {
                    rows[i] = rows[i] with { FieldStrength = rows[i].FieldStrength * (1 + (0.08 * noise[i - 1])) };
                }

                BhCurve curve = BhCurve.FromTable(new BhTable("noisy", rows, 2.4), new BhCurveOptions { Smooth = true });

                AssertLawful(curve, 3.5, 3000);
                double[] secants = [.. curve.Nodes.Zip(curve.Nodes.Skip(1), (a, b) => (b.FieldStrength - a.FieldStrength) / (b.FluxDensity - a.FluxDensity))];
                int lowest = Array.IndexOf(secants, secants.Min());
                for (int i = 1; i < secants.Length; i++)
                {
                    double change = (secants[i] - secants[i - 1]) / secants[i];
                    Assert.True(i <= lowest ? change <= 1e-9 : change >= -1e-9);
                }
            },
            iter: 100);
    }

    internal static void AssertLawful(MagneticLaw law, double to, int samples)
    {
        // J is a difference of values up to 10 T.
        const double rounding = 1e-13;
        double previousH = 0;
        double previousJ = 0;
        double previousW = 0;
        for (int i = 1; i <= samples; i++)
        {
            double b = to * i / samples;
            MagneticState state = law.At(b);
            double j = b - (PhysicalConstants.Mu0 * state.FieldStrength);
            bool lawful = state.Slope > 0 && state.Slope <= Nu0
                && state.FieldStrength > previousH
                && j >= previousJ - rounding && j <= law.SaturationPolarisation + rounding
                && state.Energy > previousW;
            if (!lawful)
            {
                Assert.Fail(FormattableString.Invariant($"At {b} T: {state}, J = {j} T; before it H = {previousH}, J = {previousJ}, w = {previousW}."));
            }

            (previousH, previousJ, previousW) = (state.FieldStrength, j, state.Energy);
        }
    }
}
