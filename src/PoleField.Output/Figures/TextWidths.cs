using OxyPlot;

namespace PoleField.Output.Figures;

/// <summary>
/// Sizes of text without a font engine, so that the same figure is laid out alike on every machine. The widths are the
/// advance widths of DejaVu Sans (in thousandths of the font size), the widest of the usual sans-serif faces: text set in
/// another face takes less room, never more.
/// </summary>
internal static class TextWidths
{
    private const int FirstCharacter = ' ';
    private const double OtherCharacter = 0.75;
    private const double BoldFactor = 1.13;
    private const double LineFactor = 1.25;

    // Characters 32 to 126.
    private static ReadOnlySpan<short> Thousandths =>
    [
        318, 401, 460, 838, 636, 950, 780, 275, 390, 390, 500, 838, 318, 361, 318, 337, 636, 636, 636, 636, 636, 636, 636, 636,
        636, 636, 337, 337, 838, 838, 838, 531, 1000, 684, 686, 698, 770, 632, 575, 775, 752, 295, 295, 656, 557, 863, 748, 787,
        603, 787, 695, 635, 611, 732, 684, 989, 685, 611, 685, 390, 337, 390, 838, 500, 500, 613, 635, 550, 635, 615, 352, 635,
        634, 278, 278, 579, 278, 974, 634, 612, 635, 635, 411, 521, 392, 634, 592, 818, 592, 592, 525, 636, 337, 636, 838,
    ];

    /// <summary>Width and height of text of one or more lines at a font size, in the unit of the size.</summary>
    public static OxySize Measure(string? text, double fontSize, bool bold = false)
    {
        if (string.IsNullOrEmpty(text))
        {
            return OxySize.Empty;
        }

        string[] lines = text.Split('\n');
        return new OxySize(lines.Max(line => Width(line, fontSize, bold)), lines.Length * LineFactor * fontSize);
    }

    /// <summary>Width of one line.</summary>
    public static double Width(string line, double fontSize, bool bold = false)
    {
        double sum = 0;
        foreach (char c in line)
        {
            int index = c - FirstCharacter;
            sum += index >= 0 && index < Thousandths.Length ? Thousandths[index] / 1000.0 : OtherCharacter;
        }

        return sum * fontSize * (bold ? BoldFactor : 1.0);
    }

    /// <summary>Breaks text into lines no wider than the given width; a single word that is wider stands alone.</summary>
    public static IReadOnlyList<string> Wrap(string text, double fontSize, double width)
    {
        List<string> lines = [];
        string line = "";
        foreach (string word in text.Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            string longer = line.Length == 0 ? word : line + " " + word;
            if (line.Length > 0 && Width(longer, fontSize) > width)
            {
                lines.Add(line);
                line = word;
            }
            else
            {
                line = longer;
            }
        }

        if (line.Length > 0)
        {
            lines.Add(line);
        }

        return lines;
    }
}

/// <summary>Answers the exporter's questions about text sizes; it never draws.</summary>
internal sealed class TextMeasurer : ClippingRenderContext
{
    public override OxySize MeasureText(string text, string fontFamily, double fontSize, double fontWeight) =>
        TextWidths.Measure(text, fontSize, fontWeight > FontWeights.Normal);

    public override void DrawLine(
        IList<ScreenPoint> points, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[] dashArray, LineJoin lineJoin) =>
        throw new NotSupportedException();

    public override void DrawPolygon(
        IList<ScreenPoint> points, OxyColor fill, OxyColor stroke, double thickness, EdgeRenderingMode edgeRenderingMode, double[] dashArray, LineJoin lineJoin) =>
        throw new NotSupportedException();

    public override void DrawText(
        ScreenPoint p, string text, OxyColor fill, string fontFamily, double fontSize, double fontWeight, double rotation, HorizontalAlignment halign, VerticalAlignment valign, OxySize? maxSize) =>
        throw new NotSupportedException();

    protected override void ResetClip()
    {
    }

    protected override void SetClip(OxyRect clippingRectangle)
    {
    }
}
