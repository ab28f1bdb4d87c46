using System.Text.Json.Serialization;
using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>Writes <c>polefield-two-wire/1</c>: the computed field against the field of two wires. Lengths in mm, else SI.</summary>
public static class TwoWireJson
{
    /// <summary>Name and version of the format.</summary>
    public const string Format = "polefield-two-wire/1";

    /// <summary>Writes a comparison.</summary>
    public static void Write(AnalysisHead head, TwoWireComparison comparison, Stream stream) => AnalysisJson.Write(
        new TwoWireFile(
            Format,
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            ResultJson.Beam(head.Report),
            Section(comparison)),
        stream);

    private static TwoWireSection Section(TwoWireComparison c) => new(
        ResultJson.Millimetres(c.Wires.HalfSpacing),
        ResultJson.Pair(1e3 * c.Wires.Midpoint),
        ResultJson.Finite(c.Wires.Current),
        Fitted(c.Stated),
        ResultJson.Finite(c.ShapeFactor),
        ResultJson.Finite(c.TwoWireShapeFactor),
        ResultJson.Finite(c.Field.AtBeam),
        ResultJson.Finite(c.Field.Max),
        ResultJson.Finite(c.Field.Rms),
        ResultJson.Finite(c.Gradient.AtBeam),
        ResultJson.Finite(c.Gradient.Max),
        ResultJson.Finite(c.Gradient.Rms));

    private static List<string> Fitted(StatedWires stated)
    {
        List<string> fitted = ["current"];
        if (stated.HalfSpacing is null)
        {
            fitted.Add("half_spacing");
        }

        if (stated.Midpoint is null)
        {
            fitted.Add("midpoint");
        }

        return fitted;
    }

    private sealed record TwoWireFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("two_wire")] TwoWireSection TwoWire);

    private sealed record TwoWireSection(
        [property: JsonPropertyName("half_spacing_mm")] double? HalfSpacing,
        [property: JsonPropertyName("midpoint_mm")] IReadOnlyList<double>? Midpoint,
        [property: JsonPropertyName("current_A")] double? Current,
        [property: JsonPropertyName("fitted")] IReadOnlyList<string> Fitted,
        [property: JsonPropertyName("k")] double? ShapeFactor,
        [property: JsonPropertyName("k_two_wire")] double? TwoWireShapeFactor,
        [property: JsonPropertyName("field_deviation_at_beam")] double? FieldAtBeam,
        [property: JsonPropertyName("field_deviation_max")] double? FieldMax,
        [property: JsonPropertyName("field_deviation_rms")] double? FieldRms,
        [property: JsonPropertyName("gradient_deviation_at_beam")] double? GradientAtBeam,
        [property: JsonPropertyName("gradient_deviation_max")] double? GradientMax,
        [property: JsonPropertyName("gradient_deviation_rms")] double? GradientRms);
}
