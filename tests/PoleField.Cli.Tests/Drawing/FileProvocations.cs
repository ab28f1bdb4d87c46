using System.Text;
using PoleField.Drawing;
using PoleField.Tests.Drawing.Dxf;
using static PoleField.Cli.Tests.Drawing.Provocation;

namespace PoleField.Cli.Tests.Drawing;

/// <summary>Files and entities the reader has something to say about.</summary>
internal static class FileProvocations
{
    private const string Bar = "0 LINE; 5 2A; 8 COIL; 10 0; 20 0; 11 1; 21 0";
    private const string Knots = "40 0; 40 0; 40 0; 40 1; 40 1; 40 1; ";
    private const string Controls = "10 0; 20 0; 10 10; 20 0; 10 10; 20 10";

    public static IEnumerable<Provocation> All => [.. Files, .. Units, .. Numbers, .. Entities, .. Blocks, .. Limits, .. Seen];

    private static Provocation[] Files { get; } =
    [
        File("not-dxf", "an empty file", ""),
        File("not-dxf", "a DWG drawing under another name", "AC1032\0\0\0\0\0"),
        File("not-dxf", "a picture", "<svg xmlns=\"http://www.w3.org/2000/svg\">"),
        File("not-dxf", "a letter", "Dear colleague,"),
        File("not-dxf", "64 NUL bytes", new string('\0', 64)),
        File("not-dxf", "a group code, no section", HandDrawn.Pairs("0 EOF")),
        File("truncated", "cut in the middle of an entity", Cut(" 11\n")),
        File("truncated", "cut between a group code and its value", Cut("1\n 21\n")),
        File("truncated", "the end of a section is lost", HandDrawn.Pairs("0 SECTION; 2 ENTITIES; " + Bar + "; 0 EOF")),
        File("truncated", "the end of a block is lost", HandDrawn.Pairs("0 SECTION; 2 BLOCKS; 0 BLOCK; 2 B; 0 ENDSEC; 0 EOF")),
        new("truncated", "a binary file cut short") { Bytes = HandDrawn.With(Bar).Binary(wideCodes: true)[..120] },
        File("bad-group-code", "a line is lost", HandDrawn.With(Bar).Text().Replace(" 10\n0\n", " 10\n", StringComparison.Ordinal)),
        new("bad-group-code", "a damaged binary file") { Bytes = [.. "AutoCAD Binary DXF\r\n\u001a\0"u8, 0, 0, 65, 0, 0x66, 0x66] },
        File("nul-bytes", "a NUL byte in a value", HandDrawn.With(Bar).Text().Replace("COIL", "CO\0IL", StringComparison.Ordinal)),
        new("code-page", "an unknown code page") { Header = "9 $ACADVER; 1 AC1015; 9 $DWGCODEPAGE; 3 klingon; 9 $INSUNITS; 70 4", Entities = Bar },
    ];

    private static Provocation[] Units { get; } =
    [
        new("unit", "$INSUNITS states inches") { Header = "9 $INSUNITS; 70 1", Entities = Bar },
        new("unit", "$INSUNITS and $MEASUREMENT disagree") { Header = "9 $INSUNITS; 70 4; 9 $MEASUREMENT; 70 0", Entities = Bar },
        new("unit", "$MEASUREMENT alone") { Header = "9 $MEASUREMENT; 70 1", Entities = Bar },
        new("unit", "$INSUNITS is no unit, $MEASUREMENT is metric") { Header = "9 $INSUNITS; 70 99; 9 $MEASUREMENT; 70 1", Entities = Bar },
        new("unit", "no unit at all") { Header = "", Entities = Bar },
        new("unit", "the case states the unit, the drawing another")
        {
            Header = "9 $INSUNITS; 70 1",
            Entities = Bar,
            Options = new DxfReadOptions { Unit = LengthUnit.Millimetre },
        },
        new("size", "a drawing in metres read in millimetres") { Entities = Line("IRON", 0, 0, 0.14, 0.15) },
    ];

