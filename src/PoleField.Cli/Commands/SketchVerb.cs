using System.CommandLine;
using PoleField.Cli.Files;
using PoleField.Cli.Sketching;
using PoleField.Cli.Text;
using PoleField.Drawing;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield sketch FAMILY</c>: a starting sketch and case from a closed-form family of pole pairs.</summary>
internal sealed class SketchVerb
{
    private readonly Tool _tool;
    private readonly SketchRequest _request;
    private readonly Option<string?> _out = new("--out", "-o") { Description = "Folder for both files. Default: the current folder.", HelpName = "DIR" };
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<bool> _force = CommonOptions.Force();

    private SketchVerb(Tool tool, FamilyWords words)
    {
        _tool = tool;
        _request = new SketchRequest(words);
    }

    public static VerbCommand Create(Tool tool)
    {
        var command = new VerbCommand("sketch", "Writes a starting sketch and case from a closed-form family of pole pairs.")
        {
            Examples =
            [
                ("polefield sketch", "the families"),
                ("polefield sketch two-wire --half-spacing \"4 mm\" --field \"1.1 T\"", "writes two-wire.dxf and two-wire.toml"),
                ("polefield sketch two-wire --help", "the dimensions of a family"),
            ],
            PartsAre = ("FAMILY", "Families"),
        };
        foreach (FamilyWords words in FamilyWords.All)
        {
            command.Subcommands.Add(CreateFamily(tool, words));
        }

        tool.SetRun(command, (_, _) => List(tool, command));
        return command;
    }

    private static VerbCommand CreateFamily(Tool tool, FamilyWords words)
    {
        var verb = new SketchVerb(tool, words);
        string name = words.Usual.Name;
        string description = words.Usual.Description;
        var command = new VerbCommand(name, $"{char.ToUpperInvariant(description[0])}{description[1..]}.")
        {
            Examples =
            [
                ($"polefield sketch {name}", $"writes {name}.dxf and {name}.toml with the usual dimensions"),
                ($"polefield sketch {name} {words.Options[0].Name} \"2.5 mm\" --name narrow -o cases/", "smaller, under another name and elsewhere"),
            ],
            Notes =
            [
                $"Lengths that are not given keep their proportion to the {words.LeadingLength} ({words.Options[0].Name}).",
            ],
        };
        verb._request.AddTo(command);
        command.Options.Add(verb._out);
        command.Options.Add(verb._json);
        command.Options.Add(verb._force);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private static int List(Tool tool, VerbCommand command)
    {
        TextWriter writer = tool.Terminal.Out;
        int width = command.Subcommands.Max(c => c.Name.Length);
        foreach (Command family in command.Subcommands)
        {
            foreach (string line in Wrapped.Lines(family.Description ?? string.Empty, 80, $"  {family.Name.PadRight(width)}  "))
            {
                writer.WriteLine(line);
            }
        }

        writer.WriteLine();
        writer.WriteLine("Dimensions: polefield sketch FAMILY --help");
        return ExitStatus.Done;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        StartingCase start = _request.Read(arguments, _tool.Pipeline.Materials);
        string folder = arguments.GetValue(_out) ?? string.Empty;
        string drawing = Path.Combine(folder, start.Name + ".dxf");
        string text = Path.Combine(folder, start.Name + ".toml");
        using OutputFiles files = OutputFiles.Plan([drawing, text], arguments.GetValue(_force));
        files.Write(drawing, s => DxfWriter.Write(start.Sketch.Sketch, s));
        files.Write(text, s => StartingCaseText.Write(start, s));
        files.Commit(cancellation);
        if (arguments.GetValue(_json))
        {
            _tool.Terminal.Print(s => JsonText.Write(new SketchFile(start, drawing, text), s));
        }
        else if (!arguments.GetValue(_tool.Quiet))
        {
            Print(arguments, start);
        }

        if (!arguments.GetValue(_tool.Quiet))
        {
            _tool.Terminal.Error.WriteLine($"Sketch: {drawing}");
            _tool.Terminal.Error.WriteLine($"Case:   {text}");
        }

        return ExitStatus.Done;
    }

    private void Print(ParseResult arguments, StartingCase start)
    {
        Ink ink = _tool.OutInk(arguments);
        TextWriter writer = _tool.Terminal.Out;
        writer.WriteLine(ink.Strong(start.Title));
        foreach (string line in Wrapped.Lines($"The closed form ({start.Idealisation}) promises at the beam, {start.BeamPlace}:", 80, "  "))
        {
            writer.WriteLine(line);
        }

        var table = new TextTable("quantity", ">value");
        table.Add("ampere-turns, A", Numbers.Significant(start.AmpereTurns));
        table.Add("field |B|, T", Numbers.Significant(start.Field));
        table.Add("gradient d|B|/dz, T/m", Numbers.Significant(start.Gradient));
        BeamTables.WriteTable(writer, table, ink);
        if (start.ErrorOfCut is { } cut)
        {
            string words = $"Cutting the groove's face costs the field roughly {Numbers.Percent(cut)} and the gradient 3.5 to 5 times that (rule of thumb); "
                + "saturation of the iron comes on top. solve tells.";
            foreach (string line in Wrapped.Lines(words, 80, "  "))
            {
                writer.WriteLine(line);
            }
        }
    }
}
