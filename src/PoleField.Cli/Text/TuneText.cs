using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Design;
using PoleField.Output.Results;

namespace PoleField.Cli.Text;

/// <summary>Prints what tuning found.</summary>
internal static class TuneText
{
    public static void Print(TextWriter writer, Ink ink, string title, (TuneOutcome Outcome, IReadOnlyList<Verdict> Verdicts) of)
    {
        TuneOutcome outcome = of.Outcome;
        writer.WriteLine(ink.Strong(title));
        writer.WriteLine();
        if (outcome.After is { } after)
        {
            BeforeAndAfter(writer, ink, outcome.Before, after);
        }
        else
        {
            TuneStep last = outcome.Tuned.State.Steps.Last(s => s.Accepted);
            writer.WriteLine(
                $"  Stopped at rms {Numbers.Percent(last.Rms)}, gradient {Numbers.Significant(last.Gradient)} T/m, by the steps' own meshes; not yet solved to full accuracy.");
            writer.WriteLine();
        }

        Changes(writer, outcome.Tuned);
        TuneState state = outcome.Tuned.State;
        string verified = outcome.After is null ? string.Empty : ", then solved to full accuracy";
        writer.WriteLine(FormattableString.Invariant($"  {state.Steps.Count - 1} steps, {state.Solves} solves{verified}"));
        foreach (Verdict v in of.Verdicts)
        {
            writer.WriteLine(
                $"  {v.Limit.Name} {Numbers.InUnit(v.Limit.Bound, v.Limit.Quantity.Dimension)}: {(v.Found is { } m ? Numbers.InUnit(m, v.Limit.Quantity.Dimension) : "-")}, {(v.Met ? "met" : "not met: best found is written")}");
        }

        foreach (string line in Wrapped.Lines("What limits it: " + string.Join("; ", outcome.Tuned.Limits) + ".", 100, "  "))
        {
            writer.WriteLine(line);
        }

        if (outcome.TradeOff.Count > 1)
        {
            TradeOff(writer, ink, outcome);
        }
    }

    private static void BeforeAndAfter(TextWriter writer, Ink ink, BeamReport before, BeamReport after)
    {
        var table = new TextTable("quantity", ">before", ">after");
        Row("field |B|, T", r => Numbers.WithError(r.Beam.Field, r.FieldError));
        Row("gradient d|B|/dz, T/m", r => Numbers.WithError(r.Beam.Gradient, r.GradientError));
        Row("gradient over the aperture: rms", r => Numbers.Percent(r.Gradient.Rms));
        Row("gradient over the aperture: spread", r => Numbers.Percent(r.Gradient.Spread));
        Row("field × gradient: rms", r => Numbers.Percent(r.FieldTimesGradient.Rms));
        Row("clearance, mm", r => Numbers.Millimetres(r.Clearance));
        BeamTables.WriteTable(writer, table, ink);

        void Row(string name, Func<BeamReport, string> value) => table.Add(name, value(before), value(after));
    }

    private static void Changes(TextWriter writer, TuneResult tuned)
    {
        foreach (FaceMoves face in tuned.Moves)
        {
            writer.WriteLine(FormattableString.Invariant(
                $"  {face.Layer} moved by {Numbers.Significant(1e6 * face.Points.Min(p => p.Move), 3)} to {Numbers.Significant(1e6 * face.Points.Max(p => p.Move), 3)} um over {Numbers.Millimetres(face.Points[^1].ArcLength - face.Points[0].ArcLength, 1)} mm of face"));
        }

        foreach (TunedDimension d in tuned.Dimensions)
        {
            writer.WriteLine(FormattableString.Invariant($"  {d.Name}: {d.Before:g6} before, {d.After:g6} now (mm or degrees)"));
        }
    }

    private static void TradeOff(TextWriter writer, Ink ink, TuneOutcome outcome)
    {
        writer.WriteLine();
        writer.WriteLine(ink.Strong("Gradient against uniformity, each shape solved to full accuracy"));
        var table = new TextTable(">gradient, T/m", ">rms", ">clearance, mm", "limited by");
        foreach (TradeOffPoint p in outcome.TradeOff)
        {
            table.Add(
                Numbers.WithError(Math.Abs(p.Report.Beam.Gradient), p.Report.GradientError),
                Numbers.Percent(outcome.RmsOf(p.Report)),
                Numbers.Millimetres(p.Report.Clearance),
                string.Join("; ", p.Limits.Select(Shortened)));
        }

        BeamTables.WriteTable(writer, table, ink);
    }

    private static string Shortened(string limit) => limit.Split(':')[0];
}