    private static Provocation[] Numbers { get; } =
    [
        new("bad-number", "decimal commas") { Entities = "0 LINE; 5 2A; 8 COIL; 10 0; 20 0; 11 1,5; 21 -18,000" },
        new("bad-number", "not a number") { Entities = "0 CIRCLE; 8 COIL; 10 0; 20 0; 40 nan" },
        new("bad-number", "a flag that is no whole number") { Entities = "0 LWPOLYLINE; 8 COIL; 70 1.5; 10 0; 20 0; 10 1; 20 0" },
        new("bad-number", "a unit that is no whole number") { Header = "9 $INSUNITS; 70 mm", Entities = Bar },
        new("missing-value", "a value is lost") { Entities = "0 LINE; 8 COIL; 10 0; 20 0; 11 1" },
        new("missing-value", "a value is there twice") { Entities = "0 CIRCLE; 8 COIL; 10 0; 10 5; 20 0; 40 1" },
        new("more-faults", "51 circles without a radius") { Entities = Repeated("0 CIRCLE; 8 COIL; 10 0; 20 0", 51) },
    ];

    private static Provocation[] Entities { get; } =
    [
        new("bad-curve", "a negative radius") { Entities = "0 CIRCLE; 8 IRON; 10 0; 20 0; 40 -1" },
        new("bad-curve", "a negative ratio of half axes") { Entities = "0 ELLIPSE; 8 IRON; 10 0; 20 0; 11 1; 21 0; 40 -0.5" },
        new("bad-curve", "a vertex without y") { Entities = "0 LWPOLYLINE; 8 IRON; 10 0; 10 1; 20 1" },
        new("bad-curve", "a last vertex without y") { Entities = "0 LWPOLYLINE; 8 IRON; 10 0; 20 1; 10 4" },
        Spline("no degree", Knots + Controls),
        Spline("a degree that is too high", "71 26; " + Knots + Controls),
        Spline("a control point without y", "71 2; " + Knots + Controls + "; 10 5"),
        Spline("too few control points", "71 3; " + Knots + Controls),
        Spline("too few knots", "71 2; 40 0; 40 0; 40 0; 40 1; 40 1; " + Controls),
        Spline("knots that decrease", "71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 0; " + Controls),
        Spline("knots without a range", "71 2; " + Repeated("40 0", 6) + "; " + Controls),
        Spline("weights missing", "71 2; " + Knots + Controls + "; 41 1; 41 1"),
        Spline("a negative weight", "71 2; " + Knots + Controls + "; 41 1; 41 -1; 41 1"),
        Spline("a weight that is too large", "71 2; " + Knots + Controls + "; 41 1; 41 1e30; 41 1"),
        Spline("more points than are read", "71 2; " + Knots + Controls) with { Options = With(new DxfLimits { SplinePoints = 2 }) },
        new("not-flat", "a line that climbs") { Entities = "0 LINE; 8 IRON; 10 0; 20 0; 30 0; 11 1; 21 0; 31 1" },
        new("not-flat", "an arc in a tilted plane") { Entities = "0 ARC; 8 IRON; 10 0; 20 0; 40 1; 50 0; 51 90; 210 0; 220 0.5; 230 0.8660254" },
        new("stray-vertex", "a vertex without a polyline") { Entities = "0 VERTEX; 8 IRON; 10 0; 20 0" },
    ];

    private static Provocation[] Blocks { get; } =
    [
        new("block-scale", "a block shown at scale 0") { Entities = "0 INSERT; 8 IRON; 2 TIP; 10 0; 20 0; 41 0", Blocks = HandDrawn.Block("TIP", Bar) },
        new("unknown-block", "a block that is not defined") { Entities = "0 INSERT; 8 IRON; 2 TIP; 10 0; 20 0" },
        new("block-twice", "a block defined twice") { Entities = Bar, Blocks = HandDrawn.Block("TIP", Bar) + "; " + HandDrawn.Block("TIP", Bar) },
        new("block-cycle", "two blocks that contain each other")
        {
            Entities = Insert("TIP"),
            Blocks = HandDrawn.Block("TIP", Insert("HALF")) + "; " + HandDrawn.Block("HALF", Insert("TIP")),
        },
        new("external", "a reference to another file") { Entities = Insert("TIP"), Blocks = "0 BLOCK; 2 TIP; 70 4; 10 0; 20 0; 0 ENDBLK" },
    ];

