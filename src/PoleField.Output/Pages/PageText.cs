using System.Globalization;
using System.Text;
using PoleField.Output.Figures;

namespace PoleField.Output.Pages;

/// <summary>Writes pieces of HTML with everything from outside escaped.</summary>
internal sealed class PageText
{
    private readonly StringBuilder _html = new();
    private int _figures;

    public override string ToString() => _html.ToString();

    /// <summary>Adds markup as it is.</summary>
    public PageText Raw(string markup)
    {
        _html.Append(markup).Append('\n');
        return this;
    }

    /// <summary>Adds an element that holds only text.</summary>
    public PageText Element(string name, string text) => text.Length == 0 ? this : Raw($"<{name}>{Escape(text)}</{name[..(name + " ").IndexOf(' ', StringComparison.Ordinal)]}>");

    /// <summary>Adds a bulleted list; nothing when there are no items.</summary>
    public PageText List(IReadOnlyList<string> items)
    {
        if (items.Count == 0)
        {
            return this;
        }

        Raw("<ul>");
        foreach (string item in items)
        {
            Raw($"<li>{Escape(item)}</li>");
        }

        return Raw("</ul>");
    }

    /// <summary>Adds a table; columns of numbers are aligned to the right.</summary>
    public PageText Table(ReportTable table)
    {
        Raw($"<div class=\"scroll\" tabindex=\"0\" role=\"region\" aria-label=\"{Escape(table.Caption)}\"><table>");
        Raw($"<caption>{Escape(table.Caption)}</caption>");
        bool[] numeric = [.. table.Columns.Select((_, c) => c > 0 && IsNumeric(table.Rows.Select(r => r[c])))];
        Raw($"<thead><tr>{string.Concat(table.Columns.Select((c, i) => $"<th scope=\"col\"{(numeric[i] ? " class=\"number\"" : "")}>{Escape(c)}</th>"))}</tr></thead><tbody>");
        foreach (IReadOnlyList<string> row in table.Rows)
        {
            string cells = string.Concat(row.Skip(1).Select((c, i) => Cell(c, numeric[i + 1])));
            Raw($"<tr><th scope=\"row\">{Escape(row[0])}</th>{cells}</tr>");
        }

        return Raw("</tbody></table></div>");
    }

    /// <summary>Adds a numbered figure with its numbers folded away under it.</summary>
    public PageText Picture(ReportPicture picture)
    {
        Figure figure = picture.Figure;
        _figures++;
        string number = _figures.ToString(CultureInfo.InvariantCulture);
        string width = figure.Width.ToString("0", CultureInfo.InvariantCulture);
        Raw($"<figure id=\"figure-{number}\" style=\"max-width:{width}px\"><div class=\"paper\">");
        Raw(FigureWriter.SvgText(figure));
        Raw($"</div><figcaption><b>Figure {number}. {Escape(figure.Title)}.</b> {Escape(figure.Caption)}</figcaption>");
        if (picture.Numbers is not null)
        {
            Raw("<details><summary>Numbers of this figure</summary>").Table(picture.Numbers).Raw("</details>");
        }

        return Raw("</figure>");
    }

    /// <summary>Text made safe for element content and attribute values.</summary>
    public static string Escape(string text) => text
        .Replace("&", "&amp;", StringComparison.Ordinal)
        .Replace("<", "&lt;", StringComparison.Ordinal)
        .Replace(">", "&gt;", StringComparison.Ordinal)
        .Replace("\"", "&quot;", StringComparison.Ordinal);

    // A column of numbers is aligned to the right; empty cells and dashes do not count, but one must be a number.
    private static bool IsNumeric(IEnumerable<string> cells)
    {
        string[] filled = [.. cells.Where(c => c.Length > 0 && c != "–" && c != "-")];
        return filled.Length > 0 && filled.All(c => char.IsAsciiDigit(c[0]) || (c.Length > 1 && c[0] is '−' or '+' or '≤' && char.IsAsciiDigit(c.TrimStart('−', '+', '≤', ' ')[0])));
    }

    private static string Cell(string text, bool numeric) => text switch
    {
        Verdict.Met => $"<td class=\"met\">{text}</td>",
        Verdict.NotMet => $"<td class=\"missed\">{text}</td>",
        _ when numeric => $"<td class=\"number\">{Escape(text)}</td>",
        _ => $"<td>{Escape(text)}</td>",
    };
}

/// <summary>The two words of a verdict; always with a sign, so that colour is not needed.</summary>
internal static class Verdict
{
    public const string Met = "✓ met";
    public const string NotMet = "✗ not met";

    public static string Of(bool met) => met ? Met : NotMet;
}
