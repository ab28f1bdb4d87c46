using System.Text.Json;
using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>What the results of all analyses repeat of the solve they start from.</summary>
/// <param name="Title">Title of the case.</param>
/// <param name="CaseSha256">SHA-256 of the case file, 64 hexadecimal digits.</param>
/// <param name="SketchSha256">SHA-256 of the sketch, 64 hexadecimal digits.</param>
/// <param name="ProgramVersion">Version of the program.</param>
/// <param name="Report">The solve at the case's own excitation.</param>
public sealed record AnalysisHead(string Title, string CaseSha256, string SketchSha256, string ProgramVersion, BeamReport Report);

/// <summary>Writes the files of the analyses in the manner of the result file.</summary>
internal static class AnalysisJson
{
    public static void Write<T>(T file, Stream stream)
    {
        JsonSerializer.Serialize(stream, file, ResultJson.Options);
        stream.WriteByte((byte)'\n');
    }
}
