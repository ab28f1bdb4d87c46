using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Design;

/// <summary>
/// Changes the poles' shape until the gradient over the aperture is uniform: damped Gauss–Newton on its deviation at the aperture's
/// sample places, with the exact derivatives of <see cref="MotionResponses"/>, a new mesh at each step.
/// </summary>
public sealed class Tuning
{
    private const double StartDamping = 1e-2;
    private const double LeastDamping = 1e-7;
    private const double MostDamping = 1e4;
    private const double Enough = 0.02;       // relative gain of a step below which it counts as slow; two such steps end the run
    private const double FirstReach = 0.25;   // of half a range: largest change in one step
    private const double Coarse = 1.25;       // the rules' sizes while tuning; the end is solved to full accuracy
    private const double AtEnd = 1e-6;        // of a range: closer to its end a freedom counts as used up

    private readonly Magnet _magnet;
    private readonly Aperture _aperture;
    private readonly TuneSettings _settings;
    private readonly CancellationToken _cancellation;
    private readonly ShapeFreedoms _freedoms;
    private readonly TuneGoal _goal;
    private readonly List<TuneStep> _steps;
    private readonly FixedMeshSolve _drawn;
    private int _solves;
    private int _tooSharp;   // shapes refused since the last step because they needed a smaller tool

    private Tuning(Magnet magnet, Aperture aperture, TuneSettings settings, CancellationToken cancellation)
    {
        (_magnet, _aperture, _settings, _cancellation) = (magnet, aperture, settings, cancellation);
        _steps = [.. settings.Start?.Steps ?? []];
        _solves = settings.Start?.Solves ?? 0;
        _drawn = Solve(magnet.Section, null);
        _goal = new TuneGoal(aperture, settings, TuneReach.IsMirrored(_drawn.Measures));
        _freedoms = FreedomsOf(settings);
        if (settings.Start is { } start && !start.Names.SequenceEqual(_freedoms.Names))
        {
            throw new InputException([new Finding(
                Severity.Fault, "other-freedoms", "The earlier run had other freedoms than the case has now.", "Start afresh, or give [tune] the faces and freedoms it had.")]);
        }
    }

    /// <summary>Tunes a magnet. Cancelled, it ends with the best shape so far.</summary>
    /// <param name="magnet">Magnet as drawn.</param>
    /// <param name="aperture">Where the beam flies.</param>
    /// <param name="settings">What may move, what is wanted.</param>
    /// <param name="progress">Called after each step with where tuning stands.</param>
    /// <param name="cancellation">Ends it.</param>
    /// <exception cref="InputException">A stretch names no face of iron, or the start does not fit.</exception>
    /// <exception cref="OperationCanceledException">Cancelled before the first field was solved.</exception>
    public static TuneResult Run(
        Magnet magnet, Aperture aperture, TuneSettings settings, Action<TuneState>? progress = null, CancellationToken cancellation = default) =>
        new Tuning(magnet, aperture, settings, cancellation).Descend(progress);

    private ShapeFreedoms FreedomsOf(TuneSettings settings)
    {
        if (settings.Dimensions is { } drawn)
        {
            return new DimensionFreedoms(_magnet, drawn);
        }

        IReadOnlyList<Face> faces = Face.Of(_magnet);
        return new FaceFreedoms(_magnet.Section, faces, [.. TuneReach.Modes(faces, settings, _drawn, _aperture)], settings);
    }

    private TuneResult Descend(Action<TuneState>? progress)
    {
        TunePoint best = Begin();
        double merit = _goal.Merit(best);
        double damping = _settings.Start?.Damping ?? StartDamping;
        int last = _steps.Count + _settings.MostSteps;
        if (_steps.Count == 0)
        {
            Record(best, accepted: true);
        }

        int slow = 0; // accepted steps in a row that gained little
        List<StepRow>? rows = null;
        while (slow < 2 && _steps.Count <= last && damping < MostDamping && !_cancellation.IsCancellationRequested)
        {
            rows ??= _goal.Rows(best, _freedoms.VelocitiesAt(best.Values, best.Section), _settings.Threads);
            double[] step = BoundedStep.Of(rows, damping, Room(best.Values, -1), Room(best.Values, 1));
            TunePoint? next = Try([.. best.Values.Zip(step, (a, b) => a + b)], best.Solve);
            if (next is null && _cancellation.IsCancellationRequested)
            {
                break;
            }

            double found = next is null ? double.PositiveInfinity : _goal.Merit(next);
            if (!(found < merit))
            {
                damping *= 8;
                Record(next ?? best, accepted: false);
                continue;
            }

            slow = 1 - (found / merit) < Enough ? slow + 1 : 0;
            (best, merit, rows, _tooSharp) = (next!, found, null, 0);
            damping = Math.Max(damping / 5, LeastDamping);
            Record(best, accepted: true);
        }

        return new TuneResult
        {
            Magnet = _magnet with { Section = best.Section },
            State = StateOf(best),
            Moves = _freedoms.MovesOf(best.Values, best.Section),
            Dimensions = _settings.Dimensions is { } drawn
                ? [.. drawn.Each.Select((d, k) => new TunedDimension(d.Name, d.Value, best.Values[k]))]
                : [],
            Limits = [.. LimitsOf(best, _steps.Count > last)],
            Interrupted = _cancellation.IsCancellationRequested,
        };

        void Record(TunePoint p, bool accepted)
        {
            _steps.Add(new TuneStep(_steps.Count, _goal.Rms(p), p.Solve.Measures.Centre.Gradient, p.Clearance, accepted));
            progress?.Invoke(StateOf(best));
        }

        TuneState StateOf(TunePoint p) => new(_freedoms.Names, p.Values, damping, [.. _steps], _solves);
    }

