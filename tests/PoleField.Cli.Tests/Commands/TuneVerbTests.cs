// Truth: the written contract of tune; a solve of the written case, which knows nothing of the tuning; and the conservation of what an
// interrupted run had reached.
using System.Diagnostics;
using System.Globalization;
using System.Text.Json;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class TuneVerbTests
{
    private const string Faces = "[tune]\nfaces = [\"NOSE\", \"BLOCK\"]\nreach = \"0.5 mm\"\nfreedoms = 5\n";

    [Fact]
    public async Task TheWrittenCaseSolvesToWhatTuneSays()
    {
        using var folder = new PolesFolder(Faces + "hold = { clearance = \">= 0.4 mm\" }\n[require]\nrms_max = \"1.5 %\"\n");

        Run run = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"]);

        Assert.True(run.Status == 0, run.All);
        Assert.Equal(["magnet.tune-state", "magnet.tune.json", "magnet.tune.svg", "magnet.tuned.dxf", "magnet.tuned.toml"], folder.NamesIn("tuned"));
        using JsonDocument tune = Json(folder["tuned/magnet.tune.json"]);
        double before = Number(tune, "before", "rms"), after = Number(tune, "after", "rms");
        Assert.True(before > 0.03, $"before {before}");
        Assert.InRange(after, 0, 0.015);
        Assert.True(tune.RootElement.GetProperty("verified").GetBoolean());

        Run again = await Run.Of(Pipeline.OfLibrary(), "solve", folder["tuned/magnet.tuned.toml"], "-o", folder["again.json"]);

        Assert.True(again.Status == 0, again.All);
        using JsonDocument solved = Json(folder["again.json"]);
        JsonElement gradient = solved.RootElement.GetProperty("aperture").GetProperty("gradient");
        Assert.Equal(after, gradient.GetProperty("rms").GetDouble(), 2e-4);
        Assert.Equal(Number(tune, "after", "gradient_T_per_m"), solved.RootElement.GetProperty("beam").GetProperty("gradient_T_per_m").GetDouble(), 0.05);
    }

    [Fact]
    public async Task AnUnreachableGoalEndsWithThreeSaysWhatLimitsItAndShowsTheTradeOff()
    {
        using var folder = new PolesFolder(
            "[tune]\nfaces = [\"NOSE\"]\nreach = \"0.15 mm\"\nfreedoms = 3\n[require]\nrms_max = \"0.01 %\"\n");

        Run run = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"]);

        Assert.Equal(3, run.Status);
        Assert.Contains("Not met: rms_max", run.Error, StringComparison.Ordinal);
        Assert.Contains("What limits it: ", run.Out, StringComparison.Ordinal);
        Assert.Contains("magnet.trade-off.svg", folder.NamesIn("tuned"));
        using JsonDocument tune = Json(folder["tuned/magnet.tune.json"]);
        (double Gradient, double Rms)[] curve =
        [
            .. tune.RootElement.GetProperty("trade_off").EnumerateArray().Select(p => p.GetProperty("shape"))
                .Select(p => (Math.Abs(p.GetProperty("gradient_T_per_m").GetDouble()), p.GetProperty("rms").GetDouble())),
        ];
        Assert.True(curve.Length >= 5, $"{curve.Length} shapes");

        // More gradient is never bought with a more uniform one: else the smaller gradient would not have been best.
        foreach (((double gradient, double rms), (double less, double better)) in curve.Zip(curve.Skip(1)))
        {
            Assert.True(gradient >= less - 0.5 && rms >= better - 5e-4, string.Join(" ", curve));
        }
    }

    [Fact]
    public async Task CtrlCKeepsTheBestSoFarAndResumeGoesOnFromIt()
    {
        if (OperatingSystem.IsWindows())
        {
            return; // no signals
        }

        using var folder = new PolesFolder(Faces + "[require]\nrms_max = \"2 %\"\n");
        string state = folder["tuned/magnet.tune-state"];
        using Process process = Process.Start(new ProcessStartInfo("dotnet", [typeof(Terminal).Assembly.Location, "tune", folder.CasePath, "-o", folder["tuned"]])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
        })!;
        Task<string> error = process.StandardError.ReadToEndAsync();
        Task<string> output = process.StandardOutput.ReadToEndAsync();
        for (int k = 0; k < 1200 && !File.Exists(state) && !process.HasExited; k++)
        {
            await Task.Delay(50);
        }

        using (var kill = Process.Start("kill", ["-INT", process.Id.ToString(CultureInfo.InvariantCulture)]))
        {
            await kill.WaitForExitAsync();
        }

        await process.WaitForExitAsync().WaitAsync(TimeSpan.FromSeconds(30));

        Assert.Equal((130, true), (process.ExitCode, (await error).EndsWith("Interrupted; the best so far is kept.\n", StringComparison.Ordinal)));
        Assert.Contains("not yet solved to full accuracy", await output, StringComparison.Ordinal);
        Assert.Equal(["magnet.tune-state", "magnet.tune.json", "magnet.tune.svg", "magnet.tuned.dxf", "magnet.tuned.toml"], folder.NamesIn("tuned"));
        using JsonDocument stopped = Json(folder["tuned/magnet.tune.json"]);
        Assert.False(stopped.RootElement.GetProperty("verified").GetBoolean());
        int steps = stopped.RootElement.GetProperty("steps").GetArrayLength();
        Assert.Equal(0, (await Run.Of(Pipeline.OfLibrary(), "check", folder["tuned/magnet.tuned.toml"])).Status);

        Run resumed = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"], "--resume");

        Assert.True(resumed.Status == 0, resumed.All);
        using JsonDocument ended = Json(folder["tuned/magnet.tune.json"]);
        JsonElement[] all = [.. ended.RootElement.GetProperty("steps").EnumerateArray()];
        Assert.True(all.Length > steps, $"{all.Length} steps after {steps}");
        Assert.Equal(
            stopped.RootElement.GetProperty("steps").EnumerateArray().Select(s => s.GetProperty("rms").GetDouble()),
            all.Take(steps).Select(s => s.GetProperty("rms").GetDouble()));
        Assert.InRange(Number(ended, "after", "rms"), 0, Math.Min(0.02, Number(stopped, "after", "rms") + 1e-3));
    }

    [Fact]
    public async Task ResumeRefusesAnotherDrawingAndAMissingState()
    {
        using var folder = new PolesFolder(Faces);
        Run without = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"], "--resume");

        Directory.CreateDirectory(folder["tuned"]);
        await File.WriteAllTextAsync(
            folder["tuned/magnet.tune-state"],
            "{ \"format\": \"polefield-tune-state/1\", \"sketch_sha256\": \"0\", \"freedoms\": [], \"damping\": 1, \"solves\": 1, \"steps\": [] }");
        Run other = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"], "--resume");

        Assert.Equal((2, 2), (without.Status, other.Status));
        Assert.Contains("is not there", without.Error, StringComparison.Ordinal);
        Assert.Contains("belongs to another drawing", other.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task DimensionsOfAFamilyAreTunedAndDrawnByTheFamily()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire", "--groove-half-angle", "80 deg");
        await File.AppendAllTextAsync(folder.CasePath, """

            [tune]
            family = "two-wire"
            dimensions = { ridge-radius = ["3 mm", "3.4 mm"], groove-half-angle = ["70 deg", "95 deg"] }
            drawn_with = { groove-half-angle = "80 deg" }
            hold = { gradient = ">= 200 T/m" }
            """);

        Run run = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"], "--accuracy", "1e-3");

        Assert.True(run.Status == 0, run.All);
        using JsonDocument tune = Json(folder["tuned/two-wire.tune.json"]);
        double before = Number(tune, "before", "rms"), after = Number(tune, "after", "rms");
        Assert.True(after < 0.98 * before, $"{before} to {after}");
        double[] values = [.. tune.RootElement.GetProperty("dimensions").EnumerateArray().Select(d => d.GetProperty("after").GetDouble())];

        // The tool that draws the family draws the same magnet from the tuned dimensions.
        using SketchFolder redrawn = await SketchFolder.Of(
            "two-wire", "--ridge-radius", FormattableString.Invariant($"{values[0]:R} mm"), "--groove-half-angle", FormattableString.Invariant($"{values[1]:R} deg"));
        Run again = await Run.Of(Pipeline.OfLibrary(), "solve", redrawn.CasePath, "--accuracy", "1e-3", "-o", redrawn["again.json"]);
        Assert.Equal(0, again.Status);
        using JsonDocument solved = Json(redrawn["again.json"]);
        Assert.Equal(after, solved.RootElement.GetProperty("aperture").GetProperty("gradient").GetProperty("rms").GetDouble(), 1e-3);

        Run further = await Run.Of(Pipeline.OfLibrary(), "check", folder["tuned/two-wire.tuned.toml"]);
        Assert.Equal(0, further.Status);
    }

    [Fact]
    public async Task ASketchThatTheFamilyDoesNotDrawIsRefused()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire", "--groove-half-angle", "80 deg");
        await File.AppendAllTextAsync(folder.CasePath, "\n[tune]\nfamily = \"two-wire\"\ndimensions = { ridge-radius = [\"3 mm\", \"3.4 mm\"] }\n");

        Run run = await Run.Of(Pipeline.OfLibrary(), "tune", folder.CasePath, "-o", folder["tuned"], "--accuracy", "1e-2");

        Assert.Equal(2, run.Status);
        Assert.Contains("The sketch is not what the family two-wire draws", run.Error, StringComparison.Ordinal);
    }

    private static JsonDocument Json(string path) => JsonDocument.Parse(File.ReadAllBytes(path));

    private static double Number(JsonDocument document, string section, string key) =>
        document.RootElement.GetProperty(section).GetProperty(key).GetDouble();
}
