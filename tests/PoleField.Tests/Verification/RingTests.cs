// Truth: Ampère's law round a straight conductor, H = I/(2πr) whatever the ring's BH curve; flux and energy of the ring are its
// integrals (closed form).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class RingTests(VerificationRecord record)
{
    private static readonly VerificationCase Published = new(
        "Steel ring 10 to 20 mm round a conductor, steel of TEAM 20 joined by straight lines",
        "Published: H = I/(2πr), B = B(H), flux ∫ B dr and energy ∫∫ H dB dS, eight digits.");

    private static readonly VerificationCase BuiltIn = new(
        "Steel ring 10 to 20 mm round a conductor, built-in curves", "Closed form: H = I/(2πr), B = B(H) by the curve's own inverse.");

    [Theory]
    [InlineData(50, 1.1753219, 1.0691693, 0.97119586, 0.78577472, 0.0097409945, 0.26169948)]
    [InlineData(100, 1.4285916, 1.3633099, 1.2982677, 1.1753219, 0.012988758, 0.49047651)]
    [InlineData(300, 1.6594706, 1.6166529, 1.5816728, 1.5238263, 0.015856609, 0.98112845)]
    [InlineData(1000, 1.9001490, 1.8453861, 1.8087988, 1.7562806, 0.018145121, 2.3159801)]
    [InlineData(3000, 2.1132802, 2.0770265, 2.0419014, 1.9766658, 0.020430366, 6.4863027)]
    public void FluxDensityFluxAndEnergyAgreeWithThePublishedValues(
        double current, double at10, double at12, double at15, double at20, double flux, double energy)
    {
        OneOrderUp local = Solve(PiecewiseLinearLaw.MildSteel, current);

        string at = FormattableString.Invariant($"{current} A: ");
        foreach ((double r, double b) in new[] { (10, at10), (12.5, at12), (15, at15), (20, at20) })
        {
            // At the skins a hair inside; over it B changes by less than the hair's share of the radius.
            double inside = Math.Clamp(r, 10 + 1e-6, 20 - 1e-6);
            record.Check(Published, at + FormattableString.Invariant($"B at {r} mm, T"), b, local.Magnitude(Point.Polar(inside / 1000, 0.7)), 5e-8 + (1e-7 * b));
        }

        record.Check(Published, at + "flux per metre, Wb/m", flux, local.Of(s => Math.Abs(A(s, 10) - A(s, 20))), 5e-10);
        record.Check(Published, at + "energy per metre, J/m", energy, local.Of(s => EnergyTests.EnergyIn(s, 0)), 5e-8);
    }

    [Theory]
    [InlineData("mild-steel", 1000)]
    [InlineData("pure-iron", 200)]
    [InlineData("cobalt-iron-49", 3000)]
    public void FluxDensityFollowsAmperesLawInBuiltInSteels(string name, double current)
    {
        Material steel = MaterialLibrary.Get(name);

        OneOrderUp local = Solve(steel, current);

        foreach (double r in new[] { 0.0101, 0.015, 0.0199 })
        {
            double h = current / (Math.Tau * r);
            string at = FormattableString.Invariant($"{name}, {current} A, {1000 * r:g3} mm: ");
            record.Check(BuiltIn, at + "H, A/m", h, local.FieldStrength(Point.Polar(r, 2.1)));
            record.Check(BuiltIn, at + "B, T", steel.Law.FluxDensityAt(h), local.Magnitude(Point.Polar(r, 2.1)));
        }
    }

    private static double A(FieldSolution solution, double r) => solution.At(new Point(r / 1000, 0))!.Value.Potential;

    private static OneOrderUp Solve(Material steel, double current)
    {
        Magnet magnet = new Drawn()
            .Circle("RING", 0, 0, 20).Circle("RING", 0, 0, 10).Circle("WIRE", 0, 0, 2)
            .Part("RING", steel).Part("WIRE", Material.Air, current)
            .Magnet();
        return new OneOrderUp(MagnetSolver.Solve(magnet, Drawn.Beam(0, 30, 4, 2), new SolveOptions { Accuracy = 1e-5 }));
    }
}
