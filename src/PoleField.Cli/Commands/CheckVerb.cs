using System.CommandLine;
using System.Text;
using PoleField.Cli.Files;
using PoleField.Cli.Text;

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
                ("polefield check magnet.toml --json", "the same for programs"),
            ],
        };
        command.Arguments.Add(verb._case);
        command.Options.Add(verb._json);
        command.Options.Add(verb._out);
        command.Options.Add(verb._force);
        if (tool.Pipeline.SectionPictures is not null)
        {
            command.Options.Add(verb._figures);
        }

        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        string path = arguments.GetRequiredValue(_case);
        string? target = arguments.GetValue(_out) is { } output ? ResultName.For(path, Ending, output) : null;
        LoadedCase loaded = new CaseLoader(_tool.Pipeline).Load(path);
        IReadOnlyList<NamedFile> pictures = Pictures(arguments, loaded);
        string folder = arguments.GetValue(_figures) ?? string.Empty;
        using OutputFiles files = OutputFiles.Plan(
            pictures.Select(p => Path.Combine(folder, p.FileName)).Concat(target is null ? [] : [target]),
            arguments.GetValue(_force));
        Print(arguments, loaded);
        if (target is not null)
        {
            files.Write(target, s => CheckJson.Write(s, loaded));
        }

        foreach (NamedFile picture in pictures)
        {
            cancellation.ThrowIfCancellationRequested();
            files.Write(Path.Combine(folder, picture.FileName), picture.Write);
        }

        files.Commit(cancellation);
        return loaded.HasFaults ? ExitStatus.WrongInput : ExitStatus.Done;
    }

    private IReadOnlyList<NamedFile> Pictures(ParseResult arguments, LoadedCase loaded) =>
        _tool.Pipeline.SectionPictures is { } draw && arguments.GetValue(_figures) is not null && loaded.Reading is not null
            ? draw(loaded)
            : [];

    private void Print(ParseResult arguments, LoadedCase loaded)
    {
        if (arguments.GetValue(_json))
        {
            using var stream = new MemoryStream();
            CheckJson.Write(stream, loaded);
            _tool.Terminal.Out.Write(Encoding.UTF8.GetString(stream.ToArray()));
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
