// Truth: the written contract of tolerance; sums of squares; and Monte-Carlo of full re-solves of magnets with random errors.
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class ToleranceVerbTests
{
    [Fact]
    public async Task TheBudgetIsRankedAddsUpAndAgreesWithReSolvedMagnets()
    {
        using var folder = new PolesFolder("""
            [tolerance]
            form = { size = "10 um", length = "3 mm" }
            place = { y = "10 um", z = "20 um", turn = "0.5 mrad" }
            beam_place = { y = "20 um", z = "20 um" }
            allow = { gradient = "0.5 %" }
            """);

        Run run = await Run.Of(Pipeline.OfLibrary(), "tolerance", folder.CasePath, "-o", folder["out" + Path.DirectorySeparatorChar], "--verify", "8");

        Assert.True(run.Status == 0, run.All);
        Assert.Equal(["magnet.tolerance.json"], folder.NamesIn("out"));
        using JsonDocument file = JsonDocument.Parse(await File.ReadAllBytesAsync(folder["out/magnet.tolerance.json"]));
        JsonElement root = file.RootElement;
        double[] gradient = [.. root.GetProperty("contributions").EnumerateArray().Select(c => c.GetProperty("gradient_rel").GetDouble())];
        Assert.Equal(gradient.OrderDescending(), gradient);
        double total = root.GetProperty("total").GetProperty("gradient_rel").GetDouble();
        Assert.Equal(Math.Sqrt(gradient.Sum(g => g * g)), total, 1e-9);
        Assert.True(root.GetProperty("worst_case").GetProperty("gradient_rel").GetDouble() > total);
        Assert.All(
            root.GetProperty("form_allowances").EnumerateArray(),
            a => Assert.InRange(a.GetProperty("one_sigma_um").GetDouble(), 0.1, 200));
        JsonElement trial = root.GetProperty("trial");
        double sampling = trial.GetProperty("sampling_error").GetDouble();
        foreach (string quantity in new[] { "field_rel", "gradient_rel", "gradient_mean_rel" })
        {
            double found = trial.GetProperty("found").GetProperty(quantity).GetDouble();
            double predicted = trial.GetProperty("predicted").GetProperty(quantity).GetDouble();
            Assert.InRange(found / predicted, 1 - (3 * sampling), 1 + (3 * sampling));
            Assert.InRange(trial.GetProperty("beyond_linear").GetProperty(quantity).GetDouble() / found, 0, 0.15);
        }
    }

    [Fact]
    public async Task ErrorsTooLargeForALinearBudgetAreSaidToBe()
    {
        using var folder = new PolesFolder("""
            [tolerance]
            form = { size = "0 um", length = "2 mm" }
            place = { y = "0 um", z = "0 um", turn = "0 mrad" }
            ampere_turns = "0 %"
            saturation = "0 %"
            beam_place = { y = "0.4 mm", z = "0 um" }
            """);

        Run run = await Run.Of(Pipeline.OfLibrary(), "tolerance", folder.CasePath, "-o", folder["out" + Path.DirectorySeparatorChar], "--verify", "4");

        // The field of a mirror-symmetric magnet is flat along y: to first order a shift changes nothing, in truth it does.
        Assert.True(run.Status == 0, run.All);
        Assert.Contains("The linear budget is not enough for field, gradient", run.Out.ReplaceLineEndings(" "), StringComparison.Ordinal);
    }
}
