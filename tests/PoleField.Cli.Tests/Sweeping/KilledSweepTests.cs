// Truth: an undisturbed sweep of the same case; the times of files that must not be written again.
using System.Diagnostics;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Sweeping;

public sealed class KilledSweepTests
{
    private const string Vary = "parts.WIRE*.ampere_turns=x0.5:x1.5:5";

    [Fact]
    public async Task KilledAtAnyMomentItLosesNothingAndRepeatsNothing()
    {
        using var folder = new CaseFolder();
        var random = new Random(20261201);
        var written = new Dictionary<string, DateTime>();
        for (int attempt = 0; attempt < 40 && !File.Exists(folder["s/table.csv"]); attempt++)
        {
            using Process process = Start(folder["s"]);
            await EndOrKill(process, PointsOf(folder["s"]).Count + 1, TimeSpan.FromMilliseconds(random.Next(300)), folder["s"]);
            foreach (FileInfo point in PointsOf(folder["s"]))
            {
                Assert.Equal(written.GetValueOrDefault(point.Name, point.LastWriteTimeUtc), point.LastWriteTimeUtc);
                written[point.Name] = point.LastWriteTimeUtc;
            }
        }

        using (Process undisturbed = Start(folder["t"]))
        {
            await undisturbed.WaitForExitAsync();
        }

        Assert.Equal(5, written.Count);
        Assert.Equal(Table(folder["t"]), Table(folder["s"]));
        Assert.Equal(6, Table(folder["s"]).Length);
    }

    // Killed a random while after one more point than before has appeared.
    private static async Task EndOrKill(Process process, int points, TimeSpan after, string folder)
    {
        while (!process.HasExited && PointsOf(folder).Count < points)
        {
            await Task.Delay(10);
        }

        if (!process.HasExited)
        {
            await Task.Delay(after);
            process.Kill();
        }

        await process.WaitForExitAsync();
    }

    private static List<FileInfo> PointsOf(string folder) =>
        Directory.Exists(Path.Combine(folder, "points")) ? [.. new DirectoryInfo(Path.Combine(folder, "points")).GetFiles("*.json").Where(f => f.Name[0] != '.')] : [];

    private static Process Start(string output) => Process.Start(new ProcessStartInfo(
        "dotnet",
        [typeof(Terminal).Assembly.Location, "sweep", Repository.File("geometries/bare-wires/bare-wires.toml"), "--accuracy", "1e-3", "--vary", Vary, "-o", output, "--quiet"]))!;

    private static string[] Table(string folder) =>
        [.. File.ReadAllLines(Path.Combine(folder, "table.csv")).Select(l => l[..l.LastIndexOf(',')])];
}