    private TunePoint Begin()
    {
        double[] values = _settings.Start?.Values.ToArray() ?? _freedoms.AsDrawn;
        if (_settings.Start is null)
        {
            return new TunePoint(values, _magnet.Section, _drawn, Clearance.Of(_magnet, _aperture));
        }

        return Try(values, _drawn)
            ?? throw new InputException([new Finding(
                Severity.Fault, "no-start", "The shape of the earlier run cannot be made of this drawing.", "Start afresh.")]);
    }

    private double[] Room(double[] values, int side) =>
    [
        .. values.Select((x, k) =>
        {
            (double low, double high) = _freedoms.Ranges[k];
            return side * Math.Min(FirstReach * 0.5 * (high - low), Math.Max(side > 0 ? high - x : x - low, 0));
        }),
    ];

    private FixedMeshSolve Solve(CrossSection section, FixedMeshSolve? neighbour)
    {
        _solves++;
        return FixedMeshSolve.Of(
            _magnet with { Section = section },
            new FixedMeshOptions(_aperture, _settings.Threads) { Fineness = Coarse, Cancellation = _cancellation },
            neighbour?.Solution);
    }

    // Null when the shape cannot be made or meshed, comes too near to the beam, needs a smaller tool, or there is no time left.
    private TunePoint? Try(double[] values, FixedMeshSolve neighbour)
    {
        try
        {
            CrossSection section = _freedoms.SectionAt(values);
            double clearance = Clearance.Of(_magnet with { Section = section }, _aperture);
            if (_freedoms.NeedsSmallerTool(section))
            {
                _tooSharp++;
                return null;
            }

            double least = _settings.Holds.Where(h => h.Of == HeldQuantity.Clearance && h.AtLeast).Select(h => h.Bound).DefaultIfEmpty(0).Max();
            return clearance < 0.5 * least ? null : new TunePoint(values, section, Solve(section, neighbour), clearance);
        }
        catch (Exception e) when (e is MeshingException or FieldNotConvergedException or ArgumentException or OperationCanceledException)
        {
            return null;
        }
    }

    private IEnumerable<string> LimitsOf(TunePoint best, bool outOfSteps)
    {
        int before = 0;
        foreach (TuneHold hold in _goal.Reached(best))
        {
            before++;
            yield return hold.Of switch
            {
                HeldQuantity.Field => "the field that must hold",
                HeldQuantity.Gradient => "the gradient that must hold",
                HeldQuantity.Clearance => "the clearance that must hold",
                _ => "the flux density in iron that must hold",
            };
        }

        string[] used =
        [
            .. _freedoms.Names.Where((_, k) =>
                Math.Min(best.Values[k] - _freedoms.Ranges[k].Low, _freedoms.Ranges[k].High - best.Values[k])
                    < AtEnd * (_freedoms.Ranges[k].High - _freedoms.Ranges[k].Low)),
        ];
        if (used.Length > 0)
        {
            before++;
            yield return FormattableString.Invariant($"the reach of {used.Length} of {_freedoms.Count} freedoms: {string.Join(", ", used)}");
        }

        if (_tooSharp > 0)
        {
            before++;
            yield return "the smallest radius of the tool";
        }

        if (outOfSteps)
        {
            before++;
            yield return "the number of steps";
        }

        if (before == 0)
        {
            yield return FormattableString.Invariant($"what these {_freedoms.Count} freedoms can do: more of them or longer stretches may do better");
        }
    }
}
