namespace PoleField.Materials;

/// <summary>The law's values at one flux density: what an element needs.</summary>
/// <param name="FieldStrength">H, A/m, ≥ 0.</param>
/// <param name="Slope">dH/dB, m/H, in (0, 1/μ0].</param>
/// <param name="Energy">w = ∫₀ᴮ H dB, J/m³.</param>
public readonly record struct MagneticState(double FieldStrength, double Slope, double Energy);

/// <summary>
/// An isotropic, single-valued law H(B). Every instance satisfies H(0) = 0 and 0 &lt; dH/dB ≤ 1/μ0 everywhere, so the stored
/// energy is strictly convex and Newton's method with a line search on it converges from any start.
/// </summary>
public abstract class MagneticLaw
{
    /// <summary>True when H is proportional to B.</summary>
    public abstract bool IsLinear { get; }

    /// <summary>Limit of H/B (and dH/dB) at B = 0, m/H.</summary>
    public abstract double InitialReluctivity { get; }

    /// <summary>Saturation polarisation Js, T; infinity for a linear law.</summary>
    public abstract double SaturationPolarisation { get; }

    /// <summary>Values at flux density <paramref name="b"/> ≥ 0, T.</summary>
    public abstract MagneticState At(double b);
}
