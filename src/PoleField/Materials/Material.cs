namespace PoleField.Materials;

/// <summary>A named material: its law and where the law comes from.</summary>
/// <param name="Name">Name as used in case files.</param>
/// <param name="Law">H(B).</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Source">Where the numbers come from.</param>
/// <param name="State">State of the numbers: "published fit, sampled", "1911 handbook table", "user's table", ...</param>
public sealed record Material(string Name, MagneticLaw Law, string Description, string Source, string State)
{
    private const double LeastGuiding = 2.0; // relative permeability

    /// <summary>Air, and everything non-magnetic.</summary>
    public static Material Air { get; } = new("air", LinearLaw.Vacuum, "Air or vacuum", "definition", "exact");

    /// <summary>What the numbers cannot promise: range, spread between batches, recalled values; null when there is nothing to say.</summary>
    public string? Caution { get; init; }

    /// <summary>Notes and warnings from laying the curve through the table.</summary>
    public IReadOnlyList<Finding> Findings => Law is BhCurve curve ? curve.Findings : [];

    /// <summary>True for materials that differ from air magnetically at all, however little.</summary>
    public bool IsMagnetic => Law is not LinearLaw { RelativePermeability: 1.0 };

    /// <summary>
    /// True for materials that guide flux as iron does: saturating ones, and linear ones of relative permeability 2 or more; not for
    /// austenitic stainless steel, which disturbs a field by about a per cent at most.
    /// </summary>
    public bool GuidesFlux => Law is not LinearLaw { RelativePermeability: < LeastGuiding };

    /// <summary>The material with its polarisation J multiplied by <paramref name="factor"/> at every H (see <see cref="MagneticLaw.WithPolarisationScaled"/>).</summary>
    /// <exception cref="ArgumentOutOfRangeException">The factor is not a positive finite number.</exception>
    public Material WithSaturationScaled(double factor) => this with
    {
        Law = Law.WithPolarisationScaled(factor),
        State = FormattableString.Invariant($"{State}, polarisation times {factor}"),
    };
}
