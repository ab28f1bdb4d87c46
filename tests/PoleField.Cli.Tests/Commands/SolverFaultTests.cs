// Truth: the written contract of the exit status for inputs the solver gives up on.
using PoleField.Cli.Tests.Doubles;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;

namespace PoleField.Cli.Tests.Commands;

public sealed class SolverFaultTests
{
    [Fact]
    public async Task ASectionThatCannotBeMeshedIsAFaultOfTheSketchWithItsPlace()
    {
        using var folder = new CaseFolder();
        Pipeline pipeline = Steps.Sound with { Solve = (_, _, _, _, _) => throw new MeshingException("Curves come too close.", new Point(1.5e-3, -2e-3)) };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(2, run.Status);
        Assert.Contains("fault: at (1.5, -2) mm: Curves come too close.", run.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("PoleField itself", run.Error, StringComparison.Ordinal);
        Assert.False(File.Exists(folder["out.json"]));
    }

    [Fact]
    public async Task AFieldThatDoesNotConvergeIsNotMetWithHowFarItCame()
    {
        using var folder = new CaseFolder();
        NewtonStep[] history = [new(-1, 0.5, 1), new(-2, 0.02, 0.25)];
        Pipeline pipeline = Steps.Sound with { Solve = (_, _, _, _, _) => throw new FieldNotConvergedException(history) };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(3, run.Status);
        Assert.Contains("after 2 Newton steps", run.Error, StringComparison.Ordinal);
        Assert.Contains("5e-1, 2e-2", run.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("PoleField itself", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ASolveReadsOnlyTheCurvesItsCaseNames()
    {
        using var folder = new CaseFolder();
        var asked = new List<string>();
        MaterialShelf shelf = Steps.Sound.Materials;
        Pipeline pipeline = Steps.Sound with
        {
            Materials = new MaterialShelf([.. shelf.Names, "other-iron"], name => { asked.Add(name); return shelf.Get(name); }),
        };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(0, run.Status);
        Assert.Equal(["pure-iron"], asked.Distinct());
    }

    [Fact]
    public async Task AMaterialTellsItsCautionAndWhatWasFoundInItsTable()
    {
        Material careful = new("pure-iron", new LinearLaw(5000), "Invented iron", "invented", "invented") { Caution = "batches differ" };
        Pipeline pipeline = Steps.Sound with { Materials = MaterialShelf.Of(Material.Air, careful) };

        Run cautious = await Run.Of(pipeline, "materials", "pure-iron");
        Run found = await Run.Of(Pipeline.OfLibrary(), "materials", "cobalt-iron-49");

        Assert.Contains("mind    batches differ", cautious.Out, StringComparison.Ordinal);
        Assert.Contains("extrapolated", found.Out, StringComparison.Ordinal);
    }
}
