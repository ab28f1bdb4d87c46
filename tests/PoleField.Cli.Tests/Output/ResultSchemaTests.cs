// Truth: JSON Schema 2020-12 as another implementation (JsonSchema.Net) checks it.
using System.Text.Json;
using System.Text.Json.Nodes;
using Json.Schema;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Output.Results;

namespace PoleField.Cli.Tests.Output;

public sealed class ResultSchemaTests
{
    private static readonly JsonSchema Schema = JsonSchema.FromText(ResultSchema.Json);

    [Fact]
    public void AWrittenResultKeepsTheSchema()
    {
        EvaluationResults results = Evaluate(Written());

        Assert.True(results.IsValid, string.Join("; ", results.Details!.Where(d => d.Errors is not null).Select(d => $"{d.InstanceLocation}: {string.Join(", ", d.Errors!.Values)}")));
    }

    [Theory]
    [InlineData("beam", "gradient_T_per_m")]
    [InlineData("aperture", "field")]
    [InlineData("circuit", "efficiency")]
    [InlineData("mesh", "triangles")]
    [InlineData("run", "accuracy_reached")]
    public void AMissingKeyBreaksTheSchema(string section, string key)
    {
        JsonNode result = Written();
        Assert.True(result[section]!.AsObject().Remove(key));

        Assert.False(Evaluate(result).IsValid);
    }

    [Fact]
    public void WrongTypesAndNamesBreakTheSchema()
    {
        JsonNode text = Written();
        text["beam"]!["field_T"] = "1.2 T";
        JsonNode kind = Written();
        kind["parts"]![0]!["kind"] = "steel";
        JsonNode hash = Written();
        hash["case_sha256"] = "unknown";
        JsonNode format = Written();
        format["format"] = "polefield-result/2";

        Assert.All([text, kind, hash, format], node => Assert.False(Evaluate(node).IsValid));
    }

    [Fact]
    public void EveryKeyIsDescribed()
    {
        JsonObject properties = JsonNode.Parse(ResultSchema.Json)!["properties"]!["beam"]!["properties"]!.AsObject();

        Assert.NotEmpty(properties);
        Assert.All(properties, p => Assert.False(string.IsNullOrEmpty((string?)p.Value!["description"])));
    }

    private static EvaluationResults Evaluate(JsonNode node)
    {
        using JsonDocument document = JsonDocument.Parse(node.ToJsonString());
        return Schema.Evaluate(document.RootElement, new EvaluationOptions { OutputFormat = OutputFormat.List });
    }

    private static JsonNode Written()
    {
        BeamValues beam = new(new Point(0, 3.6e-3), 0.0, 1.25, -300.5, -310.25);
        ApertureStatistics statistics = new(1, 0.9, 1.1, double.NaN);
        SolveResult result = new()
        {
            Title = "A case",
            CaseSha256 = new string('b', 64),
            SketchSha256 = new string('1', 64),
            ProgramVersion = "0.1.0",
            Report = new BeamReport
            {
                Beam = beam,
                FieldError = 1e-6,
                GradientError = 1e-3,
                ApertureArea = 1e-6,
                Clearance = 0.3e-3,
                Field = statistics,
                Gradient = statistics,
                GradientMeanError = 1e-3,
                FieldTimesGradient = statistics,
                ProfileY = [beam],
                ProfileZ = [beam],
                Parts = [new PartReport { Layer = "YOKE", Kind = "iron", Material = "steel-1008", Area = 1e-4, Outlines = 1, FieldMax = 1.2, FieldMaxAt = new Point(0, 0) }],
                Circuit = new CircuitReport(0, 0, 0, 0, null),
                Findings = [],
            },
            Record = new SolveRecord(10, 100, 3, 27, 5, 1, 1e-5, 1e-4),
            Seconds = new RunSeconds(0, 0, 0, 0, 0),
            PeakMemoryMB = 50,
        };
        return JsonNode.Parse(ResultJson.Text(ResultJson.ToFile(result)))!;
    }
}
