// Truth: an ellipse in a uniform field along an axis is uniform inside whatever its BH curve: H + N (B/μ0 − H) = B0/μ0 with
// N = b/(a + b), a the half axis along the field (any textbook of electromagnetism).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class EllipseTests(VerificationRecord record)
{
    private static readonly VerificationCase BuiltIn = new(
        "Saturating ellipse 2:1 along the field", "Closed form: H + N (B/μ0 − H) = B0/μ0, N = 1/3; built-in curve mild-steel, the root by halving.");

    private static readonly VerificationCase Published = new(
        "Saturating ellipse 2:1, steel of TEAM 20 joined by straight lines", "Published roots of H + N (B/μ0 − H) = B0/μ0, slope μ0 beyond the table's last row.");

    [Theory]
    [InlineData(0.5)]
    [InlineData(0.7)]
    [InlineData(1.0)]
    public void SaturatingEllipseIsUniformInside(double background)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        double truth = Inside(steel.Law, background, 1.0 / 3);

        OneOrderUp local = Solve(steel, background);

        string at = FormattableString.Invariant($"B0 {background} T: ");
        record.Check(BuiltIn, at + "B in the middle, T", truth, local.Bz(new Point(0.001, 0.002)));
        record.Check(BuiltIn, at + "B near the tip, T", truth, local.Bz(new Point(0, 0.0199)));
    }

    [Theory]
    [InlineData(0.5, 1.4947548, 2086.9895)]
    [InlineData(0.7, 2.0254559, 29660.173)]
    [InlineData(1.0, 2.4202360, 230680.77)]
    public void SaturatingEllipseAgreesWithThePublishedValues(double background, double inside, double strength)
    {
        OneOrderUp local = Solve(PiecewiseLinearLaw.MildSteel, background);

        string at = FormattableString.Invariant($"B0 {background} T: ");
        record.Check(Published, at + "B in the middle, T", inside, local.Bz(new Point(0.001, 0.002)), 5e-7);
        record.Check(Published, at + "H in the middle, A/m", strength, local.FieldStrength(new Point(0.001, 0.002)), 5e-3);
    }

    private static OneOrderUp Solve(Material steel, double background)
    {
        Magnet magnet = new Drawn().Closed("IRON", new EllipticArc(default, new Point(0, 20), 10, 0, Math.Tau))
            .Part("IRON", steel).Magnet(new Point(0, background));
        return new OneOrderUp(MagnetSolver.Solve(magnet, Drawn.Beam(15, 0, 2, 4), new SolveOptions { Accuracy = 1e-5 }));
    }

    private static double Inside(MagneticLaw law, double background, double n)
    {
        double low = 0, high = 5 * background;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            double h = law.At(b).FieldStrength;
            (low, high) = PhysicalConstants.Mu0 * h * (1 - n) + (n * b) > background ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }
}
