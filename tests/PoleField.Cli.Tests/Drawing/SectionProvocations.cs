using PoleField.Drawing;
using static PoleField.Cli.Tests.Drawing.Provocation;

namespace PoleField.Cli.Tests.Drawing;

/// <summary>Outlines the program heals, doubts or refuses.</summary>
internal static class SectionProvocations
{
    private static readonly string _iron = Box("IRON", 0, 0, 10, 10);

    public static IEnumerable<Provocation> All => [.. Healed, .. Open, .. Crossing, .. Halves, .. Layers, .. Whole];

    private static SectionRequest Half => Parts("IRON") with { MirrorLeftRight = true };

    private static SectionRequest CoilHalf => Parts("COIL") with { MirrorLeftRight = true, CurrentLayers = ["COIL"] };

    private static SectionRequest Wound => Parts("IRON", "COIL") with { CurrentLayers = ["COIL"] };

    private static Provocation[] Healed { get; } =
    [
        new("healed-joint", "two lines that miss each other by a micrometre") { Entities = Triangle(1e-3), Request = Parts("IRON") },
        new("healed-joint", "two lines that miss each other by half a nanometre") { Entities = Triangle(5e-7), Request = Parts("IRON") },
        new("healed-joint", "an outline of 210 lines, each a micrometre short") { Entities = Wheel(210), Request = Parts("IRON") },
        new("short-piece", "a line of a tenth of a nanometre") { Entities = _iron + "; " + Line("IRON", 5, 5, 5, 5 + 1e-10), Request = Parts("IRON") },
        new("duplicate", "a line drawn twice") { Entities = _iron + "; " + Line("IRON", 10, 10, 10, 0), Request = Parts("IRON") },
        new("overlap-merged", "a line over a part of another") { Entities = _iron + "; " + Line("IRON", 2, 0, 7, 0), Request = Parts("IRON") },
        new("closed-by-neighbour", "a coil whose fourth side is the iron's")
        {
            Entities = _iron + "; " + Line("COIL", 10, 2, 15, 2) + "; " + Line("COIL", 15, 2, 15, 8) + "; " + Line("COIL", 15, 8, 10, 8),
            Request = Wound,
        },
    ];

    private static Provocation[] Open { get; } =
    [
        new("open-outline", "a gap of 0.05 mm") { Entities = Triangle(0.05), Request = Parts("IRON") },
        new("ambiguous-joint", "an end that could meet two others")
        {
            Entities = Line("IRON", 0, 0, 10, 0) + "; " + Line("IRON", 10, 0.001, 10, 10) + "; " + Line("IRON", 10, 10, 0, 0) + "; " + Line("IRON", 10.0015, 0, 20, 0),
            Request = Parts("IRON"),
        },
        new("loose-curve", "a line between two outlines")
        {
            Entities = _iron + "; " + Box("IRON", 20, 0, 30, 10) + "; " + Line("IRON", 10, 5, 20, 5),
            Request = Parts("IRON"),
        },
        new("no-outline", "a layer that holds a point") { Entities = _iron + "; " + Line("PIN", 3, 3, 3, 3 + 1e-10), Request = Parts("IRON", "PIN") },
        new("outline-count", "two outlines of the beam")
        {
            Entities = _iron + "; " + Box("BEAM", 20, 0, 21, 1) + "; " + Box("BEAM", 22, 0, 23, 1),
            Request = Parts("IRON") with { BeamLayer = "BEAM" },
        },
    ];

