using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>
/// Solves a magnet at several excitations on one mesh, each from its neighbour's field. Each step has its own error bar;
/// where the mesh does not reach the asked accuracy, that step gets a mesh of its own.
/// </summary>
public sealed class Ramp
{
    private const double StartFactor = 1e-3;
    private const double SaturatedShare = 0.005;    // of a part's area, worth naming
    private const int OnsetSolves = 8;
    private const double OnsetTolerance = 5e-3;     // of the fall that is looked for
    private const double TwoWireGradient = 0.02;    // rms deviation up to which two wires describe the field
    private const double TwoWireField = 0.01;

    private readonly SolvedMagnet _full;
    private readonly RampSettings _settings;
    private readonly RunSettings _run;
    private readonly bool _otherSources;
    private double? _halfSpacing;
    private string _now = "straight start";

    private Ramp(SolvedMagnet full, RampSettings settings, RunSettings run)
    {
        _full = full;
        _settings = settings;
        _run = run with { Progress = p => run.Progress?.Invoke(p.Within(_now)) };
        Magnet magnet = full.Solution.Magnet;
        _otherSources = magnet.AppliedField != default || magnet.Roles.Any(r => r.Remanence != default);
    }

    /// <summary>Works out the excitation curve of a magnet solved at factor 1.</summary>
    /// <exception cref="InputException">The magnet has no ampere-turns.</exception>
    /// <exception cref="FieldNotConvergedException">A step did not converge.</exception>
    public static RampReport Of(
        SolvedMagnet full,
        RampSettings settings,
        SolveOptions? options = null,
        Action<SolveProgress>? progress = null,
        CancellationToken cancellation = default)
    {
        if (!(full.Report.Circuit.AmpereTurns > 0))
        {
            throw new InputException([new Finding(
                Severity.Fault,
                "no-ampere-turns",
                "No part carries ampere-turns, so there is nothing to ramp.",
                "Give the coils ampere_turns in the case.")]);
        }

        return new Ramp(full, settings, new RunSettings(options ?? new SolveOptions(), progress, cancellation)).Run();
    }

    private RampReport Run()
    {
        SolvedMagnet last = SolveAt(StartFactor, (1.0, _full), out bool ownMesh);
        _halfSpacing = HalfSpacing(last);
        RampStep start = StepOf(StartFactor, last, ownMesh);
        var steps = new List<RampStep>();
        var near = new List<SolvedMagnet>();
        double lastFactor = StartFactor;
        foreach (double factor in _settings.Factors)
        {
            _now = FormattableString.Invariant($"excitation {steps.Count + 1} of {_settings.Factors.Count}");
            bool own = false;
            last = factor == 1.0 ? _full : SolveAt(factor, (lastFactor, last), out own);
            lastFactor = factor;
            steps.Add(StepOf(factor, last, own));
            near.Add(last);
        }

        _now = "onset of saturation";
        return new RampReport
        {
            Steps = steps,
            Start = start,
            Onset = _settings.Onset,
            OnsetFactor = _otherSources ? null : OnsetFactor(start, steps, near),
            FirstSaturated = FirstSaturated(steps),
            HalfSpacing = _halfSpacing,
            HasOtherSources = _otherSources,
            AccuracyMet = steps.All(s => s.Accuracy <= _run.Options.Accuracy),
        };
    }

    // Newton starts as if the neighbour's field grew with the currents: too strong a field in saturating iron is the good side.
    private SolvedMagnet SolveAt(double factor, (double Factor, SolvedMagnet Solved) near, out bool ownMesh)
    {
        Magnet magnet = _full.Solution.Magnet.WithCurrentsScaled(factor);
        double scale = _otherSources ? 1.0 : factor / near.Factor;
        SolvedMagnet solved = MagnetSolver.SolveOnMeshOf(magnet, near.Solved, scale, _run);
        ownMesh = !solved.Record.AccuracyMet && _full.Record.AccuracyMet;
        return ownMesh
            ? MagnetSolver.Solve(magnet, _full.Field.Aperture, _run.Options, _run.Progress, _run.Cancellation)
            : solved;
    }

    private RampStep StepOf(double factor, SolvedMagnet solved, bool ownMesh) => new()
    {
        Factor = factor,
        Report = solved.Report,
        Accuracy = solved.Record.AccuracyReached,
        NewtonSteps = solved.Solution.NewtonSteps,
        OwnMesh = ownMesh,
        ShapeFactor = _halfSpacing is { } a ? Beam.TwoWireField.ShapeFactor(solved.Report.Beam, a) : null,
    };

    // Of the unsaturated field, so that k shows what saturation does.
    private double? HalfSpacing(SolvedMagnet unsaturated)
    {
        try
        {
            TwoWireComparison wires = TwoWireComparison.Of(unsaturated.Field, _settings.Wires);
            bool near = wires.Gradient.Rms < TwoWireGradient && wires.Field.Rms < TwoWireField;
            return near || _settings.Wires?.HalfSpacing is not null ? wires.Wires.HalfSpacing : null;
        }
        catch (InputException)
        {
            return null;
        }
    }

    private static (string Layer, double Factor)? FirstSaturated(List<RampStep> steps)
    {
        foreach (RampStep step in steps)
        {
            if (step.MostSaturated is { } part && part.SaturatedShare > SaturatedShare)
            {
                return (part.Layer, step.Factor);
            }
        }

        return null;
    }

    private double? OnsetFactor(RampStep start, List<RampStep> steps, List<SolvedMagnet> near)
    {
        RampStep before = start;
        double best = start.GradientPerAmpereTurn;
        for (int k = 0; k < steps.Count; k++)
        {
            if (Excess(steps[k], best) < 0)
            {
                return Between(before, steps[k], best, near[k]);
            }

            best = Math.Max(best, steps[k].GradientPerAmpereTurn);
            before = steps[k];
        }

        return null;
    }

    // Positive as long as the fall is smaller than the onset's.
    private double Excess(RampStep step, double best) => (step.GradientPerAmpereTurn / best) - (1 - _settings.Onset);

    // Regula falsi with the halved weight of the end that stays (the Illinois variant).
    private double Between(RampStep before, RampStep after, double best, SolvedMagnet near)
    {
        (double from, double fromExcess) = (before.Factor, Excess(before, best));
        (double to, double toExcess) = (after.Factor, Excess(after, best));
        double found = from + ((to - from) * fromExcess / (fromExcess - toExcess));
        for (int k = 0; k < OnsetSolves; k++)
        {
            double excess = Excess(StepOf(found, SolveAt(found, (after.Factor, near), out _), false), best);
            if (Math.Abs(excess) < OnsetTolerance * _settings.Onset)
            {
                break;
            }

            if (excess > 0)
            {
                (from, fromExcess, toExcess) = (found, excess, 0.5 * toExcess);
            }
            else
            {
                (to, toExcess, fromExcess) = (found, excess, 0.5 * fromExcess);
            }

            found = from + ((to - from) * fromExcess / (fromExcess - toExcess));
        }

        return found;
    }
}
