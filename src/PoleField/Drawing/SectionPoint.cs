using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Which region of a cross-section a place lies in.</summary>
public static class SectionPoint
{
    /// <summary>
    /// Region at a place: that on the facing side of the nearest edge. Index into the section's regions, or
    /// <see cref="CrossSection.Outside"/>.
    /// </summary>
    public static int RegionAt(CrossSection section, Point p)
    {
        double best = double.PositiveInfinity;
        int region = CrossSection.Air;
        foreach (SectionEdge edge in section.Edges)
        {
            double t = edge.Curve.ClosestParameter(p);
            double distance = edge.Curve.At(t).DistanceTo(p);

            // At a shared corner the edge that p faces most squarely decides.
            Point inward = edge.Curve.Derivative(Math.Clamp(t, 1e-9, 1 - 1e-9));
            double side = inward.Unit().Cross(p - edge.Curve.At(t));
            double weighted = distance - (1e-9 * Math.Abs(side));
            if (weighted < best)
            {
                best = weighted;
                region = side >= 0 ? edge.Left : edge.Right;
            }
        }

        return region;
    }
}
