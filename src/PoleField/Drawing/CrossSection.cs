using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// The cross-section cut into disjoint named regions by curves that meet only at common end points: what the mesher
/// meshes. All lengths in metres.
/// </summary>
/// <remarks>
/// Invariants: every edge joins two listed vertices exactly; edges cross nowhere; each edge knows the region on its left
/// and right; an edge shared by touching parts is there once; region 0 is the air around and between the parts.
/// </remarks>
public sealed class CrossSection
{
    /// <summary>Index of the surrounding air in <see cref="Regions"/>.</summary>
    public const int Air = 0;

    /// <summary>Mark of "outside the model" on the outer side of a rim.</summary>
    public const int Outside = -1;

    internal CrossSection(
        IReadOnlyList<Point> vertices,
        IReadOnlyList<SectionEdge> edges,
        IReadOnlyList<Region> regions,
        IReadOnlyList<string> parts,
        bool hasRim)
    {
        Vertices = vertices;
        Edges = edges;
        Regions = regions;
        Parts = parts;
        HasRim = hasRim;
        Box box = Box.Empty;
        foreach (SectionEdge e in edges)
        {
            box = box.Including(e.Curve.Bounds);
        }

        Bounds = box;
    }

    /// <summary>End points of edges, metres.</summary>
    public IReadOnlyList<Point> Vertices { get; }

    /// <summary>Boundary curves between regions.</summary>
    public IReadOnlyList<SectionEdge> Edges { get; }

    /// <summary>Regions; [0] is the surrounding air.</summary>
    public IReadOnlyList<Region> Regions { get; }

    /// <summary>Layer names of the parts; <see cref="Region.Part"/> indexes this list.</summary>
    public IReadOnlyList<string> Parts { get; }

    /// <summary>True when a closed rim bounds the model (A = 0 on it); false when the surroundings are open.</summary>
    public bool HasRim { get; }

    /// <summary>Box around all edges, metres.</summary>
    public Box Bounds { get; }
}

/// <summary>A boundary curve of the cross-section.</summary>
/// <param name="Start">Index of the vertex where the curve starts.</param>
/// <param name="End">Index of the vertex where it ends (equal to <paramref name="Start"/> for a closed curve, which has exactly one vertex).</param>
/// <param name="Curve">The curve, metres; its end points equal the vertices bit for bit.</param>
/// <param name="Left">Region on the left of travel, or <see cref="CrossSection.Outside"/>.</param>
/// <param name="Right">Region on the right of travel, or <see cref="CrossSection.Outside"/>.</param>
public sealed record SectionEdge(int Start, int End, Curve Curve, int Left, int Right);

/// <summary>A connected material region: one closed outline less its holes and the parts inside it.</summary>
/// <param name="Part">Index of the part (layer) it belongs to, or −1 for the surrounding air.</param>
/// <param name="Area">Exact area, m² (Green's theorem on the curves); infinite for open surroundings.</param>
/// <param name="Bounds">Box around it, metres.</param>
/// <param name="MirrorImage">True when it was completed by the symmetry and carries the opposite current.</param>
public sealed record Region(int Part, double Area, Box Bounds, bool MirrorImage = false);
