namespace PoleField.Cli.Text;

/// <summary>Text for a table cell.</summary>
internal static class Cell
{
    /// <summary>The text, cut to a width with "…" at the end.</summary>
    public static string Of(string text, int width) => text.Length <= width ? text : text[..(width - 1)] + "…";

    /// <summary>A value, or "-" where there is none.</summary>
    public static string Of(double? value, double factor = 1, int digits = 5) =>
        value is { } number ? Numbers.Significant(number * factor, digits) : "-";
}
