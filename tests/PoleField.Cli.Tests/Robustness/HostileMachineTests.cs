// Truth: the file system, memory limit and culture as they are set up here; what a result must be without them.
using System.Diagnostics;
using System.Globalization;
using System.Text.Json.Nodes;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Robustness;

public sealed class HostileMachineTests
{
    private static string BareWires => Repository.File("geometries/bare-wires/bare-wires.toml");

    [Fact]
    public async Task KilledWhileWritingItLeavesOnlyWholeFiles()
    {
        using var folder = new CaseFolder();
        var random = new Random(20261201);
        int killed = 0;
        for (int attempt = 0; attempt < 5; attempt++)
        {
            using Process process = Process.Start(ToolProcess.Described(
                "solve", BareWires, "--accuracy", "1e-2", "-o", folder["out/r.json"], "--figures", folder["out"], "--force", "--quiet"))!;
            while (!process.HasExited && !folder.Names.Any(n => n.EndsWith(".part", StringComparison.Ordinal)))
            {
                await Task.Delay(1);
            }

            await Task.Delay(random.Next(attempt < 2 ? 20 : 400));
            killed += process.HasExited ? 0 : 1;
            process.Kill();
            await process.WaitForExitAsync();
            Assert.All(folder.Names.Where(n => n.StartsWith("out/", StringComparison.Ordinal) && !n.EndsWith(".part", StringComparison.Ordinal)), n => AssertWhole(folder[n]));
        }

        Assert.True(killed > 0, "No run was killed while it wrote.");
    }

    [Fact]
    public async Task OfTwoRunsIntoOneFileOneWinsWholeAndTheOtherSaysSo()
    {
        using var folder = new CaseFolder();
        using var together = new Barrier(2);
        Pipeline meeting = Steps.Sound with { Solve = (m, a, o, p, c) => { together.SignalAndWait(TimeSpan.FromSeconds(20), c); return Steps.Solved(o); } };
        string[] words = ["solve", folder.CasePath, "-o", folder["r.json"]];

        Run[] runs = await Task.WhenAll(Run.Of(meeting, words), Run.Of(meeting, words));

        Assert.Equal([0, 2], runs.Select(r => r.Status).Order());
        Assert.Contains("exists", runs.Single(r => r.Status == 2).Error, StringComparison.Ordinal);
        Assert.Equal(["magnet.toml", "poles.dxf", "r.json"], folder.Names);
        AssertWhole(folder["r.json"]);
    }

