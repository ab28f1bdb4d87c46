using System.Text;
using System.Text.RegularExpressions;
using PoleField.Design;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Commands;

/// <summary>Sketch and case file of a tuned magnet: the old ones with the moved faces in them.</summary>
internal static partial class TunedCase
{
    /// <summary>The sketch with the outlines of moved layers taken from the new section; everything else as drawn.</summary>
    public static Sketch SketchOf(LoadedCase loaded, CrossSection before, TuneResult tuned, string name)
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

    /// <summary>The case file's text with the new sketch's name.</summary>
    public static string TextOf(LoadedCase loaded, string sketchName)
    {
        string text = Encoding.UTF8.GetString(File.ReadAllBytes(loaded.Path));
        return SketchFile().Replace(text, m => $"{m.Groups[1].Value}\"{sketchName}\"", 1);
    }

    private static int PartOf(CrossSection section, int region) => region < 0 ? -1 : section.Regions[region].Part;

    // The first "file =" after the head of [sketch].
    [GeneratedRegex("""(^\s*\[\s*sketch\s*\][\s\S]*?^\s*file\s*=\s*)("[^"\n]*"|'[^'\n]*')""", RegexOptions.Multiline)]
    private static partial Regex SketchFile();
}
