// Truth: the written contract of check: exit status 0 or 2, keys of polefield-check/1, and the stand-in sketch's own numbers.
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;
using PoleField.Geometry;

namespace PoleField.Cli.Tests.Commands;

public sealed class CheckVerbTests
{
    private static readonly Finding Gap = new(Severity.Fault, "open-outline", "The outline is open by 0.5 mm.", "Close it.")
    {
        File = "poles.dxf",
        Line = 120,
        Layer = "RIDGE",
        Handle = "1F",
        AtDrawing = new Point(1.25, 3.5),
        At = new Point(0.00125, 0.0035),
        Size = 5e-4,
    };

    private static readonly Finding Healed = new(Severity.Note, "joined-ends", "Two ends 1.5 um apart were joined.", "Nothing to do.")
    {
        Layer = "RIDGE",
        AtDrawing = new Point(2, 0),
        Size = 1.5e-6,
    };

    [Fact]
    public async Task ASoundCaseListsItsPartsAndEndsWithZero()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(Healed), "check", folder.CasePath);

        Assert.Equal(0, run.Status);
        Assert.Empty(run.Error);
        Golden.Check("check-sound.txt", run.Out);
    }

    [Fact]
    public async Task FaultsOfTheSketchEndWithTwoAndSayWhere()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(Gap, Healed), "check", folder.CasePath);

        Assert.Equal(2, run.Status);
        Assert.Contains("poles.dxf:120: fault: layer \"RIDGE\", handle 1F, at (1.25, 3.5) mm: The outline is open by 0.5 mm.\n  Close it.", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task TheJsonHasTheKeysOfTheContract()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(Gap, Healed), "check", folder.CasePath, "--json");
        JsonElement json = JsonDocument.Parse(run.Out).RootElement;

        Assert.Equal(2, run.Status);
        Assert.Equal("polefield-check/1", json.GetProperty("format").GetString());
        Assert.False(json.GetProperty("ok").GetBoolean());
        Assert.Equal(("mm", "case"), (json.GetProperty("unit").GetString(), json.GetProperty("unit_from").GetString()));
        JsonElement ridge = json.GetProperty("parts")[0];
        Assert.Equal(("RIDGE", "iron", "pure-iron", 1), (Text(ridge, "layer"), Text(ridge, "kind"), Text(ridge, "material"), ridge.GetProperty("loops").GetInt32()));
        Assert.Equal(400, ridge.GetProperty("area_mm2").GetDouble());
        Assert.Equal([-10, 0, 10, 20], ridge.GetProperty("box_mm").EnumerateArray().Select(v => v.GetDouble()));
        Assert.Equal(("NOTES", 3), (Text(json.GetProperty("ignored_layers")[0], "layer"), json.GetProperty("ignored_layers")[0].GetProperty("entities").GetInt32()));
        JsonElement healed = json.GetProperty("healed")[0];
        Assert.Equal(("joined-ends", 0.0015), (Text(healed, "what"), healed.GetProperty("size_mm").GetDouble()));
        Assert.Equal([2, 0], healed.GetProperty("at_mm").EnumerateArray().Select(v => v.GetDouble()));
        JsonElement fault = Assert.Single(json.GetProperty("faults").EnumerateArray());
        Assert.Equal(("open-outline", "RIDGE", 120), (Text(fault, "what"), Text(fault, "layer"), fault.GetProperty("line").GetInt32()));
        Assert.Equal([1.25, 3.5], fault.GetProperty("at_mm").EnumerateArray().Select(v => v.GetDouble()));
        Assert.Equal("Close it.", Text(fault, "fix"));
    }

    [Fact]
    public async Task FaultsOfTheCaseAreInTheJsonTooWithTheDrawingsParts()
    {
        using var folder = new CaseFolder(Cases.Small.Replace("width", "widht", StringComparison.Ordinal));

        Run run = await Run.Of(Steps.Sound, "check", folder.CasePath, "--json");
        JsonElement json = JsonDocument.Parse(run.Out).RootElement;

        Assert.Equal(2, run.Status);
        Assert.Equal(["missing-key", "unknown-key"], json.GetProperty("faults").EnumerateArray().Select(f => Text(f, "what")));
        Assert.Equal(["RIDGE", "COIL"], json.GetProperty("parts").EnumerateArray().Select(p => Text(p, "layer")));
    }

    [Theory]
    [InlineData("check")]
    [InlineData("solve")]
    public async Task FaultsOfCaseAndDrawingComeTogether(string verb)
    {
        using var folder = new CaseFolder(Cases.Small.Replace("\"pure-iron\"", "\"pure-irn\"", StringComparison.Ordinal));

        Run run = await Run.Of(With(Gap), verb, folder.CasePath);

        Assert.Equal(2, run.Status);
        Assert.Contains("\"pure-irn\"", run.All, StringComparison.Ordinal);
        Assert.Contains("poles.dxf:120: fault:", run.All, StringComparison.Ordinal);
    }

    // What follows from a fault of the case alone is not told as a fault of the drawing.
    [Theory]
    [InlineData("[symmetry]\nmirror = \"left\"")]
    [InlineData("[symetry]\nmirror = \"left-right\"")]
    [InlineData("[symmetry")]
    public async Task FaultsThatHideWhatTheLayersAreLeaveTheRegionsOut(string wrong)
    {
        using var folder = new CaseFolder(Cases.Small + wrong + "\n");

        Run run = await Run.Of(With(Gap), "check", folder.CasePath);

        Assert.Equal(2, run.Status);
        Assert.DoesNotContain("poles.dxf:120", run.All, StringComparison.Ordinal);
        Assert.Contains("sketch poles.dxf, in mm", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task QuietPrintsFaultsOnly()
    {
        using var folder = new CaseFolder();

        Run sound = await Run.Of(With(Healed), "check", folder.CasePath, "--quiet");
        Run faulty = await Run.Of(With(Gap, Healed), "check", folder.CasePath, "--quiet");

        Assert.Empty(sound.All);
        Assert.Empty(faulty.Out);
        Assert.Equal(2, faulty.Error.Split('\n', StringSplitOptions.RemoveEmptyEntries).Length);
    }

    [Fact]
    public async Task AMissingCaseIsNamed()
    {
        Run run = await Run.Of(Steps.Sound, "check", "nowhere/magnet.toml");

        Assert.Equal(2, run.Status);
        Assert.Contains("The case file nowhere/magnet.toml is not there.", run.All, StringComparison.Ordinal);
    }

    [Fact]
    public async Task FaultsOfCurveFileAndSketchComeTogether()
    {
        using var folder = new CaseFolder(Cases.Small.Replace("\"pure-iron\"", "{ file = \"poles.dxf\" }", StringComparison.Ordinal));
        Pipeline pipeline = With(Gap) with
        {
            ReadMaterial = (_, name) => throw new InputException([new Finding(Severity.Fault, "bad-curve", "B falls.", "Sort.") { File = name, Line = 3 }]),
        };

        Run run = await Run.Of(pipeline, "check", folder.CasePath);

        Assert.Contains("poles.dxf:3: fault: B falls.", run.Out, StringComparison.Ordinal);
        Assert.Contains("poles.dxf:120: fault:", run.Out, StringComparison.Ordinal);
        Assert.EndsWith("2 faults.\n", run.Out, StringComparison.Ordinal);
    }

    private static string? Text(JsonElement element, string key) => element.GetProperty(key).GetString();

    private static Pipeline With(params Finding[] findings) => Steps.Sound with { Cut = (_, request) => Steps.Reading(request, findings) };
}