    [Fact]
    public async Task AFullDiskIsAMessageAndLeavesNothing()
    {
        using var folder = new CaseFolder();
        Pipeline full = Steps.Sound with { WriteResult = (stream, _) => { stream.Write("half"u8); throw new IOException("No space left on device"); } };

        Run run = await Run.Of(full, "solve", folder.CasePath, "-o", folder["r.json"]);

        Assert.Equal(2, run.Status);
        Assert.Contains("r.json cannot be written: No space left on device.", run.Error, StringComparison.Ordinal);
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Theory]
    [InlineData("solve", "-o", "/proc/polefield/")] // nobody can write there, not even root
    [InlineData("sweep", "--vary", "beam.layer=BEAM", "-o", "/proc/polefield/s")]
    public async Task AFolderThatCannotBeWrittenIsToldBeforeTheSolve(string verb, params string[] rest)
    {
        if (!OperatingSystem.IsLinux())
        {
            return;
        }

        Run run = await Run.Of(Pipeline.OfLibrary() with { Solve = (_, _, _, _, _) => throw new InvalidOperationException("solved") }, [verb, BareWires, .. rest]);

        Assert.Equal(2, run.Status);
        Assert.Contains("cannot be written", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AnUnreadableCaseIsAMessage()
    {
        if (!OperatingSystem.IsLinux())
        {
            return;
        }

        Run run = await Run.Of(Steps.Sound, "solve", "/proc/self/mem"); // readable by permission, an input/output error by reading

        Assert.Equal(2, run.Status);
        Assert.Contains("cannot be read", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AFullStandardOutputIsAMessageWithoutStackTrace()
    {
        if (!OperatingSystem.IsLinux())
        {
            return;
        }

        string tool = typeof(Terminal).Assembly.Location;
        Run run = await ToolProcess.Of(new ProcessStartInfo("bash", ["-c", $"dotnet '{tool}' materials > /dev/full"]) { RedirectStandardError = true, RedirectStandardOutput = true });

        Assert.Equal(2, run.Status);
        Assert.StartsWith("polefield: the output cannot be written", run.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AMeshThatCannotFitIsRefusedWithAnEstimateBeforeTheSolve()
    {
        using var folder = new CaseFolder();
        ProcessStartInfo start = ToolProcess.Described("solve", Repository.File("geometries/alkali-deflector/alkali-deflector.toml"), "-o", folder["r.json"]);
        start.Environment["DOTNET_GCHeapHardLimit"] = "0x1800000"; // 25 MB

        Run run = await ToolProcess.Of(start);

        Assert.Equal(2, run.Status);
        Assert.Matches(@"The mesh has \d+ unknowns and needs about 0\.\d+ GB; there is room for 6291 unknowns\.", run.Error);
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task AnyNumberOfThreadsAndAnyCultureGiveTheSameBytes()
    {
        ProcessStartInfo one = ToolProcess.Described("solve", Repository.File("geometries/alkali-deflector/alkali-deflector.toml"), "--accuracy", "1e-3", "--json", "--threads", "1");
        ProcessStartInfo two = ToolProcess.Described([.. one.ArgumentList.Skip(1).SkipLast(1), "2"]);
        two.Environment["LC_ALL"] = "de_DE.UTF-8";
        two.Environment["DOTNET_SYSTEM_GLOBALIZATION_INVARIANT"] = "0";

        Run[] runs = [await ToolProcess.Of(one), await ToolProcess.Of(two)];

        Assert.All(runs, r => Assert.Equal(0, r.Status));
        Assert.Equal(WithoutTimes(runs[0].Out), WithoutTimes(runs[1].Out));
    }

    [Fact]
    public async Task ACommaCultureChangesNothing()
    {
        Run before = await Run.Of(Pipeline.OfLibrary(), "solve", BareWires, "--accuracy", "1e-2", "--json");
        CultureInfo old = CultureInfo.CurrentCulture;
        var comma = (CultureInfo)CultureInfo.InvariantCulture.Clone();
        comma.NumberFormat.NumberDecimalSeparator = ",";
        comma.NumberFormat.NumberGroupSeparator = ".";
        comma.NumberFormat.NegativeSign = "\u2212";
        Run after;
        try
        {
            CultureInfo.CurrentCulture = comma;
            after = await Run.Of(Pipeline.OfLibrary(), "solve", BareWires, "--accuracy", "1e-2", "--json");
        }
        finally
        {
            CultureInfo.CurrentCulture = old;
        }

        Assert.Equal(WithoutTimes(before.Out), WithoutTimes(after.Out));
    }

    [Fact]
    public async Task BlanksAndLettersOfAllScriptsAreGoodInPaths()
    {
        using var folder = new CaseFolder();
        string place = folder["Ablenk Magnet äΩ 磁石/" + "опыт 1"];
        Directory.CreateDirectory(place);
        string text = File.ReadAllText(BareWires).Replace("bare-wires.dxf", "Drähte 線.dxf", StringComparison.Ordinal);
        await File.WriteAllTextAsync(Path.Combine(place, "Fall Ω.toml"), text);
        File.Copy(Path.ChangeExtension(BareWires, ".dxf"), Path.Combine(place, "Drähte 線.dxf"));

        Run run = await ToolProcess.Of("solve", Path.Combine(place, "Fall Ω.toml"), "--accuracy", "1e-2", "-o", place + "/Ergebnis é/", "--figures", place + "/Bilder 図");

        Assert.Equal(0, run.Status);
        Assert.True(File.Exists(Path.Combine(place, "Ergebnis é", "Fall Ω.result.json")));
        Assert.True(File.Exists(Path.Combine(place, "Bilder 図", "field.svg")));
        Assert.Contains("sketch Drähte 線.dxf", run.Out, StringComparison.Ordinal);
    }

    private static void AssertWhole(string path)
    {
        byte[] bytes = File.ReadAllBytes(path);
        switch (Path.GetExtension(path))
        {
            case ".json":
                Assert.NotNull(JsonNode.Parse(bytes));
                break;
            case ".svg":
                Assert.EndsWith("</svg>\n", System.Text.Encoding.UTF8.GetString(bytes), StringComparison.Ordinal);
                break;
            default:
                Assert.Equal("IEND"u8.ToArray(), bytes[^8..^4]);
                break;
        }
    }

    private static string WithoutTimes(string json)
    {
        JsonNode root = JsonNode.Parse(json)!;
        JsonObject run = root["run"]!.AsObject();
        Assert.True(run.Remove("seconds") && run.Remove("peak_memory_MB"));
        return root.ToJsonString();
    }
}
