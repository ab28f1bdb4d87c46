using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Text;

/// <summary>Prints what <c>check</c> found.</summary>
internal static class CheckTables
{
    public static void Write(TextWriter writer, LoadedCase loaded, Ink ink)
    {
        if (loaded.Case is { } file)
        {
            writer.WriteLine(ink.Strong(file.Title));
        }

        if (loaded.Sketch is { } sketch)
        {
            writer.WriteLine($"  sketch {sketch.Name}, in {sketch.Unit.Name} ({OriginWords(sketch.UnitOrigin)})");
        }

        writer.WriteLine();
        if (loaded.Reading is { } reading)
        {
            WriteParts(writer, reading, loaded.Roles, ink);
            WriteIgnored(writer, loaded.Sketch, reading, ink);
        }

        if (loaded.Findings.Count > 0)
        {
            writer.WriteLine(ink.Strong("Found"));
            FindingText.Write(writer, Sorted(loaded.Findings), ink, loaded.DrawingUnit);
            writer.WriteLine();
        }

        writer.WriteLine(Summary(loaded, ink));
    }

    /// <summary>Faults first, then warnings, then notes; within each in the order they were found.</summary>
    public static IEnumerable<Finding> Sorted(IEnumerable<Finding> findings) => findings.OrderByDescending(f => f.Severity);

    /// <summary>How the unit became known, as one word for files.</summary>
    public static string OriginName(UnitOrigin origin) => origin switch
    {
        UnitOrigin.CaseFile => "case",
        UnitOrigin.InsertUnits => "drawing",
        UnitOrigin.Measurement => "drawing",
        _ => "assumed",
    };

    private static string OriginWords(UnitOrigin origin) => origin switch
    {
        UnitOrigin.CaseFile => "stated by the case",
        UnitOrigin.InsertUnits => "stated by the drawing's $INSUNITS",
        UnitOrigin.Measurement => "from the drawing's $MEASUREMENT",
        _ => "assumed: neither case nor drawing says",
    };

    private static void WriteParts(TextWriter writer, SectionReading reading, IReadOnlyList<PartRole> roles, Ink ink)
    {
        var table = new TextTable("layer", "kind", "material", ">loops", ">area, mm²", ">y, mm", ">z, mm");
        foreach (PartShape part in reading.Parts)
        {
            PartRole? role = roles.FirstOrDefault(r => r.Layer.Equals(part.Layer, StringComparison.OrdinalIgnoreCase));
            table.Add(
                Cell.Of(part.Layer, 16),
                role?.Kind ?? "-",
                Cell.Of(role?.Material.Name ?? "-", 16),
                FormattableString.Invariant($"{part.Outlines}"),
                Numbers.Significant(part.Area * 1e6),
                Interval(part.Bounds, p => p.Y),
                Interval(part.Bounds, p => p.Z));
        }

        writer.WriteLine(ink.Strong("Parts"));
        foreach (string line in table.Lines(ink))
        {
            writer.WriteLine(line);
        }

        writer.WriteLine();
    }

    private static string Interval(Box box, Func<Point, double> of) =>
        box.IsEmpty ? "-" : $"{Short(of(box.Min))} to {Short(of(box.Max))}";

    private static string Short(double metres) => Numbers.Short(Math.Round(metres * 1e3, 3), 5);

    private static void WriteIgnored(TextWriter writer, Sketch? sketch, SectionReading reading, Ink ink)
    {
        if (reading.IgnoredLayers.Count == 0 && sketch?.Skipped.Count is null or 0)
        {
            return;
        }

        writer.WriteLine(ink.Strong("Not used"));
        foreach ((string layer, int curves) in reading.IgnoredLayers)
        {
            writer.WriteLine(FormattableString.Invariant($"  layer {layer}: {curves} {(curves == 1 ? "curve" : "curves")}, not in the case"));
        }

        foreach (SkippedEntities skipped in sketch?.Skipped ?? [])
        {
            writer.WriteLine(FormattableString.Invariant($"  layer {skipped.Layer}: {skipped.Count} {skipped.Kind}, {skipped.Why}"));
        }

        writer.WriteLine();
    }

    private static string Summary(LoadedCase loaded, Ink ink)
    {
        int faults = loaded.Findings.Count(f => f.Severity == Severity.Fault);
        int warnings = loaded.Findings.Count(f => f.Severity == Severity.Warning);
        string doubts = warnings == 0 ? string.Empty : $", {Count(warnings, "warning")}";
        return faults == 0 ? ink.Good("Sound") + doubts + "." : ink.Bad(Count(faults, "fault")) + doubts + ".";
    }

    private static string Count(int count, string word) => FormattableString.Invariant($"{count} {word}{(count == 1 ? string.Empty : "s")}");
}
