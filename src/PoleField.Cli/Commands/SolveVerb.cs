using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield solve CASE.toml</c>: field, gradient, uniformity and saturation at the set excitation.</summary>
internal sealed class SolveVerb
{
    private const string Ending = ".result.json";

    private readonly Tool _tool;
    private readonly CaseRun _run;

    private SolveVerb(Tool tool)
    {
        _tool = tool;
        _run = new CaseRun(tool, "Result file, or folder for it. Default: CASE.result.json in the current folder.");
    }

    public static VerbCommand Create(Tool tool)
    {
        var verb = new SolveVerb(tool);
        var command = new VerbCommand("solve", "Field, gradient, uniformity and saturation at the set excitation.")
        {
            Examples =
            [
                ("polefield solve magnet.toml", "prints the tables, writes magnet.result.json"),
                ("polefield solve magnet.toml --accuracy 1e-5 -o results/", "finer, into a folder"),
                ("polefield solve magnet.toml --figures pictures/", "also draws field lines around the magnet and the beam"),
                ("polefield solve magnet.toml --json | jq .beam", "the result for programs; no file unless -o names one"),
            ],
            Notes =
            [
                "A result of an earlier run under the default name is replaced; any other existing file only with --force.",
                "[require] in the case knows: " + string.Join(", ", BeamQuantity.All.Select(q => q.Name)) + "; each with _min or _max.",
            ],
        };
        verb._run.AddTo(command, withJson: true);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        if (_run.Load(arguments) is not { } loaded)
        {
            return ExitStatus.WrongInput;
        }

        PictureFiles pictures = _run.Pictures(arguments);
        using OutputFiles files = PlanFiles(arguments, pictures, out string? target);
        SolveOptions options = _run.OptionsOf(arguments, loaded);
        SolvedCase result;
        using (ProgressLine progress = _run.Progress(arguments, options))
        {
            result = _run.Solve(loaded, options, progress, cancellation);
        }

        if (target is not null)
        {
            files.Write(target, s => _tool.Pipeline.WriteResult(s, ResultOutput.FileOf(result)));
        }

        if (pictures.Wanted)
        {
            pictures.Write(files, _tool.Pipeline.ResultPictures.Draw(result), cancellation);
        }

        files.Commit(cancellation);
        Print(arguments, result, target);
        return result.AllMet ? ExitStatus.Done : ExitStatus.NotMet;
    }

    private OutputFiles PlanFiles(ParseResult arguments, PictureFiles pictures, out string? target)
    {
        string? output = _run.Out(arguments);
        target = output is null && _run.Json(arguments) ? null : ResultName.For(_run.CasePath(arguments), Ending, output);
        bool replaceable = output is null && target is not null && ResultName.IsOwn(target, ResultJson.Format);
        IEnumerable<string> drawn = pictures.Targets(_tool.Pipeline.ResultPictures.Names);
        return OutputFiles.Plan(target is null ? drawn : drawn.Prepend(target), _run.Force(arguments), replaceable ? [target!] : []);
    }

    private void Print(ParseResult arguments, SolvedCase result, string? target)
    {
        bool quiet = _run.Quiet(arguments);
        if (_run.Json(arguments))
        {
            _tool.Terminal.Print(s => _tool.Pipeline.WriteResult(s, ResultOutput.FileOf(result)));
        }
        else if (!quiet)
        {
            SolveTables.Write(_tool.Terminal.Out, result, _tool.OutInk(arguments));
        }

        if (arguments.GetValue(_tool.Verbose))
        {
            RoundTables.Write(_tool.Terminal.Error, result.Solved.Record);
        }

        if (target is not null && !quiet)
        {
            _tool.Terminal.Error.WriteLine($"Result: {target}");
        }

        _run.ReportNotMet(result);
    }
}
