using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>A Gauss point on a face: a curve of the section with different materials on its two sides.</summary>
/// <param name="SectionEdge">Index of the section's edge.</param>
/// <param name="Parameter">Parameter on its curve, 0 to 1.</param>
/// <param name="At">Place, metres.</param>
/// <param name="Outward">Unit normal out of <paramref name="Inner"/>: a positive move makes the inner region grow.</param>
/// <param name="Length">Length of face the point stands for, metres: its weight in integrals along the face.</param>
/// <param name="Inner">Region whose growth counts: the more permeable one, or the conductor in air.</param>
/// <param name="Outer">Region on the other side.</param>
public readonly record struct FacePoint(
    int SectionEdge, double Parameter, Point At, Point Outward, double Length, int Inner, int Outer);
