namespace PoleField.Drawing;

/// <summary>Says what the layers of a sketch hold, for messages.</summary>
internal static class LayerSurvey
{
    private const int MostLayers = 12;
    private const int MostCurves = 20_000; // of one layer; larger ones are counted, not closed

    // Words of the trade in layer names; they only ever make a hint.
    private static readonly string[] CoilWords = ["COIL", "COILS", "WINDING", "CONDUCTOR", "COPPER"];
    private static readonly string[] IronWords = ["IRON", "POLE", "YOKE", "CORE", "STEEL", "MAGNET"];

    /// <summary>"POLE (4 curves, 1 outline, 100 mm²), ..." for the layers of the sketch.</summary>
    public static string Describe(Sketch sketch, SectionRequest request)
    {
        List<IGrouping<string, (SketchCurve Curve, int Index)>> layers =
            [.. sketch.Curves.Select((c, i) => (c, i)).GroupBy(c => c.c.Layer, StringComparer.OrdinalIgnoreCase).OrderBy(g => g.Key, StringComparer.Ordinal)];
        IEnumerable<string> texts = layers.Take(MostLayers).Select(g => Describe(sketch, g.Key, [.. g], request.Join));
        string more = layers.Count > MostLayers ? FormattableString.Invariant($" and {layers.Count - MostLayers} more") : "";
        return layers.Count == 0 ? "none" : string.Join(", ", texts) + more;
    }

    /// <summary>Name of the sketch's layer that is spelled most like the given one; null when none is near.</summary>
    public static string? Nearest(Sketch sketch, string name)
    {
        IEnumerable<(int Distance, string Layer)> all = sketch.Curves.Select(c => c.Layer).Distinct(StringComparer.OrdinalIgnoreCase)
            .Select(l => (Distance(l.ToUpperInvariant(), name.ToUpperInvariant()), l));
        (int distance, string? layer) = all.DefaultIfEmpty((int.MaxValue, null!)).Min();
        return distance <= Math.Max(2, name.Length / 3) ? layer : null;
    }

    /// <summary>"a coil", "iron" or null: what a layer's name suggests.</summary>
    public static string? Hint(string layer)
    {
        string[] words = layer.ToUpperInvariant().Split(
            ['_', '-', '.', '$', '|', ' ', '0', '1', '2', '3', '4', '5', '6', '7', '8', '9'], StringSplitOptions.RemoveEmptyEntries);
        return words.Any(CoilWords.Contains) ? "a coil" : words.Any(IronWords.Contains) ? "iron" : null;
    }

    private static string Describe(Sketch sketch, string name, (SketchCurve Curve, int Index)[] curves, double join)
    {
        string count = FormattableString.Invariant($"{curves.Length} curve{(curves.Length == 1 ? "" : "s")}");
        if (curves.Length > MostCurves)
        {
            return $"{name} ({count})";
        }

        SectionLog silent = new(sketch);
        UsedLayer layer = new(0, name, LayerRole.Part, "");
        Piece[] pieces = [.. curves.Select(c => new Piece(CurveEnds.ToMetres(c.Curve.Curve, sketch.Unit.Metres), -1, -1, 0, c.Index))];
        Reach reach = Reach.For(pieces, join);
        Net net = EndJoining.Join([layer], pieces, reach, silent);
        PlanarMap map = new(net.Points, Weaving.Weave(net, reach, silent));
        LayerCover cover = new(map, 0, _ => true);
        string outlines = FormattableString.Invariant($"{cover.Outlines} closed outline{(cover.Outlines == 1 ? "" : "s")}");
        return cover.Outlines == 0 ? $"{name} ({count}, no closed outline)" : $"{name} ({count}, {outlines}, {SectionLog.Area(cover.Area)})";
    }

    // Levenshtein's edit distance.
    private static int Distance(string a, string b)
    {
        int[] row = [.. Enumerable.Range(0, b.Length + 1)];
        for (int i = 1; i <= a.Length; i++)
        {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= b.Length; j++)
            {
                int change = diagonal + (a[i - 1] == b[j - 1] ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.Min(change, 1 + Math.Min(row[j], row[j - 1]));
            }
        }

        return row[b.Length];
    }
}
