using PoleField.Drawing;

namespace PoleField.Meshing;

/// <summary>How to mesh.</summary>
public sealed record MeshOptions
{
    /// <summary>Smallest angle to reach away from sharp input corners, degrees, at most 30.</summary>
    public double SmallestAngleDegrees { get; init; } = 26;

    /// <summary>Largest turn of a curve along one mesh edge, degrees.</summary>
    public double LargestTurnDegrees { get; init; } = 20;

    /// <summary>Radius of the open circle over that of the smallest circle around the section.</summary>
    public double OpenCircleRatio { get; init; } = 1.15;

    /// <summary>Most triangles before giving up.</summary>
    public int MostTriangles { get; init; } = 5_000_000;
}

/// <summary>Constrained Delaunay triangulation with quality refinement over a section bounded by curves.</summary>
public static class Mesher
{
    /// <summary>Meshes the section.</summary>
    /// <exception cref="MeshingException">The section cannot be meshed, with the place.</exception>
    public static Mesh Mesh(CrossSection section, SizeField size, MeshOptions? options = null, CancellationToken cancellation = default) =>
        throw new NotImplementedException("seam");
}

/// <summary>A section could not be meshed.</summary>
public sealed class MeshingException(string message, Geometry.Point at) : Exception(message)
{
    /// <summary>Where, metres.</summary>
    public Geometry.Point At { get; } = at;
}