    private static Provocation[] Crossing { get; } =
    [
        new("self-crossing", "an outline that crosses itself")
        {
            Entities = "0 LWPOLYLINE; 8 IRON; 70 1; 10 0; 20 0; 10 10; 20 10; 10 10; 20 0; 10 0; 20 10",
            Request = Parts("IRON"),
        },
        new("overlap", "a coil that reaches into the iron") { Entities = _iron + "; " + Box("COIL", 8, 3, 14, 7), Request = Wound },
        new("overlap", "the same in inches") { Header = "9 $INSUNITS; 70 1", Entities = _iron + "; " + Box("COIL", 8, 3, 14, 7), Request = Wound },
        new("coil-cut", "an iron bar through a coil") { Entities = Box("COIL", 0, 0, 10, 10) + "; " + Box("IRON", 4, 0, 6, 10), Request = Wound },
        new("outside-rim", "a rim that cuts the iron")
        {
            Entities = _iron + "; " + Box("BOX", -5, -5, 7, 15),
            Request = Parts("IRON") with { RimLayer = "BOX" },
        },
    ];

    private static Provocation[] Halves { get; } =
    [
        new("closed-on-symmetry", "a half outline that ends on y = 0")
        {
            Entities = Line("IRON", 0, 0, 10, 0) + "; " + Line("IRON", 10, 0, 10, 10) + "; " + Line("IRON", 10, 10, 0, 10),
            Request = Half,
        },
        new("across-symmetry", "a whole outline in a half model") { Entities = Box("IRON", -10, 0, 10, 10), Request = Half },
        new("coil-on-symmetry", "a coil on y = 0 in a half model") { Entities = Box("COIL", 0, 0, 10, 10), Request = CoilHalf },
    ];

    private static Provocation[] Layers { get; } =
    [
        new("missing-layer", "a layer spelled otherwise") { Entities = Box("POLE_TIP", 0, 0, 10, 10) + "; " + Line("NOTES", 0, 0, 1, 1), Request = Parts("POLETIP") },
        new("missing-layer", "a frozen layer")
        {
            Tables = "0 LAYER; 2 COIL; 70 1; 62 7; 6 CONTINUOUS",
            Entities = _iron + "; " + Box("COIL", 20, 0, 30, 10),
            Request = Parts("IRON", "COIL"),
        },
        new("missing-layer", "no curve on any layer") { Entities = "0 TEXT; 8 IRON; 1 pole", Request = Parts("IRON") },
        new("layer-twice", "a layer for a part and the beam") { Entities = _iron, Request = Parts("IRON") with { BeamLayer = "iron" } },
        new("unused-layer", "a coil the case does not name") { Entities = _iron + "; " + Box("COIL LEFT", 20, 0, 30, 10), Request = Parts("IRON") },
        new("unused-layer", "iron the case does not name") { Entities = _iron + "; " + Box("YOKE", 20, 0, 30, 10), Request = Parts("IRON") },
    ];

    private static Provocation[] Whole { get; } =
    [
        new("unlikely-size", "millimetres read as inches") { Header = "9 $INSUNITS; 70 1", Entities = Box("IRON", 0, 0, 140, 150), Request = Parts("IRON") },
        new("far-origin", "survey coordinates") { Entities = Box("IRON", 568053, 5774347, 568063, 5774357), Request = Parts("IRON") },
        new("more-faults", "60 open outlines")
        {
            Entities = string.Join("; ", Enumerable.Range(0, 60).Select(i => Line("IRON", 10 * i, 0, (10 * i) + 5, 0) + "; " + Line("IRON", (10 * i) + 5, 0, 10 * i, 4))),
            Request = Parts("IRON"),
        },
    ];

    // A triangle whose last line ends short of the first corner.
    private static string Triangle(double gap) =>
        Line("IRON", 0, 0, 10, 0) + "; " + Line("IRON", 10, 0, 10, 10) + "; " + Line("IRON", 10, 10, 0, gap);

    private static string Wheel(int lines)
    {
        (double Y, double Z) At(double turn) => (20 * Math.Cos(Math.Tau * turn), 20 * Math.Sin(Math.Tau * turn));
        return string.Join("; ", Enumerable.Range(0, lines).Select(i =>
        {
            (double Y, double Z) from = At((double)i / lines), to = At((i + 1.0) / lines);
            return Line("IRON", from.Y + 1e-3, from.Z, to.Y, to.Z);
        }));
    }
}
