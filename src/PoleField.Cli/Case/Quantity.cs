using System.Globalization;
using System.Text.RegularExpressions;

namespace PoleField.Cli.Case;

/// <summary>Reads a number with its unit, such as "3 mm", into SI.</summary>
internal static partial class Quantity
{
    /// <summary>Reads <paramref name="text"/> as a quantity of the given kind.</summary>
    /// <param name="text">Number, optional blanks, unit.</param>
    /// <param name="dimension">Kind that is wanted.</param>
    /// <param name="value">The value, SI; zero when it cannot be read.</param>
    /// <returns>What is wrong with it, or null.</returns>
    public static Mistake? Read(string text, Dimension dimension, out double value)
    {
        value = 0;
        string trimmed = text.Trim().Replace('\u2212', '-');
        Match match = NumberPattern().Match(trimmed);
        if (!match.Success)
        {
            return new Mistake("not-a-quantity", $"\"{text}\" does not start with a number; {dimension.Name} is needed.", Write(dimension));
        }

        string unitName = trimmed[match.Length..].Trim();
        if (WrongSeparator(text, trimmed, match.Length) is { } separator)
        {
            return separator;
        }

        double number = double.Parse(match.Value, NumberStyles.Float, CultureInfo.InvariantCulture);
        if (!double.IsFinite(number))
        {
            return new Mistake("not-a-quantity", $"\"{text}\" is too large a number.", Write(dimension));
        }

        if (dimension.Find(unitName) is not { } unit)
        {
            return WrongUnit(text, match.Value, unitName, dimension);
        }

        value = unit.ToSi(number);
        return null;
    }

    /// <summary>How to write a quantity of this kind.</summary>
    public static string Write(Dimension dimension) => $"Write it like \"{dimension.Example}\" (units: {dimension.Allowed}).";

    private static Mistake? WrongSeparator(string text, string trimmed, int numberLength)
    {
        string rest = trimmed[numberLength..];
        if (CommaPattern().IsMatch(rest))
        {
            string repaired = trimmed[..numberLength] + "." + rest[1..];
            return new Mistake("decimal-comma", $"\"{text}\" has a comma in the number.", $"Use the decimal point: \"{repaired}\".");
        }

        return GroupPattern().IsMatch(rest)
            ? new Mistake("digit-groups", $"\"{text}\" has blanks or marks inside the number.", "Write the digits without gaps.")
            : null;
    }

    private static Mistake WrongUnit(string text, string number, string unitName, Dimension dimension)
    {
        if (unitName.Length == 0)
        {
            return new Mistake("missing-unit", $"\"{text}\" has no unit; {dimension.Name} needs one.", Write(dimension));
        }

        Unit[] sameLetters = [.. dimension.Units.Where(u => u.Name.Equals(unitName, StringComparison.OrdinalIgnoreCase))];
        if (sameLetters.Length == 1)
        {
            return new Mistake(
                "unknown-unit",
                $"\"{text}\" has the unit \"{unitName}\"; capitals count in units.",
                $"Write \"{number} {sameLetters[0].Name}\" (units: {dimension.Allowed}).");
        }

        string what = Dimension.Owning(unitName) is { } other
            ? $"\"{text}\" is {other.Name}; {dimension.Name} is needed."
            : $"\"{text}\" has the unknown unit \"{unitName}\"; {dimension.Name} is needed.";
        return new Mistake(Dimension.Owning(unitName) is null ? "unknown-unit" : "wrong-unit", what, Write(dimension));
    }

    [GeneratedRegex(@"^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?", RegexOptions.CultureInvariant)]
    private static partial Regex NumberPattern();

    [GeneratedRegex(@"^,\d", RegexOptions.CultureInvariant)]
    private static partial Regex CommaPattern();

    [GeneratedRegex(@"^[\s'_]*\d", RegexOptions.CultureInvariant)]
    private static partial Regex GroupPattern();
}
