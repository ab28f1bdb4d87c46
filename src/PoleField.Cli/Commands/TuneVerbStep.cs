using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Design;
using PoleField.Drawing;
using PoleField.Magnetostatics;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield tune CASE.toml</c>: changes the chosen faces or dimensions until the gradient is uniform.</summary>
internal sealed class TuneVerbStep
{
    private const double DefaultGradient = 0.97;     // of the gradient as it was, when the case holds none
    private const double DefaultClearance = 0.5;     // of the clearance as it was, when the case holds none
    private const string StateEnding = ".tune-state";
    private static readonly string[] Endings = [".tune.json", ".tuned.dxf", ".tuned.toml", ".tune.svg", StateEnding, ".trade-off.svg"];

    private readonly Pipeline _pipeline;
    private readonly Option<bool> _resume = new("--resume") { Description = "Go on from where an earlier run of this case stopped or ended; its files are replaced." };
    private readonly Option<bool> _tradeOff = new("--trade-off")
    {
        Description = "Also find how uniform the gradient can be at larger and smaller gradients. Done in any case when a requirement is not met.",
    };

    private TuneVerbStep(Pipeline pipeline) => _pipeline = pipeline;

    /// <summary>The step.</summary>
    /// <param name="pipeline">Cuts the drawings of tuned dimensions.</param>
    public static AnalysisStep Create(Pipeline pipeline)
    {
        var verb = new TuneVerbStep(pipeline);
        return new AnalysisStep("tune", "Changes the chosen pole faces, or dimensions, until the gradient is uniform; writes the new sketch (DXF), case and a before/after result.")
        {
            Examples =
            [
                ("polefield tune magnet.toml -o tuned/", "writes magnet.tune.json, the tuned DXF and case, and a picture"),
                ("polefield tune magnet.toml -o tuned/ --resume", "goes on after Ctrl-C, or for further steps"),
                ("polefield tune magnet.toml --json | jq .after.rms", "the rms of the gradient after tuning"),
            ],
            Options = [verb._resume, verb._tradeOff],
            Endings = _ => Endings,
            GoesOn = arguments => arguments.GetValue(verb._resume),
            KeptOnTheWay = [StateEnding],
            Farewell = TimeSpan.FromSeconds(10),
            JudgesItself = true,
            Pictures = [TuneFigure.Name, TradeOffFigure.Name],
            IsInReport = file => file.Tune is not null,
            Needs = (file, _) => file.Tune is not null ? [] :
            [
                new Finding(Severity.Fault, "missing-table", "The case has no [tune]: nothing says what may move.", "Add [tune] with faces = [\"LAYER\", ...]."),
            ],
            Run = verb.Run,
        };
    }

    private Analysis Run(AnalysisRequest request)
    {
        SolvedCase solved = request.Solved;
        (CaseFile file, Magnet magnet, Aperture aperture) = solved.Case.Ready();
        TuneSection section = file.Tune!;
        string? state = request.Targets.FirstOrDefault(t => t.EndsWith(StateEnding, StringComparison.Ordinal));
        TuneSettings settings = SettingsOf(request, section, magnet.Section) with
        {
            Start = Asked(request, _resume)
                ? TuneStateFile.Read(state ?? ResultName.For(solved.Case.Path, StateEnding, null), solved.Case.SketchSha256)
                : null,
        };
        TuneResult tuned = Tuning.Run(magnet, aperture, settings, Kept, request.Cancellation);
        BeamReport? after = Verified(request, tuned.Magnet, aperture);
        Verdict[] verdicts = after is null ? [] : [.. section.Hold.Concat(file.Require).DistinctBy(l => (l.Name, l.Bound)).Select(l => l.Judge(after))];
        bool met = after is not null && Better(settings, solved.Solved.Report, after) && verdicts.All(v => v.Met);
        IReadOnlyList<TradeOffPoint> curve = after is not null && (!met || Asked(request, _tradeOff))
            ? TradeOffOf(request, (magnet, aperture), settings, (tuned, after))
            : [];
        var outcome = new TuneOutcome(solved.Solved.Report, after, tuned, curve) { OfProduct = settings.OfProduct };
        return AnalysisOf(solved, outcome, verdicts) with
        {
            Met = met,
            Interrupted = request.Cancellation.IsCancellationRequested,
            NotMet = [.. verdicts.Where(v => !v.Met).Select(v => v.Limit.Name)],
        };

        void Kept(TuneState now)
        {
            TuneStep step = now.Steps[^1];
            request.Progress(SolveProgress.Of(FormattableString.Invariant($"tune, step {step.Number}, rms {100 * step.Rms:g3} %")));
            if (state is not null)
            {
                TuneStateFile.Save(now, solved.Case.SketchSha256, state);
            }
        }
    }

    // The end is judged by a solve to full accuracy, never by the steps' own meshes; null when there is no time for it.
    private static BeamReport? Verified(AnalysisRequest request, Magnet magnet, Aperture aperture)
    {
        try
        {
            request.Cancellation.ThrowIfCancellationRequested();
            return MagnetSolver.Solve(magnet, aperture, request.Options, request.Progress, request.Cancellation).Report;
        }
        catch (OperationCanceledException)
        {
            return null;
        }
    }

