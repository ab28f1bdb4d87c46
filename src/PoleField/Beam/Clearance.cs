using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>Room between the aperture and the parts.</summary>
internal static class Clearance
{
    private const int PointsPerCurve = 64;
    private const int Refinements = 40;

    /// <summary>Smallest distance from the aperture's edge to a boundary of anything that is not air, metres; negative when the aperture's centre is not in air.</summary>
    public static double Of(Magnet magnet, Aperture aperture)
    {
        double best = double.PositiveInfinity;
        foreach (SectionEdge edge in magnet.Section.Edges)
        {
            if (!IsSolid(magnet, edge.Left) && !IsSolid(magnet, edge.Right))
            {
                continue;
            }

            foreach (Curve side in aperture.Outline.Curves)
            {
                best = Math.Min(best, Between(side, edge.Curve));
            }
        }

        return best;
    }

    /// <summary>True for regions of iron, magnets and conductors.</summary>
    public static bool IsSolid(Magnet magnet, int region)
    {
        if (region <= CrossSection.Air)
        {
            return false;
        }

        PartRole role = magnet.Roles[magnet.Section.Regions[region].Part];
        return role.Material.IsMagnetic || role.AmpereTurns != 0.0 || role.Remanence != default;
    }

    private static double Between(Curve side, Curve part)
    {
        int nearest = 0;
        double best = double.PositiveInfinity;
        for (int k = 0; k <= PointsPerCurve; k++)
        {
            double d = part.DistanceTo(side.At((double)k / PointsPerCurve));
            if (d < best)
            {
                (best, nearest) = (d, k);
            }
        }

        // Ternary search between the neighbours of the nearest sample.
        double from = Math.Max(0, nearest - 1) / (double)PointsPerCurve;
        double to = Math.Min(PointsPerCurve, nearest + 1) / (double)PointsPerCurve;
        for (int k = 0; k < Refinements; k++)
        {
            double a = from + ((to - from) / 3);
            double b = to - ((to - from) / 3);
            (from, to) = part.DistanceTo(side.At(a)) < part.DistanceTo(side.At(b)) ? (from, b) : (a, to);
        }

        return Math.Min(best, part.DistanceTo(side.At(0.5 * (from + to))));
    }
}
