using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Design;

/// <summary>
/// Moves pole faces until the gradient over the aperture is uniform: damped Gauss–Newton on its deviation at the aperture's
/// sample points, with the exact derivatives of <see cref="Sensitivity"/>, a new mesh at each step.
/// </summary>
public sealed class Tuning
{
    private const double StartDamping = 1e-2;
    private const double LeastDamping = 1e-7;
    private const double MostDamping = 1e4;
    private const double Enough = 0.1;        // relative gain of a step below which it ends
    private const double HoldWeight = 5.0;    // of a relative violation against the relative deviation
    private const double HoldMargin = 1e-3;   // holds are aimed at a little inside
    private const double FirstReach = 0.25;   // of the reach: largest move of one step
    private const double Coarse = 1.25;       // the rules' sizes while tuning; the end is solved to full accuracy

    private readonly Magnet _magnet;
    private readonly Aperture _aperture;
    private readonly TuneSettings _settings;
    private readonly IReadOnlyList<Face> _faces;
    private readonly FaceModes[] _modes;
    private readonly int[] _first; // first coefficient of each face's modes
    private readonly CancellationToken _cancellation;
    private readonly Point[] _places;      // where the gradient is looked at, denser than the report's
    private readonly double[] _weights;
    private int _solves;

    private Tuning(Magnet magnet, Aperture aperture, TuneSettings settings, CancellationToken cancellation)
    {
        (_magnet, _aperture, _settings, _cancellation) = (magnet, aperture, settings, cancellation);
        _faces = Face.Of(magnet);
        FixedMeshSolve start = Solve(magnet.Section, null);
        (_places, _weights) = TuneReach.Places(aperture, TuneReach.IsMirrored(start.Measures));
        _modes = [.. TuneReach.Modes(_faces, settings, start, aperture)];
        _first = [.. _modes.Select((_, k) => _modes.Take(k).Sum(m => m.Count))];
        Start = start;
    }

    private FixedMeshSolve Start { get; }

    private int Unknowns => _modes.Sum(m => m.Count);

    /// <summary>Tunes a magnet. Cancelled, it ends with the best faces so far.</summary>
    /// <exception cref="InputException">A stretch names no face of iron.</exception>
    public static TuneResult Run(
        Magnet magnet, Aperture aperture, TuneSettings settings, Action<TuneStep>? progress = null, CancellationToken cancellation = default) =>
        new Tuning(magnet, aperture, settings, cancellation).Descend(progress);

    private TuneResult Descend(Action<TuneStep>? progress)
    {
        var steps = new List<TuneStep>();
        State best = StateOf(new double[Unknowns], Start, _magnet.Section);
        Record(best, accepted: true);
        double damping = StartDamping;
        List<(double Residual, double[] Row)>? rows = null;
        while (steps.Count <= _settings.MostSteps && damping < MostDamping && !_cancellation.IsCancellationRequested)
        {
            rows ??= Rows(best);
            double[] step = BoundedStep.Of(rows, damping, Range(best.Moves, -1), Range(best.Moves, 1));
            State? next = Try([.. best.Moves.Zip(step, (a, b) => a + b)], best.Solve);
            if (next is null || next.Merit >= best.Merit)
            {
                damping *= 8;
                Record(next ?? best, accepted: false);
                continue;
            }

            double gain = 1 - (next.Merit / best.Merit);
            (best, rows) = (next, null);
            damping = Math.Max(damping / 5, LeastDamping);
            Record(best, accepted: true);
            if (gain < Enough)
            {
                break;
            }
        }

        return new TuneResult(_magnet with { Section = best.Section }, steps, _solves, [.. _modes.Select((m, k) => (m.Face.Layer, MovesOf(m, k, best)))]);

        void Record(State s, bool accepted)
        {
            steps.Add(new TuneStep(steps.Count, RmsOf(s.Solve), s.Solve.Measures.Centre.Gradient, s.Clearance, accepted));
            progress?.Invoke(steps[^1]);
        }
    }

    private double RmsOf(FixedMeshSolve s)
    {
        double[] values = [.. _places.Select(p => PointOf(s.Field.At(p)).Value)];
        double mean = values.Select((v, k) => _weights[k] * v).Sum();
        return Math.Sqrt(values.Select((v, k) => _weights[k] * (v - mean) * (v - mean)).Sum()) / Math.Abs(mean);
    }

    private (double Value, IReadOnlyList<BeamTerm> Terms) PointOf(BeamValues v)
    {
        (double value, Func<double, IEnumerable<BeamTerm>> terms) =
            _settings.OfProduct ? DesignQuantities.ProductAt(v) : DesignQuantities.GradientAt(v);
        return (value, [.. terms(1)]);
    }

    private double[] Range(double[] moves, int side) =>
        [.. moves.Select(x => side * Math.Min(FirstReach * _settings.Reach, Math.Max(_settings.Reach - (side * x), 0)))];

    private FixedMeshSolve Solve(CrossSection section, FixedMeshSolve? neighbour)
    {
        _solves++;
        return FixedMeshSolve.Of(
            _magnet with { Section = section },
            new FixedMeshOptions(_aperture, _settings.Threads) { Fineness = Coarse },
            neighbour?.Solution);
    }

    // Null when the faces cannot be made or meshed, come too near to the beam or need a smaller tool.
    private State? Try(double[] moves, FixedMeshSolve neighbour)
    {
        try
        {
            CrossSection section = MovedSection.Of(
                _magnet.Section, _faces, (face, s) => MoveAt(face, s, moves), _modes.Min(m => m.Spacing) / 2);
            return Clearance.Of(_magnet with { Section = section }, _aperture) < 0.5 * _settings.LeastClearance || TooSharp(section)
                ? null
                : StateOf(moves, Solve(section, neighbour), section);
        }
        catch (Exception e) when (e is MeshingException or FieldNotConvergedException or ArgumentException)
        {
            return null;
        }
    }

