namespace PoleField.Materials;

/// <summary>H = B/(μ0 μr).</summary>
public sealed class LinearLaw : MagneticLaw
{
    /// <summary>Air and vacuum.</summary>
    public static LinearLaw Vacuum { get; } = new(1.0);

    /// <summary>Law of constant relative permeability ≥ 1.</summary>
    /// <exception cref="ArgumentOutOfRangeException">The permeability is below 1 or not finite.</exception>
    public LinearLaw(double relativePermeability)
    {
        if (!(relativePermeability >= 1.0) || !double.IsFinite(relativePermeability))
        {
            throw new ArgumentOutOfRangeException(
                nameof(relativePermeability), relativePermeability, "Relative permeability must be a finite number of at least 1.");
        }

        RelativePermeability = relativePermeability;
        InitialReluctivity = PhysicalConstants.Nu0 / relativePermeability;
    }

    /// <summary>μr ≥ 1.</summary>
    public double RelativePermeability { get; }

    /// <inheritdoc/>
    public override bool IsLinear => true;

    /// <inheritdoc/>
    public override double InitialReluctivity { get; }

    /// <inheritdoc/>
    public override double SaturationPolarisation => double.PositiveInfinity;

    /// <inheritdoc/>
    public override MagneticState At(double b) =>
        new(InitialReluctivity * b, InitialReluctivity, 0.5 * InitialReluctivity * b * b);

    /// <inheritdoc/>
    public override double FluxDensityAt(double h) => h / InitialReluctivity;

    /// <inheritdoc/>
    public override MagneticLaw WithPolarisationScaled(double factor)
    {
        if (!(factor > 0.0) || !double.IsFinite(factor))
        {
            throw new ArgumentOutOfRangeException(nameof(factor), factor, "The factor on the polarisation must be a positive finite number.");
        }

        return new LinearLaw(1 + (factor * (RelativePermeability - 1)));
    }
}
