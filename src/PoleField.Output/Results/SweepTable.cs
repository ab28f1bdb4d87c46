using System.Text;
using System.Text.Json;
using System.Text.Json.Nodes;

namespace PoleField.Output.Results;

/// <summary>Makes the table of a sweep out of its points, and writes it as JSON and CSV with the same names and numbers.</summary>
public static class SweepTable
{
    private static readonly UTF8Encoding Utf8 = new(encoderShouldEmitUTF8Identifier: false);

    /// <summary>The row of a point.</summary>
    /// <param name="values">Its varied values.</param>
    /// <param name="point">What came out.</param>
    public static SweepRow Row(IReadOnlyList<JsonNode> values, SweepPointFile point)
    {
        var row = new SweepRow(point.Point, values, point.ExitStatus, point.Reason) { Seconds = point.Seconds };
        if (point.Result is not { } result)
        {
            return row;
        }

        return row with
        {
            Field = result.Beam.Field,
            FieldError = result.Beam.FieldError,
            Gradient = result.Beam.Gradient,
            GradientError = result.Beam.GradientError,
            MeanField = result.Aperture.Field.Mean,
            MeanGradient = result.Aperture.Gradient.Mean,
            MeanGradientError = result.Aperture.Gradient.Error,
            GradientSpread = result.Aperture.Gradient.Spread,
            GradientRms = result.Aperture.Gradient.Rms,
            FieldSpread = result.Aperture.Field.Spread,
            Clearance = result.Aperture.Clearance,
            IronFieldMax = result.Parts.Where(p => p.Kind == "iron").Max(p => p.FieldMax),
            SaturatedShare = result.Parts.Max(p => p.SaturatedShare),
            CurrentDensity = result.Parts.Max(p => p.CurrentDensity is { } j ? Math.Abs(j) : (double?)null),
            AmpereTurns = result.Circuit.AmpereTurns,
            Efficiency = result.Circuit.Efficiency,
            Energy = result.Circuit.Energy,
            Accuracy = result.Run.AccuracyReached,
            Unknowns = result.Mesh.Unknowns,
        };
    }

    /// <summary>Writes a file of a sweep as JSON in the manner of the result file.</summary>
    public static void WriteJson<T>(T file, Stream stream) => JsonText.Write(file, stream);

    /// <summary>Reads a file of a sweep.</summary>
    /// <exception cref="JsonException">It is not in that form.</exception>
    public static T ReadJson<T>(ReadOnlySpan<byte> bytes) =>
        JsonSerializer.Deserialize<T>(bytes, JsonText.Options) ?? throw new JsonException("The file holds null.");

    /// <summary>Writes the table as RFC 4180: one header row with the units, CRLF, empty cells where there is no value.</summary>
    public static void WriteCsv(SweepTableFile table, Stream stream)
    {
        using StreamWriter writer = new(stream, Utf8, bufferSize: -1, leaveOpen: true) { NewLine = "\r\n" };
        string[] axes = [.. table.Plan.Axes.Select(a => a.Column)];
        string[]? names = null;
        foreach (SweepRow row in table.Rows.Count > 0 ? table.Rows : [new SweepRow(0, [], null, string.Empty)])
        {
            JsonObject cells = JsonSerializer.SerializeToNode(row, JsonText.Options)!.AsObject();
            if (names is null)
            {
                names = [.. cells.Select(c => c.Key).Where(k => k is not ("point" or "values"))];
                writer.WriteLine(string.Join(',', axes.Prepend("point").Concat(names).Select(Quoted)));
            }

            if (table.Rows.Count > 0)
            {
                IEnumerable<JsonNode?> line = row.Values.Prepend(cells["point"]!).Concat(names.Select(n => cells[n]));
                writer.WriteLine(string.Join(',', line.Select(c => Quoted(c?.ToString() ?? string.Empty))));
            }
        }
    }

    private static string Quoted(string cell) =>
        cell.AsSpan().IndexOfAny(",\"\r\n") < 0 ? cell : "\"" + cell.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
}
