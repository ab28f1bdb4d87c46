using System.CommandLine;
using System.CommandLine.Invocation;
using PoleField.Cli.Text;

namespace PoleField.Cli.Commands;

/// <summary>Writes help, examples first.</summary>
internal sealed class HelpText : SynchronousCommandLineAction
{
    private const int Width = 80;
    private const int LeftColumn = 24;

    /// <summary>What each exit status means, in words.</summary>
    public static IReadOnlyList<(string Status, string Meaning)> ExitMeanings { get; } =
    [
        ("0", "done"),
        ("1", "a fault in PoleField itself"),
        ("2", "the command line, the case or the sketch is wrong"),
        ("3", "the run ended, but a requirement or the asked accuracy was not met"),
        ("130", "interrupted"),
    ];

    public override int Invoke(ParseResult parseResult)
    {
        TextWriter writer = parseResult.InvocationConfiguration.Output;
        Command command = parseResult.CommandResult.Command;
        if (command is VerbCommand verb)
        {
            WriteVerb(writer, verb);
        }
        else
        {
            WriteRoot(writer, command);
        }

        return ExitStatus.Done;
    }

    /// <summary>The help for a command line without words.</summary>
    public static void WriteShort(TextWriter writer, RootCommand root)
    {
        writer.WriteLine("Usage: polefield VERB [CASE.toml] [options]");
        writer.WriteLine();
        WriteCommands(writer, root, "Verbs");
        writer.WriteLine();
        writer.WriteLine("See: polefield --help, polefield VERB --help");
    }

    private static void WriteRoot(TextWriter writer, Command root)
    {
        WriteParagraph(writer, root.Description ?? string.Empty);
        WriteExamples(
            writer,
            [
                ("polefield sketch two-wire", "a case to start from"),
                ("polefield check magnet.toml", "is the case sound?"),
                ("polefield solve magnet.toml", "field, gradient, uniformity, saturation"),
                ("polefield materials", "which magnetisation curves are built in"),
            ]);
        writer.WriteLine("Usage");
        writer.WriteLine("  polefield VERB [CASE.toml] [options]");
        writer.WriteLine();
        WriteCommands(writer, root, "Verbs");
        writer.WriteLine();
        WriteOptions(writer, root.Options);
        WriteHeading(writer, "Exit status");
        foreach ((string status, string meaning) in ExitMeanings)
        {
            WriteEntry(writer, status, meaning);
        }
    }

    private static void WriteVerb(TextWriter writer, VerbCommand verb)
    {
        WriteParagraph(writer, verb.Description ?? string.Empty);
        WriteExamples(writer, verb.Examples);
        WriteHeading(writer, "Usage");
        string arguments = string.Concat(verb.Arguments.Select(a => a.Arity.MinimumNumberOfValues > 0 ? $" {a.Name}" : $" [{a.Name}]"));
        string below = verb.Subcommands.Count > 0 ? $" [{verb.PartsAre.Placeholder}]" : string.Empty;
        writer.WriteLine($"  {VerbCommand.Path(verb)}{below}{arguments} [options]");
        writer.WriteLine();
        if (verb.Subcommands.Count > 0)
        {
            WriteCommands(writer, verb, verb.PartsAre.Heading);
            writer.WriteLine();
        }

        if (verb.Arguments.Count > 0)
        {
            WriteHeading(writer, "Arguments");
            foreach (Argument argument in verb.Arguments)
            {
                WriteEntry(writer, argument.Name, argument.Description ?? string.Empty);
            }

            writer.WriteLine();
        }

        WriteOptions(writer, verb.Options.Concat(Above(verb).SelectMany(p => p.Options.Where(o => o.Recursive))));
        foreach (string note in verb.Notes)
        {
            WriteParagraph(writer, note);
        }
    }

    private static IEnumerable<Command> Above(Command command) =>
        command.Parents.OfType<Command>().SelectMany(p => Above(p).Prepend(p));

    private static void WriteCommands(TextWriter writer, Command above, string heading)
    {
        WriteHeading(writer, heading);
        foreach (Command verb in above.Subcommands.Where(c => !c.Hidden))
        {
            WriteEntry(writer, verb.Name, verb.Description ?? string.Empty);
        }
    }

    private static void WriteOptions(TextWriter writer, IEnumerable<Option> options)
    {
        WriteHeading(writer, "Options");
        foreach (Option option in options.Where(o => !o.Hidden))
        {
            string[] names = [.. option.Aliases.Where(a => a.StartsWith('-') && a.Length == 2), option.Name];
            string value = option.ValueType == typeof(bool) || option.HelpName is null ? string.Empty : " " + option.HelpName;
            WriteEntry(writer, string.Join(", ", names) + value, option.Description ?? string.Empty);
        }

        writer.WriteLine();
    }

    private static void WriteExamples(TextWriter writer, IEnumerable<(string Line, string Does)> examples)
    {
        WriteHeading(writer, "Examples");
        foreach ((string line, string does) in examples)
        {
            writer.WriteLine($"  {line}");
            foreach (string part in Wrapped.Lines(does, Width, "      "))
            {
                writer.WriteLine(part);
            }
        }

        writer.WriteLine();
    }

    private static void WriteHeading(TextWriter writer, string text) => writer.WriteLine(text);

    private static void WriteParagraph(TextWriter writer, string text)
    {
        foreach (string line in Wrapped.Lines(text, Width))
        {
            writer.WriteLine(line);
        }

        writer.WriteLine();
    }

    private static void WriteEntry(TextWriter writer, string name, string description)
    {
        string left = $"  {name}".PadRight(LeftColumn - 2) + "  ";
        if (left.Length > LeftColumn)
        {
            writer.WriteLine(left.TrimEnd());
            left = new string(' ', LeftColumn);
        }

        foreach (string line in Wrapped.Lines(description, Width, left))
        {
            writer.WriteLine(line);
        }
    }
}
