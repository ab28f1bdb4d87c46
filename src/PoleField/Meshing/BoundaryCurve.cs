using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>A curve that the mesh must follow.</summary>
/// <param name="Curve">The curve.</param>
/// <param name="SectionEdge">Index of the section's edge, or −1 for the open circle.</param>
/// <param name="Start">Vertex of the triangulation at parameter 0.</param>
/// <param name="End">Vertex of the triangulation at parameter 1.</param>
/// <param name="Left">Region on the left, or <see cref="Drawing.CrossSection.Outside"/>.</param>
/// <param name="Right">Region on the right, or <see cref="Drawing.CrossSection.Outside"/>.</param>
internal sealed record BoundaryCurve(Curve Curve, int SectionEdge, int Start, int End, int Left, int Right)
{
    /// <summary>True when the chord is the curve.</summary>
    public bool IsStraight { get; } = Curve is Line;

    /// <summary>How the curve meets its neighbours at <see cref="Start"/>.</summary>
    public Corner AtStart { get; set; }

    /// <summary>How the curve meets its neighbours at <see cref="End"/>.</summary>
    public Corner AtEnd { get; set; }

    /// <summary>Direction in which the curve leaves its start (or, from the end, its end), length one.</summary>
    public Point Leaves(bool start) => start ? Curve.Derivative(0).Unit() : -Curve.Derivative(1).Unit();
}

/// <summary>The smallest angle a curve makes with another at a common end.</summary>
internal enum Corner
{
    /// <summary>60 degrees or more: refinement needs no care.</summary>
    Open,

    /// <summary>Below 60 degrees: split at common distances from the corner (Ruppert 1995, concentric shells).</summary>
    Sharp,

    /// <summary>The curves touch without an angle: no element can follow both, the first pieces stay straight.</summary>
    Cusp,
}

/// <summary>A piece of a boundary curve that is one edge of the mesh: vertex A at parameter TA, B at TB, TA &lt; TB.</summary>
internal readonly record struct CurvePiece(int A, int B, int Curve, double TA, double TB);
