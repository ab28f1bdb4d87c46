using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Json;
using System.Text.Json.Nodes;
using PoleField.Geometry;

namespace PoleField.Output.Maps;

/// <summary>
/// A field map as comma-separated values (RFC 4180: one header row, CRLF, quotes only where needed, no comment lines), y
/// fastest, numbers with the fewest digits that read back to the same bits, empty cells where there is no value. Units, grid
/// and provenance stand in a JSON file beside it.
/// </summary>
public static class CsvMap
{
    /// <summary>Name and version of the sidecar's format.</summary>
    public const string SidecarFormat = "polefield-map/1";

    private static readonly (string Name, string Unit, string Meaning)[] Columns =
    [
        ("y_mm", "mm", "place across the deflection"),
        ("z_mm", "mm", "place along the deflection"),
        ("By_T", "T", "flux density along y"),
        ("Bz_T", "T", "flux density along z"),
        ("B_T", "T", "magnitude of B"),
        ("dB_dy_T_per_m", "T/m", "derivative of the magnitude along y"),
        ("dB_dz_T_per_m", "T/m", "derivative of the magnitude along z"),
        ("medium", "", "air, or the layer of the part; empty outside the model"),
    ];

    private static readonly JsonSerializerOptions Indented = new()
    {
        WriteIndented = true,
        NewLine = "\n",
        Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping,
    };

    private static readonly UTF8Encoding Utf8 = new(encoderShouldEmitUTF8Identifier: false);

    /// <summary>Writes the table, UTF-8 without byte order mark.</summary>
    public static void Write(FieldMap map, Stream stream)
    {
        using StreamWriter writer = new(stream, Utf8, bufferSize: -1, leaveOpen: true) { NewLine = "\r\n" };
        writer.WriteLine(string.Join(',', Columns.Select(c => c.Name)));
        for (int i = 0; i < map.Samples.Count; i++)
        {
            Point p = map.Grid[i];
            MapSample s = map.Samples[i];
            writer.Write(Millimetres(p.Y));
            writer.Write(',');
            writer.Write(Millimetres(p.Z));
            foreach (double value in (ReadOnlySpan<double>)[s.By, s.Bz, s.Field, s.DFieldDy, s.DFieldDz])
            {
                writer.Write(',');
                writer.Write(double.IsFinite(value) ? value.ToString("R", CultureInfo.InvariantCulture) : "");
            }

            writer.Write(',');
            writer.WriteLine(Quoted(s.Medium));
        }
    }

    /// <summary>Writes the description that stands beside the table.</summary>
    public static void WriteSidecar(FieldMap map, Stream stream)
    {
        MapGrid grid = map.Grid;
        JsonObject places = grid.IsRectangle
            ? new JsonObject
            {
                ["from_mm"] = Pair(grid[0]),
                ["to_mm"] = Pair(grid[grid.Count - 1]),
                ["step_mm"] = Pair(grid.Step),
                ["count"] = new JsonArray(grid.CountY, grid.CountZ),
                ["order"] = "y fastest",
            }
            : new JsonObject { ["count"] = grid.Count, ["order"] = "as listed" };
        MapProvenance origin = map.Provenance;
        JsonObject root = new()
        {
            ["format"] = SidecarFormat,
            ["title"] = origin.Title,
            ["case_sha256"] = origin.CaseSha256,
            ["sketch_sha256"] = origin.SketchSha256,
            ["program_version"] = origin.ProgramVersion,
            ["made_at"] = origin.MadeAt?.ToString("yyyy-MM-dd'T'HH:mm:sszzz", CultureInfo.InvariantCulture),
            ["accuracy_reached"] = double.IsFinite(origin.AccuracyReached) ? origin.AccuracyReached : null,
            ["axes"] = "Beam along +x, out of the page; z along the deflection, y across it; right-handed.",
            ["columns"] = new JsonArray(
                [.. Columns.Select(c => new JsonObject { ["name"] = c.Name, ["unit"] = c.Unit, ["meaning"] = c.Meaning })]),
            ["places"] = places,
            ["values"] = new JsonObject
            {
                ["extraction"] = map.Samples.Count(s => s.Source == MapSource.Extraction),
                ["element"] = map.Samples.Count(s => s.Source == MapSource.Element),
                ["none"] = map.Samples.Count(s => s.Source == MapSource.None),
            },
            ["obtained"] = new JsonObject
            {
                ["meaning"] = "How each row's value was obtained, as runs of rows in the order of the table: name, number of rows.",
                ["runs"] = Runs(map.Samples),
            },
        };
        stream.Write(Utf8.GetBytes(root.ToJsonString(Indented) + "\n"));
    }

    private static JsonArray Runs(IReadOnlyList<MapSample> samples)
    {
        JsonArray runs = [];
        for (int start = 0, end; start < samples.Count; start = end)
        {
            end = start + 1;
            while (end < samples.Count && samples[end].Source == samples[start].Source)
            {
                end++;
            }

            runs.Add(new JsonArray(MapSample.NameOf(samples[start].Source), end - start));
        }

        return runs;
    }

    private static string Millimetres(double metres) => Rounded(metres).ToString("R", CultureInfo.InvariantCulture);

    // A millionth of a micrometre: hides the last bits of the change of unit and nothing else.
    private static double Rounded(double metres) => Math.Round(1e3 * metres, 12) + 0.0;

    private static JsonArray Pair(Point p) => new(Rounded(p.Y), Rounded(p.Z));

    private static string Quoted(string text) => text.AsSpan().IndexOfAny(",\"\r\n") < 0
        ? text
        : "\"" + text.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
}
