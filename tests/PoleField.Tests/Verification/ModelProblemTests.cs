// Truth: reference values of the model problem (saturated nose and groove in a frame, within a box with A = 0 on its rim) from two
// independent programs: one in another language, elements of order 6 on curved, corner-graded meshes, 784,045 and 423,589 unknowns
// agreeing in the digits given; and a general finite-element library (folder "independent", with its script), which also gives
// a linear case.
using System.Text.Json;
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Meshing;
using PoleField.Tests.Output;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class ModelProblemTests(VerificationRecord record)
{
    internal const double Field = 1.62389503;     // Bz, T
    internal const double Gradient = -488.73228;  // dBz/dz, T/m

    private static readonly VerificationCase Reference = new(
        "Model problem: saturated nose and groove in a box, reference values",
        "A program in another language, order 6, 784,045 unknowns: the digits on which it and its 423,589 unknowns agree.");

    private static readonly VerificationCase Library = new(
        "Model problem: a general finite-element library",
        "DOLFINx 0.5.2 with meshes of gmsh 4.8 (independent/model_problem.py); its uncertainty is the largest difference between its best run and its two next ones.");

    [Theory]
    [InlineData(1e-4)]
    [InlineData(1e-5)]
    [InlineData(1e-7)]
    public void FieldAndGradientAgreeWithTheReferenceWithinTheirErrorBars(double accuracy)
    {
        SolvedMagnet solved = Solve(new SolveOptions { Accuracy = accuracy });

        Assert.True(solved.Record.AccuracyMet);
        string at = FormattableString.Invariant($"asked {accuracy:g1}: ");
        record.Check(Reference, at + "Bz, T", Field, Bz(solved), 1e-8);
        record.Check(Reference, at + "dBz/dz, T/m", Gradient, DBzDz(solved), 1e-5);
        record.Check(Reference, at + "Bz, T, to the asked accuracy", Field, solved.Report.Beam.Bz, Allowed.Accuracy(accuracy));
        record.Check(Reference, at + "dBz/dz, T/m, to the asked accuracy", Gradient, solved.Report.Beam.DBzDz, Allowed.Accuracy(accuracy));
        var local = new OneOrderUp(solved);
        record.Check(Reference, at + "iron at (0, 2.5) mm, T", 2.097766, local.Magnitude(new Point(0, 0.0025)), 5e-7);
        record.Check(Reference, at + "iron at (62.5, 4) mm, T", 0.524958, local.Magnitude(new Point(0.0625, 0.004)), 5e-7);
        record.Check(Reference, at + "∫ J A dS, J/m", 81.759381, local.Of(s => Circuit.Energies(s).Linkage), 5e-7);
    }

    [Theory]
    [InlineData("saturating")]
    [InlineData("linear")]
    public void AgreesWithTheIndependentLibraryWithinBothUncertainties(string name)
    {
        JsonElement found = Independent(name);
        JsonElement permeability = found.GetProperty("relative_permeability");
        MagneticLaw law = permeability.ValueKind == JsonValueKind.Null ? new FroehlichLaw(2.15, 2000) : new LinearLaw(permeability.GetDouble());

        SolvedMagnet solved = Solve(new SolveOptions { Accuracy = 1e-5 }, law);

        var local = new OneOrderUp(solved);
        foreach ((string quantity, string unit, Estimate obtained) in new[]
        {
            ("Bz", "T", Bz(solved)), ("dBz/dz", "T/m", DBzDz(solved)), ("J.A", "J/m", local.Of(s => Circuit.Energies(s).Linkage)),
            ("B at (0, 2.5)", "T", local.Magnitude(new Point(0, 0.0025))), ("B at (62.5, 4)", "T", local.Magnitude(new Point(0.0625, 0.004))),
        })
        {
            JsonElement truth = found.GetProperty("values").GetProperty(quantity);
            double uncertainty = truth.GetProperty("uncertainty").GetDouble();
            record.Check(
                Library, $"{name}: {quantity}, {unit}", truth.GetProperty("value").GetDouble(), obtained.Value,
                Allowed.Absolute(obtained.Bar + uncertainty, FormattableString.Invariant($"own error bar, library's uncertainty {uncertainty:g1}")));
        }
    }

    internal static SolvedMagnet Solve(SolveOptions options, MagneticLaw? law = null) =>
        MagnetSolver.Solve(Magnet(law), Aperture.Rectangle(ProblemP.Beam, 1.5e-3, 0.3e-3), options);

    internal static Magnet Magnet(MagneticLaw? law = null) =>
        new() { Section = ProblemP.Section(), Roles = Roles(law ?? new FroehlichLaw(2.15, 2000)) };

    private static Estimate Bz(SolvedMagnet solved) => new(solved.Report.Beam.Bz, solved.Report.FieldError);

    private static Estimate DBzDz(SolvedMagnet solved) => new(solved.Report.Beam.DBzDz, solved.Report.GradientError);

    private static JsonElement Independent(string name)
    {
        string file = Path.Combine(ResultJsonTests.RepositoryRoot(), "tests", "PoleField.Tests", "Verification", "independent", "model_problem.json");
        JsonElement cases = JsonDocument.Parse(File.ReadAllBytes(file)).RootElement.GetProperty("cases");
        return cases.EnumerateArray().Single(c => c.GetProperty("name").GetString() == name);
    }

    private static IReadOnlyList<PartRole> Roles(MagneticLaw law)
    {
        var iron = new Material("iron", law, "model", "reference problem", "exact");
        CrossSection section = ProblemP.Section();
        return [.. section.Parts.Select(name => name == "iron"
            ? new PartRole(name, iron)
            : new PartRole(name, Material.Air) { AmpereTurns = name.Contains("right", StringComparison.Ordinal) ? -1500 : 1500 })];
    }
}
