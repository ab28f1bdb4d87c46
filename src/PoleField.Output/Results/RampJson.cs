using System.Text.Json.Serialization;
using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>Writes <c>polefield-ramp/1</c>: an excitation curve. SI units, the unit stands in each key.</summary>
public static class RampJson
{
    /// <summary>Name and version of the format.</summary>
    public const string Format = "polefield-ramp/1";

    /// <summary>Writes an excitation curve.</summary>
    public static void Write(AnalysisHead head, RampReport ramp, Stream stream) => AnalysisJson.Write(
        new RampFile(
            Format,
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            ResultJson.Beam(head.Report),
            [.. ramp.Steps.Select(Step)],
            ramp.Onset,
            ResultJson.Finite(ramp.OnsetFactor),
            ramp.HasOtherSources ? null : ResultJson.Finite(ramp.Start.GradientPerAmpereTurn),
            ramp.FirstSaturated?.Layer,
            ramp.HalfSpacing is { } a ? ResultJson.Millimetres(a) : null),
        stream);

    private static RampPoint Step(RampStep s) => new(
        s.Factor,
        ResultJson.Finite(s.AmpereTurns),
        ResultJson.Finite(s.Report.Beam.Field),
        ResultJson.Finite(s.Report.FieldError),
        ResultJson.Finite(s.Report.Beam.Gradient),
        ResultJson.Finite(s.Report.GradientError),
        ResultJson.Finite(s.GradientPerAmpereTurn),
        ResultJson.Finite(s.Report.Gradient.Spread),
        ResultJson.Finite(s.IronFieldMax),
        s.MostSaturated?.Layer,
        ResultJson.Finite(s.MostSaturated?.SaturatedShare ?? 0),
        ResultJson.Finite(s.Report.Circuit.Efficiency),
        ResultJson.Finite(s.ShapeFactor),
        ResultJson.Finite(s.Accuracy),
        s.NewtonSteps);

    private sealed record RampFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("ramp")] IReadOnlyList<RampPoint> Ramp,
        [property: JsonPropertyName("onset")] double Onset,
        [property: JsonPropertyName("onset_factor")] double? OnsetFactor,
        [property: JsonPropertyName("start_gradient_per_ampere_turn_T_per_m_A")] double? Start,
        [property: JsonPropertyName("first_saturated_layer")] string? FirstSaturated,
        [property: JsonPropertyName("half_spacing_mm")] double? HalfSpacing);

    private sealed record RampPoint(
        [property: JsonPropertyName("ampere_turns_factor")] double Factor,
        [property: JsonPropertyName("ampere_turns")] double? AmpereTurns,
        [property: JsonPropertyName("field_T")] double? Field,
        [property: JsonPropertyName("field_error_T")] double? FieldError,
        [property: JsonPropertyName("gradient_T_per_m")] double? Gradient,
        [property: JsonPropertyName("gradient_error_T_per_m")] double? GradientError,
        [property: JsonPropertyName("gradient_per_ampere_turn_T_per_m_A")] double? PerAmpereTurn,
        [property: JsonPropertyName("spread")] double? Spread,
        [property: JsonPropertyName("iron_field_max_T")] double? IronFieldMax,
        [property: JsonPropertyName("most_saturated_layer")] string? MostSaturated,
        [property: JsonPropertyName("saturated_share")] double? SaturatedShare,
        [property: JsonPropertyName("efficiency")] double? Efficiency,
        [property: JsonPropertyName("k")] double? ShapeFactor,
        [property: JsonPropertyName("accuracy_reached")] double? Accuracy,
        [property: JsonPropertyName("newton_steps")] int NewtonSteps);
}
