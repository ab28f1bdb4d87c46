using System.CommandLine;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Design;
using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield tolerance CASE.toml</c>: what each error costs, and where on the face it matters.</summary>
internal static class ToleranceStep
{
    private const double Loosest = 200e-6; // metres; common practice: what any mill keeps without asking
    private static readonly double[] Series = [5.0, 2.0, 1.0];

    private const double TooFarFromLinear = 0.2; // of the deviation found, from which on a warning says so

    public static AnalysisStep Create()
    {
        var verify = new Option<int>("--verify")
        {
            Description = "Solve N magnets with random errors of the assumed size and compare them with the linear budget.",
            HelpName = "N",
        };
        verify.Validators.Add(r =>
        {
            if (r.GetValueOrDefault<int>() is < 0 or 1 or > 10000)
            {
                r.AddError("--verify takes a number of magnets from 2 to 10000.");
            }
        });
        return new AnalysisStep("tolerance", "How much each error of shape, place, current and material moves field, gradient and spread; where on the face it matters.")
        {
            Examples =
            [
                ("polefield tolerance magnet.toml", "prints the budget, writes magnet.tolerance.json and a picture of the faces"),
                ("polefield tolerance magnet.toml --verify 50", "also solves 50 magnets with random errors"),
            ],
            Options = [verify],
            Endings = _ => [".tolerance.json", ".tolerance.svg"],
            Run = request => Run(request, request.Arguments.GetValue(verify)),
        };
    }

    private static Analysis Run(AnalysisRequest request, int draws)
    {
        SolvedCase solved = request.Solved;
        ToleranceSection section = solved.Case.Case!.Tolerance ?? new ToleranceSection();
        int threads = request.Options.Threads;
        var budget = ToleranceBudget.Of(Sensitivity.Of(solved.Solved, threads), TolerancesOf(section));
        IReadOnlyList<FormAllowance> allowances = section.AllowGradient is { } share
            ? budget.Allowances(1, share * Math.Abs(budget.Derivatives[1].Value), Loosest)
            : [];
        ToleranceTrial? trial = draws == 0
            ? null
            : ToleranceTrial.Run(budget, solved.Solved.Field.Aperture, new TrialOptions(draws, threads), null, request.Cancellation);
        ResultFile head = ResultJson.ToFile(ResultOutput.Of(solved));
        return new Analysis(
            (writer, ink) => Print(writer, ink, (solved.Case.Case.Title, section.AllowGradient), (budget, allowances, trial)),
            [
                s => ToleranceJson.Write(head, budget, allowances, (trial, s)),
                s => FigureWriter.Svg(ToleranceFigure.Draw(budget), s),
            ]);
    }

    // What a case does not state is taken from common practice of a good workshop and supply.
    private static Tolerances TolerancesOf(ToleranceSection s) => new()
    {
        FormSize = s.FormSize ?? 10e-6,
        FormLength = s.FormLength ?? 2e-3,
        PlaceY = s.PlaceY ?? 20e-6,
        PlaceZ = s.PlaceZ ?? 20e-6,
        Turn = s.Turn ?? 0.5e-3,
        AmpereTurns = s.AmpereTurns ?? 1e-3,
        Saturation = s.Saturation ?? 0.01,
        BeamY = s.BeamY ?? 50e-6,
        BeamZ = s.BeamZ ?? 50e-6,
    };

    private static void Print(
        TextWriter writer,
        Ink ink,
        (string Title, double? Allowed) of,
        (ToleranceBudget Budget, IReadOnlyList<FormAllowance> Allowances, ToleranceTrial? Trial) result)
    {
        ToleranceBudget budget = result.Budget;
        writer.WriteLine(ink.Strong(of.Title));
        writer.WriteLine();
        writer.WriteLine(ink.Strong("Tolerance budget, one sigma"));
        var table = new TextTable("what is off", ">assumed", ">field", ">gradient", ">spread, points");
        foreach (ToleranceContribution c in budget.Contributions)
        {
            Row(table, budget, (c.Name, c.Assumed), c.OneSigma);
        }

        Row(table, budget, ("together (root of squares)", string.Empty), budget.Total);
        Row(table, budget, ("all at one sigma, worst signs", string.Empty), budget.Worst);
        WriteLines(writer, table, ink);
        if (result.Allowances.Count > 0)
        {
            Allowances(writer, ink, result.Budget, (result.Allowances, of.Allowed!.Value));
        }

        if (result.Trial is { } trial)
        {
            Trial(writer, ink, budget, trial);
        }
    }

