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

    /// <summary>Adds a table; cells that start with a number are kept on one line.</summary>
    public PageText Table(ReportTable table)
    {
        Raw($"<div class=\"scroll\" tabindex=\"0\" role=\"region\" aria-label=\"{Escape(table.Caption)}\"><table>");
        Raw($"<caption>{Escape(table.Caption)}</caption>");
        Raw($"<thead><tr>{string.Concat(table.Columns.Select(c => $"<th scope=\"col\">{Escape(c)}</th>"))}</tr></thead><tbody>");
        foreach (IReadOnlyList<string> row in table.Rows)
        {
            string cells = string.Concat(row.Skip(1).Select(Cell));
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
        Raw($"</div><figcaption>Figure {number}</figcaption>");
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

    private static string Cell(string text) => text switch
    {
        Verdict.Met => $"<td class=\"met\">{text}</td>",
        Verdict.NotMet => $"<td class=\"missed\">{text}</td>",
        _ when text.Length > 0 && (char.IsAsciiDigit(text[0]) || text[0] is '−' or '–' or '+') => $"<td class=\"number\">{Escape(text)}</td>",
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
