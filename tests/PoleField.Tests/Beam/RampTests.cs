// Truth: Ampère's law and superposition (a linear magnet's field is proportional to its current; saturating iron gives ever
// less per ampere-turn); the closed form B + μ0 H = 2 B0 for what a solve on a given mesh must reproduce.
using PoleField.Beam;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Beam;

public sealed class RampTests
{
    private static readonly SolveOptions Coarse = new() { Accuracy = 1e-3, Threads = 2 };

    [Fact]
    public void ALinearMagnetHasTheSameGradientPerAmpereTurnAllTheWayAndNoOnset()
    {
        SolvedMagnet full = Solve(new Material("linear", new LinearLaw(500), "linear", "test", "exact"), 4000);

        RampReport ramp = Ramp.Of(full, new RampSettings([0.5, 1, 3]), Coarse);

        double expected = Math.Abs(full.Report.Beam.Gradient) / full.Report.Circuit.AmpereTurns;
        Assert.All(ramp.Steps, s => Assert.Equal(1.0, s.GradientPerAmpereTurn / expected, 1e-9));
        Assert.Equal([0.5, 1.0, 3.0], ramp.Steps.Select(s => s.AmpereTurns / full.Report.Circuit.AmpereTurns));
        Assert.Null(ramp.OnsetFactor);
        Assert.Null(ramp.FirstSaturated);
        Assert.All(ramp.Steps.Skip(1), s => Assert.Equal(ramp.Steps[0].ShapeFactor, s.ShapeFactor));
    }

    [Fact]
    public void SaturatingIronGivesEverLessPerAmpereTurnAndTheOnsetIsWhereTheFallIsReached()
    {
        SolvedMagnet full = Solve(MaterialLibrary.Get("pure-iron"), 20_000);

        RampReport ramp = Ramp.Of(full, new RampSettings([0.25, 0.5, 1, 1.5, 2], 0.05), Coarse);

        double[] efficiency = [.. ramp.Steps.Select(s => s.Report.Circuit.Efficiency!.Value)];
        Assert.All(Enumerable.Range(2, 3), k => Assert.True(efficiency[k] < efficiency[k - 1]));
        Assert.All(ramp.Steps, s => Assert.InRange(s.NewtonSteps, 1, 7));
        Assert.Equal("RIDGE", ramp.FirstSaturated!.Value.Layer);
        double onset = Assert.NotNull(ramp.OnsetFactor);

        // An independent solve with a mesh of its own at that excitation.
        SolvedMagnet there = MagnetSolver.Solve(
            full.Solution.Magnet.WithCurrentsScaled(onset), full.Field.Aperture, Coarse);
        double best = ramp.Steps.Append(ramp.Start).Max(s => s.GradientPerAmpereTurn);
        double perTurn = Math.Abs(there.Report.Beam.Gradient) / there.Report.Circuit.AmpereTurns;
        Assert.Equal(0.95, perTurn / best, 2e-3);
    }

    [Fact]
    public void ASolveOnAGivenMeshIsTheSolveOfItsOwn()
    {
        SolvedMagnet full = Solve(MaterialLibrary.Get("pure-iron"), 20_000);

        SolvedMagnet again = MagnetSolver.SolveOnMeshOf(full.Solution.Magnet, full, Coarse);

        Assert.Equal(full.Report.Beam.Gradient, again.Report.Beam.Gradient, 1e-9 * Math.Abs(full.Report.Beam.Gradient));
        Assert.Equal(full.Report.GradientError, again.Report.GradientError, 1e-3 * full.Report.GradientError);
        Assert.Equal(full.Record.Triangles, again.Record.Triangles);
        Assert.InRange(again.Record.NewtonSteps, 1, 2);
        Assert.Throws<ArgumentException>(
            () => MagnetSolver.SolveOnMeshOf(full.Solution.Magnet with { Section = Rods(Material.Air, 1).Section }, full));
    }

    [Fact]
    public void AMagnetWithoutCurrentsCannotBeRamped()
    {
        SolvedMagnet full = Solve(new Material("linear", new LinearLaw(500), "linear", "test", "exact"), 4000);
        SolvedMagnet none = full with
        {
            Report = full.Report with { Circuit = full.Report.Circuit with { AmpereTurns = 0 } },
        };

        Assert.Equal("no-ampere-turns", Assert.Throws<InputException>(() => Ramp.Of(none, new RampSettings([1]))).Findings[0].What);
    }

    private static SolvedMagnet Solve(Material iron, double ampereTurns) =>
        MagnetSolver.Solve(Rods(iron, ampereTurns), Drawn.Beam(0, 3.9, 1, 0.2), Coarse);

    // A thin rod under a thick one, driven by conductors beside the thin one: smooth iron, so that coarse meshes do.
    private static Magnet Rods(Material iron, double ampereTurns) => new Drawn()
        .Circle("RIDGE", 0, 0, 3)
        .Circle("BLOCK", 0, 10.8, 6)
        .Circle("COIL LEFT", -6, 0, 2)
        .Circle("COIL RIGHT", 6, 0, 2)
        .Part("RIDGE", iron)
        .Part("BLOCK", iron)
        .Part("COIL LEFT", Material.Air, -ampereTurns)
        .Part("COIL RIGHT", Material.Air, ampereTurns)
        .Magnet();
}
