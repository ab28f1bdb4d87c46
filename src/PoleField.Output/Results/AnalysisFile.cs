using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>What the results of all analyses repeat of the solve they start from.</summary>
/// <param name="Title">Title of the case.</param>
/// <param name="CaseSha256">SHA-256 of the case file, 64 hexadecimal digits.</param>
/// <param name="SketchSha256">SHA-256 of the sketch, 64 hexadecimal digits.</param>
/// <param name="ProgramVersion">Version of the program.</param>
/// <param name="Report">The solve at the case's own excitation.</param>
public sealed record AnalysisHead(string Title, string CaseSha256, string SketchSha256, string ProgramVersion, BeamReport Report);

// The members of these classes are the keys of the files, with their values beside them; their descriptions are the published
// schema's. Values that may be missing for a sound reason are null in the file, never NaN.
internal abstract class AnalysisFile(string format, AnalysisHead head)
{
    [JsonPropertyName("format"), JsonPropertyOrder(-6), Description("Name and version of the format.")]
    public string Format { get; } = format;

    [JsonPropertyName("title"), JsonPropertyOrder(-5), Description("Title of the case.")]
    public string Title { get; } = head.Title;

    [JsonPropertyName("case_sha256"), JsonPropertyOrder(-4), Description("SHA-256 of the case file.")]
    public string CaseSha256 { get; } = head.CaseSha256;

    [JsonPropertyName("sketch_sha256"), JsonPropertyOrder(-3), Description("SHA-256 of the sketch.")]
    public string SketchSha256 { get; } = head.SketchSha256;

    [JsonPropertyName("program_version"), JsonPropertyOrder(-2), Description("Version of PoleField.")]
    public string ProgramVersion { get; } = head.ProgramVersion;

    [JsonPropertyName("beam"), JsonPropertyOrder(-1), Description("Values at the beam's centre, at the case's own excitation and shape.")]
    public BeamSection Beam { get; } = ResultJson.Beam(head.Report);
}
