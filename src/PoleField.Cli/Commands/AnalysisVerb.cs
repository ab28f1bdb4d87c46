using System.CommandLine;
using System.Text;
using PoleField.Beam;
using PoleField.Cli.Files;
using PoleField.Cli.Text;

namespace PoleField.Cli.Commands;

/// <summary>Runs an <see cref="AnalysisStep"/> as a verb: load, check the targets, solve, work out, write, print.</summary>
internal sealed class AnalysisVerb
{
    private readonly Tool _tool;
    private readonly AnalysisStep _step;
    private readonly CaseRun _run;

    private AnalysisVerb(Tool tool, AnalysisStep step)
    {
        _tool = tool;
        _step = step;
        _run = new CaseRun(tool, $"File, or folder for the files. Default: CASE.{step.Name}.* in the current folder.");
    }

    public static VerbCommand Create(Tool tool, AnalysisStep step)
    {
        var verb = new AnalysisVerb(tool, step);
        var command = new VerbCommand(step.Name, step.Description) { Examples = step.Examples };
        verb._run.AddTo(command, step.FirstIsJson);
        foreach (Option option in step.Options)
        {
            command.Options.Add(option);
        }

        if (step.Farewell is { } farewell)
        {
            tool.SetRun(command, (verb.Run, farewell));
        }
        else
        {
            tool.SetRun(command, verb.Run);
        }

        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        if (_run.Load(arguments) is not { } loaded)
        {
            return ExitStatus.WrongInput;
        }

        if (_step.Needs(loaded.Case!) is { Count: > 0 } missing)
        {
            throw new InputException([.. missing.Select(f => f with { File = Path.GetFileName(loaded.Path) })]);
        }

        List<string> targets = Targets(arguments);
        using OutputFiles files = OutputFiles.Plan(targets, _run.Force(arguments) || _step.GoesOn(arguments));
        foreach (string kept in targets.Where(t => _step.KeptOnTheWay.Any(e => t.EndsWith(e, StringComparison.Ordinal))))
        {
            files.MayReplace(kept);
        }

        SolveOptions options = _run.OptionsOf(arguments, loaded);
        SolvedCase solved;
        Analysis analysis;
        using (ProgressLine progress = _run.Progress(arguments, options))
        {
            solved = _run.Solve(loaded, options, progress, cancellation);
            analysis = _step.Run(new AnalysisRequest
            {
                Solved = solved,
                Options = options,
                Targets = targets,
                Arguments = arguments,
                Progress = progress.Report,
                Cancellation = cancellation,
            });
        }

        // What an interrupted analysis keeps is written whole.
        CancellationToken writing = _step.Farewell is null ? cancellation : CancellationToken.None;
        List<string> written = [.. targets.Where((_, i) => analysis.Files[i] is not null)];
        for (int i = 0; i < targets.Count; i++)
        {
            writing.ThrowIfCancellationRequested();
            if (analysis.Files[i] is { } content)
            {
                files.Write(targets[i], content);
            }
        }

        files.Commit(writing);
        Print(arguments, analysis, written);
        return Status(solved, analysis);
    }

    private int Status(SolvedCase solved, Analysis analysis)
    {
        if (analysis.Interrupted)
        {
            _tool.Terminal.Error.WriteLine("Interrupted; the best so far is kept.");
            return ExitStatus.Interrupted;
        }

        if (!_step.JudgesItself)
        {
            _run.ReportNotMet(solved);
        }

        foreach (string what in analysis.NotMet)
        {
            _tool.Terminal.Error.WriteLine($"Not met: {what}");
        }

        return analysis.Met && (_step.JudgesItself || solved.AllMet) ? ExitStatus.Done : ExitStatus.NotMet;
    }

    // As with solve: JSON on standard output needs no file beside it unless one is named.
    private List<string> Targets(ParseResult arguments)
    {
        string? output = _run.Out(arguments);
        if (output is null && _run.Json(arguments))
        {
            return [];
        }

        IReadOnlyList<string> endings = _step.Endings(arguments);
        return [.. ResultName.ForAll(_run.CasePath(arguments), endings, output)];
    }

    private void Print(ParseResult arguments, Analysis analysis, List<string> targets)
    {
        if (_run.Json(arguments) && analysis.Files[0] is { } json)
        {
            using var stream = new MemoryStream();
            json(stream);
            _tool.Terminal.Out.Write(Encoding.UTF8.GetString(stream.ToArray()));
        }
        else if (!_run.Quiet(arguments))
        {
            analysis.Print(_tool.Terminal.Out, _tool.OutInk(arguments));
        }

        foreach (string target in targets.Where(_ => !_run.Quiet(arguments)))
        {
            _tool.Terminal.Error.WriteLine($"Result: {target}");
        }
    }
}
