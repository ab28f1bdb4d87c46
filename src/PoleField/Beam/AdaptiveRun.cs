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

    private readonly SolveOptions _options = settings.Options;
    private readonly CancellationToken _cancellation = settings.Cancellation;
    private readonly Stopwatch _meshing = new();
    private readonly Stopwatch _solving = new();
    private readonly Stopwatch _evaluating = new();
    private readonly List<double> _accuracies = [];
    private double _openDiscSize = new MeshOptions().OpenDiscSize;
    private int _newtonSteps;
    private double _accuracy = double.NaN;

    /// <summary>Meshes, solves, estimates and refines until the asked accuracy is reached.</summary>
    public SolvedMagnet ToAccuracy()
    {
        SizeField size = MeshSizing.For(
            magnet.Section, place.Aperture.Outline, MagneticParts(magnet), Fineness(_options.Accuracy));
        FieldSolution? previous = null;
        for (int step = 1; ; step++)
        {
            (FieldSolution solution, FieldEquations equations) = SolveOn(NewMesh(size, step), step, previous);
            previous = solution;
            if (BandCutOff.Nodal(solution.Problem, place.Shape) is not { } chi)
            {
                size = size.With([.. place.Shape.EdgePoints(PointsPerSide()).Select(p => (p, 0.5 * size.At(p)))]);
                if (step > _options.MostAdaptiveSteps)
                {
                    throw NoBand();
                }

                continue;
            }

            BeamEstimate estimate = Estimate(solution, equations, chi, step);
            bool done = _accuracy <= _options.Accuracy || IsStuck();
            if (done || step > _options.MostAdaptiveSteps || 4 * equations.PotentialCount > _options.MostUnknowns)
            {
                return Finish(estimate, equations, step);
            }

            _evaluating.Start();
            double[][] indicators = estimate.Higher.Indicators(BeamGoals.Derivatives(estimate.Better, estimate.Corrected, place.Shape));
            double tolerance = _options.Accuracy / BeamEstimate.ErrorBarFactor;
            size = Refinement.Next(size, solution.Problem.Space, indicators, tolerance);
            _openDiscSize *= Refinement.OfOpenDisc(solution.Problem.Space, indicators, tolerance);
            _evaluating.Stop();
        }
    }

    /// <summary>Solves on the mesh of another solution of the same section, from its potential times a scale, and estimates the error.</summary>
    public SolvedMagnet OnMeshOf(FieldSolution other, double scale)
    {
        (FieldSolution solution, FieldEquations equations) = SolveOn(other.Mesh, 1, other, scale);
        double[] chi = BandCutOff.Nodal(solution.Problem, place.Shape) ?? throw NoBand();
        return Finish(Estimate(solution, equations, chi, 1), equations, 1);
    }

    private bool IsStuck()
    {
        _accuracies.Add(_accuracy);
        return _accuracies.Count > PatientMeshes && !(_accuracies.TakeLast(PatientMeshes).Min() < LeastGain * _accuracies[^(PatientMeshes + 1)]);
    }

    private static double Fineness(double accuracy) =>
        Math.Clamp(Math.Pow(accuracy / RuleAccuracy, 1 / RuleOrder), Finest, Coarsest);

    private static int[] MagneticParts(Magnet magnet) =>
        [.. Enumerable.Range(0, magnet.Roles.Count).Where(part => magnet.Roles[part].Material.IsMagnetic)];

    // Close enough that no large element is left between two of them.
    private int PointsPerSide()
    {
        Box box = place.Aperture.Outline.Bounds;
        return (int)Math.Clamp(Math.Ceiling(2 * Math.Max(box.Width, box.Height) / place.Clearance), 8, 200);
    }

    private MeshingException NoBand() =>
        new("No band of air elements fits between the aperture and its surroundings.", place.Aperture.Centre);

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
        _newtonSteps += history.Count;
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

    private BeamEstimate Estimate(FieldSolution solution, FieldEquations equations, double[] chi, int step)
    {
        _evaluating.Start();
        Report("estimate", step, equations.PotentialCount, 0, double.NaN);
        BeamEstimate estimate = BeamEstimate.Of(solution, chi, place, _options.Threads, _cancellation);
        _accuracy = estimate.Accuracy;
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
            _newtonSteps,
            steps - 1,
            _accuracy,
            _options.Accuracy)
        {
            MeshSeconds = _meshing.Elapsed.TotalSeconds,
            SolveSeconds = _solving.Elapsed.TotalSeconds,
            EvaluateSeconds = _evaluating.Elapsed.TotalSeconds,
        };
        return new SolvedMagnet(solution, estimate.Field, report, record);
    }

    private void Report(string what, int step, int unknowns, int newton, double residual) =>
        settings.Progress?.Invoke(new SolveProgress(what, step, unknowns, newton, residual, _accuracy));
}
