using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Geometry;
using PoleField.Output.Results;

namespace PoleField.Output.Maps;

internal sealed class MapFile(FieldMap map)
{
    public const string Name = "polefield-map/1";

    [JsonPropertyName("format"), Description("Name and version of the format.")]
    public string Format { get; } = Name;

    [JsonPropertyName("title"), Description("Title of the case.")]
    public string Title { get; } = map.Provenance.Title;

    [JsonPropertyName("case_sha256"), Description("SHA-256 of the case file.")]
    public string CaseSha256 { get; } = map.Provenance.CaseSha256;

    [JsonPropertyName("sketch_sha256"), Description("SHA-256 of the sketch.")]
    public string SketchSha256 { get; } = map.Provenance.SketchSha256;

    [JsonPropertyName("program_version"), Description("Version of PoleField.")]
    public string ProgramVersion { get; } = map.Provenance.ProgramVersion;

    [JsonPropertyName("accuracy_reached"), Description("Largest relative error bar of field and gradient over the aperture.")]
    public double? Accuracy { get; } = JsonText.Finite(map.Provenance.AccuracyReached);

    [JsonPropertyName("axes"), Description("The frame in words.")]
    public string Axes { get; } = "Beam along +x, out of the page; z along the deflection, y across it; right-handed.";

    [JsonPropertyName("columns"), Description("Columns of the table.")]
    public IReadOnlyList<MapColumnSection> Columns { get; } = [.. CsvMap.Columns.Select(c => new MapColumnSection(c.Name, c.Unit, c.Meaning))];

    [JsonPropertyName("places"), Description("Where the rows are.")]
    public MapPlacesSection Places { get; } = new(map.Grid);

    [JsonPropertyName("values"), Description("How many rows were obtained in which way.")]
    public IReadOnlyDictionary<string, int> Values { get; } = Enum.GetValues<MapSource>()
        .ToDictionary(MapSample.NameOf, source => map.Samples.Count(s => s.Source == source));

    [JsonPropertyName("obtained"), Description("How each row was obtained.")]
    public MapObtainedSection Obtained { get; } = new(map.Samples);
}

internal sealed class MapColumnSection(string name, string unit, string meaning)
{
    [JsonPropertyName("name"), Description("Head of the column.")]
    public string Name { get; } = name;

    [JsonPropertyName("unit"), Description("Unit; empty for text.")]
    public string Unit { get; } = unit;

    [JsonPropertyName("meaning"), Description("What it holds.")]
    public string Meaning { get; } = meaning;
}

internal sealed class MapPlacesSection(MapGrid grid)
{
    [JsonPropertyName("from_mm"), Description("First place of a grid: [y, z]; null for a list.")]
    public IReadOnlyList<double>? From { get; } = Pair(grid, grid[0]);

    [JsonPropertyName("to_mm"), Description("Last place of a grid; null for a list.")]
    public IReadOnlyList<double>? To { get; } = Pair(grid, grid[grid.Count - 1]);

    [JsonPropertyName("step_mm"), Description("Distance of neighbours along y and z; null for a list.")]
    public IReadOnlyList<double>? Step { get; } = Pair(grid, grid.Step);

    [JsonPropertyName("count"), Description("Places along y and along z; for a list their number and 1.")]
    public IReadOnlyList<int> Count { get; } = [grid.CountY, grid.CountZ];

    [JsonPropertyName("order"), Description("Order of the rows.")]
    public string Order { get; } = grid.IsRectangle ? "y fastest" : "as listed";

    private static IReadOnlyList<double>? Pair(MapGrid grid, Point p) => grid.IsRectangle ? [CsvMap.Rounded(p.Y), CsvMap.Rounded(p.Z)] : null;
}

internal sealed class MapObtainedSection(IReadOnlyList<MapSample> samples)
{
    [JsonPropertyName("meaning"), Description("What the runs are.")]
    public string Meaning { get; } =
        "extraction: the exactly harmonic field extracted around the aperture; element: differentiated in the finite element the place lies in, "
        + "gradients in air only; none: outside the model.";

    [JsonPropertyName("runs"), Description("Runs of rows in the order of the table.")]
    public IReadOnlyList<MapRunSection> Runs { get; } = [.. RunsOf(samples)];

    private static IEnumerable<MapRunSection> RunsOf(IReadOnlyList<MapSample> samples)
    {
        for (int start = 0, end; start < samples.Count; start = end)
        {
            end = start + 1;
            while (end < samples.Count && samples[end].Source == samples[start].Source)
            {
                end++;
            }

            yield return new MapRunSection(MapSample.NameOf(samples[start].Source), end - start);
        }
    }
}

internal sealed class MapRunSection(string way, int rows)
{
    [JsonPropertyName("way"), Description("extraction, element or none.")]
    public string Way { get; } = way;

    [JsonPropertyName("rows"), Description("Number of rows.")]
    public int Rows { get; } = rows;
}
