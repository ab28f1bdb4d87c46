// Truth: closed form of two opposite line currents. Round conductors with even current density have exactly that field
// outside themselves (Ampère's law and superposition).
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class TwoWireTests(VerificationRecord record)
{
    private const double A = 3.0; // mm
    private const double Current = 10_000;

    private static readonly TwoWires Exact = new(A / 1000, Current);

    private static readonly VerificationCase Published = new(
        "Two line currents of ±10 kA at ±3 mm", "Published values of the closed form, eight digits; round conductors of 1 mm radius have its field outside.");

    private static readonly VerificationCase Target = new(
        "Two line currents: accuracy for the unknowns used", "Closed form. Aim: gradient right to 1e-6 with at most 20,000 unknowns.");

    [Theory]
    [InlineData(0, 1.2, 0.54644809, -179.16331)]
    [InlineData(0, 1.3, 0.49566295, -159.69314)]
    [InlineData(0.5, 1.2, 0.53392739, -184.25165)]
    public void FieldAndGradientAtTheBeamAreThePublishedOnes(double y, double z, double field, double gradient)
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(y * A, z * A, 0.6, 0.3));

        string at = FormattableString.Invariant($"at ({y}, {z}) a: ");
        record.Check(Published, at + "B, T", field, solved.FieldEstimate(), 5e-9);
        record.Check(Published, at + "d|B|/dz, T/m", gradient, solved.GradientEstimate(), 5e-6);
        Assert.InRange(Math.Abs((solved.Report.Beam.Gradient / gradient) - 1), 0, 1e-4);
        Assert.True(solved.Record.AccuracyMet);
    }

    [Fact]
    public void FluxAndAmpereTurnsBetweenPlacesAreThePublishedOnes()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        var local = new OneOrderUp(solved);
        Estimate flux = local.Of(s => Potential(s, 0.5, 1.2) - Potential(s, 0, 1.2));
        record.Check(Published, "flux through z = 1.2 a from y = 0 to 0.5 a, Wb/m", 0.00078089793, Math.Abs(flux.Value), Allowed.Bar(flux.Bar, 5e-12));
        Estimate drive = local.Of(s => AmpereTurns(s, 1, 2));
        record.Check(Published, "∫ H dz from z = a to 2 a, A", 1024.1638, Math.Abs(drive.Value), Allowed.Bar(drive.Bar, 5e-5));
    }

    [Fact]
    public void GradientIsRightToAMillionthWithFewUnknowns()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 1.5, 0.3), new SolveOptions { Accuracy = 2e-6 });

        BeamValues beam = solved.Report.Beam;
        record.Check(Target, "d|B|/dz at 1.2 a, T/m", Exact.Gradient(beam.At), beam.Gradient, Allowed.Relative(1e-6, "the aim"));
        record.Check(Target, "unknowns used, thousands (0 to 20)", 10, solved.Record.Unknowns / 1000.0, Allowed.Absolute(10, "the aim"));
    }

    [Fact]
    public void TheWholeChainFromADrawingFileKeepsTheAccuracy()
    {
        Drawn drawn = Conductors();
        using var file = new MemoryStream();
        DxfWriter.Write(drawn.Sketch(), file);
        file.Position = 0;

        Sketch read = DxfReader.Read(file, "wires.dxf");
        BeamReport report = MagnetSolver.Solve(drawn.MagnetOf(read), Drawn.Beam(0, 1.2 * A, 3, 0.3)).Report;

        Assert.InRange(Math.Abs((report.Beam.Gradient / Exact.Gradient(report.Beam.At)) - 1), 0, 1e-4);
    }

    [Fact]
    public void FieldAndGradientAreRightAllOverTheAperture()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        foreach (BeamValues v in solved.Report.ProfileY.Concat(solved.Report.ProfileZ))
        {
            Assert.Equal(1.0, v.Field / Exact.Magnitude(v.At), 1e-4);
            Assert.Equal(1.0, v.Gradient / Exact.Gradient(v.At), 1e-4);
        }
    }

    [Fact]
    public void FieldIsRightInsideAndOutsideTheOpenCircle()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        var local = new OneOrderUp(solved);
        foreach (Point p in new[] { new Point(0, -0.004), new Point(0.009, 0.002), new Point(0.1, 0.03), new Point(-2, 1) })
        {
            string at = FormattableString.Invariant($"({p.Y}, {p.Z}) m, T");
            record.Check(Published, "By at " + at, Exact.Field(p).Y, local.By(p));
            record.Check(Published, "Bz at " + at, Exact.Field(p).Z, local.Bz(p));
        }
    }

    private static double Potential(FieldSolution solution, double y, double z) =>
        solution.At(new Point(y * A / 1000, z * A / 1000))!.Value.Potential;

    private static double AmpereTurns(FieldSolution solution, double from, double to)
    {
        const int pieces = 20;
        GaussRule rule = GaussRule.Legendre(6);
        double sum = 0;
        for (int i = 0; i < pieces * rule.Nodes.Length; i++)
        {
            double share = ((i / rule.Nodes.Length) + rule.Nodes[i % rule.Nodes.Length]) / pieces;
            double z = (from + (share * (to - from))) * A / 1000;
            sum += rule.Weights[i % rule.Nodes.Length] * (to - from) * A / 1000 / pieces * solution.At(new Point(0, z))!.Value.Bz;
        }

        return PhysicalConstants.Nu0 * sum;
    }

    private static Magnet Wires() => Conductors().Magnet();

    private static Drawn Conductors() => new Drawn()
        .Circle("WIRE RIGHT", A, 0, 1.0)
        .Circle("WIRE LEFT", -A, 0, 1.0)
        .Part("WIRE RIGHT", Material.Air, Current)
        .Part("WIRE LEFT", Material.Air, -Current);
}
