using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The words of what is found while a section is read.</summary>
internal static class SectionMessages
{
    public static Finding HealedJoint(SectionLog log, Point at, double gap) => new(
        Severity.Note, "healed-joint", $"Ends {SectionLog.Length(gap)} apart at {log.Place(at)} were joined.", "Nothing to do.")
    { Size = gap };

    public static Finding AmbiguousJoint(SectionLog log, Point end, Point first, Point second) => new(
        Severity.Fault,
        "ambiguous-joint",
        $"The open end {log.Place(end)} could meet two others, {log.Place(first)} ({SectionLog.Length(end.DistanceTo(first))} away) and {log.Place(second)} ({SectionLog.Length(end.DistanceTo(second))} away).",
        "Draw the joint that is meant so that its ends coincide.")
    { Size = end.DistanceTo(first) };

    public static Finding Repeat(SectionLog log, Point at, double length, bool whole) => new(
        Severity.Note,
        whole ? "duplicate" : "overlap-merged",
        whole
            ? $"A curve of length {SectionLog.Length(length)} through {log.Place(at)} is drawn more than once; one was kept."
            : $"Curves lie on each other over {SectionLog.Length(length)} about {log.Place(at)}; one was kept.",
        "Nothing to do.")
    { Size = length };

    public static Finding SelfCrossing(SectionLog log, Point at, Piece a, Piece b) => new(
        Severity.Fault,
        "self-crossing",
        $"Curves of one layer cross at {log.Place(at)} ({log.Entities(a.Source, b.Source)}).",
        "Trim them, or put the outlines on layers of their own.");

    public static Finding Overlap(SectionLog log, string a, string b, double area, Point at) => new(
        Severity.Fault,
        "overlap",
        $"Layers {a} and {b} overlap by {SectionLog.Area(area)}, first at {log.Place(at)}; parts of different material may touch or lie one inside the other, not overlap in part.",
        "Trim one outline along the other.")
    { Layer = b, Size = area };

    public static Finding OutsideRim(SectionLog log, string part, string rim, double area, Point at) => new(
        Severity.Fault,
        "outside-rim",
        $"{SectionLog.Area(area)} of layer {part} lie outside the rim on layer {rim}, first at {log.Place(at)}.",
        "Draw the rim around all parts, or set open surroundings.")
    { Layer = part, Size = area };

    public static Finding OpenOutline(SectionLog log, string layer, (Point A, Point B) ends, (int A, int B) sources, double join) => new(
        Severity.Fault,
        "open-outline",
        FormattableString.Invariant($"An outline is open on layer {layer}: ends {log.Place(ends.A)} and {log.Place(ends.B)} are {SectionLog.Length(ends.A.DistanceTo(ends.B))} apart (join tolerance {SectionLog.Length(join)}; {log.Entities(sources.A, sources.B)})."),
        "Draw the missing piece, or raise the join tolerance ([sketch] join) if the gap is meant to be closed.")
    { Layer = layer, Size = ends.A.DistanceTo(ends.B) };

    public static Finding LooseCurve(SectionLog log, string layer, Point at, int source) => new(
        Severity.Fault,
        "loose-curve",
        $"A curve on layer {layer} bounds nothing at {log.Place(at)} ({log.Entity(source)}).",
        "Delete it, or move it to a layer the case does not name.")
    { Layer = layer };

    public static Finding NoOutline(string layer, string what) => new(
        Severity.Fault,
        "no-outline",
        $"Layer {layer}, named as {what}, holds no closed outline.",
        "Close its curves to outlines, or name another layer.")
    { Layer = layer };

    public static Finding NotOneOutline(string layer, string what, int outlines) => new(
        Severity.Fault,
        "outline-count",
        FormattableString.Invariant($"Layer {layer}, named as {what}, holds {outlines} closed outlines; exactly one is allowed."),
        "Leave one outline on the layer.")
    { Layer = layer };

    public static Finding ClosedOnSymmetry(SectionLog log, string layer, Line line) => new(
        Severity.Note,
        "closed-on-symmetry",
        $"An outline on layer {layer} was closed along the symmetry line from {log.Place(line.Start)} to {log.Place(line.End)}.",
        "Nothing to do.")
    { Layer = layer, Size = line.Length };

    public static Finding ClosedByNeighbour(SectionLog log, string layer, Point at, double length) => new(
        Severity.Note,
        "closed-by-neighbour",
        $"An open outline on layer {layer} leans on another part; {SectionLog.Length(length)} of that part's edge at {log.Place(at)} serve both.",
        "Nothing to do.")
    { Layer = layer, Size = length };

    public static Finding AcrossSymmetry(SectionLog log, string layer, Point at) => new(
        Severity.Fault,
        "across-symmetry",
        $"Layer {layer} reaches across the symmetry line, to {log.Place(at)}; a sketch that is mirrored left-right shows y >= 0 only.",
        "Delete the left half, or set mirror = \"none\".")
    { Layer = layer, Size = -at.Y };

    public static Finding CoilOnSymmetry(SectionLog log, string layer, Point at) => new(
        Severity.Fault,
        "coil-on-symmetry",
        $"The coil on layer {layer} touches the symmetry line at {log.Place(at)}; its image would carry the opposite current in the same place.",
        "Draw the coil clear of y = 0.")
    { Layer = layer };

    public static Finding CoilCut(SectionLog log, string layer, int pieces, Point at) => new(
        Severity.Fault,
        "coil-cut",
        FormattableString.Invariant($"An outline of the coil on layer {layer} is cut into {pieces} pieces by other parts, first at {log.Place(at)}; ampere-turns are stated for an outline, and how they are shared among pieces is not."),
        "Draw each piece as an outline of its own and state the ampere-turns of one, or move the part that cuts.")
    { Layer = layer };

    public static Finding MissingLayer(string layer, string what, string? skipped, string? nearest, string found) => new(
        Severity.Fault,
        "missing-layer",
        $"Layer {layer}, named as {what}, holds no curve of the sketch{(skipped is null ? "" : $" (skipped: {skipped})")}. Layers found: {found}.",
        nearest is null ? "Name one of these layers." : $"Did you mean {nearest}?")
    { Layer = layer };

    public static Finding LayerTwice(string layer) => new(
        Severity.Fault, "layer-twice", $"Layer {layer} is named for two purposes.", "Give each layer one purpose.")
    { Layer = layer };

    public static Finding LooksLike(string layer, string what) => new(
        Severity.Note, "unused-layer", $"Layer {layer} looks like {what} and is not among the parts.", "Name it in the case if it belongs there.")
    { Layer = layer };

    public static Finding UnlikelySize(SectionLog log, Box box) => new(
        Severity.Warning,
        "unlikely-size",
        FormattableString.Invariant($"The parts span {box.Width * 1e3:g4} x {box.Height * 1e3:g4} mm, read with 1 {log.Unit.Name} = {log.Unit.Metres * 1e3:g4} mm; magnets of 5 mm to 3 m are expected."),
        "If the unit is wrong, state it in the case: [sketch] unit.")
    { Size = Math.Max(box.Width, box.Height) };

    public static Finding FarOrigin(SectionLog log, Point centre) => new(
        Severity.Note,
        "far-origin",
        $"The sketch lies far from its origin, about {log.Place(centre)}; lengths are kept, to the digits its coordinates still hold.",
        "Nothing to do; drawing about the origin keeps more digits.");
}
