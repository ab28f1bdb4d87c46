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
        $"Curves of one layer cross at {log.Place(at)} ({log.Entity(a.Source)}; {log.Entity(b.Source)}).",
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
        FormattableString.Invariant($"An outline is open on layer {layer}: ends {log.Place(ends.A)} and {log.Place(ends.B)} are {SectionLog.Length(ends.A.DistanceTo(ends.B))} apart (join tolerance {SectionLog.Length(join)}; {log.Entity(sources.A)}; {log.Entity(sources.B)})."),
        "Draw the missing piece, or raise the join tolerance if the gap is meant to be closed.")
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
}