    private static List<TradeOffPoint> TradeOffOf(
        AnalysisRequest request, (Magnet Magnet, Aperture Aperture) of, TuneSettings settings, (TuneResult Shape, BeamReport Report) tuned)
    {
        var points = new List<TradeOffPoint>();
        foreach ((double least, TuneResult shape) in TradeOff.Run(of.Magnet, of.Aperture, settings, tuned.Shape, request.Cancellation))
        {
            BeamReport? report = ReferenceEquals(shape, tuned.Shape) ? tuned.Report : Verified(request, shape.Magnet, of.Aperture);
            if (report is not null)
            {
                points.Add(new TradeOffPoint(least, report, shape.Limits));
            }
        }

        return points;
    }

    private static Analysis AnalysisOf(SolvedCase solved, TuneOutcome outcome, Verdict[] verdicts)
    {
        string name = Path.GetFileNameWithoutExtension(solved.Case.Path) + ".tuned.dxf";
        TuneResult tuned = outcome.Tuned;
        Sketch sketch = TunedCase.SketchOf(solved.Case, solved.Case.Reading!.Section!, tuned, name);
        PoleFamily? family = solved.Case.Case!.Tune!.Family is { } f ? FamilyTuning.With(f, tuned.State.Values) : null;
        string text = TunedCase.TextOf(solved.Case, name, family);
        Figure faces = TuneFigure.Draw(tuned);
        Figure? tradeOff = outcome.TradeOff.Count > 1 ? TradeOffFigure.Draw(outcome) : null;
        return new Analysis(
            TuneText.Of(outcome, verdicts),
            [
                s => AnalysisJson.Write(ResultOutput.HeadOf(solved), outcome, s),
                s => DxfWriter.Write(sketch, s),
                s => s.Write(System.Text.Encoding.UTF8.GetBytes(text)),
                s => FigureWriter.Svg(faces, s),
                s => TuneStateFile.Write(tuned.State, solved.Case.SketchSha256, s),
                tradeOff is null ? null : s => FigureWriter.Svg(tradeOff, s),
            ])
        {
            Pictures = tradeOff is null ? [new ReportPicture(faces)] : [new ReportPicture(faces), new ReportPicture(tradeOff)],
        };
    }

    // Under report the options are not there.
    private static bool Asked(AnalysisRequest request, Option<bool> option) =>
        request.Arguments.GetResult(option) is not null && request.Arguments.GetValue(option);

    private static bool Better(TuneSettings settings, BeamReport before, BeamReport after) => settings.OfProduct
        ? after.FieldTimesGradient.Rms <= before.FieldTimesGradient.Rms
        : after.Gradient.Rms <= before.Gradient.Rms;

    private TuneSettings SettingsOf(AnalysisRequest request, TuneSection section, CrossSection drawn)
    {
        BeamReport before = request.Solved.Solved.Report;
        var settings = new TuneSettings
        {
            Stretches = [.. section.Faces.Select(f => new TuneStretch(f.Layer, f.From, f.To))],
            Dimensions = section.Family is { } family ? FamilyTuning.Of(request.Solved.Case, family, _pipeline, drawn) : null,
            Freedoms = section.Freedoms,
            SmallestRadius = section.SmallestRadius ?? 0,
            OfProduct = section.Goal == TuneGoal.FieldTimesGradientSpread,
            Holds = [.. HoldsOf(section.Hold.Concat(request.Solved.Case.Case!.Require), before)],
            Threads = request.Options.Threads,
        };
        return section.Reach is { } reach ? settings with { Reach = reach } : settings;
    }

    // The bounds that steer; all others are judged at the end.
    private static IEnumerable<TuneHold> HoldsOf(IEnumerable<Limit> limits, BeamReport before)
    {
        TuneHold[] stated =
        [
            .. limits.Where(l => l.Bound > 0).Select(l => (Limit: l, Of: l.Quantity.Name switch
            {
                "field" => HeldQuantity.Field,
                "gradient" => HeldQuantity.Gradient,
                "clearance" => HeldQuantity.Clearance,
                "iron_field" => HeldQuantity.IronField,
                _ => (HeldQuantity?)null,
            })).Where(h => h.Of is not null).Select(h => new TuneHold(h.Of!.Value, h.Limit.AtLeast, h.Limit.Bound)),
        ];
        if (!stated.Any(h => h is { Of: HeldQuantity.Gradient, AtLeast: true }))
        {
            yield return new TuneHold(HeldQuantity.Gradient, true, DefaultGradient * Math.Abs(before.Beam.Gradient));
        }

        if (!stated.Any(h => h is { Of: HeldQuantity.Clearance, AtLeast: true }))
        {
            yield return new TuneHold(HeldQuantity.Clearance, true, DefaultClearance * before.Clearance);
        }

        foreach (TuneHold hold in stated.Distinct())
        {
            yield return hold;
        }
    }
}
