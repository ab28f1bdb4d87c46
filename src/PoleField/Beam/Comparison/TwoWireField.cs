using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// Field of two opposite line currents side by side along y. With ζ = y + iz the flux density is one analytic function,
/// Bz + i By = (μ0 I/π) a / ((ζ − m)² − a²)  (Biot and Savart; the pole pair of Rabi, Kellogg and Millman has it between
/// two of its equipotentials: Ramsey, Molecular Beams, 1956, ch. XIV, recalled from memory).
/// </summary>
/// <param name="HalfSpacing">Half the distance a of the wires, metres, positive.</param>
/// <param name="Midpoint">Middle m between the wires, metres.</param>
/// <param name="Current">Current I along the beam of the wire on the right (at m + a along y), A; the other carries −I.</param>
public sealed record TwoWireField(double HalfSpacing, Point Midpoint, double Current)
{
    /// <summary>Field and derivatives at a place, which must not be on a wire.</summary>
    public BeamValues At(Point p)
    {
        Complex distance = new(p.Y - Midpoint.Y, p.Z - Midpoint.Z);
        Complex product = (distance * distance) - (HalfSpacing * HalfSpacing);
        Complex field = PhysicalConstants.Mu0 * Current / Math.PI * HalfSpacing / product;
        Complex slope = -2 * distance * field / product; // ∂Bz/∂y + i ∂By/∂y
        return new BeamValues(p, field.Imaginary, field.Real, slope.Real, -slope.Imaginary);
    }

    /// <summary>k = a |G| / B at a place, no unit; 2az/(z² + a²) at height z above the middle, at most 1.</summary>
    public double ShapeFactor(Point p) => ShapeFactor(At(p), HalfSpacing);

    /// <summary>k = a |G| / B of any field, for a half-spacing a.</summary>
    public static double ShapeFactor(BeamValues values, double halfSpacing) =>
        halfSpacing * Math.Abs(values.Gradient) / values.Field;
}

/// <summary>What of the two wires is given; the rest is fitted.</summary>
/// <param name="HalfSpacing">Half-spacing, metres; null to fit it.</param>
/// <param name="Midpoint">Middle between the wires, metres; null to fit it.</param>
public sealed record StatedWires(double? HalfSpacing = null, Point? Midpoint = null);
