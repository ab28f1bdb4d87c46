using System.Text.RegularExpressions;
using PoleField.Geometry;

namespace PoleField.Cli.Text;

/// <summary>Prints findings: file, line, column; layer, handle, place in drawing units; what was found; what to do.</summary>
internal static partial class FindingText
{
    public static void Write(TextWriter writer, IEnumerable<Finding> findings, Ink ink, string drawingUnit = "")
    {
        foreach (Finding finding in findings)
        {
            writer.WriteLine($"{Where(finding)}{Weight(finding.Severity, ink)}: {Place(finding, drawingUnit)}{finding.Text}");
            if (finding.Fix.Length > 0 && finding.Severity != Severity.Note)
            {
                writer.WriteLine("  " + finding.Fix);
            }
        }
    }

    // Layer, handle and place, as far as the sentence itself does not name them.
    internal static string Place(Finding finding, string drawingUnit)
    {
        var parts = new List<string>();
        if (finding.Layer is { } layer && !finding.Text.Contains(layer, StringComparison.OrdinalIgnoreCase))
        {
            parts.Add($"layer \"{layer}\"");
        }

        if (finding.Handle is { Length: > 0 } handle)
        {
            parts.Add("handle " + handle);
        }

        bool placed = PairPattern().IsMatch(finding.Text);
        if (!placed && finding.AtDrawing is { } at)
        {
            parts.Add($"at {Pair(at)} {drawingUnit}".TrimEnd());
        }
        else if (!placed && finding.At is { } metres)
        {
            parts.Add($"at {Pair(1e3 * metres)} mm");
        }

        return parts.Count == 0 ? string.Empty : string.Join(", ", parts) + ": ";
    }

    [GeneratedRegex(@"\(-?[\d.]+(e-?\d+)?, -?[\d.]+(e-?\d+)?\)", RegexOptions.CultureInvariant)]
    private static partial Regex PairPattern();

    private static string Pair(Point p) => $"({Numbers.Short(p.Y, 6)}, {Numbers.Short(p.Z, 6)})";

    private static string Where(Finding finding)
    {
        if (finding.File is null)
        {
            return string.Empty;
        }

        string line = finding.Line is { } l and > 0 ? FormattableString.Invariant($":{l}") : string.Empty;
        string column = line.Length > 0 && finding.Column is { } c ? FormattableString.Invariant($":{c}") : string.Empty;
        return $"{finding.File}{line}{column}: ";
    }

    private static string Weight(Severity severity, Ink ink) => severity switch
    {
        Severity.Fault => ink.Bad("fault"),
        Severity.Warning => ink.Doubtful("warning"),
        _ => ink.Faint("note"),
    };
}
