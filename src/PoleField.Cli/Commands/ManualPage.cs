using System.CommandLine;

namespace PoleField.Cli.Commands;

/// <summary>The command tree as a manual page in the macros of man(7).</summary>
internal static class ManualPage
{
    public static void Write(TextWriter writer, Command root)
    {
        writer.WriteLine(".TH POLEFIELD 1");
        Section(writer, "NAME", $"polefield - {root.Description}");
        writer.WriteLine(".SH SYNOPSIS\n.B polefield\n.I VERB\n.RI [ CASE.toml ]\n.RI [ options ]");
        writer.WriteLine(".SH OPTIONS");
        Options(writer, root);
        writer.WriteLine(".SH VERBS");
        foreach (VerbCommand verb in root.Subcommands.OfType<VerbCommand>())
        {
            Verb(writer, verb);
        }

        writer.WriteLine(".SH \"EXIT STATUS\"");
        foreach ((string status, string meaning) in HelpText.ExitMeanings)
        {
            Entry(writer, $"\\fB{status}\\fR", meaning);
        }
    }

    private static void Verb(TextWriter writer, VerbCommand verb)
    {
        IEnumerable<string> arguments = verb.Arguments.Select(a => a.Name);
        writer.WriteLine($".SS \"{Plain($"{VerbCommand.Path(verb)} {string.Join(' ', arguments)}".TrimEnd())}\"");
        writer.WriteLine(Plain(verb.Description ?? string.Empty));
        Options(writer, verb);
        foreach (string note in verb.Notes)
        {
            writer.WriteLine($".PP\n{Plain(note)}");
        }

        foreach ((string line, string does) in verb.Examples)
        {
            writer.WriteLine($".PP\n.EX\n{Plain(line)}\n.EE\n.RS\n{Plain(does)}\n.RE");
        }

        foreach (VerbCommand below in verb.Subcommands.OfType<VerbCommand>())
        {
            Verb(writer, below);
        }
    }

    private static void Options(TextWriter writer, Command command)
    {
        foreach (Option option in command.Options.Where(o => !o.Hidden))
        {
            string value = option.ValueType == typeof(bool) || option.HelpName is null ? string.Empty : $" \\fI{Plain(option.HelpName)}\\fR";
            IEnumerable<string> names = option.Aliases.Where(a => a.StartsWith('-') && a.Length == 2).Append(option.Name);
            Entry(writer, string.Join(", ", names.Select(n => $"\\fB{Plain(n)}\\fR")) + value, option.Description ?? string.Empty);
        }
    }

    private static void Section(TextWriter writer, string heading, string text) => writer.WriteLine($".SH {heading}\n{Plain(text)}");

    private static void Entry(TextWriter writer, string term, string text) => writer.WriteLine($".TP\n{term}\n{Plain(text)}");

    // Backslashes are commands, a leading dot or apostrophe is a macro, a bare minus prints as a hyphen.
    private static string Plain(string text)
    {
        string safe = text.Replace("\\", "\\e", StringComparison.Ordinal).Replace("-", "\\-", StringComparison.Ordinal);
        return safe.StartsWith('.') || safe.StartsWith('\'') ? "\\&" + safe : safe;
    }
}
