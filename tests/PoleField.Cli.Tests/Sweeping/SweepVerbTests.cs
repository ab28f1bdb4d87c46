// Truth: the files before and after; a count of the solves; the grid written out by hand.
using System.Collections.Concurrent;
using System.Text.Json.Nodes;
using PoleField.Cli.Tests.Doubles;
using PoleField.Magnetostatics;

namespace PoleField.Cli.Tests.Sweeping;

public sealed class SweepVerbTests : IDisposable
{
    private readonly CaseFolder _folder = new();
    private readonly ConcurrentBag<double> _solved = [];

    public void Dispose() => _folder.Dispose();

    [Fact]
    public async Task AGridIsSolvedOnceInOrderOfItsAxes()
    {
        Run run = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=100:300:3", "--vary", "beam.width=1mm,2mm");

        Assert.Equal(0, run.Status);
        Assert.Equal([100, 100, 200, 200, 300, 300], _solved.Order());
        string[] lines = File.ReadAllLines(_folder["s/table.csv"]);
        Assert.StartsWith("point,parts.COIL.ampere_turns_A,beam.width_mm,exit_status,reason,field_T,field_error_T,gradient_T_per_m,gradient_error_T_per_m,", lines[0], StringComparison.Ordinal);
        Assert.Equal(
            ["0,100,1,0,", "1,100,2,0,", "2,200,1,0,", "3,200,2,0,", "4,300,1,0,", "5,300,2,0,"],
            lines[1..].Select(l => l[..10]));
    }

