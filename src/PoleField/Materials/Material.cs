namespace PoleField.Materials;

/// <summary>A named material: its law and where the law comes from.</summary>
/// <param name="Name">Name as used in case files.</param>
/// <param name="Law">H(B).</param>
/// <param name="Description">What it is, in words.</param>
/// <param name="Source">Where the numbers come from.</param>
/// <param name="State">State of the numbers: "published fit, sampled", "1911 handbook table", "user's table", ...</param>
public sealed record Material(string Name, MagneticLaw Law, string Description, string Source, string State)
{
    /// <summary>Air, and everything non-magnetic.</summary>
    public static Material Air { get; } = new("air", LinearLaw.Vacuum, "Air or vacuum", "definition", "exact");

    /// <summary>True for materials that carry flux: permeability above that of air.</summary>
    public bool IsMagnetic => Law is not LinearLaw { RelativePermeability: 1.0 };
}
