using System.CommandLine;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield check CASE.toml</c>: what the case and sketch hold, and everything that is wrong with them.</summary>
internal sealed class CheckVerb
{
    private const string Ending = ".check.json";

    private readonly Tool _tool;
    private readonly Argument<string> _case = CommonOptions.CaseFile();
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<string?> _out = CommonOptions.Out("Also write the findings as JSON to this file, or into this folder.");
    private readonly Option<bool> _force = CommonOptions.Force();
    private readonly Option<string?> _figures = CommonOptions.Figures();

    private CheckVerb(Tool tool) => _tool = tool;

    public static VerbCommand Create(Tool tool)
    {
        var verb = new CheckVerb(tool);
        var command = new VerbCommand("check", "Reads case and sketch, lists every part, and everything that is wrong; no solve.")
        {
            Examples =
            [
                ("polefield check magnet.toml", "parts with areas and loops, healed joints, faults"),
                ("polefield check magnet.toml --figures pictures/", "also draws the sketch, with faults and healed joints numbered"),
                ("polefield check magnet.toml --json", "the same for programs"),
            ],
        };
        command.Arguments.Add(verb._case);
        command.Options.Add(verb._json);
        command.Options.Add(verb._out);
        command.Options.Add(verb._force);
        command.Options.Add(verb._figures);

        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        string path = arguments.GetRequiredValue(_case);
        string? target = arguments.GetValue(_out) is { } output ? ResultName.For(path, Ending, output) : null;
        LoadedCase loaded = new CaseLoader(_tool.Pipeline).Load(path);
        var pictures = new PictureFiles(arguments.GetValue(_figures), _tool.Terminal.Error);
        using OutputFiles files = OutputFiles.Plan(
            pictures.Targets(_tool.Pipeline.SketchPictures.Names).Concat(target is null ? [] : [target]), arguments.GetValue(_force));
        Print(arguments, loaded);
        if (target is not null)
        {
            files.Write(target, s => JsonText.Write(new CheckFile(loaded), s));
        }

        if (pictures.Wanted)
        {
            pictures.Write(files, _tool.Pipeline.SketchPictures.Draw(loaded), cancellation);
        }

        files.Commit(cancellation);
        return loaded.HasFaults ? ExitStatus.WrongInput : ExitStatus.Done;
    }

    private void Print(ParseResult arguments, LoadedCase loaded)
    {
        if (arguments.GetValue(_json))
        {
            _tool.Terminal.Print(s => JsonText.Write(new CheckFile(loaded), s));
        }
        else if (!arguments.GetValue(_tool.Quiet))
        {
            CheckTables.Write(_tool.Terminal.Out, loaded, _tool.OutInk(arguments));
            return;
        }

        if (loaded.HasFaults)
        {
            FindingText.Write(
                _tool.Terminal.Error,
                loaded.Findings.Where(f => f.Severity == Severity.Fault),
                _tool.ErrorInk(arguments),
                loaded.DrawingUnit);
        }
    }
}
