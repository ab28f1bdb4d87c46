using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Beam;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

internal sealed class TwoWireFile(AnalysisHead head, TwoWireComparison comparison) : AnalysisFile(Name, head)
{
    public const string Name = "polefield-two-wire/1";

    [JsonPropertyName("two_wire"), Description("The wires, k, and the deviations relative to the two-wire field's mean over the aperture.")]
    public TwoWireSection TwoWire { get; } = new(comparison);
}

internal sealed class TwoWireSection(TwoWireComparison c)
{
    [JsonPropertyName("half_spacing_mm"), Description("Half the distance a of the wires.")]
    public double? HalfSpacing { get; } = Millimetres(c.Wires.HalfSpacing);

    [JsonPropertyName("midpoint_mm"), Description("Midpoint of the wires: [y, z].")]
    public IReadOnlyList<double>? Midpoint { get; } = Pair(c.Wires.Midpoint, 1e3);

    [JsonPropertyName("current_A"), Description("Current of the wire on the right, positive along +x.")]
    public double? Current { get; } = Finite(c.Wires.Current);

    [JsonPropertyName("fitted"), Description("Which of current, half_spacing and midpoint were fitted; the case states the others.")]
    public IReadOnlyList<string> Fitted { get; } =
    [
        "current",
        .. c.Stated.HalfSpacing is null ? (string[])["half_spacing"] : [],
        .. c.Stated.Midpoint is null ? (string[])["midpoint"] : [],
    ];

    [JsonPropertyName("k"), Description("a |G| / B of the computed field at the beam.")]
    public double? ShapeFactor { get; } = Finite(c.ShapeFactor);

    [JsonPropertyName("k_two_wire"), Description("The same of the two-wire field.")]
    public double? TwoWireShapeFactor { get; } = Finite(c.TwoWireShapeFactor);

    [JsonPropertyName("field_deviation_at_beam"), Description("Deviation of B at the beam, signed.")]
    public double? FieldAtBeam { get; } = Finite(c.Field.AtBeam);

    [JsonPropertyName("field_deviation_max"), Description("Largest size of the deviation of B.")]
    public double? FieldMax { get; } = Finite(c.Field.Max);

    [JsonPropertyName("field_deviation_rms"), Description("Root of the area-weighted mean square.")]
    public double? FieldRms { get; } = Finite(c.Field.Rms);

    [JsonPropertyName("gradient_deviation_at_beam"), Description("Deviation of G at the beam, signed.")]
    public double? GradientAtBeam { get; } = Finite(c.Gradient.AtBeam);

    [JsonPropertyName("gradient_deviation_max"), Description("Largest size of the deviation of G.")]
    public double? GradientMax { get; } = Finite(c.Gradient.Max);

    [JsonPropertyName("gradient_deviation_rms"), Description("Root of the area-weighted mean square.")]
    public double? GradientRms { get; } = Finite(c.Gradient.Rms);
}
