using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Remarks on a sketch as a whole: layers that are missing or overlooked, unlikely sizes, far places.</summary>
internal static class SectionRemarks
{
    private const double Smallest = 5e-3; // metres; common practice: beam magnets are neither smaller nor larger
    private const double Largest = 3.0;
    private const double FarRatio = 1e4;  // of the size

    /// <summary>Missing layers with what there is instead, layers named twice, unused layers that look like parts.</summary>
    public static void OnLayers(Sketch sketch, SectionRequest request, UsedLayers layers, SectionLog log)
    {
        string? found = layers.Missing.Count > 0 ? LayerSurvey.Describe(sketch, request) : null;
        foreach ((string name, string wanted) in layers.Missing)
        {
            SkippedEntities? skipped = sketch.Skipped.FirstOrDefault(s => string.Equals(s.Layer, name, StringComparison.OrdinalIgnoreCase));
            string? why = skipped is null ? null : FormattableString.Invariant($"{skipped.Count} {skipped.Kind}, {skipped.Why}");
            log.Add(SectionMessages.MissingLayer(name, wanted, why, LayerSurvey.Nearest(sketch, name), found!));
        }

        foreach (string name in layers.Twice)
        {
            log.Add(SectionMessages.LayerTwice(name));
        }

        foreach ((string name, _) in layers.Ignored)
        {
            if (LayerSurvey.Hint(name) is string hint)
            {
                log.Add(SectionMessages.LooksLike(name, hint));
            }
        }
    }

    /// <summary>Sizes that suggest a wrong unit, places that cost digits.</summary>
    public static void OnSize(IReadOnlyList<PartShape> parts, SectionLog log)
    {
        Box all = Box.Empty;
        foreach (PartShape p in parts)
        {
            all = all.Including(p.Bounds);
        }

        if (all.IsEmpty)
        {
            return;
        }

        double size = Math.Max(all.Width, all.Height);
        if (size < Smallest || size > Largest)
        {
            log.Add(SectionMessages.UnlikelySize(log, all));
        }

        if (all.Centre.Length > FarRatio * size)
        {
            log.Add(SectionMessages.FarOrigin(log, all.Centre), all.Centre);
        }
    }
}