    private bool TooSharp(CrossSection section)
    {
        if (_settings.SmallestRadius <= 0)
        {
            return false;
        }

        const int samples = 64;
        foreach (Face.FaceEdge e in _modes.SelectMany(m => m.Face.Edges))
        {
            Curve now = section.Edges[e.SectionEdge].Curve;
            if (ReferenceEquals(now, e.Edge.Curve))
            {
                continue;
            }

            for (int k = 1; k < samples; k++)
            {
                // Iron on the left: a concave face turns to the right.
                double hollow = (e.IsForward ? -1 : 1) * now.CurvatureAt((double)k / samples);
                double was = (e.IsForward ? -1 : 1) * e.Edge.Curve.CurvatureAt((double)k / samples);
                if (hollow > 1 / _settings.SmallestRadius && hollow > was * 1.02)
                {
                    return true;
                }
            }
        }

        return false;
    }

    private double MoveAt(Face face, double s, double[] moves)
    {
        double sum = 0;
        for (int k = 0; k < _modes.Length; k++)
        {
            sum += ReferenceEquals(_modes[k].Face, face) ? _modes[k].Move(moves.AsSpan(_first[k], _modes[k].Count), s) : 0;
        }

        return sum;
    }

    private State StateOf(double[] moves, FixedMeshSolve solve, CrossSection section)
    {
        double clearance = Clearance.Of(_magnet with { Section = section }, _aperture);
        double rms = RmsOf(solve);
        double gradient = Violation(Math.Abs(solve.Measures.Centre.Gradient), _settings.LeastGradient);
        double room = Violation(clearance, _settings.LeastClearance);
        return new State(moves, solve, section, clearance, (rms * rms) + (gradient * gradient) + (room * room));
    }

    private static double Violation(double value, double least) =>
        least > 0 ? HoldWeight * Math.Max(0, 1 + HoldMargin - (value / least)) : 0;

    // r = √w (q − m)/|m| at each sample point, q the gradient or its product with the field; then the holds.
    private List<(double Residual, double[] Row)> Rows(State state)
    {
        Sensitivity s = Sensitivity.Of(state.Solve);
        double[] weights = _weights;
        (double Value, IReadOnlyList<BeamTerm> Terms)[] points = [.. _places.Select(p => PointOf(state.Solve.Field.At(p)))];
        IReadOnlyList<BeamTerm> centre = [BeamGoals.GradientTerm(state.Solve.Measures.Centre, 1)];
        double[][] derivatives = new ModeDerivatives(_modes, _first).Of(s, s.Densities([.. points.Select(p => p.Terms), centre]));
        double mean = weights.Select((w, k) => w * points[k].Value).Sum();
        double[] byMean = Sum(derivatives, weights);
        var rows = new List<(double, double[])>();
        for (int k = 0; k < weights.Length; k++)
        {
            double root = Math.Sqrt(weights[k]) / Math.Abs(mean);
            double share = points[k].Value / mean;
            rows.Add((root * (points[k].Value - mean), [.. derivatives[k].Select((d, i) => root * (d - (share * byMean[i])))]));
        }

        AddHolds(rows, state, s, derivatives[^1]);
        return rows;
    }

    private void AddHolds(List<(double, double[])> rows, State state, Sensitivity s, double[] byGradient)
    {
        double gradient = state.Solve.Measures.Centre.Gradient;
        if (_settings.LeastGradient > 0 && Math.Abs(gradient) < 1.02 * _settings.LeastGradient)
        {
            double scale = HoldWeight / _settings.LeastGradient;
            double residual = HoldWeight * (1 + HoldMargin - (Math.Abs(gradient) / _settings.LeastGradient));
            rows.Add((residual, [.. byGradient.Select(d => -scale * Math.Sign(gradient) * d)]));
        }

        if (_settings.LeastClearance > 0 && state.Clearance < 1.05 * _settings.LeastClearance)
        {
            var shape = new ApertureShape(_aperture);
            int nearest = Enumerable.Range(0, s.Points.Count).MinBy(i => shape.DistanceTo(s.Points[i].At));
            double scale = HoldWeight / _settings.LeastClearance;
            double residual = HoldWeight * (1 + HoldMargin - (state.Clearance / _settings.LeastClearance));
            double[] row = new ModeDerivatives(_modes, _first).At(s.Points[nearest]);
            rows.Add((residual, [.. row.Select(d => scale * d)]));
        }
    }

    private static double[] Sum(double[][] derivatives, double[] weights)
    {
        var sum = new double[derivatives[0].Length];
        for (int k = 0; k < weights.Length; k++)
        {
            for (int i = 0; i < sum.Length; i++)
            {
                sum[i] += weights[k] * derivatives[k][i];
            }
        }

        return sum;
    }

    private IReadOnlyList<FaceMove> MovesOf(FaceModes modes, int face, State state)
    {
        const int points = 200;
        return
        [
            .. Enumerable.Range(0, points + 1).Select(k =>
            {
                double s = modes.From + (k * (modes.To - modes.From) / points);
                (Point at, Point outward) = modes.Face.At(s);
                return new FaceMove(s, at, outward, modes.Move(state.Moves.AsSpan(_first[face], modes.Count), s));
            }),
        ];
    }

    private sealed record State(double[] Moves, FixedMeshSolve Solve, CrossSection Section, double Clearance, double Merit);
}