    private static Provocation[] Limits { get; } =
    [
        Limit("a long file", new DxfLimits { FileBytes = 40 }, Bar),
        Limit("many pairs", new DxfLimits { Pairs = 12 }, Bar),
        Limit("a long line", new DxfLimits { ValueBytes = 100 }, "0 TEXT; 1 " + new string('x', 200_000)),
        Limit("many curves", new DxfLimits { Curves = 2 }, Repeated(Bar, 3)),
        Limit("many vertices in one polyline", new DxfLimits { Vertices = 2 }, "0 LWPOLYLINE; 8 IRON; " + Repeated("10 0; 20 0", 7)),
        Limit("many vertices in all polylines", new DxfLimits { Vertices = 2 }, Repeated("0 LWPOLYLINE; 8 IRON; 10 0; 20 0; 10 1; 20 0", 2)),
        Limit("a far place", new DxfLimits(), Line("IRON", 0, 0, 2e9, 0)),
        Limit("a large array", new DxfLimits(), Insert("TIP") + "; 70 32767; 71 32767; 44 1; 45 1") with { Blocks = HandDrawn.Block("TIP", Bar) },
        Limit("many copies", new DxfLimits { BlockCopies = 5 }, Insert("TIP") + "; 70 3; 71 3; 44 1; 45 1") with { Blocks = HandDrawn.Block("TIP", Bar) },
        Limit("many curves in blocks", new DxfLimits { Curves = 5 }, Insert("TIP") + "; 70 3; 71 3; 44 1; 45 1") with { Blocks = HandDrawn.Block("TIP", Bar) },
        Limit("blocks nested deeply", new DxfLimits { BlockDepth = 2 }, Insert("A")) with
        {
            Blocks = HandDrawn.Block("A", Insert("B")) + "; " + HandDrawn.Block("B", Insert("C")) + "; " + HandDrawn.Block("C", Bar),
        },
        new("limit", "a long text in a binary file")
        {
            Bytes = HandDrawn.With("0 TEXT; 1 " + new string('x', 200_000)).Binary(wideCodes: true),
            Options = With(new DxfLimits { ValueBytes = 100 }),
        },
    ];

    private static Provocation[] Seen { get; } =
    [
        new("no-curves", "text alone") { Entities = "0 TEXT; 8 NOTES; 1 pole" },
        new("no-length", "a circle of radius 0") { Entities = "0 CIRCLE; 8 IRON; 10 0; 20 0; 40 0; " + Bar },
        new("centre-line", "a line of a centre-line type on a part's layer") { Entities = "0 LINE; 8 IRON; 6 CENTER2; 10 0; 20 0; 11 9; 21 0; " + Bar },
        new("heights", "two heights") { Entities = Bar + "; 0 CIRCLE; 8 IRON; 10 0; 20 0; 30 2; 40 1" },
        new("fit-spline", "a spline with fit points alone") { Entities = "0 SPLINE; 8 IRON; 71 3; 11 0; 21 0; 11 5; 21 2; 11 9; 21 0" },
        .. ((string[])["XLINE", "HATCH", "SOLID", "REGION", "MLINE", "MESH", "ACAD_PROXY_ENTITY", "GADGET"])
            .Select(kind => new Provocation("not-read", $"{kind} on a part's layer") { Entities = $"0 {kind}; 8 IRON; {Bar}" }),
    ];

    private static Provocation File(string what, string how, string text) => new(what, how) { Bytes = Encoding.Latin1.GetBytes(text) };

    private static Provocation Spline(string how, string pairs) => new("bad-curve", "a spline: " + how) { Entities = "0 SPLINE; 8 IRON; " + pairs };

    private static Provocation Limit(string how, DxfLimits limits, string entities) =>
        new("limit", how) { Entities = entities, Options = With(limits) };

    private static DxfReadOptions With(DxfLimits limits) => new() { Limits = limits };

    private static string Insert(string block) => $"0 INSERT; 8 IRON; 2 {block}; 10 0; 20 0";

    private static string Repeated(string pairs, int times) => string.Join("; ", Enumerable.Repeat(pairs, times));

    private static string Cut(string after)
    {
        string text = HandDrawn.With(Bar).Text();
        return text[..(text.IndexOf(after, StringComparison.Ordinal) + after.Length)];
    }
}
