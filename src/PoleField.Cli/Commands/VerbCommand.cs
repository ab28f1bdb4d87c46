using System.CommandLine;

namespace PoleField.Cli.Commands;

/// <summary>A command with the examples its help starts with.</summary>
internal sealed class VerbCommand(string name, string description) : Command(name, description)
{
    /// <summary>Command lines, each with what it does.</summary>
    public required IReadOnlyList<(string Line, string Does)> Examples { get; init; }

    /// <summary>Paragraphs after the options.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];

    /// <summary>What the commands below this one are: placeholder in the usage line, and heading.</summary>
    public (string Placeholder, string Heading) PartsAre { get; init; } = (string.Empty, string.Empty);

    /// <summary>The words that call a command, "polefield" first.</summary>
    public static string Path(Command command) => string.Join(
        ' ', command.Parents.OfType<Command>().Take(1).Select(Path).Append(command is RootCommand ? "polefield" : command.Name));
}
