using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Design;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield tolerance CASE.toml</c>: what each error costs, and where on the face it matters.</summary>
internal static class ToleranceStep
{
    private const double Loosest = 200e-6; // metres; common practice: what any mill keeps without asking
    private const double UsualAllowance = 0.005; // of the gradient; common practice

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
                ("polefield tolerance magnet.toml", "prints the budget, writes magnet.tolerance.json"),
                ("polefield tolerance magnet.toml --verify 50", "also solves 50 magnets with random errors"),
            ],
            Options = [verify],
            Endings = _ => [".tolerance.json"],
            Pictures = [ToleranceFigure.Name],
            IsInReport = file => file.Tolerance is not null,
            Run = request => Run(request, request.Arguments.GetResult(verify) is null ? 0 : request.Arguments.GetValue(verify)),
        };
    }

    private static Analysis Run(AnalysisRequest request, int draws)
    {
        SolvedCase solved = request.Solved;
        ToleranceSection section = solved.Case.Case!.Tolerance ?? new ToleranceSection();
        int threads = request.Options.Threads;
        request.Progress(SolveProgress.Of("sensitivities"));
        var budget = ToleranceBudget.Of(Sensitivity.Of(solved.Solved, threads), TolerancesOf(section));
        double share = section.AllowGradient ?? UsualAllowance;
        var allowances = new FormAllowances(share, budget.Allowances(1, share * Math.Abs(budget.Derivatives[1].Value), Loosest));
        ToleranceTrial? trial = draws == 0
            ? null
            : ToleranceTrial.Run(budget, solved.Solved.Field.Aperture, new TrialOptions(draws, threads), Solved, request.Cancellation);
        var answer = new ToleranceAnswer(budget, allowances, trial);
        return new Analysis(
            ToleranceText.Of(answer, Loosest), [s => AnalysisJson.Write(ResultOutput.HeadOf(solved), answer, s)])
        {
            Pictures = [new ReportPicture(ToleranceFigure.Draw(budget, allowances))],
        };

        void Solved(int magnets) => request.Progress(SolveProgress.Of(FormattableString.Invariant($"magnet {magnets} of {draws} with random errors")));
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
}
