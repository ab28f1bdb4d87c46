using System.CommandLine;
using System.CommandLine.Parsing;
using System.Globalization;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Sweeping;
using PoleField.Cli.Text;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield sweep CASE.toml --vary …</c>: many solves of one case with other values in it.</summary>
internal sealed class SweepVerb
{
    private const int MostPoints = 1_000_000;

    private readonly Tool _tool;
    private readonly CaseRun _run;
    private readonly Option<string[]> _vary = new("--vary")
    {
        Description = "A value of the case by its TOML path, and what it becomes: a list, or START:STOP:COUNT. x marks factors of the case's own value. "
            + "Repeated, all combinations are solved.",
        HelpName = "PATH=VALUES",
        Required = true,
        AllowMultipleArgumentsPerToken = false,
    };

    private readonly Option<Shard> _shard = new("--shard")
    {
        Description = "Solve only part K of N; other processes or machines solve the others.",
        HelpName = "K/N",
        CustomParser = ParseShard,
        DefaultValueFactory = _ => Shard.Whole,
    };

    private readonly Option<bool> _retry = new("--retry") { Description = "Solve points that failed again." };

    private SweepVerb(Tool tool)
    {
        _tool = tool;
        _run = new CaseRun(tool, "Folder of the sweep. Default: CASE.sweep in the current folder.");
    }

    public static VerbCommand Create(Tool tool)
    {
        var verb = new SweepVerb(tool);
        var command = new VerbCommand("sweep", "Solves a case for many values of its numbers and gathers them in one table.")
        {
            Examples =
            [
                ("polefield sweep magnet.toml --vary 'parts.COIL*.ampere_turns=x0.5:x1.5:5'", "five currents in all coils"),
                ("polefield sweep m.toml --vary beam.width=1:2:11 --vary magnet.length=9cm,1m", "a grid of 22 points"),
                ("polefield sweep magnet.toml --vary parts.RIDGE.material=pure-iron,steel-1008", "words vary too"),
                ("polefield sweep magnet.toml --vary beam.width=1mm:4mm:100 --shard 3/8", "one of eight jobs; see polefield gather"),
            ],
            Notes =
            [
                "Each finished point is a file in the folder. A run that was stopped goes on with the same command: finished points are kept, "
                    + "and several runs in one folder share the points.",
                "--threads points are solved at a time, each on one thread. The table is table.csv and table.json in the folder.",
            ],
        };
        verb._run.AddTo(command, withJson: true);
        command.Options.Add(verb._vary);
        command.Options.Add(verb._shard);
        command.Options.Add(verb._retry);
        tool.SetRun(command, verb.Run, "Interrupted; finished points are kept, and the same command goes on from there.");
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        if (_run.Load(arguments) is not { } loaded)
        {
            return ExitStatus.WrongInput;
        }

        SweepPlan plan = PlanOf(arguments, loaded);
        var folder = new SweepFolder(_run.Out(arguments) ?? Path.GetFileNameWithoutExtension(loaded.Path) + ".sweep");
        folder.TakeUp(plan, _run.Force(arguments));
        Shard shard = arguments.GetValue(_shard);
        int[] points = [.. shard.PointsOf(SweepPlan.CountOf(plan.File))];
        SweepProgress end = Solve(arguments, (plan, folder, points), loaded.Path, cancellation);
        SweepTableFile table = SweepGathering.Table(plan.File, [folder], points);
        bool whole = shard == Shard.Whole;
        if (whole)
        {
            SweepGathering.WriteInto(folder.Path, table);
        }

        Print(arguments, table, whole);
        Summarise(arguments, shard, end, folder);
        return table.Rows.All(r => r.ExitStatus == ExitStatus.Done) ? ExitStatus.Done : ExitStatus.NotMet;
    }

    private SweepProgress Solve(
        ParseResult arguments, (SweepPlan Plan, SweepFolder Folder, int[] Points) part, string casePath, CancellationToken cancellation)
    {
        var options = new SweepOptions(_run.Accuracy(arguments), _run.Threads(arguments), arguments.GetValue(_retry));
        bool seen = !_run.Quiet(arguments) && !_run.Json(arguments);
        using var line = new ProgressLine(_tool.Terminal, seen, double.NaN, TimeProvider.System);
        var words = new SweepProgressWords(TimeProvider.System);
        return new SweepRun(_tool.Pipeline, casePath, part.Plan, part.Folder)
            .Solve(part.Points, options, now => line.Show(() => words.Of(now)), cancellation);
    }

