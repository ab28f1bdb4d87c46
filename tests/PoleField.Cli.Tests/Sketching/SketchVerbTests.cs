// Truth: the closed forms of the families (two line currents by Biot and Savart; equipotential faces of infinite permeability)
// against whole runs of the tool, and the written contract of the verb.
using System.Text.Json;
using PoleField.Cli.Sketching;
using PoleField.Cli.Tests.Doubles;
using PoleField.Drawing;

namespace PoleField.Cli.Tests.Sketching;

public sealed class SketchVerbTests : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("polefield-");

    public static TheoryData<string> Families => [.. PoleFamilies.All.Select(f => f.Name)];

    public void Dispose() => _folder.Delete(recursive: true);

    [Theory]
    [MemberData(nameof(Families))]
    public async Task EveryFamilyChecksAndSolvesAtOnceNearItsClosedForm(string family)
    {
        Run sketch = await Real("sketch", family, "-o", _folder.FullName, "--json");
        Run check = await Real("check", this[family + ".toml"]);
        Run solve = await Real("solve", this[family + ".toml"], "--accuracy", "1e-3", "--json");

        Assert.Equal((0, 0, 0), (sketch.Status, check.Status, solve.Status));
        (double field, double gradient) = BeamOf(sketch);
        JsonElement beam = JsonDocument.Parse(solve.Out).RootElement.GetProperty("beam");

        // Cut faces and real iron cost a few per cent; round wires are exact.
        double allowance = family == "round-wires" ? 0 : 0.05 * field;
        Assert.InRange(Math.Abs(beam.GetProperty("field_T").GetDouble() - field), 0, beam.GetProperty("field_error_T").GetDouble() + allowance);
        Assert.InRange(beam.GetProperty("gradient_T_per_m").GetDouble() / gradient, 0.85, 1.02);
    }

    [Fact]
    public async Task RoundWiresAgreeInTheGradientWithinItsErrorBar()
    {
        Run sketch = await Real("sketch", "round-wires", "--half-spacing", "4 mm", "--field", "20 mT", "-o", _folder.FullName, "--json");
        Run solve = await Real("solve", this["round-wires.toml"], "--accuracy", "1e-3", "--json");

        (double field, double gradient) = BeamOf(sketch);
        Assert.Equal(0.02, field, 1e-6);
        Assert.Equal(-2 * 1.2 / (0.004 * (1 + (1.2 * 1.2))), gradient / field, 1e-9); // −2z/(z² + a²) at z = 1.2 a
        JsonElement beam = JsonDocument.Parse(solve.Out).RootElement.GetProperty("beam");
        Assert.InRange(Math.Abs(beam.GetProperty("gradient_T_per_m").GetDouble() - gradient), 0, beam.GetProperty("gradient_error_T_per_m").GetDouble());
    }

    [Fact]
    public void TheAmpereTurnsOfAllOutlinesAddUpToTheTotalOfEachSign()
    {
        foreach (FamilyWords words in FamilyWords.All)
        {
            StartingSketch sketch = words.Usual.Draw();

            // Outlines on each layer of a coil: two windows per side, or the wire itself.
            double outlines = words.HasIron ? 2 : 1;
            Assert.Equal(1.0, outlines * sketch.Parts.Where(p => p.Share > 0).Sum(p => p.Share), 12);
            Assert.Equal(-1.0, outlines * sketch.Parts.Where(p => p.Share < 0).Sum(p => p.Share), 12);
        }
    }

    [Fact]
    public void EveryOptionSetsTheDimensionItReads()
    {
        foreach (FamilyWords words in FamilyWords.All)
        {
            foreach (FamilyOption option in words.Options.Where(o => o.Name != "--frame-scale"))
            {
                double wanted = 1.25 * option.Get(words.Usual);
                PoleFamily set = option.Set(words.Usual, wanted);

                Assert.Equal(wanted, option.Get(set));
                Assert.All(words.Options.Where(o => o != option), o => Assert.Equal(o.Get(words.Usual), o.Get(set)));
            }
        }
    }

    [Fact]
    public void AnotherLeadingLengthAloneScalesTheWholePair()
    {
        foreach (FamilyWords words in FamilyWords.All)
        {
            PoleFamily larger = words.With(new Dictionary<FamilyOption, double> { [words.Options[0]] = 1.5 * words.Options[0].Get(words.Usual) });

            // Similar magnets: B per ampere-turn falls as one over the size, G/B likewise.
            StartingSketch usual = words.Usual.Draw();
            StartingSketch drawn = larger.Draw();
            Assert.Equal(usual.FieldPerAmpereTurn / 1.5, drawn.FieldPerAmpereTurn, 9);
            Assert.Equal(usual.GradientPerField / 1.5, drawn.GradientPerField, 6);
        }
    }

    [Fact]
    public async Task AllFaultsOfTheDimensionsComeAtOnceAndNothingIsWritten()
    {
        Run run = await Real(
            "sketch", "two-wire", "--half-spacing", "3", "--beam-width", "-1 mm", "--flank-angle", "95", "--material", "pure-irn", "--field", "0 T", "-o", _folder.FullName);

        Assert.Equal(2, run.Status);
        foreach (string part in new[] { "--half-spacing", "has no unit", "Beam width", "flank angle", "\"pure-iron\"", "--field is 0 T" })
        {
            Assert.Contains(part, run.Error, StringComparison.Ordinal);
        }

        Assert.Empty(_folder.GetFiles());
    }

    [Fact]
    public async Task OneExistingFileKeepsBothFromBeingWritten()
    {
        await File.WriteAllTextAsync(this["mine.toml"], "mine");

        Run refused = await Real("sketch", "two-wire", "--name", "mine", "-o", _folder.FullName);
        Assert.Equal((2, 1), (refused.Status, _folder.GetFiles().Length));
        Assert.Equal("mine", await File.ReadAllTextAsync(this["mine.toml"]));

        Run forced = await Real("sketch", "two-wire", "--name", "mine", "-o", _folder.FullName, "--force");
        Assert.Equal((0, 2), (forced.Status, _folder.GetFiles().Length));
    }

    [Fact]
    public async Task WithoutAFamilyTheFamiliesAreListedAndAnUnknownOneIsRefused()
    {
        Run list = await Real("sketch");
        Run unknown = await Real("sketch", "two-wires");

        Assert.Equal((0, 2), (list.Status, unknown.Status));
        Assert.All(PoleFamilies.All, f => Assert.Contains("  " + f.Name + " ", list.Out, StringComparison.Ordinal));
        Assert.Contains("Did you mean \"two-wire\"?", unknown.Error, StringComparison.Ordinal);
    }

    private string this[string name] => Path.Combine(_folder.FullName, name);

    private static Task<Run> Real(params string[] args) => Run.Of(Pipeline.OfLibrary(), args);

    private static (double Field, double Gradient) BeamOf(Run sketch)
    {
        JsonElement beam = JsonDocument.Parse(sketch.Out).RootElement.GetProperty("beam");
        return (beam.GetProperty("field_T").GetDouble(), beam.GetProperty("gradient_T_per_m").GetDouble());
    }
}
