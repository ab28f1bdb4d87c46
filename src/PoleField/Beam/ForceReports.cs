using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Numerics;

namespace PoleField.Beam;

/// <summary>Magnetic forces per metre of length on the parts, and the pull across the beam's gap.</summary>
internal static class ForceReports
{
    private const int FirstIntervals = 40;      // over the section's width, on each side of the beam
    private const double Growth = 1.25;         // of an interval beyond the section
    private const double FarthestWidths = 1e3;  // stress falls like the fourth power of the distance
    private const int PointsPerInterval = 6;

    /// <summary>
    /// Force on a part: ∫ J × B for conductors; for iron and magnets Maxwell's stress in the air around them, where they
    /// touch other iron on their free faces alone. The other way is the stress around conductors, and the stress along a closed
    /// path one layer of elements away around iron and magnets.
    /// </summary>
    public static PartForce Of(FieldSolution solution, int part)
    {
        PartRole role = solution.Magnet.Roles[part];
        bool[] body = [.. solution.Magnet.Section.Regions.Select(r => r.Part == part)];
        bool magnetic = role.Material.IsMagnetic || role.Remanence != default;
        if (!body.Contains(true) || (!magnetic && role.AmpereTurns == 0.0))
        {
            return default;
        }

        ForceShell shell = ForceShell.Around(solution, body);
        if (!magnetic)
        {
            return new PartForce(ForceOnCurrent.Of(solution, body), shell.HasJoints ? null : shell.OverShell(), false);
        }

        return new PartForce(shell.OverShell(), shell.HasJoints ? null : shell.Outward().AlongPath(), shell.HasJoints);
    }

    /// <summary>
    /// Pull per metre across the horizontal line through the beam, ∫ (Bz² − By²)/(2 μ0) dy, N/m, positive when the halves
    /// attract each other; from iron to iron, or to infinity where the line meets none.
    /// </summary>
    public static double AcrossGap(FieldSolution solution, Point beam) =>
        OneWay(solution, beam, 1.0) + OneWay(solution, beam, -1.0);

    private static double OneWay(FieldSolution solution, Point beam, double direction)
    {
        GaussRule rule = GaussRule.Legendre(PointsPerInterval);
        double width = solution.Magnet.Section.Bounds.Width;
        double step = width / FirstIntervals;
        double at = 0;
        double sum = 0;
        while (at < FarthestWidths * width)
        {
            double end = IronWithin(solution, beam, direction, (at, at + step)) ?? at + step;
            for (int i = 0; i < rule.Nodes.Length; i++)
            {
                double y = beam.Y + (direction * (at + (rule.Nodes[i] * (end - at))));
                if (solution.At(new Point(y, beam.Z)) is not { } s)
                {
                    return 0.5 * PhysicalConstants.Nu0 * sum; // beyond a closed model's rim
                }

                sum += rule.Weights[i] * (end - at) * ((s.Bz * s.Bz) - (s.By * s.By));
            }

            if (end < at + step)
            {
                break;
            }

            at = end;
            step *= at < width ? 1.0 : Growth;
        }

        return 0.5 * PhysicalConstants.Nu0 * sum;
    }

    private static double? IronWithin(FieldSolution solution, Point beam, double direction, (double From, double To) interval)
    {
        const int looks = 16;
        const int halvings = 50;
        double air = interval.From;
        for (int k = 1; k <= looks; k++)
        {
            double next = interval.From + ((interval.To - interval.From) * k / looks);
            if (Circuit.IsIron(solution, new Point(beam.Y + (direction * next), beam.Z)))
            {
                double iron = next;
                for (int b = 0; b < halvings; b++)
                {
                    double middle = 0.5 * (air + iron);
                    (air, iron) = Circuit.IsIron(solution, new Point(beam.Y + (direction * middle), beam.Z))
                        ? (air, middle)
                        : (middle, iron);
                }

                return air;
            }

            air = next;
        }

        return null;
    }
}

/// <summary>Force on a part.</summary>
/// <param name="PerMetre">Per metre of length (y, z), N/m; null for air.</param>
/// <param name="OtherWay">The same by another law; null where there is none.</param>
/// <param name="OnFreeFacesOnly">True when the part is joined to others.</param>
internal readonly record struct PartForce(Point? PerMetre, Point? OtherWay, bool OnFreeFacesOnly);
