using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Design;
using PoleField.Output.Results;

namespace PoleField.Cli.Text;

/// <summary>Tells what tuning found.</summary>
internal static class TuneText
{
    public static Answer Of(TuneOutcome outcome, IReadOnlyList<Verdict> verdicts)
    {
        List<AnswerTable> tables = outcome.After is { } after ? [BeforeAndAfter(outcome.Before, after)] : [];
        TuneResult tuned = outcome.Tuned;
        if (tuned.Moves.Count > 0)
        {
            tables.Add(new AnswerTable(
                "Moves of the faces, outward where positive",
                ["face", ">least, um", ">most, um", ">length of face, mm"],
                [.. tuned.Moves.Select(m => new[]
                {
                    m.Layer,
                    Numbers.Significant(1e6 * m.Points.Min(p => p.Move), 3),
                    Numbers.Significant(1e6 * m.Points.Max(p => p.Move), 3),
                    Numbers.Millimetres(m.Points[^1].ArcLength - m.Points[0].ArcLength, 1),
                })]));
        }

        if (tuned.Dimensions.Count > 0)
        {
            tables.Add(new AnswerTable(
                "Dimensions, mm or degrees",
                ["dimension", ">before", ">now"],
                [.. tuned.Dimensions.Select(d => new[] { d.Name, Numbers.Short(d.Before), Numbers.Short(d.After) })]));
        }

        if (verdicts.Count > 0)
        {
            tables.Add(new AnswerTable("What must hold", ["name", "bound", "found", "verdict"], [.. verdicts.Select(Verdict)]));
        }

        if (outcome.TradeOff.Count > 1)
        {
            tables.Add(TradeOff(outcome));
        }

        return new Answer("Tuning", tables, Remarks(outcome));
    }

    private static AnswerTable BeforeAndAfter(BeamReport before, BeamReport after)
    {
        return new AnswerTable(
            "Before and after, each solved to full accuracy",
            ["quantity", ">before", ">after"],
            [
                Row("field |B|, T", r => Numbers.WithError(r.Beam.Field, r.FieldError)),
                Row("gradient d|B|/dz, T/m", r => Numbers.WithError(r.Beam.Gradient, r.GradientError)),
                Row("gradient over the aperture: rms", r => Numbers.Percent(r.Gradient.Rms)),
                Row("gradient over the aperture: spread", r => Numbers.Percent(r.Gradient.Spread)),
                Row("field × gradient: rms", r => Numbers.Percent(r.FieldTimesGradient.Rms)),
                Row("clearance, mm", r => Numbers.Millimetres(r.Clearance)),
            ]);

        string[] Row(string name, Func<BeamReport, string> value) => [name, value(before), value(after)];
    }

    private static string[] Verdict(Verdict v) =>
    [
        v.Limit.Name,
        Numbers.InUnit(v.Limit.Bound, v.Limit.Quantity.Dimension),
        v.Found is { } m ? Numbers.InUnit(m, v.Limit.Quantity.Dimension) : "-",
        v.Met ? "met" : "not met: best found is written",
    ];

    private static AnswerTable TradeOff(TuneOutcome outcome) => new(
        "Gradient against uniformity, each shape solved to full accuracy",
        [">gradient, T/m", ">rms", ">clearance, mm", "limited by"],
        [.. outcome.TradeOff.Select(p => new[]
        {
            Numbers.WithError(Math.Abs(p.Report.Beam.Gradient), p.Report.GradientError),
            Numbers.Percent(outcome.RmsOf(p.Report)),
            Numbers.Millimetres(p.Report.Clearance),
            string.Join("; ", p.Limits.Select(limit => limit.Split(':')[0])),
        })]);

    private static List<string> Remarks(TuneOutcome outcome)
    {
        TuneState state = outcome.Tuned.State;
        List<string> remarks = [];
        if (outcome.After is null)
        {
            TuneStep last = state.Steps.Last(s => s.Accepted);
            remarks.Add("Stopped: not yet solved to full accuracy.");
            remarks.Add($"By the steps' own meshes: rms {Numbers.Percent(last.Rms)}, gradient {Numbers.Significant(last.Gradient)} T/m.");
        }

        remarks.Add(FormattableString.Invariant($"{state.Steps.Count - 1} steps, {state.Solves} solves."));
        remarks.Add("What limits it: " + string.Join("; ", outcome.Tuned.Limits) + ".");
        return remarks;
    }
}
