using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>Places that the open circle must enclose for the sake of the beam.</summary>
internal static class EnclosedPlaces
{
    /// <summary>
    /// Corners of a box around the aperture as wide as its clearance, so that the band of the extraction has room between
    /// the beam and the circle.
    /// </summary>
    public static IReadOnlyList<Point> Around(Magnet magnet, Aperture aperture)
    {
        double room = Math.Min(Clearance.Of(magnet, aperture), magnet.Section.Bounds.Diagonal);
        Box box = aperture.Outline.Bounds.Inflated(Math.Max(0, room));
        return [box.Min, box.Max, new Point(box.Min.Y, box.Max.Z), new Point(box.Max.Y, box.Min.Z)];
    }
}
