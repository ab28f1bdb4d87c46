using PoleField.Output.Results;

namespace PoleField.Cli.Sweeping;

/// <summary>Puts the finished points of folders into one table.</summary>
internal static class SweepGathering
{
    public const string CsvName = "table.csv";

    /// <summary>The plan all folders share.</summary>
    /// <exception cref="InputException">A folder holds no plan, or another one.</exception>
    public static SweepPlanFile CommonPlan(IReadOnlyList<SweepFolder> folders)
    {
        var faults = new List<Finding>();
        SweepPlanFile? common = null;
        foreach (SweepFolder folder in folders)
        {
            SweepPlanFile? plan = folder.ReadPlan();
            if (plan is null)
            {
                faults.Add(new Finding(Severity.Fault, "no-sweep", $"{folder.Path} holds no sweep.", "Give a folder that polefield sweep has written."));
            }
            else if (common is not null && SweepPlan.HashOf(common) != SweepPlan.HashOf(plan))
            {
                faults.Add(new Finding(Severity.Fault, "other-sweep", $"{folder.Path} holds another sweep than {folders[0].Path}.", "Gather parts of one sweep only."));
            }

            common ??= plan;
        }

        return faults.Count == 0 && common is not null ? common : throw new InputException(faults);
    }

    /// <summary>The table of some points: each from the first folder that has it; rows without values for those none has.</summary>
    public static SweepTableFile Table(SweepPlanFile plan, IReadOnlyList<SweepFolder> folders, IEnumerable<int> points)
    {
        string hash = SweepPlan.HashOf(plan);
        return new SweepTableFile(SweepTableFile.Name, plan, [.. points.Select(Row)]);

        SweepRow Row(int point)
        {
            SweepPointFile? found = folders.Select(f => f.ReadPoint(hash, point)).FirstOrDefault(p => p is not null);
            return found is null
                ? new SweepRow(point, SweepPlan.ValuesAt(plan, point), null, "not solved yet")
                : SweepTable.Row(SweepPlan.ValuesAt(plan, point), found);
        }
    }

    /// <summary>Writes the table into the sweep's own folder.</summary>
    public static void WriteInto(string folder, SweepTableFile table)
    {
        SweepFolder.Write(Path.Combine(folder, CsvName), stream => SweepTable.WriteCsv(table, stream));
        SweepFolder.Write(Path.Combine(folder, "table.json"), stream => SweepTable.WriteJson(table, stream));
    }
}
