using System.CommandLine;
using PoleField.Cli.Files;
using PoleField.Cli.Sweeping;
using PoleField.Cli.Text;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield gather DIR…</c>: the parts of a sweep as one table.</summary>
internal sealed class GatherVerb
{
    private static readonly string[] Endings = [".sweep.csv", ".sweep.json"];

    private readonly Tool _tool;
    private readonly Argument<string[]> _folders = new("DIR") { Description = "Folder of a sweep; several when its parts went into folders of their own.", Arity = ArgumentArity.OneOrMore };
    private readonly Option<string?> _out = CommonOptions.Out("Table, or folder for it. Default: CASE.sweep.csv and .json in the current folder.");
    private readonly Option<bool> _json = CommonOptions.Json();
    private readonly Option<bool> _force = CommonOptions.Force();

    private GatherVerb(Tool tool) => _tool = tool;

    public static VerbCommand Create(Tool tool)
    {
        var verb = new GatherVerb(tool);
        var command = new VerbCommand("gather", "Merges the parts of a sweep into one table, as CSV and JSON.")
        {
            Examples =
            [
                ("polefield gather magnet.sweep", "writes magnet.sweep.csv and magnet.sweep.json"),
                ("polefield gather part-*/ -o table.csv --force", "parts from several machines"),
            ],
            Notes = ["Points that have not been solved have rows without values; then the exit status is 3."],
        };
        command.Arguments.Add(verb._folders);
        command.Options.Add(verb._out);
        command.Options.Add(verb._json);
        command.Options.Add(verb._force);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        SweepFolder[] folders = [.. arguments.GetRequiredValue(_folders).Select(f => new SweepFolder(f))];
        SweepPlanFile plan = SweepGathering.CommonPlan(folders);
        string? output = arguments.GetValue(_out);
        bool json = arguments.GetValue(_json);
        string[] targets = json && output is null ? [] : [.. ResultName.ForAll(plan.Case, Endings, output)];
        using OutputFiles files = OutputFiles.Plan(targets, arguments.GetValue(_force));
        SweepTableFile table = SweepGathering.Table(plan, folders, Shard.Whole.PointsOf(SweepPlan.CountOf(plan)));
        if (targets.Length > 0)
        {
            files.Write(targets[0], stream => SweepTable.WriteCsv(table, stream));
            files.Write(targets[1], stream => SweepTable.WriteJson(table, stream));
        }

        files.Commit(cancellation);
        Print(arguments, table, targets);
        return table.Rows.All(r => r.ExitStatus == ExitStatus.Done) ? ExitStatus.Done : ExitStatus.NotMet;
    }

    private void Print(ParseResult arguments, SweepTableFile table, string[] targets)
    {
        bool quiet = arguments.GetValue(_tool.Quiet);
        if (arguments.GetValue(_json))
        {
            SweepText.WriteJson(_tool.Terminal.Out, table);
        }
        else if (!quiet)
        {
            SweepText.Write(_tool.Terminal.Out, table, _tool.OutInk(arguments));
        }

        int open = table.Rows.Count(r => r.ExitStatus is null);
        int failed = table.Rows.Count(r => r.ExitStatus is not (null or ExitStatus.Done));
        if (open > 0)
        {
            _tool.Terminal.Error.WriteLine(FormattableString.Invariant($"Not met: {open} of {table.Rows.Count} points are not solved yet; run their sweep again."));
        }

        if (failed > 0)
        {
            _tool.Terminal.Error.WriteLine(FormattableString.Invariant($"Not met: {failed} of {table.Rows.Count} points failed or missed a requirement; the table says why."));
        }

        foreach (string target in quiet ? [] : targets)
        {
            _tool.Terminal.Error.WriteLine($"Result: {target}");
        }
    }
}
