// Truth: the written contract of solve (exit status, streams, files whole or not at all) and the stand-in report's numbers.
using PoleField.Beam;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class SolveVerbTests
{
    [Fact]
    public async Task TheTablesHoldTheAnswerWithinEightyColumns()
    {
        using var folder = new CaseFolder(Cases.Small + "[require]\ngradient_min = \"300 T/m\"\niron_field_max = \"1.9 T\"\n");

        Run run = await Run.Of(Fixed, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(0, run.Status);
        Assert.All(run.Out.Split('\n'), line => Assert.True(line.Length <= 80, line));
        Golden.Check("solve.txt", System.Text.RegularExpressions.Regex.Replace(run.Out, @"\d+\.\d s, \d+ MB", "T s, M MB"));
    }

    [Fact]
    public async Task TheResultFileIsCalledAfterTheCaseInTheNamedFolder()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(Fixed, "solve", folder.CasePath, "-o", folder["results"]);

        Assert.Equal(["magnet.toml", "poles.dxf", Path.Combine("results", "magnet.result.json")], folder.Names);
        Assert.Equal($"Result: {folder[Path.Combine("results", "magnet.result.json")]}\n", run.Error);
    }

    [Fact]
    public async Task JsonIsAllOfStandardOutputAndNoFileUnlessAsked()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(Fixed, "solve", folder.CasePath, "--json");

        Assert.Equal((0, string.Empty), (run.Status, run.Error));
        Assert.Equal("Small", System.Text.Json.JsonDocument.Parse(run.Out).RootElement.GetProperty("title").GetString());
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task AnExistingFileIsRefusedBeforeTheSolveAndKept()
    {
        using var folder = new CaseFolder();
        await File.WriteAllTextAsync(folder["out.json"], "mine");
        bool solved = false;
        Pipeline pipeline = Fixed with { Solve = (_, _, options, _, _) => { solved = true; return Steps.Solved(options); } };

        Run refused = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal((2, false, "mine"), (refused.Status, solved, await File.ReadAllTextAsync(folder["out.json"])));
        Assert.Contains("--force", refused.Error, StringComparison.Ordinal);

        Run forced = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"], "--force");

        Assert.Equal((0, true), (forced.Status, solved));
        Assert.Contains("polefield-result/1", await File.ReadAllTextAsync(folder["out.json"]), StringComparison.Ordinal);
    }

    [Fact]
    public async Task AFaultyCaseWritesNothing()
    {
        using var folder = new CaseFolder(Cases.Small.Replace("width", "widht", StringComparison.Ordinal));

        Run run = await Run.Of(Fixed, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal((2, string.Empty), (run.Status, run.Out));
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task AFaultWhileWritingLeavesNoFile()
    {
        using var folder = new CaseFolder();
        Pipeline pipeline = Fixed with
        {
            WriteResult = (stream, _) =>
            {
                stream.Write("{ half"u8);
                throw new InvalidOperationException("broken writer");
            },
        };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(1, run.Status);
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task ARequirementThatIsNotMetEndsWithThreeAndStillWrites()
    {
        using var folder = new CaseFolder(Cases.Small + "[require]\nspread_max = \"2 %\"\n");

        Run run = await Run.Of(Fixed, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal(3, run.Status);
        Assert.Contains("not met", run.Out, StringComparison.Ordinal);
        Assert.Contains("Not met: spread_max", run.Error, StringComparison.Ordinal);
        Assert.Contains("out.json", folder.Names);
    }

    [Fact]
    public async Task AnAccuracyThatIsNotReachedEndsWithThree()
    {
        using var folder = new CaseFolder();
        Pipeline pipeline = Fixed with
        {
            Solve = (_, _, options, _, _) => Steps.Solved(options) with { Record = Steps.Solved(options).Record with { AccuracyReached = 1e-3 } },
        };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"], "--accuracy", "0.01 %");

        Assert.Equal(3, run.Status);
        Assert.Contains("accuracy 1e-3 of 1e-4 asked: not reached", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task TheOptionsReachTheSolver()
    {
        using var folder = new CaseFolder();
        SolveOptions? seen = null;
        Pipeline pipeline = Fixed with { Solve = (_, _, options, _, _) => { seen = options; return Steps.Solved(options); } };

        await Run.Of(pipeline, "solve", folder.CasePath, "--json", "--accuracy", "2e-6", "--threads", "3");

        Assert.Equal((2e-6, 3), (seen!.Accuracy, seen.Threads));
    }

    [Theory]
    [InlineData(true)] // the step notices the cancellation
    [InlineData(false)] // the step is deaf to it
    public async Task InterruptedItEndsWithinASecondAndLeavesNothing(bool notices)
    {
        using var folder = new CaseFolder();
        using var interrupt = new CancellationTokenSource();
        using var release = new ManualResetEventSlim();
        Pipeline pipeline = Fixed with
        {
            Solve = (_, _, options, _, token) =>
            {
                interrupt.Cancel();
                release.Wait(TimeSpan.FromSeconds(30), notices ? token : CancellationToken.None);
                return Steps.Solved(options);
            },
        };

        var clock = System.Diagnostics.Stopwatch.StartNew();
        Run run = await Run.Of(pipeline, interrupt.Token, "solve", folder.CasePath, "-o", folder["out.json"]);
        TimeSpan took = clock.Elapsed;
        release.Set();

        Assert.Equal(130, run.Status);
        Assert.True(took < TimeSpan.FromSeconds(5), $"took {took}"); // one second on a machine of one's own; others build here
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task WhatTheSolverRefusesIsAFaultOfTheInput()
    {
        using var folder = new CaseFolder();
        Pipeline pipeline = Fixed with
        {
            Solve = (_, _, _, _, _) => throw new InputException([new Finding(Severity.Fault, "aperture-in-part", "The aperture cuts RIDGE.", "Move the beam.")]),
        };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"]);

        Assert.Equal((2, "fault: The aperture cuts RIDGE.\n  Move the beam.\n"), (run.Status, run.Error));
    }

    [Fact]
    public async Task RunningTwiceUnderTheDefaultNameReplacesTheOwnResultOnly()
    {
        using var folder = new CaseFolder();
        string name = "polefield-test-" + Path.GetRandomFileName() + ".toml";
        string result = Path.GetFileNameWithoutExtension(name) + ".result.json";
        File.Copy(folder.CasePath, folder[name]);
        try
        {
            Run first = await Run.Of(Fixed, "solve", folder[name]);
            Run second = await Run.Of(Fixed, "solve", folder[name]);
            await File.WriteAllTextAsync(result, "not ours");
            Run third = await Run.Of(Fixed, "solve", folder[name]);

            Assert.Equal((0, 0, 2), (first.Status, second.Status, third.Status));
        }
        finally
        {
            File.Delete(result);
        }
    }

    private static Pipeline Fixed => Steps.Sound;
}
