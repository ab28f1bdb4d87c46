using System.CommandLine;
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

        if (_step.Needs(loaded.Case!, arguments) is { Count: > 0 } missing)
        {
            throw new InputException([.. missing.Select(f => f with { File = f.File ?? Path.GetFileName(loaded.Path) })]);
        }

        List<string> targets = Targets(arguments);
        PictureFiles pictures = _run.Pictures(arguments);
        using OutputFiles files = OutputFiles.Plan(targets.Concat(pictures.Targets(_step.Pictures)), _run.Force(arguments) || _step.GoesOn(arguments));
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
            analysis = _step.Run(CaseRun.Request(arguments, solved, new SolveSteps(options, progress.Report, cancellation)) with { Targets = targets });
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

        pictures.Write(files, [.. analysis.Pictures.Select(p => p.Figure)], writing);
        files.Commit(writing);
        Print(arguments, (solved, analysis), written);
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

    private void Print(ParseResult arguments, (SolvedCase Solved, Analysis Analysis) of, List<string> targets)
    {
        if (_run.Json(arguments) && of.Analysis.Files[0] is { } json)
        {
            _tool.Terminal.Print(json);
        }
        else if (!_run.Quiet(arguments))
        {
            of.Analysis.Answer.Write(_tool.Terminal.Out, _tool.OutInk(arguments), of.Solved.Case.Case!.Title);
        }

        foreach (string target in targets.Where(_ => !_run.Quiet(arguments)))
        {
            _tool.Terminal.Error.WriteLine($"Result: {target}");
        }
    }
}
