using System.Globalization;
using System.Text;
using PoleField.Geometry;

namespace PoleField.Cli.Files;

/// <summary>
/// A list of places: one a line, y and z in mm, apart by comma, semicolon, blank or tab. Empty lines and lines that start with
/// '#' are skipped, and so is a first line of column heads.
/// </summary>
internal static class PlacesFile
{
    private static readonly char[] Separators = [',', ';', ' ', '\t'];

    /// <summary>Reads the places, metres.</summary>
    /// <exception cref="InputException">The file cannot be read, holds no place, or lines of it are no places; all of them are listed.</exception>
    public static IReadOnlyList<Point> Read(string path)
    {
        string[] lines = Encoding.UTF8.GetString(CaseLoader.ReadFile(path, "list of places")).TrimStart('\ufeff').ReplaceLineEndings("\n").Split('\n');
        var places = new List<Point>();
        var faults = new List<Finding>();
        bool first = true;
        for (int i = 0; i < lines.Length; i++)
        {
            string line = lines[i].Trim();
            if (line.Length == 0 || line[0] == '#')
            {
                continue;
            }

            string[] cells = line.Split(Separators, StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);
            if (cells.Length == 2 && Number(cells[0]) is { } y && Number(cells[1]) is { } z)
            {
                places.Add(new Point(y / 1e3, z / 1e3));
            }
            else if (!first || cells.Any(c => Number(c) is not null))
            {
                faults.Add(Fault(path, i + 1, $"\"{line}\" is no place.", "Write y and z in mm, such as 0.5, 3.6, with decimal points."));
            }

            first = false;
        }

        if (places.Count == 0 && faults.Count == 0)
        {
            faults.Add(Fault(path, null, "The list holds no place.", "Write one place a line: y and z in mm."));
        }

        return faults.Count == 0 ? places : throw new InputException(faults);
    }

    private static double? Number(string cell) =>
        double.TryParse(cell, NumberStyles.Float, CultureInfo.InvariantCulture, out double value) && double.IsFinite(value) ? value : null;

    private static Finding Fault(string path, int? line, string text, string fix) =>
        new(Severity.Fault, "not-a-place", text, fix) { File = Path.GetFileName(path), Line = line };
}
