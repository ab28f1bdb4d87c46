using System.Globalization;
using System.Net;
using System.Text;
using System.Text.RegularExpressions;
using OxyPlot.SkiaSharp;

namespace PoleField.Output.Figures;

/// <summary>PNG pictures need a native drawing library that is not there; SVG does not.</summary>
public sealed class PngUnavailableException(Exception cause) : Exception(
    "PNG pictures cannot be made here: the native drawing library (libSkiaSharp) is missing or does not fit this system. "
    + "The SVG pictures are complete; ask for those, or install PoleField with its native parts.",
    cause);

/// <summary>Writes figures as SVG (no native code, same bytes everywhere) and as PNG.</summary>
public static partial class FigureWriter
{
    private const string FontChoice = "DejaVu Sans, Verdana, Segoe UI, Helvetica, Arial, sans-serif";

    /// <summary>Writes a figure as a stand-alone SVG document, UTF-8 without byte order mark.</summary>
    public static void Svg(Figure figure, Stream stream)
    {
        byte[] bytes = new UTF8Encoding(false).GetBytes(Element(figure, 0, 0) + "\n");
        stream.Write(bytes);
    }

    /// <summary>
    /// The figure as an <c>svg</c> element for a page that writes title and caption beside it as text: scales to the width it is
    /// given, has a name for screen readers, and its inner ids start with the figure's name so that several can stand in one page.
    /// </summary>
    public static string SvgText(Figure figure) => Element(figure, figure.TitleHeight, figure.CaptionHeight);

    private static string Element(Figure figure, double above, double below)
    {
        OxyPlot.SvgExporter exporter = new()
        {
            Width = figure.Width,
            Height = figure.Height,
            IsDocument = false,
            TextMeasurer = new TextMeasurer(),
        };
        string text = exporter.ExportToString(figure.Model);
        int start = text.IndexOf("<svg", StringComparison.Ordinal);
        int body = text.IndexOf('>', start) + 1;
        string inner = text[body..].TrimEnd();
        inner = IdPattern().Replace(inner, m => $"{m.Groups[1].Value}{figure.Name}-{m.Groups[2].Value}");
        inner = inner.Replace($"font-family=\"{FigureStyle.Font}\"", $"font-family=\"{FontChoice}\"", StringComparison.Ordinal);
        return Head(figure, above, below) + inner;
    }

    /// <summary>Writes a figure as PNG.</summary>
    /// <param name="figure">The figure.</param>
    /// <param name="stream">Where to.</param>
    /// <param name="scale">Pixels per point: 1 for 96 dots per inch, 2 for sharp print of column width; 0.25 to 10.</param>
    /// <exception cref="PngUnavailableException">The native drawing library is missing.</exception>
    public static void Png(Figure figure, Stream stream, double scale = 2)
    {
        if (!(scale >= 0.25) || !(scale <= 10))
        {
            throw new ArgumentOutOfRangeException(nameof(scale), scale, "The scale of a PNG is 0.25 to 10 pixels per point.");
        }

        try
        {
            PngExporter exporter = new()
            {
                Width = (int)Math.Ceiling(figure.Width * scale),
                Height = (int)Math.Ceiling(figure.Height * scale),
                Dpi = (float)(96 * scale),
                UseTextShaping = false,
            };
            exporter.Export(figure.Model, stream);
        }
        catch (Exception e) when (e is DllNotFoundException or TypeInitializationException or BadImageFormatException or EntryPointNotFoundException)
        {
            throw new PngUnavailableException(e);
        }
    }

    private static string Head(Figure figure, double above, double below)
    {
        string w = figure.Width.ToString("0.##", CultureInfo.InvariantCulture);
        string top = above.ToString("0.##", CultureInfo.InvariantCulture);
        string h = (figure.Height - above - below).ToString("0.##", CultureInfo.InvariantCulture);
        string id = figure.Name;
        return $"<svg xmlns=\"http://www.w3.org/2000/svg\" xmlns:xlink=\"http://www.w3.org/1999/xlink\" viewBox=\"0 {top} {w} {h}\" width=\"{w}\" "
            + $"role=\"img\" aria-labelledby=\"{id}-title {id}-desc\">"
            + $"<title id=\"{id}-title\">{WebUtility.HtmlEncode(figure.Title)}</title>"
            + $"<desc id=\"{id}-desc\">{WebUtility.HtmlEncode(figure.Caption)}</desc>\n";
    }

    [GeneratedRegex("(id=\"|url\\(#)(clipPath)")]
    private static partial Regex IdPattern();
}
