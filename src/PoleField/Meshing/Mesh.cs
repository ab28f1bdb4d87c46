using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>A mesh edge that lies on a curve: the vertices A and B sit at parameters TA and TB of it.</summary>
/// <param name="A">Vertex index.</param>
/// <param name="B">Vertex index.</param>
/// <param name="Curve">
/// The curve: that of a section edge, or the circle of the open surroundings. Where two curves touch without an angle no
/// element can follow both; the edge there is the chord, a line from A to B with parameters 0 and 1.
/// </param>
/// <param name="TA">Parameter of A in [0, 1].</param>
/// <param name="TB">Parameter of B in [0, 1] (for a closed curve's last piece: 1, not 0).</param>
/// <param name="SectionEdge">Index of the section edge, or −1 for the circle of the open surroundings.</param>
public readonly record struct CurveEdge(int A, int B, Curve Curve, double TA, double TB, int SectionEdge);

/// <summary>The circle outside which Kelvin's inversion stands for open space.</summary>
/// <param name="Centre">Centre, metres.</param>
/// <param name="Radius">Radius, metres, &gt; 0.</param>
public sealed record OpenCircle(Point Centre, double Radius);

/// <summary>
/// Triangles over the cross-section and, for open surroundings, over a second disc that stands for all of space outside
/// the <see cref="OpenCircle"/>. The two discs share their rim's vertices.
/// </summary>
/// <remarks>
/// Invariants: triangles are counter-clockwise with positive area, conforming (an edge has at most two triangles, and one
/// only on the rim of a closed model); every edge between different regions is in <see cref="CurveEdges"/>; vertices on
/// curves lie on them.
/// </remarks>
public sealed class Mesh
{
    /// <summary>Region of the triangles of the second disc.</summary>
    public const int Exterior = -1;

    internal Mesh(
        CrossSection section,
        Point[] vertices,
        int[] triangles,
        int[] regions,
        CurveEdge[] curveEdges,
        OpenCircle? circle,
        int infinity)
    {
        Section = section;
        Vertices = vertices;
        Triangles = triangles;
        Regions = regions;
        CurveEdges = curveEdges;
        Circle = circle;
        Infinity = infinity;
    }

    /// <summary>The section that was meshed.</summary>
    public CrossSection Section { get; }

    /// <summary>Places of the vertices, metres. Vertices inside the second disc use that disc's own plane (same centre and radius).</summary>
    public IReadOnlyList<Point> Vertices { get; }

    /// <summary>Corner c of triangle t at [3·t + c], counter-clockwise.</summary>
    public IReadOnlyList<int> Triangles { get; }

    /// <summary>Region of triangle t: index into the section's regions, or <see cref="Exterior"/>.</summary>
    public IReadOnlyList<int> Regions { get; }

    /// <summary>Edges on curves, each once.</summary>
    public IReadOnlyList<CurveEdge> CurveEdges { get; }

    /// <summary>The circle shared by the two discs; null for a closed model.</summary>
    public OpenCircle? Circle { get; }

    /// <summary>Vertex at the second disc's centre, which stands for infinity; −1 for a closed model.</summary>
    public int Infinity { get; }

    /// <summary>Number of triangles.</summary>
    public int TriangleCount => Regions.Count;
}
