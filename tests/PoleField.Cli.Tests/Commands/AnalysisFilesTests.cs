// Truth: the written contract of the analyses' files and pictures: names, keys, published schemas (checked by the folder), PNG's and SVG's own signs.
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class AnalysisFilesTests
{
    private const string Sections = """

        [ramp]
        factors = [0.5, 1.0]
        [flight]
        species = "Ag-107"
        source = { speed = "600 m/s", width = "5 %" }
        drift = "0.3 m"
        slit = { width = "1 mm", height = "0.1 mm" }
        [tune]
        faces = ["RIDGE"]
        freedoms = 3
        reach = "0.05 mm"
        [tolerance]
        ampere_turns = "0.1 %"

        """;

    // Verb, ending of its JSON file, a key of that format, pictures.
    [Theory]
    [InlineData("solve", ".result.json", "operation", "field field-beam")]
    [InlineData("ramp", ".ramp.json", "onset_factor", "excitation")]
    [InlineData("compare", ".compare.json", "two_wire", "two-wire-gradient two-wire-field profiles")]
    [InlineData("deflect", ".deflect.json", "flight", "deflection")]
    [InlineData("tolerance", ".tolerance.json", "contributions", "tolerance")]
    [InlineData("tune", ".tune.json", "after", "tuned-faces")]
    [InlineData("map", ".map.json", "obtained", "field field-beam")]
    public async Task EveryVerbWritesItsFileAndItsPicturesTwice(string verb, string ending, string key, string pictures)
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire");
        string name = Path.GetFileNameWithoutExtension(folder.CasePath);
        await WithSections(folder.CasePath);

        Run run = await Run.Of(Pipeline.OfLibrary(), verb, folder.CasePath, "--accuracy", "1e-2", "-o", folder["out" + Path.DirectorySeparatorChar], "--figures", folder["pictures"]);

        Assert.True(run.Status is 0 or 3, run.All);
        using JsonDocument json = JsonDocument.Parse(await File.ReadAllTextAsync(folder[Path.Combine("out", name + ending)]));
        Assert.True(json.RootElement.TryGetProperty(key, out _));
        Assert.Equal(
            pictures.Split(' ').SelectMany(p => new[] { p + ".png", p + ".svg" }).Order(StringComparer.Ordinal),
            Directory.GetFiles(folder["pictures"]).Select(f => Path.GetFileName(f)!).Where(n => !n.StartsWith("trade-off.", StringComparison.Ordinal)).Order(StringComparer.Ordinal)); // drawn where a goal is missed
        Assert.All(Directory.GetFiles(folder["pictures"], "*.svg"), f => Assert.Contains("<svg", File.ReadAllText(f), StringComparison.Ordinal));
        Assert.All(Directory.GetFiles(folder["pictures"], "*.png"), f => Assert.Equal([0x89, 0x50, 0x4E, 0x47], File.ReadAllBytes(f)[..4]));
    }

    // The family's own case has some of the sections; each may stand once.
    private static async Task WithSections(string casePath)
    {
        string text = await File.ReadAllTextAsync(casePath);
        string[] own = [.. text.Split("\n[").Where(s => !(s.StartsWith("ramp]", StringComparison.Ordinal) || s.StartsWith("flight]", StringComparison.Ordinal) || s.StartsWith("tune]", StringComparison.Ordinal) || s.StartsWith("tolerance]", StringComparison.Ordinal)))];
        string kept = string.Join("\n[", own);
        await File.WriteAllTextAsync(casePath, kept + (kept.Contains("\n[magnet]", StringComparison.Ordinal) ? string.Empty : "\n[magnet]\nlength = \"70 mm\"\n") + Sections);
    }
}
