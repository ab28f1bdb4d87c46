using System.CommandLine;
using System.Diagnostics;
using System.Text;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield solve CASE.toml</c>: field, gradient, uniformity and saturation at the set excitation.</summary>
internal sealed class SolveVerb
{
    private const string Ending = ".result.json";
    private const string ResultFormat = "polefield-result/1";

    private readonly Tool _tool;
    private readonly Argument<string> _case = CommonOptions.CaseFile();
    private readonly Option<string?> _out = CommonOptions.Out("Result file, or folder for it. Default: CASE.result.json in the current folder.");
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<double?> _accuracy = CommonOptions.Accuracy();
    private readonly Option<int> _threads = CommonOptions.Threads();
    private readonly Option<bool> _force = CommonOptions.Force();
    private readonly Option<string?> _figures = CommonOptions.Figures();

    private SolveVerb(Tool tool) => _tool = tool;

    public static VerbCommand Create(Tool tool)
    {
        var verb = new SolveVerb(tool);
        var command = new VerbCommand("solve", "Field, gradient, uniformity and saturation at the set excitation.")
        {
            Examples =
            [
                ("polefield solve magnet.toml", "prints the tables, writes magnet.result.json"),
                ("polefield solve magnet.toml --accuracy 1e-5 -o results/", "finer, into a folder"),
                ("polefield solve magnet.toml --json | jq .beam", "the result for programs; no file unless -o names one"),
            ],
            Notes =
            [
                "A result of an earlier run under the default name is replaced; any other existing file only with --force.",
                "[require] in the case knows: " + string.Join(", ", BeamQuantity.All.Select(q => q.Name)) + "; each with _min or _max.",
            ],
        };
        command.Arguments.Add(verb._case);
        foreach (Option option in new Option[] { verb._out, verb._json, verb._accuracy, verb._threads, verb._force })
        {
            command.Options.Add(option);
        }

        if (tool.Pipeline.ResultPictures is not null)
        {
            command.Options.Add(verb._figures);
        }

        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        var clock = Stopwatch.StartNew();
        string path = arguments.GetRequiredValue(_case);
        LoadedCase loaded = new CaseLoader(_tool.Pipeline).Load(path);
        if (_tool.ReportFaults(arguments, loaded))
        {
            return ExitStatus.WrongInput;
        }

        using OutputFiles files = PlanFiles(arguments, path, out string? target);
        SolveResult result = Solve(arguments, loaded, clock, cancellation);
        if (target is not null)
        {
            files.Write(target, s => _tool.Pipeline.WriteResult(s, result));
        }

        WritePictures(arguments, files, result, cancellation);
        files.Commit(cancellation);
        Print(arguments, result, target);
        return result.AllMet ? ExitStatus.Done : ExitStatus.NotMet;
    }

    private OutputFiles PlanFiles(ParseResult arguments, string path, out string? target)
    {
        string? output = arguments.GetValue(_out);
        target = output is null && arguments.GetValue(_json) ? null : ResultName.For(path, Ending, output);
        bool replaceable = output is null && target is not null && ResultName.IsOwn(target, ResultFormat);
        return OutputFiles.Plan(target is null ? [] : [target], arguments.GetValue(_force), replaceable ? [target!] : []);
    }

    private SolveResult Solve(ParseResult arguments, LoadedCase loaded, Stopwatch clock, CancellationToken cancellation)
    {
        (CaseFile file, Magnet magnet, Aperture aperture) = loaded.Ready();
        double readSeconds = clock.Elapsed.TotalSeconds;
        var options = new SolveOptions
        {
            Accuracy = arguments.GetValue(_accuracy) ?? file.Accuracy,
            Threads = arguments.GetValue(_threads),
        };
        SolvedMagnet solved;
        bool progress = !arguments.GetValue(_tool.Quiet) && !arguments.GetValue(_json);
        using (var line = new ProgressLine(_tool.Terminal, progress, options.Accuracy, TimeProvider.System))
        {
            solved = _tool.Pipeline.Solve(magnet, aperture, options, line.Report, cancellation);
        }

        cancellation.ThrowIfCancellationRequested();
        double? reach = magnet.AppliedField == default ? StrayField.Reach(_tool.Pipeline.FieldOf(solved), magnet.Section.Bounds) : null;
        return new SolveResult
        {
            Case = loaded,
            Solved = solved,
            Verdicts = [.. file.Require.Select(r => r.Judge(solved.Report))],
            Cautions = Cautions.Of(file, solved.Report, reach),
            Warnings = [.. loaded.Findings.Concat(solved.Report.Findings).Where(f => f.Severity == Severity.Warning)],
            ReadSeconds = readSeconds,
            TotalSeconds = clock.Elapsed.TotalSeconds,
            PeakMemoryMegabytes = PeakMemoryMegabytes(),
        };
    }

    private static double PeakMemoryMegabytes()
    {
        using var process = Process.GetCurrentProcess();
        return process.PeakWorkingSet64 / 1e6;
    }

    private void WritePictures(ParseResult arguments, OutputFiles files, SolveResult result, CancellationToken cancellation)
    {
        if (_tool.Pipeline.ResultPictures is not { } draw || arguments.GetValue(_figures) is not { } folder)
        {
            return;
        }

        foreach (NamedPicture picture in draw(result))
        {
            cancellation.ThrowIfCancellationRequested();
            files.Write(Path.Combine(folder, picture.FileName), picture.Write);
        }
    }

    private void Print(ParseResult arguments, SolveResult result, string? target)
    {
        bool quiet = arguments.GetValue(_tool.Quiet);
        if (arguments.GetValue(_json))
        {
            using var stream = new MemoryStream();
            _tool.Pipeline.WriteResult(stream, result);
            _tool.Terminal.Out.Write(Encoding.UTF8.GetString(stream.ToArray()));
        }
        else if (!quiet)
        {
            SolveTables.Write(_tool.Terminal.Out, result, _tool.OutInk(arguments));
        }

        if (target is not null && !quiet)
        {
            _tool.Terminal.Error.WriteLine($"Result: {target}");
        }

        WriteNotMet(result);
    }

    private void WriteNotMet(SolveResult result)
    {
        foreach (Verdict verdict in result.Verdicts.Where(v => !v.Met))
        {
            _tool.Terminal.Error.WriteLine($"Not met: {verdict.Limit.Name}");
        }

        if (!result.Solved.Record.AccuracyMet)
        {
            _tool.Terminal.Error.WriteLine(
                $"Not met: accuracy {Numbers.Significant(result.Solved.Record.AccuracyAsked, 2)}; reached {Numbers.Significant(result.Solved.Record.AccuracyReached, 2)}");
        }
    }
}
