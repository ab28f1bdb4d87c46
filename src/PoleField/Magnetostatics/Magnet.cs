using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Materials;

namespace PoleField.Magnetostatics;

/// <summary>What a part is made of and what it carries.</summary>
/// <param name="Layer">Layer of the part.</param>
/// <param name="Material">Its material.</param>
public sealed record PartRole(string Layer, Material Material)
{
    /// <summary>Ampere-turns of each closed outline, spread evenly over it; positive along the beam (+x).</summary>
    public double AmpereTurns { get; init; }

    /// <summary>Copper share of the outline, in (0, 1]; null when not stated.</summary>
    public double? Fill { get; init; }

    /// <summary>Remanence of a permanent magnet, T; zero otherwise. The material's law then acts on B less this.</summary>
    public Point Remanence { get; init; }

    /// <summary>"coil", "magnet", "iron" or "air"; metals as weakly magnetic as stainless steel count as air here.</summary>
    public string Kind => AmpereTurns != 0.0 ? "coil" : Remanence != default ? "magnet" : Material.GuidesFlux ? "iron" : "air";
}

/// <summary>A magnet to be solved: section, what its parts are, and the uniform background field.</summary>
public sealed record Magnet
{
    /// <summary>The section.</summary>
    public required CrossSection Section { get; init; }

    /// <summary>Role of each part, in the order of <see cref="CrossSection.Parts"/>.</summary>
    public required IReadOnlyList<PartRole> Roles { get; init; }

    /// <summary>Uniform background field (By, Bz), T.</summary>
    public Point AppliedField { get; init; }

    /// <summary>Indices of the parts that guide or drive flux: iron and magnets.</summary>
    public int[] MagneticParts => [.. Enumerable.Range(0, Roles.Count).Where(p => Roles[p].Material.GuidesFlux || Roles[p].Remanence != default)];

    /// <summary>The magnet with all its ampere-turns multiplied by a factor.</summary>
    public Magnet WithCurrentsScaled(double factor) =>
        this with { Roles = [.. Roles.Select(r => r with { AmpereTurns = factor * r.AmpereTurns })] };
}
