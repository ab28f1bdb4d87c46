using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Which region of a cross-section a place lies in.</summary>
public static class SectionPoint
{
    /// <summary>Region of the section at a place off its edges: index into <see cref="CrossSection.Regions"/>, or <see cref="CrossSection.Outside"/>.</summary>
    public static int RegionAt(CrossSection section, Point p)
    {
        for (int region = CrossSection.Air + 1; region < section.Regions.Count; region++)
        {
            if (section.Regions[region].Bounds.Contains(p) && Turns(section, region, p) == 1)
            {
                return region;
            }
        }

        return section.HasRim && Turns(section, CrossSection.Air, p) != 1 ? CrossSection.Outside : CrossSection.Air;
    }

    /// <summary>How often the edges of a region wind around a place: once inside it, not at all outside.</summary>
    internal static int Turns(CrossSection section, int region, Point p)
    {
        double angle = 0;
        foreach (SectionEdge e in section.Edges)
        {
            if (e.Left == region || e.Right == region)
            {
                angle += (e.Left == region ? 1 : -1) * Outline.SweptAngle(e.Curve, p);
            }
        }

        return (int)Math.Round(angle / Math.Tau);
    }
}
