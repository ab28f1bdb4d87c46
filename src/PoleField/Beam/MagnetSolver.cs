using System.Diagnostics;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Mesh, solve, estimate, refine until the asked accuracy is reached.</summary>
public static class MagnetSolver
{
    private const double ErrorBarFactor = 3.0;     // with corners in saturated iron the estimate was seen low by up to 2.7

    // At one point contributions of many corners may cancel in the estimate and not in the error: on the model problem the
    // centre's field was seen off by 4.5 times its estimate, and by at most 1.9 times the largest one over the aperture.
    private const double LeastShare = 2.0;
    private const double QuadratureTolerance = 1e-9;

    // The rules' own mesh reaches about 1e-5 with third-order elements on saturated poles with corners (measured), and the
    // error falls like the sixth power of the element size.
    private const double RuleAccuracy = 1e-5;
    private const double RuleOrder = 6.0;
    private const double Finest = 0.7;
    private const double Coarsest = 1.6;

    /// <summary>Solves a magnet for the beam in an aperture.</summary>
    /// <exception cref="InputException">The aperture touches something that is not air, or lies outside the model.</exception>
    /// <exception cref="MeshingException">The section cannot be meshed.</exception>
    /// <exception cref="FieldNotConvergedException">The field did not converge.</exception>
    public static SolvedMagnet Solve(
        Magnet magnet,
        Aperture aperture,
        SolveOptions? options = null,
        Action<SolveProgress>? progress = null,
        CancellationToken cancellation = default)
    {
        options ??= new SolveOptions();
        double clearance = CheckedClearance(magnet, aperture);
        var run = new AdaptiveRun(magnet, aperture, options, progress, cancellation);
        return run.ToAccuracy(clearance);
    }

    private static double CheckedClearance(Magnet magnet, Aperture aperture)
    {
        double clearance = Clearance.Of(magnet, aperture);
        Point centre = aperture.Centre;
        string? problem = null;
        if (!(clearance > 0.0))
        {
            problem = "touches";
        }
        else if (SectionPoint.RegionAt(magnet.Section, centre) is int region && Clearance.IsSolid(magnet, region))
        {
            problem = "lies inside";
        }

        if (problem is null)
        {
            return clearance;
        }

        throw new InputException([new Finding(
            Severity.Fault,
            "beam-in-part",
            FormattableString.Invariant(
                $"The beam's aperture around ({1e3 * centre.Y:g6}, {1e3 * centre.Z:g6}) mm {problem} a part of iron, a magnet or a conductor."),
            "Move or shrink the aperture so that it lies in air.") { At = centre }]);
    }

