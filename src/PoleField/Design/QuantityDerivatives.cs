using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>One quantity and its derivatives by everything that a workshop, a mill or a power supply can get wrong.</summary>
public sealed record QuantityDerivatives
{
    /// <summary>The quantity.</summary>
    public required DesignQuantity Quantity { get; init; }

    /// <summary>Its value; SI.</summary>
    public required double Value { get; init; }

    /// <summary>
    /// Derivative by outward move at each of <see cref="Sensitivity.Points"/>, per metre of move and metre of face. Its sum
    /// over the points, times their lengths and a move, is what the move does.
    /// </summary>
    public required IReadOnlyList<double> Density { get; init; }

    /// <summary>Derivatives by each part, in the order of the section's parts.</summary>
    public required IReadOnlyList<PartDerivatives> Parts { get; init; }

    /// <summary>Derivative by shifting the beam with its aperture along y and z, per metre.</summary>
    public required Point BeamPlace { get; init; }
}

/// <summary>Derivatives of a quantity by what one part is and where it stands.</summary>
/// <param name="Shift">By a shift of the whole part along y and z, per metre. Joints to parts of the same material stay closed.</param>
/// <param name="Turn">By a turn of the whole part from +y towards +z about <paramref name="Pivot"/>, per radian.</param>
/// <param name="Pivot">Middle of the box around the part, metres.</param>
/// <param name="AmpereTurns">By a relative change of its ampere-turns.</param>
/// <param name="Saturation">By a relative change of its material's polarisation at every field strength.</param>
/// <param name="Remanence">By a relative change of its remanence.</param>
public sealed record PartDerivatives(
    Point Shift, double Turn, Point Pivot, double AmpereTurns, double Saturation, double Remanence);
