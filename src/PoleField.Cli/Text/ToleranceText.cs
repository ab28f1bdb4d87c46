using PoleField.Design;
using PoleField.Output.Results;

namespace PoleField.Cli.Text;

/// <summary>Tells a tolerance budget.</summary>
internal static class ToleranceText
{
    private static readonly string[] Names = ["field", "gradient", "spread", "mean gradient", "rms"];
    private static readonly string[] Columns = [">field", ">gradient", ">spread, points", ">mean", ">rms, points"];

    /// <summary>The budget in words.</summary>
    /// <param name="answer">Budget, allowances and trial.</param>
    /// <param name="loosest">Form error that is not exceeded in allowances, metres.</param>
    public static Answer Of(ToleranceAnswer answer, double loosest)
    {
        ToleranceBudget budget = answer.Budget;
        List<AnswerTable> tables =
        [
            new(
                "Tolerance budget, one sigma",
                ["what is off", ">assumed", .. Columns],
                [
                    .. budget.Contributions.Select(c => (string[])[c.Name, c.Assumed, .. Effects(budget, c.OneSigma)]),
                    ["together (root of squares)", string.Empty, .. Effects(budget, budget.Total)],
                    ["all at one sigma, worst signs", string.Empty, .. Effects(budget, budget.Worst)],
                ]),
            new(
                $"Loosest form, one sigma, that keeps the gradient within {Percent(answer.Allowances.Gradient)}",
                ["face", ">from y, z, mm", ">to y, z, mm", ">form, um"],
                [.. Stretches(answer, loosest)]),
        ];
        if (answer.Trial is { } trial)
        {
            tables.Add(new AnswerTable(
                FormattableString.Invariant($"{trial.Draws} magnets with random errors, solved anew"),
                ["one sigma", .. Columns],
                [
                    ["of the budget", .. Effects(budget, trial.Predicted)],
                    ["found", .. Effects(budget, trial.Found)],
                    ["beyond the linear prediction", .. Effects(budget, trial.Residual)],
                ]));
        }

        return new Answer("Tolerances", tables, Remarks(answer.Trial));
    }

    private static string[] Effects(ToleranceBudget budget, IReadOnlyList<double> effects) =>
    [
        Percent(effects[0] / Math.Abs(budget.Derivatives[0].Value)),
        Percent(effects[1] / Math.Abs(budget.Derivatives[1].Value)),
        Percent(effects[2]),
        Percent(effects[3] / Math.Abs(budget.Derivatives[3].Value)),
        Percent(effects[4]),
    ];

    // Neighbouring stretches of one face with the same rounded allowance are one row.
    private static IEnumerable<string[]> Stretches(ToleranceAnswer answer, double loosest)
    {
        IReadOnlyList<FormAllowance> all = answer.Allowances.Stretches;
        int k = 0;
        while (k < all.Count)
        {
            FormAllowance first = all[k];
            double step = Preferred(first.OneSigma);
            int last = k;
            while (last + 1 < all.Count && all[last + 1].Face == first.Face && Preferred(all[last + 1].OneSigma) == step)
            {
                last++;
            }

            Face face = answer.Budget.Faces[first.Face];
            string form = Numbers.Short(1e6 * step);
            yield return
            [
                face.Layer, Place(face.At(first.From).At), Place(face.At(all[last].To).At), step >= Preferred(loosest) ? $"{form} or more" : form,
            ];
            k = last + 1;
        }
    }

    // Rounded down to 1, 2 or 5 times a power of ten.
    private static double Preferred(double size)
    {
        double decade = Math.Pow(10, Math.Floor(Math.Log10(size * 1e6)));
        double lead = (size * 1e6 * (1 + 1e-9) / decade) switch { >= 5 => 5, >= 2 => 2, _ => 1 };
        return 1e-6 * lead * decade;
    }

    private static List<string> Remarks(ToleranceTrial? trial)
    {
        List<string> remarks =
        [
            "Each row moves field and gradient at the beam, and spread, mean and rms of the gradient over the aperture, by this much at one sigma; rows are taken as independent.",
        ];
        if (trial is null)
        {
            return remarks;
        }

        remarks.Add($"Sampling error of what was found: {Percent(trial.SamplingError)} of it.");
        string[] beyond = [.. Names.Where((_, q) => trial.IsBeyondLinear(q) || trial.Disagrees(q))];
        if (beyond.Length > 0)
        {
            remarks.Add($"The linear budget is not enough for {string.Join(", ", beyond)}: take the figures found. "
                + "(Spread and rms of a symmetric magnet grow with a shift of either sign, which no derivative knows.)");
        }

        return remarks;
    }

    private static string Percent(double ratio) => $"{Numbers.Significant(100 * ratio, 2)} %";

    private static string Place(Geometry.Point p) => $"{Numbers.Millimetres(p.Y, 2)}, {Numbers.Millimetres(p.Z, 2)}";
}
