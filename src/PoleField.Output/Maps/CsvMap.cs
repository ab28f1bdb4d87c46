using System.Globalization;
using System.Text;
using PoleField.Geometry;
using PoleField.Output.Results;

namespace PoleField.Output.Maps;

/// <summary>
/// A field map as comma-separated values (RFC 4180: one header row, CRLF, quotes only where needed, no comment lines), y
/// fastest, numbers with the fewest digits that read back to the same bits, empty cells where there is no value. Units, grid
/// and provenance stand in a JSON file beside it.
/// </summary>
public static class CsvMap
{
    internal static IReadOnlyList<(string Name, string Unit, string Meaning)> Columns { get; } =
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
    public static void WriteSidecar(FieldMap map, Stream stream) => JsonText.Write(new MapFile(map), stream);

    private static string Millimetres(double metres) => Rounded(metres).ToString("R", CultureInfo.InvariantCulture);

    // A millionth of a micrometre: hides the last bits of the change of unit and nothing else.
    internal static double Rounded(double metres) => Math.Round(1e3 * metres, 12) + 0.0;

    private static string Quoted(string text) => text.AsSpan().IndexOfAny(",\"\r\n") < 0
        ? text
        : "\"" + text.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
}
