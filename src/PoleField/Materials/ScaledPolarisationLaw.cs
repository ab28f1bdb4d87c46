namespace PoleField.Materials;

/// <summary>
/// A law whose polarisation is another's times a factor f at equal field strength: B = μ0 H + f J(H). With b the flux density
/// of the base law at the same H, B = f b + (1 − f) μ0 H(b): increasing in b with a slope between f and 1, so it is inverted
/// by a bracketed Newton iteration, and the energy follows in closed form, w = f w(b) + (1 − f) μ0 H²/2.
/// </summary>
internal sealed class ScaledPolarisationLaw : MagneticLaw
{
    private const double Mu0 = PhysicalConstants.Mu0;

    private readonly MagneticLaw _law;
    private readonly double _factor;

    internal ScaledPolarisationLaw(MagneticLaw law, double factor)
    {
        if (!(factor > 0.0) || !double.IsFinite(factor))
        {
            throw new ArgumentOutOfRangeException(nameof(factor), factor, "The factor on the polarisation must be a positive finite number.");
        }

        _law = law;
        _factor = factor;
    }

    /// <inheritdoc/>
    public override bool IsLinear => false;

    /// <inheritdoc/>
    public override double InitialReluctivity => Scaled(_law.InitialReluctivity);

    /// <inheritdoc/>
    public override double SaturationPolarisation => _factor * _law.SaturationPolarisation;

    /// <inheritdoc/>
    public override MagneticState At(double b)
    {
        MagneticState state = BaseState(b);
        double h = state.FieldStrength;
        return new MagneticState(
            h, Scaled(state.Slope), (_factor * state.Energy) + ((1 - _factor) * 0.5 * Mu0 * h * h));
    }

    /// <inheritdoc/>
    public override double FluxDensityAt(double h) =>
        (_factor * _law.FluxDensityAt(h)) + ((1 - _factor) * Mu0 * h);

    private double Scaled(double slope) => slope / Rise(slope);

    // dB/db; the two terms are positive because μ0 dH/db is at most 1.
    private double Rise(double slope) => (_factor * (1 - (Mu0 * slope))) + (Mu0 * slope);

    private MagneticState BaseState(double b)
    {
        const int mostSteps = 200;
        double low = b / Math.Max(1, _factor);
        double high = b / Math.Min(1, _factor);
        double x = b;
        for (int step = 0; step < mostSteps; step++)
        {
            MagneticState state = _law.At(x);
            double excess = (_factor * x) + ((1 - _factor) * Mu0 * state.FieldStrength) - b;
            if (excess > 0)
            {
                high = x;
            }
            else
            {
                low = x;
            }

            double next = x - (excess / Rise(state.Slope));
            if (Math.Abs(next - x) <= RootTolerance * high || high - low <= RootTolerance * high)
            {
                return state;
            }

            x = next > low && next < high ? next : 0.5 * (low + high);
        }

        throw new InvalidOperationException(FormattableString.Invariant($"No field strength found for B = {b} T; the law does not rise."));
    }
}
