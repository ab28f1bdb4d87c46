// Truth: a functional of a finite-element solution converges like h²ᵖ (Babuška and Miller 1984); the solution is the closed
// form of two line currents, and that of a permeable cylinder beside them by images.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class ConvergenceOrderTests(VerificationRecord record)
{
    private const double A = 3.0; // mm

    private static readonly VerificationCase Case = new(
        "Order of convergence of field and gradient, two wires, meshes refined uniformly",
        "A functional of elements of order p converges as h²ᵖ (Babuška and Miller 1984): halvings of the error per halving of h over 2p.");

    [Theory]
    [InlineData(2, 2)]
    [InlineData(3, 2)]
    [InlineData(4, 1)]
    public void FieldAndGradientConvergeWithTwiceTheElementsOrder(int order, int refinements)
    {
        var exact = new TwoWires(A / 1000, 10_000);
        Magnet magnet = new Drawn()
            .Circle("WIRE RIGHT", A, 0, 1.0)
            .Circle("WIRE LEFT", -A, 0, 1.0)
            .Part("WIRE RIGHT", Material.Air, 10_000)
            .Part("WIRE LEFT", Material.Air, -10_000)
            .Magnet();
        Aperture aperture = Drawn.Beam(0, 1.2 * A, 1.5, 0.6);
        Mesh mesh = Mesher.Mesh(magnet.Section, SizeField.FromSources(0.9e-3, 0.35, []), new MeshOptions { OpenCircleRatio = 1.7 });
        var field = new List<double>();
        var gradient = new List<double>();

        for (int level = 0; level <= refinements; level++)
        {
            BeamField beam = Extract(magnet, mesh, order, aperture);
            field.Add(WorstError(beam, v => v.Field, p => exact.Magnitude(p)));
            gradient.Add(WorstError(beam, v => v.Gradient, p => exact.Gradient(p)));
            mesh = UniformRefinement.Of(mesh);
        }

        // Halving h divides the error by 2²ᵖ, to within a quarter of that rate, since the coarsest mesh is hardly in the
        // asymptotic range.
        double rate = 2 * order * refinements;
        string at = FormattableString.Invariant($"order {order}: ");
        record.Check(Case, at + "of the field's worst error over 2p", 1, Math.Log2(field[0] / field[^1]) / rate, Allowed.Absolute(0.25, "coarsest mesh hardly asymptotic"));
        record.Check(Case, at + "of the gradient's worst error over 2p", 1, Math.Log2(gradient[0] / gradient[^1]) / rate, Allowed.Absolute(0.25, "coarsest mesh hardly asymptotic"));
    }

    private static double WorstError(BeamField beam, Func<BeamValues, double> value, Func<Point, double> truth)
    {
        var samples = ApertureSamples.Of(beam.Aperture, new ApertureShape(beam.Aperture));
        return samples.Inside.Concat(samples.Edge).Max(p => Math.Abs((value(beam.At(p)) - truth(p)) / truth(p)));
    }

    private static BeamField Extract(Magnet magnet, Mesh mesh, int order, Aperture aperture)
    {
        FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), order);
        FieldProblem problem = FieldProblem.Create(magnet, space);
        (double[] potential, _) = FieldSolver.Solve(new FieldEquations(problem));
        double[] chi = Assert.IsType<double[]>(BandCutOff.Nodal(problem, new ApertureShape(aperture)));
        return BeamExtraction.Create(space, chi).FieldOf(aperture, potential);
    }
}
