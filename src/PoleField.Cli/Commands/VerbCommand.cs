using System.CommandLine;

namespace PoleField.Cli.Commands;

/// <summary>A command with the examples its help starts with.</summary>
internal sealed class VerbCommand(string name, string description) : Command(name, description)
{
    /// <summary>Command lines, each with what it does.</summary>
    public required IReadOnlyList<(string Line, string Does)> Examples { get; init; }

    /// <summary>Paragraphs after the options.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];
}
