using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Sizes from the geometry.</summary>
public static class MeshSizing
{
    /// <summary>Rule-based size field.</summary>
    public static SizeField For(CrossSection section, Outline aperture, double fineness = 1.0) => throw new NotImplementedException("seam");
}

/// <summary>Angles of a mesh.</summary>
/// <param name="SmallestAngleDegrees">Smallest angle, degrees.</param>
public sealed record MeshQuality(double SmallestAngleDegrees)
{
    /// <summary>Measures a mesh.</summary>
    public static MeshQuality Of(Mesh mesh) => throw new NotImplementedException("seam");
}
