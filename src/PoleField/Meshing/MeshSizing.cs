using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Sizes from the geometry.</summary>
public static class MeshSizing
{
    /// <summary>Rule-based size field.</summary>
    public static SizeField For(CrossSection section, Outline aperture, double fineness = 1.0)
    {
        double gap = double.PositiveInfinity;
        var edge = new List<Point>();
        foreach (Curve c in aperture.Curves)
        {
            for (int k = 0; k < 16; k++)
            {
                edge.Add(c.At(k / 16.0));
            }
        }

        foreach (SectionEdge e in section.Edges)
        {
            foreach (Point p in edge)
            {
                gap = Math.Min(gap, e.Curve.DistanceTo(p));
            }
        }

        return SizeField.FromSources(
            section.Bounds.Diagonal / 10 * fineness, 0.35, [.. edge.Select(p => (p, gap / 3 * fineness))]);
    }
}
