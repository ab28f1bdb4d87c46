// Truth: the written contract of all verbs that solve a case, held against a stand-in analysis.
using System.CommandLine;
using PoleField.Cli.Commands;
using PoleField.Cli.Tests.Doubles;
using PoleField.Cli.Text;

namespace PoleField.Cli.Tests.Commands;

public sealed class AnalysisVerbTests
{
    private static readonly string[] Before = ["magnet.toml", "poles.dxf"];

    [Fact]
    public async Task AnAnalysisIsAVerbWithHelpAndItsOwnOptions()
    {
        Run run = await Run.Of(With(met: true), "probe", "--help");

        Assert.Equal(0, run.Status);
        Assert.Contains("--depth", run.Out, StringComparison.Ordinal);
        Assert.Contains("--accuracy", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ItsFilesAppearTogetherInTheNamedFolder()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(met: true), "probe", folder.CasePath, "-o", folder["new.folder"]);

        Assert.Equal((0, "Small\n\n  - probed 2\n"), (run.Status, run.Out));
        Assert.Equal([.. Before.Take(1), Path.Combine("new.folder", "magnet.probe.csv"), Path.Combine("new.folder", "magnet.probe.json"), "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task JsonIsItsFirstFileAlone()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(met: true), "probe", folder.CasePath, "--json", "--depth", "7");

        Assert.Equal("{ \"depth\": 7 }", run.Out);
        Assert.Equal(Before, folder.Names);
    }

    [Fact]
    public async Task AMissedGoalEndsWithThreeAndStillWrites()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(With(met: false), "probe", folder.CasePath, "-o", folder["out"]);

        Assert.Equal(3, run.Status);
        Assert.Equal(4, folder.Names.Count);
    }

    [Fact]
    public async Task OneExistingTargetRefusesAllBeforeTheSolve()
    {
        using var folder = new CaseFolder();
        Directory.CreateDirectory(folder["out"]);
        await File.WriteAllTextAsync(folder[Path.Combine("out", "magnet.probe.csv")], "mine");
        Pipeline pipeline = With(met: true) with { Solve = (_, _, _, _, _) => throw new InvalidOperationException("solved") };

        Run run = await Run.Of(pipeline, "probe", folder.CasePath, "-o", folder["out"]);

        Assert.Equal(2, run.Status);
        Assert.Equal(3, folder.Names.Count);
    }

    private static Pipeline With(bool met)
    {
        var depth = new Option<int>("--depth") { Description = "Depth.", DefaultValueFactory = _ => 2 };
        var step = new AnalysisStep("probe", "Probes.")
        {
            Examples = [("polefield probe magnet.toml", "probes")],
            Options = [depth],
            Endings = _ => [".probe.json", ".probe.csv"],
            Run = request =>
            {
                int value = request.Arguments.GetValue(depth);
                return new Analysis(
                    new Answer("Probe", [], [FormattableString.Invariant($"probed {value}")]),
                    [
                        stream => stream.Write(System.Text.Encoding.UTF8.GetBytes(FormattableString.Invariant($"{{ \"depth\": {value} }}"))),
                        stream => stream.Write("y,z\n"u8),
                    ])
                {
                    Met = met,
                };
            },
        };
        return Steps.Sound with { Analyses = [step] };
    }
}
