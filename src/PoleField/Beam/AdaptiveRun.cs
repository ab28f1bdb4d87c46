using System.Diagnostics;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>What every run needs beside its magnet: accuracy, progress and the wish to stop.</summary>
internal sealed record RunSettings(SolveOptions Options, Action<SolveProgress>? Progress, CancellationToken Cancellation);

/// <summary>One run for the beam in one magnet: its state between solves.</summary>
internal sealed class AdaptiveRun(Magnet magnet, BeamPlace place, RunSettings settings)
{
    // The rules' own mesh reaches about 2e-5 with third-order elements on saturated poles with corners (measured), and the
    // error falls like the sixth power of the element size.
    private const double RuleAccuracy = 2e-5;
    private const double RuleOrder = 6.0;
    private const double Finest = 0.7;
    private const double Coarsest = 1.6;

    // A run that gains less than this in so many meshes is at the end of what refinement can do.
    private const double LeastGain = 0.5;
    private const int PatientMeshes = 3;

    // So often the elements around the aperture are halved to make room for a band before it is done without.
    private const int MostHalvings = 4;
    private const double LocalFitReduction = 0.7;

    private readonly SolveOptions _options = settings.Options;
    private readonly CancellationToken _cancellation = settings.Cancellation;
    private readonly Stopwatch _meshing = new();
    private readonly Stopwatch _solving = new();
    private readonly Stopwatch _evaluating = new();
    private readonly List<MeshRound> _rounds = [];
    private double _openDiscSize = new MeshOptions().OpenDiscSize;
    private double _accuracy = double.NaN;

    /// <summary>Meshes, solves, estimates and refines until the asked accuracy is reached.</summary>
    public SolvedMagnet ToAccuracy()
    {
        SizeField size = MeshSizing.For(
            magnet.Section, place.Aperture.Outline, magnet.MagneticParts, Fineness(_options.Accuracy));
        FieldSolution? previous = null;
        int halvings = 0;
        for (int step = 1; ; step++)
        {
            (FieldSolution solution, FieldEquations equations) = SolveOn(NewMesh(size, step), step, previous);
            previous = solution;
            double[]? chi = Band(solution.Problem);
            if (chi is null && !place.Touches && halvings++ < MostHalvings)
            {
                size = WithFinerAperture(size, 0.5);
                continue;
            }

            BeamEstimate estimate = Estimate(solution, equations, chi, step);
            bool done = _accuracy <= _options.Accuracy || IsStuck();
            if (done || step > _options.MostAdaptiveSteps || 4 * equations.PotentialCount > _options.MostUnknowns)
            {
                return Finish(estimate, equations, step);
            }

            size = NextSize(size, estimate);
        }
    }

    /// <summary>Solves on the mesh of another solution of the same section, from its potential times a scale, and estimates the error.</summary>
    public SolvedMagnet OnMeshOf(FieldSolution other, double scale)
    {
        (FieldSolution solution, FieldEquations equations) = SolveOn(other.Mesh, 1, other, scale);
        return Finish(Estimate(solution, equations, Band(solution.Problem), 1), equations, 1);
    }

    private double[]? Band(FieldProblem problem) => place.Touches ? null : BandCutOff.Nodal(problem, place.Shape);

    private SizeField NextSize(SizeField size, BeamEstimate estimate)
    {
        _evaluating.Start();
        var refinement = new Refinement(estimate, _options.Accuracy);
        SizeField next = refinement.Next(size);
        _openDiscSize *= refinement.OfOpenDisc();

        // The adjoint sees the elements' error, not what a fitted polynomial of limited degree leaves out.
        next = estimate.Field.Method == BeamFieldMethod.LocalFits ? WithFinerAperture(next, LocalFitReduction) : next;
        _evaluating.Stop();
        return next;
    }

    private SizeField WithFinerAperture(SizeField size, double factor)
    {
        IEnumerable<Point> places = place.Shape.EdgePoints(PointsPerSide()).Concat(place.Samples.Inside);
        return size.With([.. places.Select(p => (p, factor * size.At(p)))]);
    }

    private bool IsStuck() => _rounds.Count > PatientMeshes
        && !(_rounds.TakeLast(PatientMeshes).Min(r => r.Accuracy) < LeastGain * _rounds[^(PatientMeshes + 1)].Accuracy);

    private static double Fineness(double accuracy) =>
        Math.Clamp(Math.Pow(accuracy / RuleAccuracy, 1 / RuleOrder), Finest, Coarsest);

