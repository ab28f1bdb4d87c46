using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>How far the field reaches around a magnet. A plane section overstates it far away: real magnets end.</summary>
public static class StrayField
{
    /// <summary>
    /// 0.5 mT: action level for active implanted devices such as pacemakers, directive 2013/35/EU, annex II, table B4
    /// (recalled from memory).
    /// </summary>
    public const double ImplantLevel = 0.5e-3;

    /// <summary>
    /// 3 mT: action level for the attraction of loose iron near sources above 100 mT, same table (recalled from memory).
    /// </summary>
    public const double AttractionLevel = 3e-3;

    // Circles grow by a tenth up to thirty metres; directions every 7.5 degrees see any low-order far field's maxima.
    private const double Growth = 1.1;
    private const double Farthest = 30.0;
    private const int Directions = 48;
    private const int Halvings = 12;

    /// <summary>The smallest distance that is told: half the diagonal of the box around the magnet, metres.</summary>
    public static double Nearest(Box bounds) => 0.5 * bounds.Diagonal;

    /// <summary>
    /// Distance from the middle of the box beyond which the field stays below a level, metres, a thousandth more rather than
    /// less; at least the circle around the box. Null when the field outside is not known or stays above the level up to 30 m.
    /// </summary>
    /// <param name="fieldAt">|B| at a place, T; null where it is not known.</param>
    /// <param name="bounds">Box around the magnet.</param>
    /// <param name="level">Flux density, T, positive.</param>
    public static double? Reach(Func<Point, double?> fieldAt, Box bounds, double level)
    {
        double start = Nearest(bounds);
        double above = double.NaN;
        double? strongest = null;
        for (double radius = start; radius < Farthest; radius *= Growth)
        {
            strongest = StrongestOn(fieldAt, bounds.Centre, radius);
            if (strongest is null)
            {
                return null;
            }

            above = strongest > level ? radius : above;
        }

        return !(strongest <= level) ? null : double.IsNaN(above) ? start : Between(fieldAt, bounds.Centre, above, level);
    }

    private static double Between(Func<Point, double?> fieldAt, Point centre, double above, double level)
    {
        double below = Growth * above;
        for (int k = 0; k < Halvings; k++)
        {
            double middle = 0.5 * (above + below);
            (above, below) = StrongestOn(fieldAt, centre, middle) > level ? (middle, below) : (above, middle);
        }

        return below;
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
