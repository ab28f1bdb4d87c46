using System.Text.RegularExpressions;

namespace PoleField.Cli.Case;

/// <summary>Puts the parser's syntax messages into words that someone can act on.</summary>
internal static partial class SyntaxMistake
{
    private const string Name = "toml-syntax";
    private const string Quotes = "Put text and numbers with units in quotes: width = \"3 mm\".";

    /// <summary>The mistake behind a parser message.</summary>
    public static Mistake From(string message)
    {
        if (DefinedPattern().Match(message) is { Success: true } twice)
        {
            return new Mistake(Name, $"{twice.Groups[1].Value} is defined already in line {twice.Groups[2].Value}.", "Keep one of the two.");
        }

        if (ExpectingPattern().Match(message) is { Success: true } found)
        {
            return Unexpected(found.Groups[1].Value, found.Groups[2].Value);
        }

        return message switch
        {
            _ when Has(message, "newline in a string") || Has(message, "End-Of-File found on string") =>
                new Mistake(Name, "The text is not closed by the end of the line.", "Close it with a quote."),
            _ when Has(message, "while expecting a value") => new Mistake(Name, "There is no value that can be read.", Quotes),
            _ when Has(message, "Expecting `=`") => new Mistake(Name, "There is no = after the key.", "Write key = value, one to a line."),
            _ when Has(message, "Missing a `,`") => new Mistake(Name, "A comma is missing between two items.", "Separate items with commas."),
            _ => new Mistake(Name, TokenPattern().Replace(message, string.Empty).Trim().TrimEnd('.') + ".", Quotes),
        };
    }

    private static Mistake Unexpected(string found, string wanted)
    {
        string shown = found == "\u2424" ? "the end of the line" : $"\"{found}\"";
        return wanted switch
        {
            "newline" => new Mistake(Name, $"{Capital(shown)} stands where the line should end.", Quotes),
            "]" => new Mistake(
                Name, $"{Capital(shown)} stands where ] is needed.", "Close the bracket; names with blanks need quotes: [parts.\"COIL LEFT\"]."),
            _ => new Mistake(Name, $"{Capital(shown)} stands where {wanted} is needed.", "Write key = value, one to a line."),
        };
    }

    private static string Capital(string text) => char.ToUpperInvariant(text[0]) + text[1..];

    private static bool Has(string message, string words) => message.Contains(words, StringComparison.OrdinalIgnoreCase);

    [GeneratedRegex(@"^The key `([^`]+)` is already defined at \((\d+),", RegexOptions.CultureInvariant)]
    private static partial Regex DefinedPattern();

    [GeneratedRegex(@"^Unexpected token found `([^`]*)`.* while expecting (?:token )?`([^`]+)`", RegexOptions.CultureInvariant)]
    private static partial Regex ExpectingPattern();

    [GeneratedRegex(@"\s*\(token: [^)]*\)", RegexOptions.CultureInvariant)]
    private static partial Regex TokenPattern();
}