    // Close enough that no large element is left between two of them.
    private int PointsPerSide()
    {
        Box box = place.Aperture.Outline.Bounds;
        return (int)Math.Clamp(Math.Ceiling(2 * Math.Max(box.Width, box.Height) / place.Clearance), 8, 200);
    }

    private InputException TooLarge(int unknowns) => new(
    [
        new Finding(
            Severity.Fault,
            "too-large",
            FormattableString.Invariant(
                $"The mesh has {unknowns} unknowns and needs about {unknowns * (double)SolveOptions.BytesPerUnknown / 1e9:0.0#} GB; there is room for {_options.MostUnknowns} unknowns."),
            "Ask for less accuracy, simplify outlines with tiny steps or radii, or use a machine with more memory."),
    ]);

    private Mesh NewMesh(SizeField size, int step)
    {
        Report("mesh", step, 0, 0, double.NaN);
        _meshing.Start();
        Mesh mesh = Mesher.Mesh(magnet.Section, size, new MeshOptions { OpenDiscSize = _openDiscSize, Enclosed = EnclosedPlaces.Around(magnet, place.Aperture) }, _cancellation);
        _meshing.Stop();
        return mesh;
    }

    private (FieldSolution Solution, FieldEquations Equations) SolveOn(
        Mesh mesh, int step, FieldSolution? previous, double scale = 1.0)
    {
        _solving.Start();
        FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), _options.Order);
        if (step == 1 && space.NodeCount > _options.MostUnknowns)
        {
            throw TooLarge(space.NodeCount);
        }

        FieldProblem problem = FieldProblem.Create(magnet, space);
        var equations = new FieldEquations(problem, _options.Threads);
        double[]? start = previous is not null && equations.IsNonlinear ? Start(previous, equations, scale) : null;
        Report("solve", step, equations.PotentialCount, 0, double.NaN);
        (double[] potential, IReadOnlyList<NewtonStep> history) = FieldSolver.Solve(
            equations,
            start,
            (k, newton) => Report("solve", step, equations.PotentialCount, k, newton.Decrement),
            _cancellation);
        _solving.Stop();
        return (new FieldSolution(problem, potential, history), equations);
    }

    private static double[] Start(FieldSolution previous, FieldEquations equations, double scale)
    {
        FiniteElementSpace space = equations.Problem.Space;
        bool sameNodes = ReferenceEquals(previous.Mesh, space.Mesh) && previous.Order == space.Order;
        double[] start = sameNodes ? (double[])previous.Potential.Clone() : previous.InterpolatedTo(space);
        for (int node = 0; node < start.Length; node++)
        {
            start[node] *= scale;
        }

        equations.ApplyFixedValues(start);
        return start;
    }

    private BeamEstimate Estimate(FieldSolution solution, FieldEquations equations, double[]? chi, int step)
    {
        _evaluating.Start();
        Report("estimate", step, equations.PotentialCount, 0, double.NaN);
        BeamEstimate estimate = BeamEstimate.Of(solution, chi, place, _options.Threads, _cancellation);
        _accuracy = estimate.Accuracy;
        _rounds.Add(new MeshRound(solution.Mesh.TriangleCount, equations.PotentialCount, _accuracy, solution.History));
        _evaluating.Stop();
        return estimate;
    }

    private SolvedMagnet Finish(BeamEstimate estimate, FieldEquations equations, int steps)
    {
        _evaluating.Start();
        FieldSolution solution = estimate.Solution;
        BeamReport report = estimate.Report(place, _options.Accuracy);
        _evaluating.Stop();
        var record = new SolveRecord(
            solution.Mesh.TriangleCount,
            equations.PotentialCount,
            solution.Order,
            MeshQuality.Of(solution.Mesh).SmallestAngleDegrees,
            _rounds.Sum(r => r.NewtonSteps),
            steps - 1,
            _accuracy,
            _options.Accuracy)
        {
            Rounds = _rounds,
            MeshSeconds = _meshing.Elapsed.TotalSeconds,
            SolveSeconds = _solving.Elapsed.TotalSeconds,
            EvaluateSeconds = _evaluating.Elapsed.TotalSeconds,
        };
        return new SolvedMagnet(solution, estimate.Field, report, record);
    }

    private void Report(string what, int step, int unknowns, int newton, double residual) =>
        settings.Progress?.Invoke(new SolveProgress(what, step, unknowns, newton, residual, _accuracy));
}
