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

    private readonly LinearisedField _linear;
    private readonly ApertureSamples _samples;
    private readonly FaceTraces _faces;
    private readonly int _threads;

    private Sensitivity(LinearisedField linear, int threads)
    {
        (_linear, _threads) = (linear, threads);
        _samples = ApertureSamples.Of(linear.Field.Aperture, new ApertureShape(linear.Field.Aperture));
        Measures = BeamMeasures.Of(linear.Field, _samples);
        _faces = new FaceTraces(linear.Solution);
    }

    /// <summary>Gauss points of all faces between different materials, in the order of the section's edges and along each.</summary>
    public IReadOnlyList<FacePoint> Points => _faces.Points;

    /// <summary>The magnet.</summary>
    public Magnet Magnet => _linear.Solution.Magnet;

    /// <summary>The section.</summary>
    public CrossSection Section => _linear.Solution.Mesh.Section;

    internal BeamMeasures Measures { get; }

    internal double[] SampleWeights => _samples.Weights;

    /// <summary>Takes one Newton step in the next order of elements and factors the tangent there.</summary>
    /// <param name="solved">Solved magnet.</param>
    /// <param name="threads">Threads, at least 1.</param>
    public static Sensitivity Of(SolvedMagnet solved, int threads = 1) => new(LinearisedField.Of(solved, threads), threads);

    internal static Sensitivity Of(FixedMeshSolve solve, int threads = 1) => new(LinearisedField.Of(solve), threads);

    /// <summary>Derivatives of the quantities, in their order.</summary>
    public IReadOnlyList<QuantityDerivatives> Derivatives(IReadOnlyList<DesignQuantity> quantities)
    {
        double[][] adjoints = Adjoints([.. quantities.Select(q => q.Terms(Measures, _samples.Weights))]);
        double step = BeamStep * _linear.Field.Aperture.Outline.Bounds.Diagonal;
        BeamMeasures[] shifted =
        [
            .. new[] { new Point(step, 0), new(-step, 0), new(0, step), new(0, -step) }
                .Select(by => BeamMeasures.Of(_linear.Field, _samples.ShiftedBy(by))),
        ];
        PartResponses parts = Responses();
        return [.. quantities.Select((q, k) => Collect((q, parts), adjoints[k], [.. shifted.Select(m => q.Value(m))], step))];
    }

    /// <summary>Derivative densities at <see cref="Points"/> on the iron of sums of terms, one sum per row.</summary>
    internal double[][] Densities(IReadOnlyList<IReadOnlyList<BeamTerm>> sums)
    {
        bool touches = _faces.TouchesConductor;
        return
        [
            .. Adjoints(sums).Select(a => _faces.Density(
                a, touches ? Means(MaterialDerivatives.Of(_linear.Solution, a)) : new double[Section.Regions.Count])),
        ];
    }

    private double[][] Adjoints(IReadOnlyList<IReadOnlyList<BeamTerm>> sums) =>
        _linear.Tangent.Solve([.. sums.Select(_linear.Extraction.Functional)]);

    private static double[] Means(MaterialDerivatives[] regions) => [.. regions.Select(r => r.Mean)];

    private QuantityDerivatives Collect((DesignQuantity Quantity, PartResponses Parts) of, double[] adjoint, double[] shifted, double step)
    {
        MaterialDerivatives[] regions = MaterialDerivatives.Of(_linear.Solution, adjoint);
        return new QuantityDerivatives
        {
            Quantity = of.Quantity,
            Value = of.Quantity.Value(Measures),
            Density = _faces.Density(adjoint, Means(regions)),
            Parts = [.. Enumerable.Range(0, Section.Parts.Count).Select(part => PartOf(part, of, regions))],
            BeamPlace = new Point((shifted[0] - shifted[1]) / (2 * step), (shifted[2] - shifted[3]) / (2 * step)),
        };
    }

    // Every part that is not the same as its surroundings, moved as a whole.
    private PartResponses Responses()
    {
        bool Differ(SectionEdge e) => e.Left < 0 || e.Right < 0 || _faces.Differ(e.Left, e.Right);
        int[] parts =
        [
            .. Enumerable.Range(0, Section.Parts.Count).Where(part => Section.Edges.Any(e =>
                e.Left >= 0 && e.Right >= 0 && Section.Regions[e.Left].Part == part != (Section.Regions[e.Right].Part == part) && Differ(e))),
        ];
        var velocities = new PartVelocities(Section, [.. parts.Select(p => (p, PivotOf(p)))], Differ);
        var motion = MeshMotion.Of(_linear.Solution.Problem.Space, _linear.Chi, velocities);
        Point[] places = [_samples.Centre, .. _samples.Inside, .. _samples.Edge];
        MotionResponse[] responses = MotionResponses.Of(_linear, motion, _threads);
        var changes = new Dictionary<Point, BeamValues>[responses.Length];
        Parallel.For(0, responses.Length, new ParallelOptions { MaxDegreeOfParallelism = _threads }, k =>
            changes[k] = places.Distinct().ToDictionary(p => p, responses[k].Field.At));
        return new PartResponses(parts, changes);
    }

    private Point PivotOf(int part)
    {
        Box box = Box.Empty;
        foreach (Region region in Section.Regions.Where(r => r.Part == part))
        {
            box = box.Including(region.Bounds);
        }

        return box.IsEmpty ? default : box.Centre;
    }

    private PartDerivatives PartOf(int part, (DesignQuantity Quantity, PartResponses Responses) of, MaterialDerivatives[] regions)
    {
        MaterialDerivatives own = default;
        for (int r = 0; r < regions.Length; r++)
        {
            own = Section.Regions[r].Part == part ? own.Plus(regions[r]) : own;
        }

        int moved = Array.IndexOf(of.Responses.Parts, part);
        IReadOnlyList<BeamTerm> terms = of.Quantity.Terms(Measures, _samples.Weights);
        double By(int k) => moved < 0 ? 0 : BeamChange.Of(terms, of.Responses.Changes[(3 * moved) + k]);
        return new PartDerivatives(
            new Point(By(0), By(1)), By(2) + own.Turn, PivotOf(part), own.AmpereTurns, own.Saturation, own.Remanence);
    }

    /// <param name="Parts">Parts that were moved.</param>
    /// <param name="Changes">Field of each one's shift along y, along z and turn, by place.</param>
    private sealed record PartResponses(int[] Parts, Dictionary<Point, BeamValues>[] Changes);
}
