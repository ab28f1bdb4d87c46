using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Cli.Text;
using PoleField.Materials;
using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>Materials with their curves. Its members are the keys; their descriptions are the published schema's.</summary>
internal sealed class MaterialsFile(IEnumerable<Material> materials, bool withCurves)
{
    public const string Name = "polefield-materials/1";

    /// <summary>The format with its schema.</summary>
    public static FileFormat Form { get; } = new(Name, "Magnetisation curves with their sources. SI units.", typeof(MaterialsFile));

    [JsonPropertyName("format"), Description("Name and version of the format.")]
    public string Format { get; } = Name;

    [JsonPropertyName("materials"), Description("The materials.")]
    public IReadOnlyList<MaterialEntry> Materials { get; } = [.. materials.Select(m => new MaterialEntry(m, withCurves))];
}

internal sealed class MaterialEntry(Material material, bool withCurve)
{
    [JsonPropertyName("name"), Description("Name.")]
    public string Name { get; } = material.Name;

    [JsonPropertyName("description"), Description("What it is.")]
    public string Text { get; } = material.Description;

    [JsonPropertyName("source"), Description("Where its curve comes from.")]
    public string Source { get; } = material.Source;

    [JsonPropertyName("state"), Description("State of the sample: heat treatment, form, scatter.")]
    public string State { get; } = material.State;

    [JsonPropertyName("caution"), Description("What the numbers cannot promise; null when there is nothing to say.")]
    public string? Caution { get; } = material.Caution;

    [JsonPropertyName("findings"), Description("Notes and warnings from laying the curve through the table.")]
    public IReadOnlyList<string> Findings { get; } = [.. material.Findings.Select(f => $"{f.Text} {f.Fix}".Trim())];

    [JsonPropertyName("linear"), Description("True for a constant permeability.")]
    public bool IsLinear { get; } = material.Law.IsLinear;

    [JsonPropertyName("saturation_polarisation_T"), Description("Saturation polarisation; null for a linear material.")]
    public double? Saturation { get; } = double.IsFinite(material.Law.SaturationPolarisation) ? material.Law.SaturationPolarisation : null;

    [JsonPropertyName("curve"), Description("Points of the curve; null in the list of all materials.")]
    public IReadOnlyList<CurvePoint>? Curve { get; } = withCurve ? [.. MaterialTables.Rows(material).Select(r => new CurvePoint(r.B, r.H, r.Mu))] : null;
}

internal sealed class CurvePoint(double b, double h, double mu)
{
    [JsonPropertyName("B_T"), Description("Flux density.")]
    public double B { get; } = b;

    [JsonPropertyName("H_A_per_m"), Description("Field strength.")]
    public double H { get; } = h;

    [JsonPropertyName("mu_r"), Description("Relative permeability B/(mu0 H).")]
    public double Mu { get; } = mu;
}

/// <summary>Whether the table of a curve is sound.</summary>
internal sealed class MaterialCheckFile(IReadOnlyList<Finding> findings)
{
    public const string Name = "polefield-material-check/1";

    /// <summary>The format with its schema.</summary>
    public static FileFormat Form { get; } = new(Name, "What is wrong with the table of a magnetisation curve.", typeof(MaterialCheckFile));

    [JsonPropertyName("format"), Description("Name and version of the format.")]
    public string Format { get; } = Name;

    [JsonPropertyName("ok"), Description("True when there are no faults.")]
    public bool Ok { get; } = findings.All(f => f.Severity != Severity.Fault);

    [JsonPropertyName("faults"), Description("What must be mended.")]
    public IReadOnlyList<FoundFault> Faults { get; } = [.. FoundFault.Of(findings, Severity.Fault, null)];
}
