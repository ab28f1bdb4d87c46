// Truth: H = B/(mu0 mu_r) of the stand-in's constant permeability.
using System.Globalization;
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class MaterialsVerbTests
{
    [Fact]
    public async Task TheListNamesEveryMaterial()
    {
        Run text = await Run.Of(Steps.Sound, "materials");
        Run json = await Run.Of(Steps.Sound, "materials", "--json");

        Assert.Contains("pure-iron  Invented iron (invented)", text.Out, StringComparison.Ordinal);
        Assert.Equal(["air", "pure-iron"], JsonDocument.Parse(json.Out).RootElement.GetProperty("materials").EnumerateArray().Select(m => m.GetProperty("name").GetString()));
    }

    [Fact]
    public async Task AMaterialShowsItsSourceAndItsCurve()
    {
        Run run = await Run.Of(Steps.Sound, "materials", "pure-iron");

        double h = 1.0 / (1.25663706127e-6 * 5000);
        Assert.Contains("source  invented", run.Out, StringComparison.Ordinal);
        Assert.Matches($@"\n\s+1\.00\s+{h.ToString("F1", CultureInfo.InvariantCulture)}\s+5000\s", run.Out);
    }

    [Fact]
    public async Task TheJsonCurveObeysTheLaw()
    {
        Run run = await Run.Of(Steps.Sound, "materials", "pure-iron", "--json");

        foreach (JsonElement row in JsonDocument.Parse(run.Out).RootElement.GetProperty("materials")[0].GetProperty("curve").EnumerateArray())
        {
            Assert.Equal(row.GetProperty("B_T").GetDouble() / (1.25663706127e-6 * 5000), row.GetProperty("H_A_per_m").GetDouble(), 9);
        }
    }

    [Fact]
    public async Task AnUnknownNameSuggestsTheNearest()
    {
        Run run = await Run.Of(Steps.Sound, "materials", "pure_irn");

        Assert.Equal(2, run.Status);
        Assert.Contains("Did you mean \"pure-iron\"?", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ASoundTableIsCalledSoundAndAFaultyOneNot()
    {
        using var folder = new CaseFolder();
        Pipeline faulty = Steps.Sound with
        {
            ReadMaterial = (_, name) => throw new InputException([new Finding(Severity.Fault, "falling-B", "B falls from 1 T to 0.9 T.", "Sort the rows.") { File = name, Line = 7 }]),
        };

        Run sound = await Run.Of(Steps.Sound, "materials", "--check", folder["poles.dxf"]);
        Run text = await Run.Of(faulty, "materials", "--check", folder["poles.dxf"]);
        Run json = await Run.Of(faulty, "materials", "--check", folder["poles.dxf"], "--json");

        Assert.Equal((0, 2, 2), (sound.Status, text.Status, json.Status));
        Assert.EndsWith("Sound.\n", sound.Out, StringComparison.Ordinal);
        Assert.Equal("poles.dxf:7: fault: B falls from 1 T to 0.9 T.\n  Sort the rows.\n", text.Error);
        Assert.False(JsonDocument.Parse(json.Out).RootElement.GetProperty("ok").GetBoolean());
    }
}
