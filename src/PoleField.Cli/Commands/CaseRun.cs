using System.CommandLine;
using System.Diagnostics;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Commands;

/// <summary>The options and the course of every verb that solves a case.</summary>
internal sealed class CaseRun(Tool tool, string outDescription)
{
    private readonly Option<double?> _accuracy = CommonOptions.Accuracy();
    private readonly Option<int> _threads = CommonOptions.Threads();
    private readonly Argument<string> _case = CommonOptions.CaseFile();
    private readonly Option<string?> _out = CommonOptions.Out(outDescription);
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<bool> _force = CommonOptions.Force();
    private readonly Option<string?> _figures = CommonOptions.Figures();

    /// <summary>Adds case and options to a command.</summary>
    public void AddTo(Command command, bool withJson)
    {
        command.Arguments.Add(_case);
        command.Options.Add(_out);
        if (withJson)
        {
            command.Options.Add(_json);
        }

        command.Options.Add(_figures);
        command.Options.Add(_accuracy);
        command.Options.Add(_threads);
        command.Options.Add(_force);
    }

    public string CasePath(ParseResult arguments) => arguments.GetRequiredValue(_case);

    public string? Out(ParseResult arguments) => arguments.GetValue(_out);

    public bool Json(ParseResult arguments) => arguments.GetResult(_json) is not null && arguments.GetValue(_json);

    public bool Force(ParseResult arguments) => arguments.GetValue(_force);

    public bool Quiet(ParseResult arguments) => arguments.GetValue(tool.Quiet);

    /// <summary>The folder for pictures.</summary>
    public PictureFiles Pictures(ParseResult arguments) => new(arguments.GetValue(_figures), tool.Terminal.Error);

    /// <summary>What an analysis of a solved case starts from.</summary>
    public static AnalysisRequest Request(ParseResult arguments, SolvedCase solved, SolveSteps steps) => new()
    {
        Solved = solved,
        Options = steps.Options,
        Arguments = arguments,
        Progress = steps.Progress,
        Cancellation = steps.Cancellation,
    };

    /// <summary>Loads the case; null after its faults have been printed.</summary>
    public LoadedCase? Load(ParseResult arguments)
    {
        LoadedCase loaded = new CaseLoader(tool.Pipeline).Load(CasePath(arguments));
        return tool.ReportFaults(arguments, loaded) ? null : loaded;
    }

    /// <summary>Accuracy on the command line; null when it names none.</summary>
    public double? Accuracy(ParseResult arguments) => arguments.GetValue(_accuracy);

    public int Threads(ParseResult arguments) => arguments.GetValue(_threads);

    /// <summary>How to solve: the command line goes before the case.</summary>
    public SolveOptions OptionsOf(ParseResult arguments, LoadedCase loaded) => new()
    {
        Accuracy = arguments.GetValue(_accuracy) ?? loaded.Case!.Accuracy,
        Threads = arguments.GetValue(_threads),
        MostUnknowns = MostUnknowns(solvesAtATime: 1),
    };

    /// <summary>The unknowns the memory of this machine, or of the container around the process, has room for.</summary>
    public static int MostUnknowns(int solvesAtATime)
    {
        double room = GC.GetGCMemoryInfo().TotalAvailableMemoryBytes / (double)(SolveOptions.BytesPerUnknown * solvesAtATime);
        return (int)Math.Min(new SolveOptions().MostUnknowns, room);
    }

    /// <summary>The progress line of a run, silent with <c>--quiet</c> and <c>--json</c>.</summary>
    public ProgressLine Progress(ParseResult arguments, SolveOptions options) =>
        new(tool.Terminal, !Quiet(arguments) && !Json(arguments), options.Accuracy, TimeProvider.System);

    /// <summary>Solves a sound case.</summary>
    public SolvedCase Solve(LoadedCase loaded, SolveOptions options, ProgressLine progress, CancellationToken cancellation) =>
        Solve(tool.Pipeline, loaded, new SolveSteps(options, progress.Report, cancellation));

    /// <summary>Solves a sound case apart from any command line.</summary>
    public static SolvedCase Solve(Pipeline pipeline, LoadedCase loaded, SolveSteps steps)
    {
        var clock = Stopwatch.StartNew();
        (CaseFile file, Magnet magnet, Aperture aperture) = loaded.Ready();
        SolvedMagnet solved = pipeline.Solve(magnet, aperture, steps.Options, steps.Progress, steps.Cancellation);
        steps.Cancellation.ThrowIfCancellationRequested();

        var operation = OperationReport.Of(magnet, solved.Report.Circuit, pipeline.FieldOf(solved), file.Operation);
        using var process = Process.GetCurrentProcess();
        return new SolvedCase
        {
            Case = loaded,
            Solved = solved,
            Verdicts = [.. file.Require.Select(r => r.Judge(solved.Report))],
            Operation = operation,
            Cautions = Cautions.Of(solved.Report, operation),
            Warnings = [.. loaded.Findings.Concat(solved.Report.Findings).Where(f => f.Severity == Severity.Warning)],
            ReadSeconds = loaded.Seconds,
            TotalSeconds = loaded.Seconds + clock.Elapsed.TotalSeconds,
            PeakMemoryMegabytes = process.PeakWorkingSet64 / 1e6,
        };
    }

    /// <summary>Says on the error stream what was asked and not met.</summary>
    public void ReportNotMet(SolvedCase result)
    {
        foreach (string missed in NotMet(result))
        {
            tool.Terminal.Error.WriteLine("Not met: " + missed);
        }
    }

    /// <summary>What was asked and not met.</summary>
    public static IEnumerable<string> NotMet(SolvedCase result)
    {
        SolveRecord record = result.Solved.Record;
        IEnumerable<string> accuracy = record.AccuracyMet
            ? []
            : [$"accuracy {Numbers.Accuracy(record.AccuracyAsked)}; reached {Numbers.Accuracy(record.AccuracyReached)}"];
        return result.Verdicts.Where(v => !v.Met).Select(v => v.Limit.Name).Concat(accuracy);
    }
}

/// <summary>How to solve, and how to follow and stop it.</summary>
internal sealed record SolveSteps(SolveOptions Options, Action<SolveProgress> Progress, CancellationToken Cancellation);