    private SweepPlan PlanOf(ParseResult arguments, LoadedCase loaded)
    {
        var reader = new AxisReader(CaseLoader.ValuesOf(loaded.Path));
        Axis[] axes = [.. arguments.GetRequiredValue(_vary).Select(reader.Read)];
        if (axes.Aggregate(1.0, (n, a) => n * a.Values.Count) > MostPoints)
        {
            throw new InputException([new Finding(Severity.Fault, "vary-count", $"The grid has more than {MostPoints} points.", "Vary less.")]);
        }

        IReadOnlyList<InputFile> inputs = Tried(loaded, axes);
        return new SweepPlan(axes, new SweepPlanFile(
            SweepPlanFile.Name,
            Path.GetFileName(loaded.Path),
            loaded.Case!.Title,
            ResultOutput.ProgramVersion,
            _run.Accuracy(arguments),
            [.. inputs.Select(i => new SweepInput(i.Name, i.Sha256))],
            [.. axes.Select(a => a.ToFile())]));
    }

    // Each value by itself, before the first solve: a value the case cannot have is a mistake of the command line.
    private IReadOnlyList<InputFile> Tried(LoadedCase loaded, Axis[] axes)
    {
        var loader = new CaseLoader(_tool.Pipeline);
        var inputs = new List<InputFile>(loaded.Inputs);
        var faults = new List<Finding>();
        foreach (Axis axis in axes)
        {
            for (int i = 0; i < axis.Values.Count; i++)
            {
                CaseChange change = axis.At(i);
                LoadedCase tried = loader.Load(loaded.Path, [change], cut: false);
                inputs.AddRange(tried.Inputs);
                faults.AddRange(tried.Findings.Where(f => f.Severity == Severity.Fault)
                    .Select(f => f with { Text = $"with {axis.Path.Text} = {(axis.IsFactor ? "x" : string.Empty)}{change.Text}: {f.Text}" }));
            }
        }

        return faults.Count == 0 ? [.. inputs.Distinct()] : throw new InputException(faults);
    }

    private void Print(ParseResult arguments, SweepTableFile table, bool whole)
    {
        if (_run.Json(arguments))
        {
            SweepText.WriteJson(_tool.Terminal.Out, table);
        }
        else if (!_run.Quiet(arguments) && whole)
        {
            SweepText.Write(_tool.Terminal.Out, table, _tool.OutInk(arguments));
        }
    }

    private void Summarise(ParseResult arguments, Shard shard, SweepProgress end, SweepFolder folder)
    {
        if (_run.Quiet(arguments))
        {
            return;
        }

        TextWriter error = _tool.Terminal.Error;
        string part = shard == Shard.Whole ? string.Empty : FormattableString.Invariant($"Part {shard.Number} of {shard.Of}: ");
        int open = end.Asked - end.Kept - end.Solved;
        error.WriteLine(FormattableString.Invariant(
            $"{part}{end.Asked} points, {end.Kept} kept of earlier runs, {end.Solved} solved now, {end.Failed} not met or failed."));
        if (open > 0)
        {
            error.WriteLine(FormattableString.Invariant($"{open} points are being solved by another run in the same folder."));
        }

        error.WriteLine(shard == Shard.Whole
            ? $"Result: {Path.Combine(folder.Path, SweepGathering.CsvName)}"
            : $"When all parts are done: polefield gather {folder.Path}");
    }

    private static Shard ParseShard(ArgumentResult result)
    {
        string text = result.Tokens.Count > 0 ? result.Tokens[0].Value : string.Empty;
        string[] parts = text.Split('/');
        if (parts.Length == 2
            && int.TryParse(parts[0], NumberStyles.None, CultureInfo.InvariantCulture, out int number)
            && int.TryParse(parts[1], NumberStyles.None, CultureInfo.InvariantCulture, out int of)
            && number >= 1 && number <= of)
        {
            return new Shard(number, of);
        }

        result.AddError($"--shard is \"{text}\"; it must be K/N with K from 1 to N, such as 3/8.");
        return Shard.Whole;
    }
}
