using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Beam;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

internal sealed class RampFile(AnalysisHead head, RampReport ramp) : AnalysisFile(Name, head)
{
    public const string Name = "polefield-ramp/1";

    [JsonPropertyName("ramp"), Description("One entry for each excitation, by rising ampere-turns.")]
    public IReadOnlyList<RampStepSection> Steps { get; } = [.. ramp.Steps.Select(s => new RampStepSection(s))];

    [JsonPropertyName("onset"), Description("Fall of gradient per ampere-turn below its best that counts as saturation.")]
    public double Onset { get; } = ramp.Onset;

    [JsonPropertyName("onset_factor"), Description("Factor of the case's ampere-turns at which it is reached; null when it is not, or when other sources act too.")]
    public double? OnsetFactor { get; } = Finite(ramp.OnsetFactor);

    [JsonPropertyName("start_gradient_per_ampere_turn_T_per_m_A"), Description("At a thousandth of the ampere-turns; null when other sources act too.")]
    public double? Start { get; } = ramp.HasOtherSources ? null : Finite(ramp.Start.GradientPerAmpereTurn);

    [JsonPropertyName("first_saturated_layer"), Description("Iron part that saturates first; null when none does.")]
    public string? FirstSaturated { get; } = ramp.FirstSaturated?.Layer;

    [JsonPropertyName("half_spacing_mm"), Description("Half-spacing a of the wires behind k; null where no two wires describe the field.")]
    public double? HalfSpacing { get; } = Millimetres(ramp.HalfSpacing);
}

internal sealed class RampStepSection(RampStep s)
{
    [JsonPropertyName("ampere_turns_factor"), Description("Factor of the case's ampere-turns.")]
    public double Factor { get; } = s.Factor;

    [JsonPropertyName("ampere_turns"), Description("Sum of the positive ampere-turns.")]
    public double? AmpereTurns { get; } = Finite(s.AmpereTurns);

    [JsonPropertyName("field_T"), Description("B = |B| at the beam.")]
    public double? Field { get; } = Finite(s.Report.Beam.Field);

    [JsonPropertyName("field_error_T"), Description("Error bar of B (discretisation).")]
    public double? FieldError { get; } = Finite(s.Report.FieldError);

    [JsonPropertyName("gradient_T_per_m"), Description("G = d|B|/dz at the beam, signed.")]
    public double? Gradient { get; } = Finite(s.Report.Beam.Gradient);

    [JsonPropertyName("gradient_error_T_per_m"), Description("Error bar of G (discretisation).")]
    public double? GradientError { get; } = Finite(s.Report.GradientError);

    [JsonPropertyName("gradient_per_ampere_turn_T_per_m_A"), Description("|G| over the ampere-turns.")]
    public double? PerAmpereTurn { get; } = Finite(s.GradientPerAmpereTurn);

    [JsonPropertyName("spread"), Description("(max - min) / (2 |mean|) of G over the aperture.")]
    public double? Spread { get; } = Finite(s.Report.Gradient.Spread);

    [JsonPropertyName("rms"), Description("Standard deviation / |mean| of G over the aperture.")]
    public double? Rms { get; } = Finite(s.Report.Gradient.Rms);

    [JsonPropertyName("iron_field_max_T"), Description("Largest flux density in iron; null without iron.")]
    public double? IronFieldMax { get; } = Finite(s.IronFieldMax);

    [JsonPropertyName("most_saturated_layer"), Description("Part with the largest saturated share of its area; null when none is saturated.")]
    public string? MostSaturated { get; } = s.MostSaturated?.Layer;

    [JsonPropertyName("saturated_share"), Description("That share.")]
    public double? SaturatedShare { get; } = Finite(s.MostSaturated?.SaturatedShare ?? 0);

    [JsonPropertyName("efficiency"), Description("Gap share of the ampere-turns.")]
    public double? Efficiency { get; } = Finite(s.Report.Circuit.Efficiency);

    [JsonPropertyName("k"), Description("a |G| / B at the beam; null where no two wires describe the field.")]
    public double? ShapeFactor { get; } = Finite(s.ShapeFactor);

    [JsonPropertyName("accuracy_reached"), Description("Largest relative error bar of field and gradient over the aperture.")]
    public double? Accuracy { get; } = Finite(s.Accuracy);

    [JsonPropertyName("newton_steps"), Description("Newton steps on its mesh.")]
    public int NewtonSteps { get; } = s.NewtonSteps;
}
