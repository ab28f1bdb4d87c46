using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>One curve as drawn, in drawing units, with where it came from.</summary>
/// <param name="Curve">The exact curve, in drawing units.</param>
/// <param name="Layer">Layer that counts (after block inheritance).</param>
/// <param name="Kind">Entity as the format names it: LINE, ARC, LWPOLYLINE, ...</param>
/// <param name="Handle">Entity handle, when the file has them.</param>
/// <param name="Line">Line of the file where the entity starts, from 1 (0 where there is none: binary files, made sketches).</param>
public sealed record SketchCurve(Curve Curve, string Layer, string Kind, string? Handle, int Line);

/// <summary>Entities that were seen and not used, counted together.</summary>
/// <param name="Layer">Layer.</param>
/// <param name="Kind">Entity as the format names it.</param>
/// <param name="Why">Reason in words: "layer is frozen", "text is not an outline", ...</param>
/// <param name="Count">How many.</param>
public sealed record SkippedEntities(string Layer, string Kind, string Why, int Count);

/// <summary>A drawing as it was drawn: curves with their layers, in drawing units. It may be wrong; it knows where each curve came from.</summary>
/// <param name="Name">File name for messages.</param>
/// <param name="Unit">Drawing unit.</param>
/// <param name="UnitOrigin">Where the unit came from.</param>
/// <param name="Curves">All visible model-space curves, blocks expanded, in file order.</param>
/// <param name="Skipped">What was not read, and why.</param>
/// <param name="Findings">Notes and warnings of reading (faults throw).</param>
public sealed record Sketch(
    string Name,
    LengthUnit Unit,
    UnitOrigin UnitOrigin,
    IReadOnlyList<SketchCurve> Curves,
    IReadOnlyList<SkippedEntities> Skipped,
    IReadOnlyList<Finding> Findings);
