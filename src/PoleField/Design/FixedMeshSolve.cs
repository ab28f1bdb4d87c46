using PoleField.Beam;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Design;

/// <summary>A magnet solved on one mesh, without estimate and refinement: what design steps compare.</summary>
internal sealed record FixedMeshSolve
{
    private const int MostAttempts = 4;

    public required FieldSolution Solution { get; init; }

    public required FieldEquations Equations { get; init; }

    public required BeamExtraction Extraction { get; init; }

    /// <summary>The extraction's cut-off by node.</summary>
    public required double[] Chi { get; init; }

    public required BeamField Field { get; init; }

    public required BeamMeasures Measures { get; init; }

    /// <summary>Meshes by the rules and solves, from a neighbour's solution if there is one.</summary>
    /// <exception cref="MeshingException">The section cannot be meshed, or the mesh leaves no band of air around the aperture.</exception>
    /// <exception cref="FieldNotConvergedException">The field did not converge.</exception>
    public static FixedMeshSolve Of(Magnet magnet, FixedMeshOptions options, FieldSolution? neighbour = null)
    {
        Aperture aperture = options.Aperture;
        var shape = new ApertureShape(aperture);
        int[] magnetic = magnet.MagneticParts;
        SizeField size = options.Size ?? MeshSizing.For(magnet.Section, aperture.Outline, magnetic, options.Fineness);
        for (int attempt = 0; ; attempt++)
        {
            Mesh mesh = Mesher.Mesh(magnet.Section, size, new MeshOptions { Enclosed = EnclosedPlaces.Around(magnet, aperture) }, options.Cancellation);
            FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), options.Order);
            FieldProblem problem = FieldProblem.Create(magnet, space);
            if (BandCutOff.Nodal(problem, shape) is { } chi)
            {
                return OnSpace(problem, chi, options, neighbour);
            }

            if (attempt == MostAttempts)
            {
                throw new MeshingException("No band of air elements fits between the aperture and its surroundings.", aperture.Centre);
            }

            SizeField coarse = size;
            size = size.With([.. shape.EdgePoints(8).Select(p => (p, 0.5 * coarse.At(p)))]);
        }
    }

    private static FixedMeshSolve OnSpace(FieldProblem problem, double[] chi, FixedMeshOptions options, FieldSolution? neighbour)
    {
        var equations = new FieldEquations(problem, options.Threads);
        double[]? start = null;
        if (neighbour is not null && equations.IsNonlinear)
        {
            start = neighbour.InterpolatedTo(problem.Space);
            equations.ApplyFixedValues(start);
        }

        (double[] potential, IReadOnlyList<NewtonStep> history) =
            FieldSolver.Solve(equations, start, null, options.Cancellation);
        BeamExtraction extraction = BeamExtraction.Create(problem.Space, chi);
        BeamField field = extraction.FieldOf(options.Aperture, potential);
        return new FixedMeshSolve
        {
            Solution = new FieldSolution(problem, potential, history),
            Equations = equations,
            Extraction = extraction,
            Chi = chi,
            Field = field,
            Measures = BeamMeasures.Of(field, ApertureSamples.Of(options.Aperture, new ApertureShape(options.Aperture))),
        };
    }
}

/// <summary>How design steps solve.</summary>
/// <param name="Aperture">Where the beam flies.</param>
/// <param name="Threads">Threads, at least 1.</param>
internal sealed record FixedMeshOptions(Aperture Aperture, int Threads)
{
    /// <summary>Order of the elements.</summary>
    public int Order { get; init; } = 3;

    /// <summary>Factor on the rules' element sizes.</summary>
    public double Fineness { get; init; } = 1.0;

    /// <summary>Element sizes to use instead of the rules'.</summary>
    public SizeField? Size { get; init; }

    public CancellationToken Cancellation { get; init; }
}
