using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>
/// How the beam's numbers follow every face, part, current and material: one solve with the factored tangent per quantity
/// (the adjoint) gives all of its derivatives at once.
/// </summary>
public sealed class Sensitivity
{
    private const double BeamStep = 1e-3; // of the aperture's diagonal, for differences of the exactly harmonic field

    private readonly FieldSolution _solution;
    private readonly BeamField _field;
    private readonly ApertureSamples _samples;
    private readonly BeamExtraction _extraction;
    private readonly TangentSystem _tangent;
    private readonly FaceTraces _faces;

    private Sensitivity(FieldSolution solution, BeamField field, BeamExtraction extraction, TangentSystem tangent)
    {
        _solution = solution;
        _field = field;
        _extraction = extraction;
        _tangent = tangent;
        _samples = ApertureSamples.Of(field.Aperture, new ApertureShape(field.Aperture));
        Measures = BeamMeasures.Of(field, _samples);
        _faces = new FaceTraces(solution);
    }

    /// <summary>Gauss points of all faces between different materials, in the order of the section's edges and along each.</summary>
    public IReadOnlyList<FacePoint> Points => _faces.Points;

    /// <summary>The magnet.</summary>
    public Magnet Magnet => _solution.Magnet;

    /// <summary>The section.</summary>
    public CrossSection Section => _solution.Mesh.Section;

    internal BeamMeasures Measures { get; }

    internal double[] SampleWeights => _samples.Weights;

    /// <summary>
    /// Takes one Newton step in the next order of elements and factors the tangent there: traces at faces need the digits.
    /// </summary>
    /// <param name="solved">Solved magnet.</param>
    /// <param name="threads">Threads, at least 1.</param>
    public static Sensitivity Of(SolvedMagnet solved, int threads = 1)
    {
        FieldProblem problem = solved.Solution.Problem;
        double[] chi = BandCutOff.Nodal(problem, new ApertureShape(solved.Field.Aperture))
            ?? throw new InvalidOperationException("A solved magnet has a band of air around its aperture.");
        HigherOrderStep higher = HigherOrderStep.From(solved.Solution, threads, CancellationToken.None);
        var solution = new FieldSolution(higher.Problem, higher.Potential, solved.Solution.History);
        BeamExtraction extraction = BeamExtraction.Create(higher.Problem.Space, higher.Lift.Up(chi));
        return new Sensitivity(
            solution,
            extraction.FieldOf(solved.Field.Aperture, higher.Potential),
            extraction,
            new FieldEquations(higher.Problem, threads).TangentAt(higher.Potential));
    }

    internal static Sensitivity Of(FixedMeshSolve solve) =>
        new(solve.Solution, solve.Field, solve.Extraction, solve.Equations.TangentAt(solve.Solution.Potential));

    /// <summary>Derivatives of the quantities, in their order.</summary>
    public IReadOnlyList<QuantityDerivatives> Derivatives(IReadOnlyList<DesignQuantity> quantities)
    {
        double[][] adjoints = Adjoints([.. quantities.Select(q => q.Terms(Measures, _samples.Weights))]);
        double step = BeamStep * _field.Aperture.Outline.Bounds.Diagonal;
        BeamMeasures[] shifted =
        [
            .. new[] { new Point(step, 0), new(-step, 0), new(0, step), new(0, -step) }
                .Select(by => BeamMeasures.Of(_field, _samples.ShiftedBy(by))),
        ];
        return [.. quantities.Select((q, k) => Collect(q, adjoints[k], [.. shifted.Select(m => q.Value(m))], step))];
    }

    /// <summary>Derivative densities at <see cref="Points"/> on the iron of sums of terms, one sum per row.</summary>
    internal double[][] Densities(IReadOnlyList<IReadOnlyList<BeamTerm>> sums)
    {
        bool touches = _faces.TouchesConductor;
        return
        [
            .. Adjoints(sums).Select(a => _faces.Density(
                a, touches ? Means(MaterialDerivatives.Of(_solution, a)) : new double[Section.Regions.Count])),
        ];
    }

    private double[][] Adjoints(IReadOnlyList<IReadOnlyList<BeamTerm>> sums) =>
        _tangent.Solve([.. sums.Select(_extraction.Functional)]);

    private static double[] Means(MaterialDerivatives[] regions) => [.. regions.Select(r => r.Mean)];

    private QuantityDerivatives Collect(DesignQuantity quantity, double[] adjoint, double[] shifted, double step)
    {
        MaterialDerivatives[] regions = MaterialDerivatives.Of(_solution, adjoint);
        double[] density = _faces.Density(adjoint, Means(regions));
        return new QuantityDerivatives
        {
            Quantity = quantity,
            Value = quantity.Value(Measures),
            Density = density,
            Parts = [.. Enumerable.Range(0, Section.Parts.Count).Select(part => PartOf(part, density, regions))],
            BeamPlace = new Point((shifted[0] - shifted[1]) / (2 * step), (shifted[2] - shifted[3]) / (2 * step)),
        };
    }

    private PartDerivatives PartOf(int part, double[] density, MaterialDerivatives[] regions)
    {
        Box box = Box.Empty;
        MaterialDerivatives own = default;
        for (int r = 0; r < regions.Length; r++)
        {
            if (Section.Regions[r].Part == part)
            {
                box = box.Including(Section.Regions[r].Bounds);
                own = own with
                {
                    AmpereTurns = own.AmpereTurns + regions[r].AmpereTurns,
                    Saturation = own.Saturation + regions[r].Saturation,
                    Remanence = own.Remanence + regions[r].Remanence,
                    Turn = own.Turn + regions[r].Turn,
                };
            }
        }

        Point pivot = box.IsEmpty ? default : box.Centre;
        Point shift = default;
        double turn = own.Turn;
        for (int i = 0; i < density.Length; i++)
        {
            FacePoint p = Points[i];
            if (Section.Regions[p.Inner].Part == part != (Section.Regions[p.Outer].Part == part))
            {
                Point push = (density[i] * p.Length) * p.Outward;
                shift += push;
                turn += push.Dot((p.At - pivot).Perpendicular);
            }
        }

        return new PartDerivatives(shift, turn, pivot, own.AmpereTurns, own.Saturation, own.Remanence);
    }
}
