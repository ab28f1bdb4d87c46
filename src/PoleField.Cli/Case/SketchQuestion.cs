using PoleField.Drawing;

namespace PoleField.Cli.Case;

/// <summary>What a case asks of its drawing; known from a case with faults too, as far as they leave it clear.</summary>
/// <param name="Sketch">File, unit, join length.</param>
/// <param name="Parts">Layers that are parts.</param>
/// <param name="Request">Which layers are what; null where faults of the case leave that open, so that none is told twice.</param>
internal sealed record SketchQuestion(SketchSection Sketch, IReadOnlyList<PartSection> Parts, SectionRequest? Request)
{
    /// <summary>The question of a case, sound or not.</summary>
    public static SketchQuestion Of(CaseFile file, bool isClear) => new(file.Sketch, file.Parts, isClear ? RequestOf(file) : null);

    /// <summary>What a case asks of its drawing.</summary>
    public static SectionRequest RequestOf(CaseFile file) => new()
    {
        PartLayers = [.. file.Parts.Select(p => p.Layer)],
        MaterialKeys = [.. file.Parts.Select(p => p.AmpereTurns is { } a ? FormattableString.Invariant($"coil {p.Layer} {a:R}") : p.Substance.Key)],
        CurrentLayers = [.. file.Parts.Where(p => p.AmpereTurns is not null).Select(p => p.Layer)],
        BeamLayer = (file.Beam as BeamOnLayer)?.Layer is string beam && beam != "?" && !IsPart(file, beam) ? beam : null,
        RimLayer = file.Surroundings.RimLayer,
        MirrorLeftRight = file.MirrorLeftRight,
        Join = file.Sketch.Join,
    };

    private static bool IsPart(CaseFile file, string layer) => file.Parts.Any(p => p.Layer.Equals(layer, StringComparison.OrdinalIgnoreCase));
}
