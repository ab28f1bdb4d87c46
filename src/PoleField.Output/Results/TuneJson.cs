using System.Text.Json;
using System.Text.Json.Serialization;
using PoleField.Beam;
using PoleField.Design;

namespace PoleField.Output.Results;

/// <summary>Writes the result of tuning, <c>polefield-tune/1</c>: before, after, and how far each face moved.</summary>
public static class TuneJson
{
    /// <summary>Writes the result.</summary>
    /// <param name="head">Result before, whose title, hashes and beam are repeated.</param>
    /// <param name="after">Report of the tuned magnet, solved to full accuracy.</param>
    /// <param name="tuned">Moves and history.</param>
    /// <param name="stream">Where to.</param>
    public static void Write(ResultFile head, (BeamReport Before, BeamReport After) after, TuneResult tuned, Stream stream)
    {
        var file = new TuneFile(
            "polefield-tune/1",
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            head.Beam,
            State(after.Before),
            State(after.After),
            [.. tuned.Moves.Select(m => new FaceSection(
                m.Layer, [.. m.Points.Select(p => new PointSection(1e3 * p.ArcLength, 1e3 * p.At.Y, 1e3 * p.At.Z, 1e6 * p.Move))]))],
            tuned.Solves,
            [.. tuned.Steps.Select(s => new StepSection(s.Number, s.Rms, s.Gradient, 1e3 * s.Clearance, s.Accepted))]);
        JsonSerializer.Serialize(stream, file, ResultJson.Options);
        stream.Write("\n"u8);
    }

    private static StateSection State(BeamReport r) => new(
        r.Beam.Field,
        r.FieldError,
        r.Beam.Gradient,
        r.GradientError,
        r.Gradient.Mean,
        r.Gradient.Spread,
        r.Gradient.Rms,
        r.FieldTimesGradient.Spread,
        r.FieldTimesGradient.Rms,
        1e3 * r.Clearance);

    private sealed record TuneFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("before")] StateSection Before,
        [property: JsonPropertyName("after")] StateSection After,
        [property: JsonPropertyName("faces")] IReadOnlyList<FaceSection> Faces,
        [property: JsonPropertyName("solves")] int Solves,
        [property: JsonPropertyName("steps")] IReadOnlyList<StepSection> Steps);

    private sealed record StateSection(
        [property: JsonPropertyName("field_T")] double Field,
        [property: JsonPropertyName("field_error_T")] double FieldError,
        [property: JsonPropertyName("gradient_T_per_m")] double Gradient,
        [property: JsonPropertyName("gradient_error_T_per_m")] double GradientError,
        [property: JsonPropertyName("gradient_mean_T_per_m")] double Mean,
        [property: JsonPropertyName("spread")] double Spread,
        [property: JsonPropertyName("rms")] double Rms,
        [property: JsonPropertyName("field_times_gradient_spread")] double ProductSpread,
        [property: JsonPropertyName("field_times_gradient_rms")] double ProductRms,
        [property: JsonPropertyName("clearance_mm")] double Clearance);

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
