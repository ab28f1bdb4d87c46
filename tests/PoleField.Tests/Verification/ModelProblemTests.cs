// Truth: reference values of the model problem (saturated nose and groove in a frame, within a box with A = 0 on its rim) from
// an independent program in another language: elements of order 6 on curved, corner-graded meshes; 784,045 and 423,589 unknowns
// agree in the digits given.
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Meshing;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class ModelProblemTests(VerificationRecord record)
{
    private const double Field = 1.62389503;
    private const double Gradient = -488.73228;

    [Theory]
    [InlineData(1e-4)]
    [InlineData(1e-5)]
    public void FieldAndGradientAgreeWithTheReferenceWithinTheirErrorBars(double accuracy)
    {
        SolvedMagnet solved = Solve(accuracy);

        BeamValues beam = solved.Report.Beam;
        Assert.True(solved.Record.AccuracyMet);
        string at = FormattableString.Invariant($"model problem at {accuracy:g1}: ");
        record.Absolute(at + "Bz, T, within its bar", Field, beam.Bz, solved.Report.FieldError + 1e-8);
        record.Absolute(at + "dBz/dz, T/m, within its bar", Gradient, beam.DBzDz, solved.Report.GradientError + 1e-5);
        record.Relative(at + "Bz, T, to the asked accuracy", Field, beam.Bz, accuracy);
        record.Relative(at + "dBz/dz, T/m, to the asked accuracy", Gradient, beam.DBzDz, accuracy);
        record.Relative(at + "iron at (0, 2.5) mm, T", 2.097766, solved.Solution.At(new Point(0, 0.0025))!.Value.Magnitude, 1e-3);
        record.Relative(at + "iron at (62.5, 4) mm, T", 0.524958, solved.Solution.At(new Point(0.0625, 0.004))!.Value.Magnitude, 1e-2);
        record.Relative(at + "∫ J A dS, J/m", 81.759381, Circuit.Energies(solved.Solution).Linkage, 1e-3);
    }

    internal static SolvedMagnet Solve(double accuracy, Action<SolveProgress>? progress = null) => MagnetSolver.Solve(
        new Magnet { Section = ProblemP.Section(), Roles = Roles() },
        Aperture.Rectangle(ProblemP.Beam, 1.5e-3, 0.3e-3),
        new SolveOptions { Accuracy = accuracy, Threads = 1 },
        progress);

    private static IReadOnlyList<PartRole> Roles()
    {
        var iron = new Material("saturating", new FroehlichLaw(2.15, 2000), "model", "reference problem", "exact");
        CrossSection section = ProblemP.Section();
        return [.. section.Parts.Select(name => name == "iron"
            ? new PartRole(name, iron)
            : new PartRole(name, Material.Air) { AmpereTurns = name.Contains("right", StringComparison.Ordinal) ? -1500 : 1500 })];
    }
}
