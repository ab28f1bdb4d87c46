using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Design;
using PoleField.Drawing;
using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield tune CASE.toml</c>: moves the chosen faces until the gradient is uniform.</summary>
internal static class TuneVerbStep
{
    private const double DefaultReach = 0.4e-3;      // metres
    private const double DefaultGradient = 0.97;     // of the gradient as it was, when the case holds none
    private const double DefaultClearance = 0.5;     // of the clearance as it was, when the case holds none

    public static AnalysisStep Create() => new("tune", "Moves the chosen pole faces until the gradient is uniform; writes the new sketch (DXF), case and a before/after result.")
    {
        Examples =
        [
            ("polefield tune magnet.toml -o tuned/", "writes magnet.tune.json, the tuned DXF and case, and a picture"),
            ("polefield tune magnet.toml --json | jq .after.rms", "the rms of the gradient after tuning"),
        ],
        Endings = _ => [".tune.json", ".tuned.dxf", ".tuned.toml", ".tune.svg"],
        Run = Run,
    };

    private static Analysis Run(AnalysisRequest request)
    {
        SolvedCase solved = request.Solved;
        CaseFile file = solved.Case.Case!;
        if (file.Tune is not { } section)
        {
            throw new InputException([new Finding(
                Severity.Fault, "missing-table", "The case has no [tune]: nothing says which faces may move.", "Add [tune] with faces = [\"LAYER\", ...].")]);
        }

        (CaseFile _, Magnetostatics.Magnet magnet, Aperture aperture) = solved.Case.Ready();
        BeamReport before = solved.Solved.Report;
        TuneSettings settings = SettingsOf(section, before, request.Options.Threads);
        TuneResult tuned = Tuning.Run(
            magnet,
            aperture,
            settings,
            s => request.Progress(new SolveProgress("tune", s.Number, 0, 0, double.NaN, s.Rms)),
            request.Cancellation);
        request.Cancellation.ThrowIfCancellationRequested();

        // The end is judged by a solve to full accuracy, never by the steps' own meshes.
        BeamReport after = MagnetSolver.Solve(tuned.Magnet, aperture, request.Options, request.Progress, request.Cancellation).Report;
        IReadOnlyList<Verdict> verdicts = [.. section.Hold.Concat(file.Require).Select(l => l.Judge(after))];
        bool better = settings.OfProduct
            ? after.FieldTimesGradient.Rms < before.FieldTimesGradient.Rms
            : after.Gradient.Rms < before.Gradient.Rms;
        string name = Path.GetFileNameWithoutExtension(solved.Case.Path) + ".tuned.dxf";
        Sketch sketch = TunedCase.SketchOf(solved.Case, magnet.Section, tuned, name);
        string text = TunedCase.TextOf(solved.Case, name);
        ResultFile head = ResultJson.ToFile(ResultOutput.Of(solved));
        return new Analysis(
            (writer, ink) => Print(writer, ink, file.Title, (before, after, tuned, verdicts)),
            [
                s => TuneJson.Write(head, (before, after), tuned, s),
                s => DxfWriter.Write(sketch, s),
                s => s.Write(System.Text.Encoding.UTF8.GetBytes(text)),
                s => FigureWriter.Svg(TuneFigure.Draw(tuned), s),
            ],
            better && verdicts.All(v => v.Met));
    }

    private static TuneSettings SettingsOf(TuneSection section, BeamReport before, int threads)
    {
        double? Least(string quantity) => section.Hold.FirstOrDefault(l => l.AtLeast && l.Quantity.Name == quantity)?.Bound;
        return new TuneSettings
        {
            Stretches = [.. section.Faces.Select(f => new TuneStretch(f.Layer, f.From, f.To))],
            Reach = section.Reach ?? DefaultReach,
            Freedoms = section.Freedoms,
            SmallestRadius = section.SmallestRadius ?? 0,
            OfProduct = section.Goal == TuneGoal.FieldTimesGradientSpread,
            LeastGradient = Least("gradient") ?? (DefaultGradient * Math.Abs(before.Beam.Gradient)),
            LeastClearance = Least("clearance") ?? (DefaultClearance * before.Clearance),
            Threads = threads,
        };
    }

    private static void Print(
        TextWriter writer,
        Ink ink,
        string title,
        (BeamReport Before, BeamReport After, TuneResult Tuned, IReadOnlyList<Verdict> Verdicts) of)
    {
        writer.WriteLine(ink.Strong(title));
        writer.WriteLine();
        var table = new TextTable("quantity", ">before", ">after");
        Row("field |B|, T", r => Numbers.WithError(r.Beam.Field, r.FieldError));
        Row("gradient d|B|/dz, T/m", r => Numbers.WithError(r.Beam.Gradient, r.GradientError));
        Row("gradient over the aperture: rms", r => Numbers.Percent(r.Gradient.Rms));
        Row("gradient over the aperture: spread", r => Numbers.Percent(r.Gradient.Spread));
        Row("field × gradient: rms", r => Numbers.Percent(r.FieldTimesGradient.Rms));
        Row("clearance, mm", r => Numbers.Millimetres(r.Clearance));
        WriteLines(writer, table, ink);
        writer.WriteLine();
        foreach ((string layer, IReadOnlyList<FaceMove> points) in of.Tuned.Moves)
        {
            writer.WriteLine(FormattableString.Invariant(
                $"  {layer} moved by {Numbers.Significant(1e6 * points.Min(p => p.Move), 3)} to {Numbers.Significant(1e6 * points.Max(p => p.Move), 3)} um over {Numbers.Millimetres(points[^1].ArcLength - points[0].ArcLength, 1)} mm of face"));
        }

        writer.WriteLine(FormattableString.Invariant($"  {of.Tuned.Steps.Count - 1} steps, {of.Tuned.Solves} solves, then solved to full accuracy"));
        foreach (Verdict v in of.Verdicts)
        {
            writer.WriteLine(
                $"  {v.Limit.Name}: {(v.Found is { } m ? Numbers.InUnit(m, v.Limit.Quantity.Dimension) : "-")}, {(v.Met ? "met" : "not met: best found is written")}");
        }

        void Row(string name, Func<BeamReport, string> value) => table.Add(name, value(of.Before), value(of.After));
    }

    private static void WriteLines(TextWriter writer, TextTable table, Ink ink)
    {
        foreach (string line in table.Lines(ink))
        {
            writer.WriteLine(line);
        }
    }
}
