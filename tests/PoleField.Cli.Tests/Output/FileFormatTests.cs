// Truth: JSON Schema 2020-12 as another implementation (JsonSchema.Net) checks it; the published schemas are files of the repository.
using System.Text.Json.Nodes;
using PoleField.Cli.Files;
using PoleField.Cli.Tests.Doubles;
using PoleField.Output.Results;

namespace PoleField.Cli.Tests.Output;

public sealed class FileFormatTests
{
    public static TheoryData<string> Names => [.. PublishedFormats.All.Select(f => f.Name)];

    [Theory]
    [MemberData(nameof(Names))]
    public void ThePublishedSchemaIsTheOneTheTypeMakes(string name)
    {
        FileFormat format = PublishedFormats.All.Single(f => f.Name == name);

        Golden.CheckFile(Path.Combine("src", "PoleField.Output", "Schemas", format.FileName), format.Schema);
    }

    [Fact]
    public void NoSchemaIsPublishedThatNothingWrites()
    {
        string folder = Repository.File(Path.Combine("src", "PoleField.Output", "Schemas"));

        Assert.Equal(
            PublishedFormats.All.Select(f => f.FileName).Order(StringComparer.Ordinal),
            Directory.GetFiles(folder).Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal));
    }

    [Theory]
    [MemberData(nameof(Names))]
    public void EveryKeyIsDescribed(string name)
    {
        JsonObject[] objects = [.. Objects(JsonNode.Parse(PublishedFormats.All.Single(f => f.Name == name).Schema)!)];

        Assert.NotEmpty(objects);
        foreach (JsonObject properties in objects)
        {
            Assert.All(properties, p => Assert.False(string.IsNullOrEmpty((string?)p.Value!["description"]), p.Key));
        }
    }

    [Theory]
    [InlineData("beam", "gradient_T_per_m")]
    [InlineData("aperture", "field")]
    [InlineData("circuit", "efficiency")]
    [InlineData("mesh", "triangles")]
    [InlineData("run", "accuracy_reached")]
    [InlineData("operation", "energy_J")]
    public async Task AMissingKeyBreaksTheSchema(string section, string key)
    {
        JsonNode result = await Result();
        Assert.Equal(string.Empty, Schemas.Faults(result.ToJsonString()));

        Assert.True(result[section]!.AsObject().Remove(key));

        Assert.NotEqual(string.Empty, Schemas.Faults(result.ToJsonString()));
    }

    [Fact]
    public async Task WrongTypesAndNamesBreakTheSchema()
    {
        JsonNode text = await Result();
        text["beam"]!["field_T"] = "1.2 T";
        JsonNode kind = await Result();
        kind["parts"]![0]!["kind"] = "steel";
        JsonNode hash = await Result();
        hash["case_sha256"] = "unknown";
        JsonNode format = await Result();
        format["format"] = "polefield-result/2";

        Assert.All([text, kind, hash, format], node => Assert.NotEqual(string.Empty, Schemas.Faults(node.ToJsonString())));
    }

    [Fact]
    public async Task AFileFromBeforeTheLaterKeysStillKeepsTheSchemaAndIsRead()
    {
        JsonObject result = (await Result()).AsObject();
        Assert.True(result.Remove("materials") & result.Remove("operation") & result["circuit"]!.AsObject().Remove("gap_pull_N_per_m"));

        ResultFile read = ResultJson.Read(new MemoryStream(System.Text.Encoding.UTF8.GetBytes(result.ToJsonString())));

        Assert.Equal(string.Empty, Schemas.Faults(result.ToJsonString()));
        Assert.Null(read.Operation);
    }

    private static async Task<JsonNode> Result()
    {
        using var folder = new CaseFolder();
        Run run = await Run.Of(Steps.Sound, "solve", folder.CasePath, "--json");
        return JsonNode.Parse(run.Out)!;
    }

    private static IEnumerable<JsonObject> Objects(JsonNode node) => node switch
    {
        JsonObject o => (o["properties"] is JsonObject p ? (JsonObject[])[p] : []).Concat(o.Where(c => c.Value is not null).SelectMany(c => Objects(c.Value!))),
        JsonArray a => a.Where(c => c is not null).SelectMany(c => Objects(c!)),
        _ => [],
    };
}
