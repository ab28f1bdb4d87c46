// Truth: the energy is strictly convex, so that Newton's method with a line search converges from any start (Armijo 1966), its
// energies only fall, and all starts end at one solution.
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using Xunit;
using Xunit.Abstractions;

namespace PoleField.Tests.Magnetostatics;

public class NewtonTests(ITestOutputHelper output)
{
    private const int MostCold = 16;
    private const int MostNear = 5;
    private const int MostOnFinerMesh = 6; // the sharpest knees; 4 or 5 elsewhere
    private const double AmpereTurns = 2000;

    private static readonly double[] Excitations = [0.1, 0.3, 1, 2, 5, 10, 20];

    [Theory]
    [InlineData("steel-1008")]
    [InlineData("cobalt-iron-49")]
    [InlineData("pure-iron")]
    public void ConvergesColdAtAnyExcitationAndInFewStepsFromANeighbour(string material)
    {
        Magnet magnet = PolePair(material);
        Aperture aperture = Aperture.Rectangle(new Point(0, 3.6e-3), 3e-3, 0.3e-3);
        SizeField size = MeshSizing.For(magnet.Section, aperture.Outline, magnet.MagneticParts, 1.6);
        Mesh coarse = Mesher.Mesh(magnet.Section, size);
        Mesh fine = Mesher.Mesh(magnet.Section, size.Scaled(0.8));
        foreach (double factor in Excitations)
        {
            (FieldSolution cold, FieldEquations equations) = Solve(magnet.WithCurrentsScaled(factor), coarse, null);
            (FieldSolution stronger, _) = Solve(magnet.WithCurrentsScaled(1.05 * factor), coarse, cold);
            (FieldSolution refined, _) = Solve(magnet.WithCurrentsScaled(factor), fine, cold);
            (FieldSolution again, _) = Solve(magnet.WithCurrentsScaled(factor), coarse, stronger);
            output.WriteLine(FormattableString.Invariant(
                $"{material} {factor}: cold {Words(cold)}; 5 % more {Words(stronger)}; refined mesh {Words(refined)}"));

            Assert.InRange(cold.NewtonSteps, 1, MostCold);
            Assert.InRange(stronger.NewtonSteps, 1, MostNear);
            Assert.InRange(refined.NewtonSteps, 1, MostOnFinerMesh);

            // Both ends lie within a decrement of 1e-8 of the solution, in the energy norm; at one node it may be some times that.
            double most = cold.Potential.Max(Math.Abs);
            Assert.Equal(0.0, cold.Potential.Zip(again.Potential).Max(pair => Math.Abs(pair.First - pair.Second) / most), 1e-7);
            AssertEnergiesFall(cold, equations);
        }
    }

    private static void AssertEnergiesFall(FieldSolution solution, FieldEquations equations)
    {
        // Sums of some ten thousand terms are good to about 1e-13 of their sizes.
        double rounding = 1e-12 * equations.Evaluate(solution.Potential).FieldProduct;
        foreach ((NewtonStep before, NewtonStep after) in solution.History.Zip(solution.History.Skip(1)))
        {
            Assert.True(after.Energy <= before.Energy + rounding, $"{before.Energy} then {after.Energy}");
        }
    }

    private static string Words(FieldSolution solution) =>
        string.Join(" ", solution.History.Select(s => FormattableString.Invariant($"{s.Decrement:e0}{(s.TangentKept ? "k" : s.StepLength < 1 ? "s" : "")}")));

    private static (FieldSolution Solution, FieldEquations Equations) Solve(Magnet magnet, Mesh mesh, FieldSolution? near)
    {
        FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), 3);
        FieldProblem problem = FieldProblem.Create(magnet, space);
        var equations = new FieldEquations(problem, 2);
        double[]? start = near?.InterpolatedTo(space);
        if (start is not null)
        {
            equations.ApplyFixedValues(start);
        }

        (double[] potential, IReadOnlyList<NewtonStep> history) = FieldSolver.Solve(equations, start);
        return (new FieldSolution(problem, potential, history), equations);
    }

    private static Magnet PolePair(string material)
    {
        StartingSketch start = new TwoWirePair().Draw();
        SectionReading reading = Sectioning.Read(start.Sketch, new SectionRequest
        {
            PartLayers = [.. start.Parts.Select(p => p.Layer)],
            MaterialKeys = [.. start.Parts.Select(p => p.Layer)],
        });
        Material iron = MaterialLibrary.Get(material);
        return new Magnet
        {
            Section = Assert.IsType<CrossSection>(reading.Section),
            Roles = [.. start.Parts.Select(p => new PartRole(p.Layer, p.Share == 0 ? iron : Material.Air) { AmpereTurns = p.Share * AmpereTurns })],
        };
    }
}
