using System.Runtime.CompilerServices;

namespace PoleField.Numerics;

/// <summary>
/// Signs of the two determinants a triangulation rests on, right for all doubles that neither overflow nor underflow.
/// </summary>
/// <remarks>
/// Shewchuk, Adaptive Precision Floating-Point Arithmetic and Fast Robust Geometric Predicates, Discrete Comput. Geom. 18
/// (1997) 305: rounded arithmetic with an error bound first, expansions only when the bound cannot decide.
/// </remarks>
internal static partial class Predicates
{
    // Half an ulp of one, and the bounds of Shewchuk's sections 4.2 and 4.4 in it.
    private const double Epsilon = 1.1102230246251565e-16;
    private const double OrientFilter = (3 + (16 * Epsilon)) * Epsilon;
    private const double InCircleFilter = (10 + (96 * Epsilon)) * Epsilon;

    /// <summary>
    /// Twice the signed area of triangle abc: positive when c lies left of the line from a to b, zero exactly when the three
    /// are collinear. The sign is exact, the size approximate.
    /// </summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static double Orient(double ay, double az, double by, double bz, double cy, double cz)
    {
        double left = (ay - cy) * (bz - cz);
        double right = (az - cz) * (by - cy);
        double determinant = left - right;
        double bound = OrientFilter * (Math.Abs(left) + Math.Abs(right));
        return Math.Abs(determinant) >= bound ? determinant : OrientAdaptive(ay, az, by, bz, cy, cz);
    }

    /// <summary>
    /// Positive when d lies inside the circle through a, b, c (counter-clockwise), negative outside, zero exactly when the
    /// four are cocircular. The sign is exact, the size approximate.
    /// </summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static double InCircle(
        double ay, double az, double by, double bz, double cy, double cz, double dy, double dz)
    {
        double ady = ay - dy, adz = az - dz;
        double bdy = by - dy, bdz = bz - dz;
        double cdy = cy - dy, cdz = cz - dz;
        double bc = bdy * cdz, cb = cdy * bdz, ca = cdy * adz, ac = ady * cdz, ab = ady * bdz, ba = bdy * adz;
        double aLift = (ady * ady) + (adz * adz);
        double bLift = (bdy * bdy) + (bdz * bdz);
        double cLift = (cdy * cdy) + (cdz * cdz);
        double determinant = (aLift * (bc - cb)) + (bLift * (ca - ac)) + (cLift * (ab - ba));
        double permanent = ((Math.Abs(bc) + Math.Abs(cb)) * aLift)
            + ((Math.Abs(ca) + Math.Abs(ac)) * bLift)
            + ((Math.Abs(ab) + Math.Abs(ba)) * cLift);
        return Math.Abs(determinant) >= InCircleFilter * permanent
            ? determinant
            : InCircleAdaptive(ay, az, by, bz, cy, cz, dy, dz);
    }
}
