using System.Text.Json.Serialization;
using PoleField.Beam;
using PoleField.Design;

namespace PoleField.Output.Results;

/// <summary>Writes the result of tuning, <c>polefield-tune/1</c>: before, after, and how far each face moved.</summary>
public static class TuneJson
{
    /// <summary>Writes the result.</summary>
    /// <param name="head">Result before, whose title, hashes and beam are repeated.</param>
    /// <param name="outcome">What came out.</param>
    /// <param name="stream">Where to.</param>
    public static void Write(ResultFile head, TuneOutcome outcome, Stream stream)
    {
        TuneResult tuned = outcome.Tuned;
        TuneStep last = tuned.State.Steps.Last(s => s.Accepted);
        var file = new TuneFile(
            "polefield-tune/1",
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            head.Beam,
            outcome.After is not null,
            State(outcome.Before),
            outcome.After is { } after ? State(after) : new StateSection { Gradient = last.Gradient, Rms = last.Rms, Clearance = 1e3 * last.Clearance },
            [.. tuned.Limits],
            [.. tuned.Moves.Select(m => new FaceSection(
                m.Layer, [.. m.Points.Select(p => new PointSection(1e3 * p.ArcLength, 1e3 * p.At.Y, 1e3 * p.At.Z, 1e6 * p.Move))]))],
            [.. tuned.Dimensions.Select(d => new DimensionSection(d.Name, d.Before, d.After))],
            [.. outcome.TradeOff.Select(p => new TradeOffSection(p.LeastGradient, State(p.Report), p.Limits))],
            tuned.State.Solves,
            [.. tuned.State.Steps.Select(s => new StepSection(s.Number, s.Rms, s.Gradient, 1e3 * s.Clearance, s.Accepted))]);
        AnalysisJson.Write(file, stream);
    }

    private static StateSection State(BeamReport r) => new()
    {
        Field = r.Beam.Field,
        FieldError = r.FieldError,
        Gradient = r.Beam.Gradient,
        GradientError = r.GradientError,
        Mean = r.Gradient.Mean,
        Spread = r.Gradient.Spread,
        Rms = r.Gradient.Rms,
        ProductSpread = r.FieldTimesGradient.Spread,
        ProductRms = r.FieldTimesGradient.Rms,
        Clearance = 1e3 * r.Clearance,
    };

    private sealed record TuneFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("verified")] bool Verified,
        [property: JsonPropertyName("before")] StateSection Before,
        [property: JsonPropertyName("after")] StateSection After,
        [property: JsonPropertyName("limited_by")] IReadOnlyList<string> Limits,
        [property: JsonPropertyName("faces")] IReadOnlyList<FaceSection> Faces,
        [property: JsonPropertyName("dimensions")] IReadOnlyList<DimensionSection> Dimensions,
        [property: JsonPropertyName("trade_off")] IReadOnlyList<TradeOffSection> TradeOff,
        [property: JsonPropertyName("solves")] int Solves,
        [property: JsonPropertyName("steps")] IReadOnlyList<StepSection> Steps);

    private sealed record StateSection
    {
        [JsonPropertyName("field_T")]
        public double? Field { get; init; }

        [JsonPropertyName("field_error_T")]
        public double? FieldError { get; init; }

        [JsonPropertyName("gradient_T_per_m")]
        public double? Gradient { get; init; }

        [JsonPropertyName("gradient_error_T_per_m")]
        public double? GradientError { get; init; }

        [JsonPropertyName("gradient_mean_T_per_m")]
        public double? Mean { get; init; }

        [JsonPropertyName("spread")]
        public double? Spread { get; init; }

        [JsonPropertyName("rms")]
        public double? Rms { get; init; }

        [JsonPropertyName("field_times_gradient_spread")]
        public double? ProductSpread { get; init; }

        [JsonPropertyName("field_times_gradient_rms")]
        public double? ProductRms { get; init; }

        [JsonPropertyName("clearance_mm")]
        public double? Clearance { get; init; }
    }

    private sealed record DimensionSection(
        [property: JsonPropertyName("name")] string Name,
        [property: JsonPropertyName("before")] double Before,
        [property: JsonPropertyName("after")] double After);

    private sealed record TradeOffSection(
        [property: JsonPropertyName("least_gradient_T_per_m")] double LeastGradient,
        [property: JsonPropertyName("shape")] StateSection Shape,
        [property: JsonPropertyName("limited_by")] IReadOnlyList<string> Limits);

    private sealed record FaceSection(
        [property: JsonPropertyName("layer")] string Layer,
        [property: JsonPropertyName("points")] IReadOnlyList<PointSection> Points);

    private sealed record PointSection(
        [property: JsonPropertyName("s_mm")] double ArcLength,
        [property: JsonPropertyName("y_mm")] double Y,
        [property: JsonPropertyName("z_mm")] double Z,
        [property: JsonPropertyName("move_um")] double Move);

    private sealed record StepSection(
        [property: JsonPropertyName("step")] int Number,
        [property: JsonPropertyName("rms")] double Rms,
        [property: JsonPropertyName("gradient_T_per_m")] double Gradient,
        [property: JsonPropertyName("clearance_mm")] double Clearance,
        [property: JsonPropertyName("accepted")] bool Accepted);
}