    [Fact]
    public async Task TheSameCommandAgainSolvesNothing()
    {
        await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2,3");

        Run again = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2,3");

        Assert.Equal(3, _solved.Count);
        Assert.Contains("3 kept of earlier runs, 0 solved now", again.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AStoppedSweepKeepsItsPointsAndGoesOn()
    {
        using var stop = new CancellationTokenSource();
        Pipeline stopping = Counting with { Solve = (m, a, o, p, c) => { if (_solved.Count == 2) { stop.Cancel(); c.ThrowIfCancellationRequested(); } return Counting.Solve(m, a, o, p, c); } };

        Run stopped = await Run.Of(stopping, stop.Token, Words("--threads", "1", "--vary", "parts.COIL.ampere_turns=1:5:5"));
        Run rest = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1:5:5");

        Assert.Equal((130, 0), (stopped.Status, rest.Status));
        Assert.Contains("the same command goes on", stopped.Error, StringComparison.Ordinal);
        Assert.Equal([1, 2, 3, 4, 5], _solved.Order());
        Assert.DoesNotContain(_folder.Names, n => n.EndsWith(".claim", StringComparison.Ordinal) || n.EndsWith(".part", StringComparison.Ordinal));
    }

    [Fact]
    public async Task ShardsTogetherAreTheWholeAndGatherMergesTheirFolders()
    {
        string[] vary = ["--vary", "parts.COIL.ampere_turns=1:7:7"];
        foreach (string k in (string[])["1", "2", "3"])
        {
            Run part = await Run.Of(Counting, ["sweep", _folder.CasePath, "-o", _folder["part" + k], "--shard", k + "/3", .. vary]);
            Assert.Equal(0, part.Status);
            Assert.False(File.Exists(_folder[$"part{k}/table.csv"]));
        }

        Run gathered = await Gather("part1", "part2", "part3");
        await Sweep(Counting, vary);

        Assert.Equal(0, gathered.Status);
        Assert.Equal(14, _solved.Count);
        Assert.Equal(WithoutSeconds("s/table.csv"), WithoutSeconds("t.csv"));
        Assert.Equal(8, WithoutSeconds("t.csv").Length);
    }

    [Fact]
    public async Task MissingPointsHaveRowsAndGatherSaysSo()
    {
        await Sweep(Counting, "--shard", "1/2", "--vary", "parts.COIL.ampere_turns=1:5:5");

        Run run = await Gather("s");

        Assert.Equal(3, run.Status);
        Assert.Contains("2 of 5 points are not solved yet", run.Error, StringComparison.Ordinal);
        Assert.StartsWith("1,2,,not solved yet,,", File.ReadAllLines(_folder["t.csv"])[2], StringComparison.Ordinal);
    }

    [Fact]
    public async Task AFailedPointIsARowWithItsStatusAndReasonAndIsRepeatedOnlyOnDemand()
    {
        Pipeline failing = Counting with
        {
            Solve = (m, a, o, p, c) =>
            {
                Counting.Solve(m, a, o, p, c);
                return m.Roles[1].AmpereTurns switch
                {
                    2 => throw new FieldNotConvergedException([]),
                    3 => throw new InvalidOperationException("broken"),
                    4 => throw new InputException([new Finding(Severity.Fault, "x", "The beam touches RIDGE.", "Move it.")]),
                    _ => Steps.Solved(o),
                };
            },
        };

        Run run = await Sweep(failing, "--vary", "parts.COIL.ampere_turns=1:4:4");
        await Sweep(failing, "--vary", "parts.COIL.ampere_turns=1:4:4");
        Assert.Equal(4, _solved.Count);
        await Sweep(Counting, "--retry", "--vary", "parts.COIL.ampere_turns=1:4:4");

        Assert.Equal(7, _solved.Count);
        Assert.Equal(3, run.Status);
        JsonArray rows = JsonNode.Parse((await Gather("s", "--json")).Out)!["rows"]!.AsArray();
        Assert.All(rows, r => Assert.Equal(0, (int)r!["exit_status"]!));
        Assert.Contains("3: ", run.Out, StringComparison.Ordinal);
        Assert.Contains("1: a fault in PoleField itself", run.Out, StringComparison.Ordinal);
        Assert.Contains("2: fault: The beam touches RIDGE.", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AnotherSweepsFolderIsRefusedUnlessForced()
    {
        await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2");

        Run refused = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,3");
        int solvedThen = _solved.Count;
        Run forced = await Sweep(Counting, "--force", "--vary", "parts.COIL.ampere_turns=1,3");

        Assert.Equal((2, 2, 0), (refused.Status, solvedThen, forced.Status));
        Assert.Equal([1, 1, 2, 3], _solved.Order());
    }

    [Fact]
    public async Task AChangedCaseIsAnotherSweep()
    {
        await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2");
        File.AppendAllText(_folder.CasePath, "\n# a remark\n");

        Run run = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2");

        Assert.Equal(2, run.Status);
        Assert.Contains("has changed since", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ASketchThatChangesUnderTheSweepStopsIt()
    {
        Pipeline meddling = Counting with { Solve = (m, a, o, p, c) => { File.WriteAllText(_folder["poles.dxf"], "other"); return Counting.Solve(m, a, o, p, c); } };

        Run run = await Sweep(meddling, "--threads", "1", "--vary", "parts.COIL.ampere_turns=1,2,3");

        Assert.Equal(2, run.Status);
        Assert.Contains("poles.dxf has changed", run.Error, StringComparison.Ordinal);
        Assert.Single(_solved);
    }

    [Fact]
    public async Task ADamagedPointIsSolvedAgain()
    {
        await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2");
        File.WriteAllText(_folder["s/points/000001.json"], "{ \"format\": \"polefield-sweep-po");

        Run run = await Sweep(Counting, "--vary", "parts.COIL.ampere_turns=1,2");

        Assert.Equal(0, run.Status);
        Assert.Equal([1, 2, 2], _solved.Order());
    }

    [Fact]
    public async Task TwoRunsInOneFolderShareThePoints()
    {
        Pipeline slow = Counting with { Solve = (m, a, o, p, c) => { Thread.Sleep(20); return Counting.Solve(m, a, o, p, c); } };
        string[] words = Words("--threads", "1", "--vary", "parts.COIL.ampere_turns=1:20:20");

        Run[] runs = await Task.WhenAll(Run.Of(slow, words), Run.Of(slow, words));
        Run last = await Run.Of(slow, words);

        Assert.Equal(Enumerable.Range(1, 20).Select(i => (double)i), _solved.Order());
        Assert.All(runs, r => Assert.Contains(r.Status, (int[])[0, 3])); // 3: the other one's last point was still open
        Assert.Equal(0, last.Status);
    }

    [Theory]
    [InlineData("0/3")]
    [InlineData("4/3")]
    [InlineData("1")]
    [InlineData("1/-3")]
    public async Task AShardIsOneOfN(string shard)
    {
        Run run = await Sweep(Counting, "--shard", shard, "--vary", "parts.COIL.ampere_turns=1,2");

        Assert.Equal(2, run.Status);
        Assert.Contains("K from 1 to N", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task ValuesTheCaseCannotHaveAreToldBeforeAnySolve()
    {
        Run unit = await Sweep(Counting, "--vary", "beam.width=1T");
        Run both = await Sweep(Counting, "--vary", "parts.COIL.fill=0.5,1.5,2", "--vary", "beam.width=-1mm,1mm");

        Assert.Equal((2, 2), (unit.Status, both.Status));
        Assert.Contains("magnet.toml:12:8: fault: with parts.COIL.fill = 1.5", both.Error, StringComparison.Ordinal);
        Assert.Contains("with parts.COIL.fill = 2", both.Error, StringComparison.Ordinal);
        Assert.Contains("with beam.width = -1 mm", both.Error, StringComparison.Ordinal);
        Assert.Empty(_solved);
        Assert.DoesNotContain(_folder.Names, n => n.StartsWith("s/", StringComparison.Ordinal));
    }

    private Pipeline Counting => Steps.Sound with
    {
        Solve = (magnet, _, options, _, _) =>
        {
            _solved.Add(magnet.Roles[1].AmpereTurns);
            return Steps.Solved(options);
        },
    };

    private Task<Run> Sweep(Pipeline pipeline, params string[] rest) => Run.Of(pipeline, Words(rest));

    private string[] Words(params string[] rest) => ["sweep", _folder.CasePath, "-o", _folder["s"], .. rest];

    private Task<Run> Gather(params string[] words) =>
        Run.Of(Counting, ["gather", .. words.Select(w => w.StartsWith('-') ? w : _folder[w]), "-o", _folder["t.csv"], "--force"]);

    private string[] WithoutSeconds(string name) => [.. File.ReadAllLines(_folder[name]).Select(l => l[..l.LastIndexOf(',')])];
}