    /// <summary>One adaptive run: its state between meshes.</summary>
    private sealed class AdaptiveRun(
        Magnet magnet,
        Aperture aperture,
        SolveOptions options,
        Action<SolveProgress>? progress,
        CancellationToken cancellation)
    {
        private readonly ApertureShape _shape = new(aperture);
        private readonly Point[] _enclosed = EnclosedPlaces(magnet, aperture);
        private readonly Stopwatch _meshing = new();
        private readonly Stopwatch _solving = new();
        private readonly Stopwatch _evaluating = new();
        private readonly List<Finding> _findings = [];
        private int _newtonSteps;
        private double _accuracy = double.NaN;

        public SolvedMagnet ToAccuracy(double clearance)
        {
            var samples = ApertureSamples.Of(aperture, _shape);
            SizeField size = MeshSizing.For(
                magnet.Section, aperture.Outline, MagneticParts(magnet), Fineness(options.Accuracy));
            FieldSolution? previous = null;
            for (int step = 1; ; step++)
            {
                (FieldSolution solution, FieldEquations equations) = SolveOn(size, step, previous);
                _evaluating.Start();
                double[]? chi = BandCutOff.Nodal(solution.Problem, _shape);
                if (chi is null)
                {
                    _evaluating.Stop();
                    size = size.With([.. _shape.EdgePoints(8).Select(p => (p, 0.5 * size.At(p)))]);
                    previous = solution;
                    if (step > options.MostAdaptiveSteps)
                    {
                        throw new MeshingException(
                            "No band of air elements fits between the aperture and its surroundings.", aperture.Centre);
                    }

                    continue;
                }

                BeamExtraction extraction = BeamExtraction.Create(solution.Problem.Space, chi);
                BeamField field = extraction.FieldOf(aperture, solution.Potential);
                BeamMeasures measures = BeamMeasures.Of(field, samples);
                Report("estimate", step, equations.PotentialCount, 0, double.NaN);
                HigherOrderStep higher = HigherOrderStep.From(solution, options.Threads, cancellation);
                BeamExtraction better = BeamExtraction.Create(higher.Problem.Space, higher.Lift.Up(chi));
                BeamField corrected = better.FieldOf(aperture, higher.Potential);
                BeamMeasures correctedMeasures = BeamMeasures.Of(corrected, samples);
                _accuracy = ErrorBarFactor * Math.Max(
                    measures.FieldDifference(correctedMeasures), measures.GradientDifference(correctedMeasures));
                _evaluating.Stop();

                bool done = _accuracy <= options.Accuracy;
                if (done || step > options.MostAdaptiveSteps || 4 * equations.PotentialCount > options.MostUnknowns)
                {
                    return Finish(solution, equations, extraction, field, measures, correctedMeasures, clearance, step);
                }

                _evaluating.Start();
                double[][] indicators = higher.Indicators(BeamGoals.Derivatives(better, corrected, _shape));
                size = Refinement.Next(size, solution.Problem.Space, indicators, options.Accuracy / ErrorBarFactor);
                previous = solution;
                _evaluating.Stop();
            }
        }

        private static double Fineness(double accuracy) =>
            Math.Clamp(Math.Pow(accuracy / RuleAccuracy, 1 / RuleOrder), Finest, Coarsest);

        // The open circle keeps as far from the aperture as the parts do, so that the band of the extraction has room.
        private static Point[] EnclosedPlaces(Magnet magnet, Aperture aperture)
        {
            Box box = aperture.Outline.Bounds.Inflated(Math.Min(Clearance.Of(magnet, aperture), magnet.Section.Bounds.Diagonal));
            return [box.Min, box.Max, new Point(box.Min.Y, box.Max.Z), new Point(box.Max.Y, box.Min.Z)];
        }

        private static int[] MagneticParts(Magnet magnet) =>
            [.. Enumerable.Range(0, magnet.Roles.Count).Where(part => magnet.Roles[part].Material.IsMagnetic)];

        private (FieldSolution Solution, FieldEquations Equations) SolveOn(SizeField size, int step, FieldSolution? previous)
        {
            Report("mesh", step, 0, 0, double.NaN);
            _meshing.Start();
            Mesh mesh = Mesher.Mesh(magnet.Section, size, new MeshOptions { Enclosed = _enclosed }, cancellation);
            _meshing.Stop();
            _solving.Start();
            FiniteElementSpace space = FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), options.Order);
            FieldProblem problem = FieldProblem.Create(magnet, space);
            var equations = new FieldEquations(problem, options.Threads);
            double[]? start = previous is not null && equations.IsNonlinear ? Start(previous, equations) : null;
            Report("solve", step, equations.PotentialCount, 0, double.NaN);
            (double[] potential, IReadOnlyList<NewtonStep> history) = FieldSolver.Solve(
                equations,
                start,
                (k, newton) => Report("solve", step, equations.PotentialCount, k, newton.Decrement),
                cancellation);
            _newtonSteps += history.Count;
            _solving.Stop();
            return (new FieldSolution(problem, potential, history), equations);
        }

        private static double[] Start(FieldSolution previous, FieldEquations equations)
        {
            double[] start = previous.InterpolatedTo(equations.Problem.Space);
            equations.ApplyFixedValues(start);
            return start;
        }

        private SolvedMagnet Finish(
            FieldSolution solution,
            FieldEquations equations,
            BeamExtraction extraction,
            BeamField field,
            BeamMeasures measures,
            BeamMeasures corrected,
            double clearance,
            int steps)
        {
            _evaluating.Start();
            double check = extraction.SelfCheck(aperture, [aperture.Centre, .. _shape.EdgePoints(1)], Math.Min(clearance, aperture.Outline.Bounds.Diagonal));
            double floor = Math.Max(check, QuadratureTolerance);
            if (check > options.Accuracy)
            {
                _findings.Add(new Finding(
                    Severity.Warning,
                    "extraction-check",
                    FormattableString.Invariant($"The extraction's self-check is off by {check:g2}, more than the asked accuracy."),
                    "Give the aperture more clearance, or ask for a finer accuracy so that the mesh there is refined."));
            }

            BeamReport report = new()
            {
                Beam = measures.Centre,
                FieldError = Math.Max(
                    Bar(measures.Centre.Field, corrected.Centre.Field, floor),
                    LeastShare * measures.FieldDifference(corrected) * measures.Field.Max),
                GradientError = Math.Max(
                    Bar(measures.Centre.Gradient, corrected.Centre.Gradient, floor),
                    LeastShare * measures.LargestGradientDifference(corrected)),
                ApertureArea = aperture.Outline.Area,
                Clearance = clearance,
                Field = measures.Field,
                Gradient = measures.Gradient,
                GradientMeanError = Bar(measures.Gradient.Mean, corrected.Gradient.Mean, floor),
                FieldTimesGradient = measures.FieldTimesGradient,
                ProfileY = measures.ProfileY,
                ProfileZ = measures.ProfileZ,
                Parts = PartReports.Of(solution),
                Circuit = Circuit.Of(solution, aperture.Centre),
                Findings = _findings,
            };
            _evaluating.Stop();
            var record = new SolveRecord(
                solution.Mesh.TriangleCount,
                equations.PotentialCount,
                solution.Order,
                MeshQuality.Of(solution.Mesh).SmallestAngleDegrees,
                _newtonSteps,
                steps - 1,
                _accuracy,
                options.Accuracy)
            {
                MeshSeconds = _meshing.Elapsed.TotalSeconds,
                SolveSeconds = _solving.Elapsed.TotalSeconds,
                EvaluateSeconds = _evaluating.Elapsed.TotalSeconds,
            };
            return new SolvedMagnet(solution, field, report, record);
        }

        private static double Bar(double value, double corrected, double floor) =>
            (ErrorBarFactor * Math.Abs(value - corrected)) + (floor * Math.Abs(value));

        private void Report(string what, int step, int unknowns, int newton, double residual) =>
            progress?.Invoke(new SolveProgress(what, step, unknowns, newton, residual, _accuracy));
    }
}