    private static void Row(TextTable table, ToleranceBudget budget, (string Name, string Assumed) what, IReadOnlyList<double> effects) =>
        table.Add(
            what.Name,
            what.Assumed,
            Percent(effects[0] / Math.Abs(budget.Derivatives[0].Value)),
            Percent(effects[1] / Math.Abs(budget.Derivatives[1].Value)),
            Percent(effects[2]));

    private static void Allowances(
        TextWriter writer, Ink ink, ToleranceBudget budget, (IReadOnlyList<FormAllowance> Stretches, double Allowed) of)
    {
        writer.WriteLine();
        writer.WriteLine(ink.Strong($"Loosest form, one sigma, that keeps the gradient within {Percent(of.Allowed)}"));
        var table = new TextTable("face", ">from y, z, mm", ">to y, z, mm", ">form, um");
        int k = 0;
        while (k < of.Stretches.Count)
        {
            FormAllowance first = of.Stretches[k];
            double step = Preferred(first.OneSigma);
            int last = k;
            while (last + 1 < of.Stretches.Count && of.Stretches[last + 1].Face == first.Face && Preferred(of.Stretches[last + 1].OneSigma) == step)
            {
                last++;
            }

            Face face = budget.Faces[first.Face];
            table.Add(
                face.Layer,
                Place(face.At(first.From).At),
                Place(face.At(of.Stretches[last].To).At),
                step >= Preferred(Loosest) ? $"{Numbers.Short(1e6 * step)} or more" : Numbers.Short(1e6 * step));
            k = last + 1;
        }

        WriteLines(writer, table, ink);
    }

    // Rounded down to 1, 2 or 5 times a power of ten.
    private static double Preferred(double size)
    {
        double decade = Math.Pow(10, Math.Floor(Math.Log10(size * 1e6)));
        return 1e-6 * Series.Select(m => m * decade).First(s => s <= size * 1e6 * (1 + 1e-9));
    }

    private static void Trial(TextWriter writer, Ink ink, ToleranceBudget budget, ToleranceTrial trial)
    {
        writer.WriteLine();
        writer.WriteLine(ink.Strong(FormattableString.Invariant($"{trial.Draws} magnets with random errors, solved anew")));
        var table = new TextTable("one sigma", ">field", ">gradient", ">spread, points");
        Effects("of the budget", trial.Predicted);
        Effects("found", trial.Found);
        Effects("beyond the linear prediction", trial.Residual);
        WriteLines(writer, table, ink);
        writer.WriteLine($"  sampling error of what was found: {Percent(trial.SamplingError)} of it");
        if (Enumerable.Range(0, 2).Any(q => trial.Residual[q] > TooFarFromLinear * trial.Found[q]))
        {
            writer.WriteLine("  The errors are too large for the linear budget; take the figures found.");
        }

        if (trial.Residual[2] > TooFarFromLinear * trial.Found[2])
        {
            writer.WriteLine("  The spread does not follow the linear budget (in a symmetric magnet it grows with a shift of either sign); take the figures found.");
        }

        void Effects(string name, IReadOnlyList<double> effects) => table.Add(
            name,
            Percent(effects[0] / Math.Abs(budget.Derivatives[0].Value)),
            Percent(effects[1] / Math.Abs(budget.Derivatives[1].Value)),
            Percent(effects[2]));
    }

    private static string Percent(double ratio) => $"{Numbers.Significant(100 * ratio, 2)} %";

    private static string Place(Geometry.Point p) => $"{Numbers.Millimetres(p.Y, 2)}, {Numbers.Millimetres(p.Z, 2)}";

    private static void WriteLines(TextWriter writer, TextTable table, Ink ink)
    {
        foreach (string line in table.Lines(ink))
        {
            writer.WriteLine(line);
        }
    }
}
