// Truth: one pole tip (a 20 by 25 rectangle with two corners of radius 5) drawn in many ways is one set of curves, whose
// Green area is 500 - 2·25·(1 - π/4) square millimetres.
using System.Globalization;
using System.Text;
using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class SameTipTests
{
    private const string Bulge = "0.41421356237309503";
    private const double Area = 500 - (50 * (1 - (Math.PI / 4)));

    private static readonly string[] Loose =
    [
        "0 LINE; 5 A1; 8 IRON; 10 -10; 20 0; 11 10; 21 0",
        "0 LINE; 8 IRON; 10 10; 20 0; 30 0; 11 10; 21 20; 31 0",
        "0 ARC; 8 IRON; 10 5; 20 20; 40 5; 50 0; 51 90",
        "0 LINE; 8 IRON; 10 5; 20 25; 11 -5; 21 25",
        "0 ARC; 8 IRON; 10 -5; 20 20; 40 5; 50 90; 51 180",
        "0 LINE; 8 IRON; 10 -10; 20 20; 11 -10; 21 0",
    ];

    private const string Light =
        "0 LWPOLYLINE; 100 AcDbEntity; 8 IRON; 100 AcDbPolyline; 90 6; 70 1;"
        + "10 -10; 20 0; 10 10; 20 0; 10 10; 20 20; 42 " + Bulge + "; 10 5; 20 25; 10 -5; 20 25; 42 " + Bulge + "; 10 -10; 20 20";

    // Seen from below: x counts to the left, so the vertices are mirrored and run the other way.
    private const string FromBelow =
        "0 LWPOLYLINE; 8 IRON; 90 6; 70 1; 210 0; 220 0; 230 -1;"
        + "10 10; 20 0; 10 -10; 20 0; 10 -10; 20 20; 42 -" + Bulge + "; 10 -5; 20 25; 10 5; 20 25; 42 -" + Bulge + "; 10 10; 20 20";

    private const string Old =
        "0 POLYLINE; 8 IRON; 66 1; 70 1; 10 0; 20 0; 30 0;"
        + "0 VERTEX; 8 0; 10 -10; 20 0; 0 VERTEX; 8 0; 10 10; 20 0; 0 VERTEX; 8 0; 10 10; 20 20; 42 " + Bulge + ";"
        + "0 VERTEX; 8 0; 10 5; 20 25; 0 VERTEX; 8 0; 10 -5; 20 25; 42 " + Bulge + "; 0 VERTEX; 8 0; 10 -10; 20 20; 0 SEQEND";

    // The left half in a block, shown once as it is and once mirrored; the bottom line is two halves.
    private const string HalfBlock =
        "0 LINE; 8 0; 10 3; 20 1; 11 13; 21 1; 0 LINE; 8 0; 10 13; 20 1; 11 13; 21 21;"
        + "0 ARC; 8 0; 10 8; 20 21; 40 5; 50 0; 51 90; 0 LINE; 8 0; 10 8; 20 26; 11 3; 21 26";

    private static readonly string[] Halves =
    [
        "0 LINE; 8 IRON; 10 0; 20 0; 11 10; 21 0", "0 LINE; 8 IRON; 10 0; 20 0; 11 -10; 21 0",
        "0 LINE; 8 IRON; 10 10; 20 0; 11 10; 21 20", "0 LINE; 8 IRON; 10 -10; 20 20; 11 -10; 21 0",
        "0 ARC; 8 IRON; 10 5; 20 20; 40 5; 50 0; 51 90", "0 ARC; 8 IRON; 10 -5; 20 20; 40 5; 50 90; 51 180",
        "0 LINE; 8 IRON; 10 5; 20 25; 11 0; 21 25", "0 LINE; 8 IRON; 10 0; 20 25; 11 -5; 21 25",
    ];

    private static HandDrawn ByLoose => HandDrawn.With(Loose);

    public static TheoryData<string> Ways =>
    [
        "polyline", "polyline with repeated first vertex", "polyline from below", "old polyline", "old polyline without SEQEND", "block",
        "nested block, turned back", "binary, wide codes", "binary, R12", "inch", "metre", "CR LF", "CR", "CR CR LF", "byte order mark",
        "UTF-16", "big-endian UTF-16", "blanks and comments", "entities only", "arcs past 360 degrees", "non-uniform scale and back",
    ];

    [Theory]
    [MemberData(nameof(Ways))]
    public void One_tip_drawn_in_many_ways_is_one_set_of_curves(string way)
    {
        Sketch sketch = Draw(way);

        Assert.Equal(Signature(ByLoose.Read()), Signature(sketch));
        Assert.All(sketch.Curves, c => Assert.Equal("IRON", c.Layer));
        double green = sketch.Curves.Sum(c => c.Curve.AreaTerm(default)) * Math.Pow(sketch.Unit.Metres * 1e3, 2);
        Assert.Equal(Area, Math.Abs(green), 1e-9);
    }

    [Fact]
    public void A_half_in_a_block_and_its_mirror_image_make_the_whole()
    {
        HandDrawn drawing = HandDrawn.With(
            "0 INSERT; 8 IRON; 2 half; 10 0; 20 0", "0 INSERT; 8 IRON; 2 HALF; 10 0; 20 0; 41 -1");

        Sketch sketch = (drawing with { Blocks = HandDrawn.Block("Half", HalfBlock, "10 3; 20 1") }).Read();

        Assert.Equal(Signature(HandDrawn.With(Halves).Read()), Signature(sketch));
        Assert.Equal(2, sketch.Curves.Count(c => c.Curve is CircularArc));
    }

    private static Sketch Draw(string way) => way switch
    {
        "polyline" => HandDrawn.With(Light).Read(),
        "polyline with repeated first vertex" => HandDrawn.With(Light + "; 10 -10; 20 0").Read(),
        "polyline from below" => HandDrawn.With(FromBelow).Read(),
        "old polyline" => HandDrawn.With(Old).Read(),
        "old polyline without SEQEND" => HandDrawn.With(Old.Replace("; 0 SEQEND", "", StringComparison.Ordinal)).Read(),
        "block" => (HandDrawn.With("0 INSERT; 8 IRON; 2 TIP; 10 0; 20 0; 43 0")
            with
        { Blocks = HandDrawn.Block("TIP", Light) }).Read(),
        "nested block, turned back" => (HandDrawn.With("0 INSERT; 8 IRON; 2 OUTER; 10 7; 20 0; 50 90")
            with
        {
            Blocks = HandDrawn.Block("TIP", Light.Replace("IRON", "0", StringComparison.Ordinal))
                    + ";" + HandDrawn.Block("OUTER", "0 INSERT; 8 0; 2 tip; 10 0; 20 7; 50 -90; 70 0; 71 0")
        }).Read(),
        "non-uniform scale and back" => (HandDrawn.With("0 INSERT; 8 IRON; 2 OUTER; 10 0; 20 0; 41 0.5; 42 4")
            with
        {
            Blocks = HandDrawn.Block("TIP", Light) + ";" + HandDrawn.Block("OUTER", "0 INSERT; 8 0; 2 tip; 10 0; 20 0; 41 2; 42 0.25")
        }).Read(),
        "binary, wide codes" => HandDrawn.Read(ByLoose.Binary(wideCodes: true)),
        "binary, R12" => HandDrawn.Read(HandDrawn.With(Old).Binary(wideCodes: false)),
        "inch" => Scaled(1 / 25.4, 1).Read(),
        "metre" => Scaled(1e-3, 6).Read(),
        "CR LF" => (ByLoose with { LineEnd = "\r\n" }).Read(),
        "CR" => (ByLoose with { LineEnd = "\r" }).Read(),
        "CR CR LF" => (ByLoose with { LineEnd = "\r\r\n" }).Read(),
        "byte order mark" => HandDrawn.Read("\uFEFF" + ByLoose.Text()),
        "UTF-16" => HandDrawn.Read(Encoding.Unicode.GetBytes("\uFEFF" + ByLoose.Text())),
        "big-endian UTF-16" => HandDrawn.Read(Encoding.BigEndianUnicode.GetBytes(ByLoose.Text())),
        "blanks and comments" => HandDrawn.Read(Blanked(ByLoose.Text())),
        "entities only" => (ByLoose with { Header = "" }).Read(),
        _ => HandDrawn.With([.. Loose.Select(e => e.Replace("50 0; 51 90", "50 -360; 51 -270", StringComparison.Ordinal)
            .Replace("50 90; 51 180", "50 450; 51 180", StringComparison.Ordinal))]).Read(),
    };

    // Every coordinate of the loose drawing by a factor; bulges and angles stay.
    private static HandDrawn Scaled(double factor, int unit) => HandDrawn.With([.. Loose.Select(e => string.Join(";", e.Split(';').Select(pair =>
    {
        string[] parts = pair.Trim().Split(' ');
        return parts[0] is "10" or "20" or "11" or "21" or "40"
            ? FormattableString.Invariant($"{parts[0]} {factor * double.Parse(parts[1], CultureInfo.InvariantCulture)}")
            : pair;
    })))]) with
    { Header = FormattableString.Invariant($"9 $INSUNITS; 70 {unit}; 9 $MEASUREMENT; 70 1") };

    private static string Blanked(string text)
    {
        string[] lines = text.Split('\n');
        return "999\nmade by hand\n" + string.Join('\n', lines.Select((l, i) => i % 2 == 0 && l.Length > 0 ? " \t" + l + "  " : l + "\t "));
    }

    // Start, middle and end of each curve in micrometres, whichever way it runs, in order.
    private static List<string> Signature(Sketch sketch)
    {
        string At(Point p) => FormattableString.Invariant(
            $"{Math.Round(p.Y * sketch.Unit.Metres * 1e6, 5) + 0.0:0.00000} {Math.Round(p.Z * sketch.Unit.Metres * 1e6, 5) + 0.0:0.00000}");
        return [.. sketch.Curves.Select(c =>
        {
            string[] ends = [At(c.Curve.Start), At(c.Curve.End)];
            Array.Sort(ends, StringComparer.Ordinal);
            return $"{c.Layer}: {ends[0]} | {At(c.Curve.At(0.5))} | {ends[1]}";
        }).Order(StringComparer.Ordinal)];
    }
}
