using System.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>States of the laws of a few elements, each in a lane, at their quadrature points.</summary>
internal sealed class LaneStates(int points)
{
    /// <summary>H, A/m.</summary>
    public Vector<double>[] FieldStrength { get; } = new Vector<double>[points];

    /// <summary>dH/dB, m/H.</summary>
    public Vector<double>[] Slope { get; } = new Vector<double>[points];

    /// <summary>Energy density, J/m³.</summary>
    public Vector<double>[] Energy { get; } = new Vector<double>[points];
}
