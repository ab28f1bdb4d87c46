using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>The outline the beam fills, metres.</summary>
/// <param name="Outline">Closed outline.</param>
public sealed record Aperture(Outline Outline)
{
    /// <summary>Area-weighted middle: "the beam".</summary>
    public Point Centre => Outline.Centroid;

    /// <summary>Rectangle of a width along y and a height along z.</summary>
    public static Aperture Rectangle(Point centre, double width, double height) =>
        new(Outline.Rectangle(centre, width, height));
}
