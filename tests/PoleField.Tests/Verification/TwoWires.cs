using PoleField.Geometry;

namespace PoleField.Tests.Verification;

/// <summary>
/// Closed form of two opposite line currents at (±a, 0), the one at +a towards the viewer for positive current (Biot and
/// Savart; for the deflection magnet Ramsey, Molecular Beams, 1956, ch. XIV, recalled from memory). Metres, amperes, tesla.
/// </summary>
internal sealed record TwoWires(double HalfSpacing, double Current)
{
    public Point Field(Point p)
    {
        Point right = Wire(p - new Point(HalfSpacing, 0));
        Point left = Wire(p - new Point(-HalfSpacing, 0));
        return right - left;
    }

    /// <summary>d|B|/dz = −sign·(μ0 I a/π) 2z (y² + z² + a²)/(r1 r2)³ for the magnitude's own sign convention.</summary>
    public double Gradient(Point p)
    {
        double a = HalfSpacing;
        double r1 = p.DistanceTo(new Point(a, 0));
        double r2 = p.DistanceTo(new Point(-a, 0));
        double product = r1 * r2;
        return -(PhysicalConstants.Mu0 * Math.Abs(Current) * a / Math.PI) * 2 * p.Z * (p.SquaredLength + (a * a))
            / (product * product * product);
    }

    public double Magnitude(Point p) => Field(p).Length;

    // Current along +x: the field circulates from +y to +z.
    private Point Wire(Point d) =>
        (PhysicalConstants.Mu0 * Current / (Math.Tau * d.SquaredLength)) * d.Perpendicular;
}
