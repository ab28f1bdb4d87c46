using PoleField.Geometry;

namespace PoleField.Cli;

/// <summary>How far the field reaches around the magnet.</summary>
internal static class StrayField
{
    /// <summary>0.5 mT: action level for active implanted devices such as pacemakers, directive 2013/35/EU, annex II, table B4 (recalled).</summary>
    public const double Limit = 0.5e-3;

    // Circles grow by a tenth up to thirty metres; directions every 7.5 degrees see any low-order far field's maxima.
    private const double Growth = 1.1;
    private const double Farthest = 30.0;
    private const int Directions = 48;

    /// <summary>
    /// Distance from the middle of the box beyond which the field stays below <see cref="Limit"/>, metres; null when the
    /// field outside is not known or stays above it.
    /// </summary>
    /// <param name="fieldAt">|B| at a place, T; null where it is not known.</param>
    /// <param name="bounds">Box around the magnet.</param>
    public static double? Reach(Func<Point, double?> fieldAt, Box bounds)
    {
        double radius = 0.5 * bounds.Diagonal;
        double? reach = radius;
        double? strongest = null;
        for (; radius < Farthest; radius *= Growth)
        {
            strongest = StrongestOn(fieldAt, bounds.Centre, radius);
            if (strongest is null)
            {
                return null;
            }

            reach = strongest > Limit ? radius * Growth : reach;
        }

        return strongest <= Limit ? reach : null;
    }

    private static double? StrongestOn(Func<Point, double?> fieldAt, Point centre, double radius)
    {
        double strongest = 0;
        for (int i = 0; i < Directions; i++)
        {
            if (fieldAt(centre + Point.Polar(radius, Math.Tau * i / Directions)) is not { } field)
            {
                return null;
            }

            strongest = Math.Max(strongest, field);
        }

        return strongest;
    }
}
