using PoleField.Output.Pages;

namespace PoleField.Cli.Text;

/// <summary>A table that goes to the terminal and to the page of a report alike.</summary>
/// <param name="Caption">What it holds.</param>
/// <param name="Heads">Column heads; a leading '&gt;' aligns the column to the right.</param>
/// <param name="Rows">Rows.</param>
internal sealed record AnswerTable(string Caption, IReadOnlyList<string> Heads, IReadOnlyList<string[]> Rows)
{
    public void Write(TextWriter writer, Ink ink)
    {
        writer.WriteLine(ink.Strong(Caption));
        var table = new TextTable([.. Heads]);
        foreach (string[] row in Rows)
        {
            table.Add(row);
        }

        BeamTables.WriteTable(writer, table, ink);
    }

    public ReportTable ForPage() => new(Caption, [.. Heads.Select(h => h.TrimStart('>'))], [.. Rows.Select(r => r.Select(WithMinus).ToArray())]);

    // A page has the true minus sign; a terminal may not.
    private static string WithMinus(string cell) => cell.Length > 1 && cell[0] == '-' && char.IsAsciiDigit(cell[1]) ? "−" + cell[1..] : cell;
}

/// <summary>An analysis in words: tables and remarks, for the terminal and for the page.</summary>
/// <param name="Heading">Heading on the page.</param>
/// <param name="Tables">Tables.</param>
/// <param name="Remarks">What to make of the numbers, and what they leave out.</param>
internal sealed record Answer(string Heading, IReadOnlyList<AnswerTable> Tables, IReadOnlyList<string> Remarks)
{
    private const int Width = 100;

    /// <summary>Prints it under the case's title.</summary>
    public void Write(TextWriter writer, Ink ink, string title)
    {
        writer.WriteLine(ink.Strong(title));
        writer.WriteLine();
        foreach (AnswerTable table in Tables)
        {
            table.Write(writer, ink);
        }

        foreach (string line in Remarks.SelectMany(r => Wrapped.Lines(r, Width, "  - ")))
        {
            writer.WriteLine(line);
        }
    }

    /// <summary>The section of a page, with pictures.</summary>
    public ReportSection ForPage(string id, IReadOnlyList<ReportPicture> pictures) => new()
    {
        Id = id,
        Heading = Heading,
        Tables = [.. Tables.Select(t => t.ForPage())],
        Pictures = pictures,
        Remarks = Remarks,
    };
}
