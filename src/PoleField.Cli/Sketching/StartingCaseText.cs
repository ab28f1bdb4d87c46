using System.Globalization;
using System.Text;
using PoleField.Cli.Text;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Sketching;

/// <summary>Writes the case file of a starting sketch: it solves as it is, and its comments show what else can be said.</summary>
internal static class StartingCaseText
{
    private const int CommentColumn = 32;

    public static void Write(StartingCase start, Stream stream) => stream.Write(new UTF8Encoding(false).GetBytes(Of(start)));

    public static string Of(StartingCase start)
    {
        var text = new StringBuilder();
        WriteHead(text, start);
        WriteParts(text, start);
        text.Append("[beam]\n");
        Line(text, "layer = \"BEAM\"", "the aperture is the closed outline on this layer");
        text.Append('\n');
        if (start.Length is { } length)
        {
            text.Append("[magnet]\n");
            Line(text, $"length = \"{Numbers.Short(1e3 * length)} mm\"", "along the beam; for forces, energy, heat and deflection");
        }
        else
        {
            text.Append("# [magnet]\n");
            Line(text, "# length = \"200 mm\"", "along the beam; for forces, energy, heat and deflection");
        }

        text.Append("\n[accuracy]\n");
        Line(text, "relative = 1e-4", "of field and gradient over the aperture");
        text.Append('\n');
        if (start.Words.HalfSpacing(start.Family) is { } a)
        {
            text.Append("[two_wire]\n");
            Line(text, $"half_spacing = \"{Numbers.Short(a)} mm\"", "the wires whose field the pair imitates; omit to fit them");
            text.Append("midpoint = [\"0 mm\", \"0 mm\"]\n\n");
        }

        WriteFurther(text, start);
        return text.ToString();
    }

    private static void WriteHead(StringBuilder text, StartingCase start)
    {
        Comment(text, $"Starting case, written by polefield sketch {start.Family.Name}: {start.Family.Description}.");
        Comment(text, "Dimensions: " + string.Join(", ", start.Words.Options.Where(o => o.Name != "--frame-scale").Select(o => $"{o.Name[2..]} {o.Written(start.Family)}")) + ".");
        Comment(
            text,
            $"With {Plain(start.AmpereTurns)} ampere-turns the closed form ({start.Idealisation}) promises at the beam, {start.BeamPlace}: "
            + $"B = {Numbers.Significant(start.Field)} T, d|B|/dz = {Numbers.Significant(start.Gradient)} T/m.");
        text.Append("format = 1\n");
        text.Append(CultureInfo.InvariantCulture, $"title = \"{start.Title}\"\n\n");
        text.Append("[sketch]\n");
        Line(text, $"file = \"{start.Name}.dxf\"", "beside this file; edit it with any drawing program");
        text.Append("unit = \"mm\"\n\n");
    }

    private static void WriteParts(StringBuilder text, StartingCase start)
    {
        bool first = true;
        foreach (SuggestedPart part in start.Sketch.Parts)
        {
            text.Append(CultureInfo.InvariantCulture, $"[parts.{Key(part.Layer)}]\n");
            if (start.MaterialOf(part) is { } material)
            {
                Line(text, $"material = \"{material}\"", first ? "see: polefield materials; or { file = \"my-steel.csv\" }" : string.Empty);
                first = false;
            }
            else
            {
                Line(text, $"ampere_turns = \"{Plain(start.AmpereTurnsOf(part))} A\"", "of each closed outline; positive along +x, out of the page");
                if (start.Words.HasIron)
                {
                    Line(text, "fill = 0.6", "copper share of the outline, for current density and heat");
                }
            }

            text.Append('\n');
        }
    }

    private static void WriteFurther(StringBuilder text, StartingCase start)
    {
        Comment(text, "What the magnet must reach; a line that fails ends the run with exit status 3:");
        string gradient = Numbers.Significant(0.9 * Math.Abs(start.Gradient), 2);
        text.Append("# [require]\n");
        text.Append(CultureInfo.InvariantCulture, $"# gradient_min = \"{gradient} T/m\"\n");
        text.Append("# spread_max = \"20 %\"\n");
        text.Append(start.Words.HasIron ? "# iron_field_max = \"1.9 T\"\n\n" : "\n");
        Comment(text, "Grid of the field map; without it the air around the aperture:");
        Point beam = start.Sketch.Beam;
        text.Append("# [map]\n");
        text.Append(CultureInfo.InvariantCulture, $"# from = [\"{Numbers.Short(beam.Y - 2)} mm\", \"{Numbers.Short(beam.Z - 0.5)} mm\"]\n");
        text.Append(CultureInfo.InvariantCulture, $"# to   = [\"{Numbers.Short(beam.Y + 2)} mm\", \"{Numbers.Short(beam.Z + 0.5)} mm\"]\n");
        text.Append("# step = \"0.05 mm\"\n");
    }

    private static void Line(StringBuilder text, string line, string comment) =>
        text.Append((comment.Length == 0 ? line : $"{line.PadRight(CommentColumn - 1)} # {comment}") + "\n");

    private static void Comment(StringBuilder text, string words)
    {
        foreach (string line in Wrapped.Lines(words, 98))
        {
            text.Append("# ").Append(line).Append('\n');
        }
    }

    private static string Key(string layer) => layer.Contains(' ', StringComparison.Ordinal) ? $"\"{layer}\"" : layer;

    private static string Plain(double value) => value.ToString("0.###########", CultureInfo.InvariantCulture);
}
