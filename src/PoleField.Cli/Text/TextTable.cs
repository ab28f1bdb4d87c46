using System.Text;

namespace PoleField.Cli.Text;

/// <summary>A plain table: a header with units, columns aligned, two blanks between, no frames.</summary>
internal sealed class TextTable
{
    private readonly List<string[]> _rows = [];
    private readonly string[] _headers;
    private readonly bool[] _right;

    /// <param name="headers">Column heads; a leading '&gt;' aligns the column to the right.</param>
    public TextTable(params string[] headers)
    {
        _headers = [.. headers.Select(h => h.TrimStart('>'))];
        _right = [.. headers.Select(h => h.StartsWith('>'))];
    }

    public int Count => _rows.Count;

    public void Add(params string[] cells)
    {
        if (cells.Length != _headers.Length)
        {
            throw new InvalidOperationException(FormattableString.Invariant($"A row has {cells.Length} cells, the table {_headers.Length} columns."));
        }

        _rows.Add(cells);
    }

    /// <summary>The lines of the table, header first.</summary>
    /// <param name="ink">Marks the header.</param>
    /// <param name="indent">Blanks before each line.</param>
    public IEnumerable<string> Lines(Ink ink, int indent = 2)
    {
        int[] widths = [.. Enumerable.Range(0, _headers.Length).Select(c => _rows.Select(r => r[c].Length).Append(_headers[c].Length).Max())];
        if (_headers.Any(h => h.Length > 0))
        {
            yield return ink.Faint(Line(_headers, widths, indent));
        }

        foreach (string[] row in _rows)
        {
            yield return Line(row, widths, indent);
        }
    }

    private string Line(string[] cells, int[] widths, int indent)
    {
        var line = new StringBuilder().Append(' ', indent);
        for (int c = 0; c < cells.Length; c++)
        {
            line.Append(_right[c] ? cells[c].PadLeft(widths[c]) : cells[c].PadRight(widths[c]));
            line.Append("  ");
        }

        return line.ToString().TrimEnd();
    }
}
