using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>
/// Kelvin's inversion x → c + R²(x − c)/|x − c|²: it maps the outside of the open circle onto the second disc and leaves
/// the plane Laplace equation as it is (Thomson 1847; use in finite elements: Lowther, Freeman, Forghani 1989, both recalled from memory).
/// </summary>
internal static class Kelvin
{
    /// <summary>Image of a place; the centre's image is far away, not infinite, so that it can be ordered.</summary>
    public static Point Invert(OpenCircle circle, Point p)
    {
        const double nearestToCentre = 1e-3; // of the radius
        Point d = p - circle.Centre;
        double squared = Math.Max(d.SquaredLength, nearestToCentre * nearestToCentre * circle.Radius * circle.Radius);
        return circle.Centre + ((circle.Radius * circle.Radius / squared) * d);
    }

    /// <summary>Gradient in space at <paramref name="outside"/> from the gradient in the second disc at its image.</summary>
    public static Point GradientOutside(OpenCircle circle, Point outside, Point gradientInDisc)
    {
        // The derivative of the inversion is (R²/|d|²)(I − 2 d dᵀ/|d|²), symmetric.
        Point d = outside - circle.Centre;
        double squared = d.SquaredLength;
        double scale = circle.Radius * circle.Radius / squared;
        return scale * (gradientInDisc - ((2 * d.Dot(gradientInDisc) / squared) * d));
    }
}
