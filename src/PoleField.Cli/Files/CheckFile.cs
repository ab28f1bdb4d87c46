using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Cli.Text;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>What <c>check</c> found. Its members are the keys; their descriptions are the published schema's.</summary>
internal sealed class CheckFile(LoadedCase loaded)
{
    public const string Name = "polefield-check/1";

    /// <summary>The format with its schema.</summary>
    public static FileFormat Form { get; } = new(Name, "What a case and its sketch hold, and everything that is wrong with them. Lengths in mm.", typeof(CheckFile));

    [JsonPropertyName("format"), Description("Name and version of the format.")]
    public string Format { get; } = Name;

    [JsonPropertyName("ok"), Description("True when there are no faults.")]
    public bool Ok { get; } = !loaded.HasFaults;

    [JsonPropertyName("title"), Description("Title of the case; null when it could not be read.")]
    public string? Title { get; } = loaded.Case?.Title;

    [JsonPropertyName("case_sha256"), Description("SHA-256 of the case file; empty when it could not be read.")]
    public string CaseSha256 { get; } = loaded.CaseSha256;

    [JsonPropertyName("sketch_sha256"), Description("SHA-256 of the sketch; empty when it could not be read.")]
    public string SketchSha256 { get; } = loaded.SketchSha256;

    [JsonPropertyName("unit"), Description("Unit of the drawing; null without one.")]
    public string? Unit { get; } = loaded.Sketch?.Unit.Name;

    [JsonPropertyName("unit_from"), Description("What states the unit.")]
    public string? UnitFrom { get; } = loaded.Sketch is { } sketch ? CheckTables.OriginName(sketch.UnitOrigin) : null;

    [JsonPropertyName("parts"), Description("The parts found in the sketch.")]
    public IReadOnlyList<CheckedPart> Parts { get; } = [.. (loaded.Reading?.Parts ?? []).Select(p => new CheckedPart(
        p, loaded.Roles.FirstOrDefault(r => r.Layer.Equals(p.Layer, StringComparison.OrdinalIgnoreCase))))];

    [JsonPropertyName("ignored_layers"), Description("Layers of the sketch that the case does not name.")]
    public IReadOnlyList<IgnoredLayer> IgnoredLayers { get; } = [.. (loaded.Reading?.IgnoredLayers ?? []).Select(l => new IgnoredLayer(l.Layer, l.Curves))];

    [JsonPropertyName("healed"), Description("What was put right in the drawing.")]
    public IReadOnlyList<HealedPlace> Healed { get; } =
        [.. (loaded.Reading?.Findings ?? []).Where(f => f.Severity == Severity.Note).Select(f => new HealedPlace(f, loaded.Sketch))];

    [JsonPropertyName("faults"), Description("What must be mended before a solve.")]
    public IReadOnlyList<FoundFault> Faults { get; } = [.. FoundFault.Of(loaded.Findings, Severity.Fault, loaded.Sketch)];

    [JsonPropertyName("warnings"), Description("What should be looked at.")]
    public IReadOnlyList<FoundFault> Warnings { get; } = [.. FoundFault.Of(loaded.Findings, Severity.Warning, loaded.Sketch)];

    // Twelve decimals of a millimetre: below any coordinate's meaning, above the rounding of the change of unit.
    public static double? Tidy(double? value) => value is { } v && double.IsFinite(v) ? Math.Abs(v) < 1e3 ? Math.Round(v, 12) : v : null;
}

internal sealed class CheckedPart(PartShape part, PartRole? role)
{
    [JsonPropertyName("layer"), Description("Layer of the sketch.")]
    public string Layer { get; } = part.Layer;

    [JsonPropertyName("kind"), Description("iron, coil, magnet or air; null when the case does not tell.")]
    public string? Kind { get; } = role?.Kind;

    [JsonPropertyName("material"), Description("Material; null when the case does not tell.")]
    public string? Material { get; } = role?.Material.Name;

    [JsonPropertyName("loops"), Description("Closed outlines.")]
    public int Loops { get; } = part.Outlines;

    [JsonPropertyName("area_mm2"), Description("Exact area of the curves, holes and enclosed other parts subtracted.")]
    public double? Area { get; } = CheckFile.Tidy(part.Area * 1e6);

    [JsonPropertyName("box_mm"), Description("Box around the part: [ymin, zmin, ymax, zmax]; empty for a part without curves.")]
    public IReadOnlyList<double?> Box { get; } = part.Bounds.IsEmpty
        ? []
        : [.. new[] { part.Bounds.Min.Y, part.Bounds.Min.Z, part.Bounds.Max.Y, part.Bounds.Max.Z }.Select(v => CheckFile.Tidy(1e3 * v))];
}

internal sealed class IgnoredLayer(string layer, int curves)
{
    [JsonPropertyName("layer"), Description("Layer of the sketch.")]
    public string Layer { get; } = layer;

    [JsonPropertyName("entities"), Description("Curves on it.")]
    public int Entities { get; } = curves;
}

internal sealed class HealedPlace(Finding note, Sketch? sketch)
{
    [JsonPropertyName("what"), Description("Kind of what was put right.")]
    public string What { get; } = note.What;

    [JsonPropertyName("layer"), Description("Layer; null when it has none.")]
    public string? Layer { get; } = note.Layer;

    [JsonPropertyName("at_mm"), Description("Place: [y, z]; null when it has none.")]
    public IReadOnlyList<double?>? At { get; } = FoundFault.Place(note, sketch);

    [JsonPropertyName("size_mm"), Description("How large it was; null when it has no size.")]
    public double? Size { get; } = CheckFile.Tidy(note.Size * 1e3);

    [JsonPropertyName("text"), Description("What was done.")]
    public string Text { get; } = note.Text;
}

internal sealed class FoundFault(Finding finding, Sketch? sketch)
{
    [JsonPropertyName("what"), Description("Kind of fault.")]
    public string What { get; } = finding.What;

    [JsonPropertyName("file"), Description("File; null when it is not in one.")]
    public string? File { get; } = finding.File;

    [JsonPropertyName("layer"), Description("Layer; null when it has none.")]
    public string? Layer { get; } = finding.Layer;

    [JsonPropertyName("line"), Description("Line of the file, from 1; null when it has none.")]
    public int? Line { get; } = finding.Line;

    [JsonPropertyName("column"), Description("Column of the line, from 1; null when it has none.")]
    public int? Column { get; } = finding.Column;

    [JsonPropertyName("at_mm"), Description("Place: [y, z]; null when it has none.")]
    public IReadOnlyList<double?>? At { get; } = Place(finding, sketch);

    [JsonPropertyName("text"), Description("What was found.")]
    public string Text { get; } = finding.Text;

    [JsonPropertyName("fix"), Description("What to do.")]
    public string Fix { get; } = finding.Fix;

    public static IEnumerable<FoundFault> Of(IEnumerable<Finding> findings, Severity severity, Sketch? sketch) =>
        findings.Where(f => f.Severity == severity).Select(f => new FoundFault(f, sketch));

    public static IReadOnlyList<double?>? Place(Finding finding, Sketch? sketch)
    {
        Point? metres = finding.At ?? (finding.AtDrawing is { } drawn && sketch is not null ? sketch.Unit.Metres * drawn : null);
        return metres is { } at ? [CheckFile.Tidy(1e3 * at.Y), CheckFile.Tidy(1e3 * at.Z)] : null;
    }
}
