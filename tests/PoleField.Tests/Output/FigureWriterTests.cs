// Truth: the rules of SVG, PNG and HTML (unique ids, names for screen readers, signatures), and repeatability.
using System.Globalization;
using System.Text;
using System.Xml.Linq;
using OxyPlot;
using PoleField.Geometry;
using PoleField.Output.Figures;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class FigureWriterTests
{
    private static readonly FieldScene Scene = TwoConductorScene.Scene(cells: 60);

    [Fact]
    public void TheSvgIsOneWellFormedElementWithANameAndNoByteOrderMark()
    {
        using MemoryStream stream = new();
        FigureWriter.Svg(FieldFigure.Whole(Scene), stream);
        string text = new UTF8Encoding(false, true).GetString(stream.ToArray());

        Assert.StartsWith("<svg", text, StringComparison.Ordinal);
        XElement svg = XElement.Parse(text);
        Assert.Equal("img", svg.Attribute("role")?.Value);
        Assert.Equal("Field lines and |B| of the cross-section", svg.Element(svg.Name.Namespace + "title")?.Value);
        Assert.NotNull(svg.Attribute("viewBox"));
        Assert.Contains("mWb per metre", svg.Element(svg.Name.Namespace + "desc")?.Value, StringComparison.Ordinal);
    }

    [Fact]
    public void TwoFiguresInOnePageShareNoId()
    {
        XElement whole = XElement.Parse(FigureWriter.SvgText(FieldFigure.Whole(Scene)));
        XElement beam = XElement.Parse(FigureWriter.SvgText(FieldFigure.Beam(Scene)));

        string[] first = Ids(whole), second = Ids(beam);

        Assert.NotEmpty(first);
        Assert.Equal(first.Length, first.Distinct().Count());
        Assert.Empty(first.Intersect(second));
    }

    [Fact]
    public void EveryClipPathThatIsUsedIsThere()
    {
        XElement svg = XElement.Parse(FigureWriter.SvgText(FieldFigure.Whole(Scene)));

        string[] used =
        [
            .. svg.Descendants().Select(e => e.Attribute("clip-path")?.Value).OfType<string>().Distinct()
                .Select(v => v["url(#".Length..^1]),
        ];

        Assert.NotEmpty(used);
        Assert.All(used, id => Assert.Contains(id, Ids(svg)));
    }

    [Fact]
    public void TheSameFigureGivesTheSameBytesUnderAnotherCulture()
    {
        string first = FigureWriter.SvgText(FieldFigure.Beam(Scene));
        CultureInfo before = CultureInfo.CurrentCulture;
        try
        {
            CultureInfo.CurrentCulture = new CultureInfo("de-DE");

            Assert.Equal(first, FigureWriter.SvgText(FieldFigure.Beam(Scene)));
        }
        finally
        {
            CultureInfo.CurrentCulture = before;
        }
    }

    [Fact]
    public void ThePartsAreNamedAndTheCurrentsMarked()
    {
        string text = FigureWriter.SvgText(FieldFigure.Whole(Scene));

        Assert.All(["YOKE", "RIDGE", "GROOVE", "COIL LEFT", "COIL RIGHT", "y (mm)", "z (mm)", "|B| (T)"], label => Assert.Contains(label, text, StringComparison.Ordinal));
    }

    [Fact]
    public void APngHasTheAskedSizeInPixels()
    {
        Figure figure = FieldFigure.Beam(Scene);
        using MemoryStream stream = new();

        FigureWriter.Png(figure, stream, scale: 0.5);

        byte[] bytes = stream.ToArray();
        Assert.Equal([0x89, 0x50, 0x4e, 0x47], bytes[..4]);
        Assert.Equal((int)Math.Ceiling(figure.Width * 0.5), (bytes[18] << 8) + bytes[19]);
        Assert.Equal((int)Math.Ceiling(figure.Height * 0.5), (bytes[22] << 8) + bytes[23]);
    }

    [Fact]
    public void AnIndexedPictureReadsBackPixelByPixel()
    {
        OxyColor[] palette = [OxyColors.Red, OxyColors.Lime, OxyColors.Blue];
        byte[] png = IndexedPng.Encode([0, 1, 2, IndexedPng.Transparent, 2, 1], 3, palette);

        using SkiaSharp.SKBitmap read = SkiaSharp.SKBitmap.Decode(png); // another reader of the format

        Assert.Equal((3, 2), (read.Width, read.Height));
        Assert.Equal(new SkiaSharp.SKColor(0, 0, 255), read.GetPixel(2, 0));
        Assert.Equal(0, read.GetPixel(0, 1).Alpha);
        Assert.Equal(new SkiaSharp.SKColor(0, 255, 0), read.GetPixel(2, 1));
    }

    [Fact]
    public void TheRasterHoldsTheClosedFormAtItsPixels()
    {
        Box view = Box.Around(new Point(-2e-3, 3e-3), new Point(2e-3, 7e-3));
        FieldRaster raster = FieldRaster.OfMagnitude(TwoConductorScene.Triangles(Scene.Section, 300), view, 40);

        for (int row = 0; row < raster.Rows; row++)
        {
            for (int column = 0; column < raster.Columns; column++)
            {
                Point p = raster.Middle(column, row);
                double exact = TwoConductorScene.At(p).Field;

                // Linear between corners 0.16 mm apart: error below h²/8 of the second derivative, about 1e-3.
                Assert.Equal(exact, raster.Values[(row * raster.Columns) + column], 2e-3 * exact);
            }
        }
    }

    [Fact]
    public void LabelsStandInsideTheirRegions()
    {
        FieldRaster raster = FieldRaster.OfMagnitude(Scene.Triangles, Scene.Section.Bounds.Inflated(1e-3), 300);

        foreach (LabelPlace place in LabelPlaces.Find(raster))
        {
            (int column, int row) = ((int)((place.At.Y - raster.View.Min.Y) / raster.View.Width * raster.Columns), (int)((raster.View.Max.Z - place.At.Z) / raster.View.Height * raster.Rows));
            Assert.Equal(place.Region, raster.Regions[(row * raster.Columns) + column]);
            Assert.True(place.Radius > 0);
        }
    }

    [Theory]
    [InlineData(0.0, "0")]
    [InlineData(-1.23456, "−1.235")]
    [InlineData(312.44, "312.4")]
    [InlineData(12345.6, "12346")]
    [InlineData(2.5e-5, "0.000025")]
    [InlineData(double.NaN, "–")]
    public void NumbersAreShownShortAndInvariant(double value, string text) => Assert.Equal(text, FigureStyle.Number(value));

    private static string[] Ids(XElement svg) => [.. svg.DescendantsAndSelf().Select(e => e.Attribute("id")?.Value).OfType<string>()];
}
