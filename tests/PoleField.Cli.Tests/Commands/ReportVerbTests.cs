// Truth: the written contract of report (one self-contained page, all or nothing, exit status) and the result file it carries.
using System.Text.Json;
using System.Text.RegularExpressions;
using PoleField.Cli.Commands;
using PoleField.Cli.Tests.Doubles;
using PoleField.Cli.Text;
using PoleField.Tests.Common;

namespace PoleField.Cli.Tests.Commands;

public sealed partial class ReportVerbTests
{
    private static readonly string[] Pictures = ["field", "field-beam", "gradient-map", "profiles", "saturation", "two-wire-gradient", "two-wire-field"];

    [Fact]
    public async Task ThePageHoldsTheSolveAndItsPicturesAndTheResultFile()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire");

        Run run = await Run.Of(
            Pipeline.OfLibrary(), "report", folder.CasePath, "--accuracy", "1e-2", "-o", folder["page.html"], "--figures", folder["pictures"]);

        Assert.Equal((0, string.Empty), (run.Status, run.Out));
        string page = await File.ReadAllTextAsync(folder["page.html"]);
        Assert.Equal(Pictures.Length, SvgPattern().Count(page));
        Assert.Contains("two-wire field", page, StringComparison.Ordinal); // the stated wires beside the profiles
        Assert.DoesNotContain("http-equiv=\"refresh\"", page, StringComparison.Ordinal);
        Assert.Empty(FetchPattern().Matches(page));
        JsonElement result = JsonDocument.Parse(ResultPattern().Match(page).Groups[1].Value).RootElement;
        Assert.Equal("polefield-result/1", result.GetProperty("format").GetString());
        Assert.Equal("Two-wire pair, half spacing 3 mm", result.GetProperty("title").GetString());
        Assert.Equal(
            Pictures.SelectMany(p => new[] { p + ".png", p + ".svg" }).Order(StringComparer.Ordinal),
            Directory.GetFiles(folder["pictures"]).Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal));
    }

    [Fact]
    public async Task AnAnalysisAddsItsSectionAndOthersAreLeftOut()
    {
        using var folder = new CaseFolder();
        var step = new AnalysisStep("probe", "Probes.")
        {
            Examples = [],
            Endings = _ => [],
            IsInReport = _ => true,
            Run = _ => new Analysis(new Answer("Excitation", [], ["Straight to the end."]), []),
        };
        AnalysisStep notAsked = step with { IsInReport = _ => false, Run = _ => throw new InvalidOperationException("Not asked for.") };
        AnalysisStep refuses = step with
        {
            Name = "refuses",
            Run = _ => throw new InputException([new Finding(Severity.Fault, "no", "Nothing to probe here.", "Draw something.")]),
        };

        Run with = await Run.Of(Steps.Sound with { Analyses = [step, refuses] }, "report", folder.CasePath, "-o", folder["with.html"]);
        Run without = await Run.Of(Steps.Sound with { Analyses = [notAsked] }, "report", folder.CasePath, "-o", folder["without.html"]);

        Assert.Equal((0, 0), (with.Status, without.Status));
        Assert.Contains("Straight to the end.", await File.ReadAllTextAsync(folder["with.html"]), StringComparison.Ordinal);
        Assert.Contains("Not made: Nothing to probe here. Draw something.", await File.ReadAllTextAsync(folder["with.html"]), StringComparison.Ordinal);
        Assert.DoesNotContain("Excitation", await File.ReadAllTextAsync(folder["without.html"]), StringComparison.Ordinal);
    }

    [Fact]
    public async Task AnExistingPictureRefusesAllBeforeTheSolve()
    {
        using var folder = new CaseFolder();
        Directory.CreateDirectory(folder["pictures"]);
        await File.WriteAllTextAsync(folder[Path.Combine("pictures", "profiles.svg")], "mine");
        Pipeline pipeline = Steps.Sound with { Solve = (_, _, _, _, _) => throw new InvalidOperationException("solved") };

        Run run = await Run.Of(pipeline, "report", folder.CasePath, "-o", folder["page.html"], "--figures", folder["pictures"]);

        Assert.Equal(2, run.Status);
        Assert.Contains("profiles.svg exists already", run.Error, StringComparison.Ordinal);
        Assert.False(File.Exists(folder["page.html"]));
    }

    [Fact]
    public async Task AMissedRequirementIsShownAndEndsWithThree()
    {
        using var folder = new CaseFolder(Cases.Small + "[require]\ngradient_min = \"999 T/m\"\n");

        Run run = await Run.Of(Steps.Sound, "report", folder.CasePath, "-o", folder["page.html"]);

        Assert.Equal(3, run.Status);
        Assert.Contains("1 of 1 requirements not met", await File.ReadAllTextAsync(folder["page.html"]), StringComparison.Ordinal);
    }

    [ChromiumFact]
    public async Task ABrowserAsksForThePageAloneAndHasNothingToComplainOf()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire");
        await Run.Of(Pipeline.OfLibrary(), "report", folder.CasePath, "--accuracy", "1e-2", "-o", folder["page.html"]);

        Chromium.Visit visit = await Chromium.Open(await File.ReadAllBytesAsync(folder["page.html"]));

        Assert.Equal(["/report.html"], visit.Requests);
        Assert.DoesNotContain("CONSOLE", visit.Log, StringComparison.Ordinal);
        Assert.Contains("<section id=\"cautions\"", visit.Document, StringComparison.Ordinal);
        Assert.Equal(Pictures.Length, SvgPattern().Count(visit.Document));
    }

    [Fact]
    public async Task AResultFileGivesItsPageAgainWithoutASolve()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire");
        Pipeline noSolve = Pipeline.OfLibrary() with { Solve = (_, _, _, _, _) => throw new InvalidOperationException("solved") };
        Run solve = await Run.Of(Pipeline.OfLibrary(), "solve", folder.CasePath, "--accuracy", "1e-2", "-o", folder["two-wire.result.json"]);

        Run first = await Run.Of(noSolve, "report", folder["two-wire.result.json"], "-o", folder["a.html"], "--figures", folder["pictures"]);
        Run again = await Run.Of(noSolve, "report", folder["two-wire.result.json"], "-o", folder["b.html"]);

        Assert.Equal((0, 0, 0), (solve.Status, first.Status, again.Status));
        string page = await File.ReadAllTextAsync(folder["a.html"]);
        Assert.Equal(page, await File.ReadAllTextAsync(folder["b.html"]));
        string written = (await File.ReadAllTextAsync(folder["two-wire.result.json"])).Trim().Replace("<", "\\u003c", StringComparison.Ordinal);
        Assert.Equal(written, ResultPattern().Match(page).Groups[1].Value.Trim()); // nothing of the result is lost or changed
        Assert.Contains("Made from the result file alone", page, StringComparison.Ordinal);
        Assert.Single(SvgPattern().Matches(page));
        Assert.True(File.Exists(folder[Path.Combine("pictures", "profiles.svg")]));
    }

    [Theory]
    [InlineData("{ \"format\": \"polefield-result/9\" }")]
    [InlineData("no JSON")]
    public async Task AFileThatIsNoResultIsRefusedByName(string text)
    {
        using var folder = new CaseFolder();
        await File.WriteAllTextAsync(folder["other.result.txt"], text);
        File.Move(folder["other.result.txt"], folder["other.JSON"]);

        Run run = await Run.Of(Steps.Sound, "report", folder["other.JSON"], "-o", folder["a.html"]);

        Assert.Equal(2, run.Status);
        Assert.Contains("other.JSON", run.Error, StringComparison.Ordinal);
        Assert.False(File.Exists(folder["a.html"]));
    }

    [GeneratedRegex("<svg ")]
    private static partial Regex SvgPattern();

    [GeneratedRegex("(src|href)=\"(https?:)?//")]
    private static partial Regex FetchPattern();

    [GeneratedRegex("<script type=\"application/json\" id=\"result\">(.*?)</script>", RegexOptions.Singleline)]
    private static partial Regex ResultPattern();
}
