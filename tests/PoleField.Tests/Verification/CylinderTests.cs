// Truth: a permeable cylinder in a uniform field (any textbook of electromagnetism): inside uniform, B + μ0 H = 2 B0; outside
// the background plus a dipole of strength k R² B0, k = B/B0 − 1. With a BH curve the inside is still uniform, whatever the curve.
using System.Text;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class CylinderTests(VerificationRecord record)
{
    private const double Radius = 10; // mm
    private const double Asked = 1e-5;

    private static readonly VerificationCase Linear = new(
        "Permeable cylinder in a uniform field of 1 T",
        "Closed form: B = 2μr/(μr + 1) B0 inside, B0 (1 ± k R²/r²) on the axes outside, k = (μr − 1)/(μr + 1).");

    private static readonly VerificationCase Saturating = new(
        "Saturating cylinder in a uniform field",
        "Closed form: B + μ0 H(B) = 2 B0 inside, the root by halving; a dipole outside. Built-in curve mild-steel, and a user's table of another steel.");

    private static readonly VerificationCase Published = new(
        "Saturating cylinder, steel of TEAM 20 joined by straight lines",
        "Published values of B + μ0 H(B) = 2 B0, eight digits, slope μ0 beyond the table's last row.");

    // A user's table: Frölich's law B = μ0 H + 1.8 H/(900 + H), rounded to a mT.
    private const string UsersTable = """
        # Js_T: 1.8
        H_A_per_m,B_T
        0,0
        100,0.180
        300,0.450
        600,0.721
        1000,0.949
        2000,1.244
        4000,1.474
        8000,1.628
        16000,1.724
        32000,1.791
        64000,1.855
        """;

    [Theory]
    [InlineData(2, 1.3333333, 1.0833333, 0.91666667)]
    [InlineData(10, 1.8181818, 1.2045455, 0.79545455)]
    [InlineData(1000, 1.9980020, 1.2495005, 0.7504995)]
    public void LinearCylinderHasTheTextbookField(double permeability, double inside, double along, double across)
    {
        SolvedMagnet solved = Solve(new Material("linear", new LinearLaw(permeability), "", "", ""), 1.0, 2);
        var local = new OneOrderUp(solved);
        string at = FormattableString.Invariant($"μr {permeability}: ");

        record.Check(Linear, at + "B inside, T", inside, local.Bz(new Point(0.001, 0.002)), 5e-8);
        record.Check(Linear, at + "B at 2 R along the field, T", along, solved.FieldEstimate(), 5e-8);
        record.Check(Linear, at + "B at 2 R across the field, T", across, local.Bz(new Point(0.020, 0)), 5e-8);
    }

    [Theory]
    [InlineData("mild-steel", 0.1)]
    [InlineData("mild-steel", 0.5)]
    [InlineData("mild-steel", 0.8)]
    [InlineData("mild-steel", 1.0)]
    [InlineData("mild-steel", 1.2)]
    [InlineData("mild-steel", 1.5)]
    [InlineData("cobalt-iron-49", 1.1)]
    [InlineData("user's table", 0.4)]
    [InlineData("user's table", 0.9)]
    public void SaturatingCylinderIsUniformInsideAndADipoleOutside(string steel, double background)
    {
        Material material = steel == "user's table"
            ? MaterialFile.Read(new MemoryStream(Encoding.UTF8.GetBytes(UsersTable)), "steel.csv")
            : MaterialLibrary.Get(steel);
        SolvedMagnet solved = Solve(material, background, 1.5);
        double inside = InsideField(material.Law, background);
        double k = (inside / background) - 1;
        BeamValues beam = solved.Report.Beam; // on the axis along the field at 1.5 R
        double r = beam.At.Z / (Radius / 1000);
        string at = FormattableString.Invariant($"{steel}, B0 {background} T: ");

        record.Check(Saturating, at + "B inside, T", inside, new OneOrderUp(solved).Bz(new Point(0.0033, -0.0021)));
        record.Check(Saturating, at + "B at 1.5 R along the field, T", background * (1 + (k / (r * r))), solved.FieldEstimate());
        record.Check(Saturating, at + "dB/dz there, T/m", -2 * background * k / (r * r * beam.At.Z), solved.GradientEstimate());
        Assert.InRange(solved.Solution.History.Count, 1, 16);
    }

    [Theory]
    [InlineData(0.1, 0.19974252, 204.89701, 0.14433001)]
    [InlineData(0.5, 0.99930331, 554.40781, 0.72191258)]
    [InlineData(0.8, 1.5957142, 3410.5693, 1.1536507)]
    [InlineData(1.0, 1.9707705, 23260.128, 1.4314535)]
    [InlineData(1.1, 2.1313644, 54618.473, 1.5583842)]
    [InlineData(1.2, 2.2572283, 113614.13, 1.6698792)]
    [InlineData(1.5, 2.5651770, 346021.15, 1.9734120)]
    [InlineData(2.0, 3.0651770, 743908.51, 2.4734120)]
    public void SaturatingCylinderAgreesWithThePublishedValues(double background, double inside, double strength, double outside)
    {
        SolvedMagnet solved = Solve(PiecewiseLinearLaw.MildSteel, background, 1.5);
        var local = new OneOrderUp(solved);
        string at = FormattableString.Invariant($"B0 {background} T: ");

        record.Check(Published, at + "B inside, T", inside, local.Bz(new Point(0.001, 0.001)), 5e-8);
        record.Check(Published, at + "H inside, A/m", strength, local.FieldStrength(new Point(0.001, 0.001)), 5e-3);
        record.Check(Published, at + "B at 1.5 R along the field, T", outside, solved.FieldEstimate(), 5e-8);
    }

    internal static double InsideField(MagneticLaw law, double background)
    {
        double low = 0, high = 2 * background;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            (low, high) = b + (PhysicalConstants.Mu0 * law.At(b).FieldStrength) > 2 * background ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }

    private static SolvedMagnet Solve(Material material, double background, double beamAt) => MagnetSolver.Solve(
        new Drawn().Circle("IRON", 0, 0, Radius).Part("IRON", material).Magnet(new Point(0, background)),
        Drawn.Beam(0, beamAt * Radius, 3, 1),
        new SolveOptions { Accuracy = Asked });
}
