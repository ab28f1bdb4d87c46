using System.Text;
using PoleField.Cli.Sweeping;
using PoleField.Output.Results;

namespace PoleField.Cli.Text;

/// <summary>Prints the table of a sweep for people: the first rows of a long one, and the words of progress.</summary>
internal static class SweepText
{
    // A longer table is for a program to read.
    private const int MostRows = 60;

    public static void Write(TextWriter writer, SweepTableFile table, Ink ink)
    {
        string[] axes = [.. table.Plan.Axes.Select(a => ">" + a.Name + (a.Factor ? ", factor" : a.Unit.Length > 0 ? ", " + a.Unit : string.Empty))];
        var text = new TextTable([">point", .. axes, ">field, T", ">gradient, T/m", ">spread", "status"]);
        foreach (SweepRow row in table.Rows.Take(MostRows))
        {
            text.Add(
            [
                FormattableString.Invariant($"{row.Point}"),
                .. row.Values.Select(v => v.ToString()),
                row.Field is { } field ? Numbers.WithError(field, row.FieldError ?? 0) : "-",
                row.Gradient is { } gradient ? Numbers.WithError(gradient, row.GradientError ?? 0) : "-",
                row.GradientSpread is { } spread ? Numbers.Percent(spread) : "-",
                Status(row),
            ]);
        }

        writer.WriteLine(ink.Strong(table.Plan.Title));
        foreach (string line in text.Lines(ink))
        {
            writer.WriteLine(line);
        }

        if (table.Rows.Count > MostRows)
        {
            writer.WriteLine(FormattableString.Invariant($"  ... and {table.Rows.Count - MostRows} more in the table's file"));
        }
    }

    public static void WriteJson(TextWriter writer, SweepTableFile table)
    {
        using var stream = new MemoryStream();
        SweepTable.WriteJson(table, stream);
        writer.Write(Encoding.UTF8.GetString(stream.ToArray()));
    }

    private static string Status(SweepRow row) => row.ExitStatus switch
    {
        null => row.Reason,
        ExitStatus.Done => "done",
        { } status => FormattableString.Invariant($"{status}: {Cell.Of(row.Reason, 80)}"),
    };
}

/// <summary>"12 of 40 points, 1 failed, about 40 s left".</summary>
internal sealed class SweepProgressWords(TimeProvider time)
{
    private readonly long _start = time.GetTimestamp();

    public string Of(SweepProgress now)
    {
        int done = now.Kept + now.Solved;
        string words = FormattableString.Invariant($"{done} of {now.Asked} points");
        words += now.Failed > 0 ? FormattableString.Invariant($", {now.Failed} not met or failed") : string.Empty;
        if (now.Solved == 0)
        {
            return words;
        }

        TimeSpan left = time.GetElapsedTime(_start) / now.Solved * (now.Asked - done);
        return words + (left.TotalMinutes < 2
            ? FormattableString.Invariant($", about {Math.Ceiling(left.TotalSeconds)} s left")
            : FormattableString.Invariant($", about {Math.Ceiling(left.TotalMinutes)} min left"));
    }
}
