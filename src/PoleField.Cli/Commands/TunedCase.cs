using System.Text;
using System.Text.RegularExpressions;
using PoleField.Design;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Commands;

/// <summary>Sketch and case file of a tuned magnet: the old ones with what changed in them.</summary>
internal static partial class TunedCase
{
    /// <summary>The sketch of the tuned magnet.</summary>
    public static Sketch SketchOf(LoadedCase loaded, CrossSection before, TuneResult tuned, string name) =>
        loaded.Case!.Tune?.Family is { } family
            ? FamilyTuning.With(family, tuned.State.Values).Draw().Sketch with { Name = name }
            : WithMovedFaces(loaded, before, tuned, name);

    /// <summary>The case file's text with the new sketch's name and, for a family, the dimensions it is drawn with.</summary>
    public static string TextOf(LoadedCase loaded, string sketchName, PoleFamily? family = null)
    {
        string text = Encoding.UTF8.GetString(File.ReadAllBytes(loaded.Path));
        text = SketchFile().Replace(text, m => $"{m.Groups[1].Value}\"{sketchName}\"", 1);
        if (family is null)
        {
            return text;
        }

        string line = "drawn_with = " + FamilyTuning.DrawnWith(family);
        return DrawnWith().IsMatch(text)
            ? DrawnWith().Replace(text, m => m.Groups[1].Value + line, 1)
            : Dimensions().Replace(text, m => $"{m.Value}\n{line}", 1);
    }

    // Outlines of moved layers are taken from the new section; everything else is as drawn.
    private static Sketch WithMovedFaces(LoadedCase loaded, CrossSection before, TuneResult tuned, string name)
    {
        Sketch drawn = loaded.Sketch!;
        CrossSection after = tuned.Magnet.Section;
        var moved = new HashSet<int>();
        for (int e = 0; e < after.Edges.Count; e++)
        {
            if (!ReferenceEquals(before.Edges[e].Curve, after.Edges[e].Curve))
            {
                moved.UnionWith([PartOf(after, after.Edges[e].Left), PartOf(after, after.Edges[e].Right)]);
            }
        }

        moved.Remove(-1);
        var layers = moved.Select(p => after.Parts[p]).ToHashSet(StringComparer.OrdinalIgnoreCase);
        Affine toDrawing = Affine.Scaling(1 / drawn.Unit.Metres);
        bool half = loaded.Case!.MirrorLeftRight;
        IEnumerable<SketchCurve> outlines = moved.Order().SelectMany(part => after.Edges
            .Where(e => PartOf(after, e.Left) == part != (PartOf(after, e.Right) == part))
            .Where(e => !half || e.Curve.At(0.5).Y > 0)
            .Select(e => new SketchCurve(e.Curve.Transformed(toDrawing), after.Parts[part], e.Curve is Nurbs ? "SPLINE" : "LINE", null, 0)));
        return drawn with { Name = name, Curves = [.. drawn.Curves.Where(c => !layers.Contains(c.Layer)), .. outlines], Skipped = [], Findings = [] };
    }

    private static int PartOf(CrossSection section, int region) => region < 0 ? -1 : section.Regions[region].Part;

    // The first "file =" after the head of [sketch].
    [GeneratedRegex("""(^\s*\[\s*sketch\s*\][\s\S]*?^\s*file\s*=\s*)("[^"\n]*"|'[^'\n]*')""", RegexOptions.Multiline)]
    private static partial Regex SketchFile();

    [GeneratedRegex("""^([ \t]*)drawn_with\s*=\s*\{[^}\n]*\}""", RegexOptions.Multiline)]
    private static partial Regex DrawnWith();

    [GeneratedRegex("""^[ \t]*dimensions\s*=\s*\{.*$""", RegexOptions.Multiline)]
    private static partial Regex Dimensions();
}
