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
    // A few roundings of a double, relative.
    private protected const double RootTolerance = 2e-15;

    /// <summary>True when H is proportional to B.</summary>
    public abstract bool IsLinear { get; }

    /// <summary>Limit of H/B (and dH/dB) at B = 0, m/H.</summary>
    public abstract double InitialReluctivity { get; }

    /// <summary>Saturation polarisation Js, T; infinity for a linear law.</summary>
    public abstract double SaturationPolarisation { get; }

    /// <summary>Values at flux density <paramref name="b"/> ≥ 0, T.</summary>
    public abstract MagneticState At(double b);

    /// <summary>Values at many flux densities at once: H, A/m, dH/dB, m/H, and the energy density, J/m³.</summary>
    internal virtual void At(ReadOnlySpan<double> b, Span<double> h, Span<double> slope, Span<double> energy)
    {
        for (int i = 0; i < b.Length; i++)
        {
            (h[i], slope[i], energy[i]) = At(b[i]);
        }
    }

    /// <summary>The inverse: B, T, at field strength <paramref name="h"/> ≥ 0, A/m.</summary>
    public virtual double FluxDensityAt(double h)
    {
        double lowest = PhysicalConstants.Mu0 * h;
        return Inverse(h, lowest, lowest + SaturationPolarisation);
    }

    /// <summary>
    /// The law with the polarisation J multiplied by <paramref name="factor"/> at every H: B = μ0 H + factor · J(H). It is
    /// what a batch of other saturation does to first order, and makes the derivative by saturation well defined.
    /// </summary>
    /// <exception cref="ArgumentOutOfRangeException">The factor is not a positive finite number.</exception>
    public virtual MagneticLaw WithPolarisationScaled(double factor) => new ScaledPolarisationLaw(this, factor);

    // H(B) is increasing, so a bracket always shrinks: Newton where its step stays inside, halving where not.
    private protected double Inverse(double h, double low, double high)
    {
        const int mostSteps = 200;
        double b = 0.5 * (low + high);
        for (int step = 0; step < mostSteps; step++)
        {
            MagneticState state = At(b);
            double excess = state.FieldStrength - h;
            if (excess > 0)
            {
                high = b;
            }
            else
            {
                low = b;
            }

            double next = b - (excess / state.Slope);
            if (Math.Abs(next - b) <= RootTolerance * high || high - low <= RootTolerance * high)
            {
                return b;
            }

            b = next > low && next < high ? next : 0.5 * (low + high);
        }

        throw new InvalidOperationException(FormattableString.Invariant($"No flux density found for H = {h} A/m; the law does not rise."));
    }
}
