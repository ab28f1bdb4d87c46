using System.Globalization;
using System.Text.RegularExpressions;

namespace PoleField.Cli.Case;

/// <summary>Another value at a place of the case.</summary>
/// <param name="Path">The place or places.</param>
/// <param name="Text">The value as it would be written, unit included; as a factor a bare number.</param>
/// <param name="IsFactor">The value multiplies what the case says.</param>
internal sealed partial record CaseChange(CasePath Path, string Text, bool IsFactor)
{
    /// <summary>The value that stands in the case instead of <paramref name="old"/>.</summary>
    public TomlNode Of(TomlNode old)
    {
        (double? number, string unit) = Split(old);
        if (IsFactor && number is { } base10)
        {
            return Node(old, Rounded(base10 * double.Parse(Text, CultureInfo.InvariantCulture)), unit);
        }

        (double? given, string givenUnit) = Split(Text);
        return given is { } value && number is not null
            ? Node(old, value, givenUnit.Length > 0 ? givenUnit : unit)
            : new TomlText(old.At, Text);
    }

    /// <summary>Number and unit of a value; no number when it is a word.</summary>
    public static (double? Number, string Unit) Split(TomlNode node) => node switch
    {
        TomlNumber number => (number.Value, string.Empty),
        TomlText text => Split(text.Value),
        _ => (null, string.Empty),
    };

    /// <summary>Number and unit of "3 mm"; no number when it is not one with at most a unit behind it.</summary>
    public static (double? Number, string Unit) Split(string text)
    {
        Match match = QuantityPattern().Match(text.Trim());
        return match.Success
            ? (double.Parse(match.Groups[1].Value, CultureInfo.InvariantCulture), match.Groups[4].Value)
            : (null, string.Empty);
    }

    /// <summary>Twelve digits: what a person would have written, without the dust of binary fractions.</summary>
    public static double Rounded(double value) =>
        double.Parse(value.ToString("G12", CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);

    private static TomlNode Node(TomlNode old, double value, string unit) => unit.Length == 0
        ? new TomlNumber(old.At, value, value == Math.Round(value))
        : new TomlText(old.At, FormattableString.Invariant($"{value:R} {unit}"));

    [GeneratedRegex(@"^([+-]?(\d+(\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?)\s*([^\d\s.,:;]\S*)?$", RegexOptions.CultureInvariant)]
    private static partial Regex QuantityPattern();
}
