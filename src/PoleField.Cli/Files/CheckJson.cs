using System.Text.Json;
using PoleField.Cli.Text;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Files;

/// <summary>Writes what <c>check</c> found as JSON, format <c>polefield-check/1</c>.</summary>
internal sealed class CheckJson
{
    public const string Format = "polefield-check/1";

    private readonly Utf8JsonWriter _json;
    private readonly LoadedCase _loaded;

    private CheckJson(Utf8JsonWriter json, LoadedCase loaded) => (_json, _loaded) = (json, loaded);

    public static void Write(Stream stream, LoadedCase loaded)
    {
        using var json = new Utf8JsonWriter(stream, new JsonWriterOptions { Indented = true, NewLine = "\n", Encoder = Encoder });
        new CheckJson(json, loaded).WriteAll();
        json.Flush();
        stream.WriteByte((byte)'\n');
    }

    // Readable text in names and messages; quotes and control characters stay escaped.
    private static System.Text.Encodings.Web.JavaScriptEncoder Encoder => System.Text.Encodings.Web.JavaScriptEncoder.UnsafeRelaxedJsonEscaping;

    private void WriteAll()
    {
        _json.WriteStartObject();
        _json.WriteString("format", Format);
        _json.WriteBoolean("ok", !_loaded.HasFaults);
        _json.WriteString("title", _loaded.Case?.Title);
        _json.WriteString("case_sha256", _loaded.CaseSha256);
        _json.WriteString("sketch_sha256", _loaded.SketchSha256);
        _json.WriteString("unit", _loaded.Sketch?.Unit.Name);
        _json.WriteString("unit_from", _loaded.Sketch is { } sketch ? CheckTables.OriginName(sketch.UnitOrigin) : null);
        WriteParts();
        WriteIgnored();
        WriteHealed();
        WriteFindings("faults", Severity.Fault);
        WriteFindings("warnings", Severity.Warning);
        _json.WriteEndObject();
    }

    private void WriteParts()
    {
        _json.WriteStartArray("parts");
        foreach (PartShape part in _loaded.Reading?.Parts ?? [])
        {
            PartRole? role = _loaded.Roles.FirstOrDefault(r => r.Layer.Equals(part.Layer, StringComparison.OrdinalIgnoreCase));
            _json.WriteStartObject();
            _json.WriteString("layer", part.Layer);
            _json.WriteString("kind", role?.Kind);
            _json.WriteString("material", role?.Material.Name);
            _json.WriteNumber("loops", part.Outlines);
            WriteNumber("area_mm2", part.Area * 1e6);
            _json.WriteStartArray("box_mm");
            foreach (double value in part.Bounds.IsEmpty ? [] : (double[])[part.Bounds.Min.Y, part.Bounds.Min.Z, part.Bounds.Max.Y, part.Bounds.Max.Z])
            {
                _json.WriteNumberValue(Tidy(value * 1e3));
            }

            _json.WriteEndArray();
            _json.WriteEndObject();
        }

        _json.WriteEndArray();
    }

    private void WriteIgnored()
    {
        _json.WriteStartArray("ignored_layers");
        foreach ((string layer, int curves) in _loaded.Reading?.IgnoredLayers ?? [])
        {
            _json.WriteStartObject();
            _json.WriteString("layer", layer);
            _json.WriteNumber("entities", curves);
            _json.WriteEndObject();
        }

        _json.WriteEndArray();
    }

    private void WriteHealed()
    {
        _json.WriteStartArray("healed");
        foreach (Finding note in _loaded.Reading?.Findings.Where(f => f.Severity == Severity.Note) ?? [])
        {
            _json.WriteStartObject();
            _json.WriteString("what", note.What);
            _json.WriteString("layer", note.Layer);
            WritePlace(note);
            if (note.Size is { } size)
            {
                WriteNumber("size_mm", size * 1e3);
            }

            _json.WriteString("text", note.Text);
            _json.WriteEndObject();
        }

        _json.WriteEndArray();
    }

    private void WriteFindings(string name, Severity severity)
    {
        _json.WriteStartArray(name);
        foreach (Finding finding in _loaded.Findings.Where(f => f.Severity == severity))
        {
            _json.WriteStartObject();
            _json.WriteString("what", finding.What);
            _json.WriteString("file", finding.File);
            _json.WriteString("layer", finding.Layer);
            WriteNumber("line", finding.Line);
            WriteNumber("column", finding.Column);
            WritePlace(finding);
            _json.WriteString("text", finding.Text);
            _json.WriteString("fix", finding.Fix);
            _json.WriteEndObject();
        }

        _json.WriteEndArray();
    }

    private void WritePlace(Finding finding)
    {
        Point? metres = finding.At ?? (finding.AtDrawing is { } drawn && _loaded.Sketch is { } sketch ? sketch.Unit.Metres * drawn : null);
        if (metres is not { } at)
        {
            _json.WriteNull("at_mm");
            return;
        }

        _json.WriteStartArray("at_mm");
        _json.WriteNumberValue(Tidy(at.Y * 1e3));
        _json.WriteNumberValue(Tidy(at.Z * 1e3));
        _json.WriteEndArray();
    }

    private void WriteNumber(string name, double? value)
    {
        if (value is { } number && double.IsFinite(number))
        {
            _json.WriteNumber(name, Tidy(number));
        }
        else
        {
            _json.WriteNull(name);
        }
    }

    // Twelve decimals of a millimetre: below any coordinate's meaning, above the rounding of the change of unit.
    private static double Tidy(double value) => Math.Abs(value) < 1e3 ? Math.Round(value, 12) : value;
}
