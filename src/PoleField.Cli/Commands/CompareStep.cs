using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield compare CASE.toml</c>: the computed field against that of two wires.</summary>
internal static class CompareStep
{
    public static AnalysisStep Create() => new("compare", "The computed field against the two-wire approximation.")
    {
        Examples =
        [
            ("polefield compare magnet.toml", "fits wires, prints k = aG/B and the deviations, writes magnet.compare.json"),
            ("polefield compare magnet.toml --json | jq .two_wire", "the same for programs"),
        ],
        Endings = _ => [".compare.json"],
        Run = request =>
        {
            TwoWireComparison comparison = ComparisonOf(request.Solved);
            return new Analysis(
                (writer, ink) => AnswerOf(request.Solved, comparison).Write(writer, ink, request.Solved.Case.Case!.Title),
                [s => TwoWireJson.Write(AnalysisOutput.HeadOf(request.Solved), comparison, s)]);
        },
        Report = new ReportPart([ComparisonFigure.MapName, ComparisonFigure.ProfilesName], AddTo),
    };

    /// <summary>What a case states of its wires.</summary>
    public static StatedWires WiresOf(CaseFile file) => new(file.TwoWire.HalfSpacing, file.TwoWire.Midpoint);

    private static TwoWireComparison ComparisonOf(SolvedCase solved) =>
        TwoWireComparison.Of(solved.Solved.Field, WiresOf(solved.Case.Case!));

    private static Answer AnswerOf(SolvedCase solved, TwoWireComparison comparison) =>
        CompareText.Of(comparison, solved.Solved.Record.AccuracyReached);

    private static ReportPage AddTo(AnalysisRequest request, ReportPage page)
    {
        SolvedCase solved = request.Solved;
        TwoWireComparison comparison;
        try
        {
            comparison = ComparisonOf(solved);
        }
        catch (InputException)
        {
            return page; // poles of another kind have nothing to compare
        }

        return page with
        {
            TwoWire = AnswerOf(solved, comparison).ForPage(
                new ReportPicture(ComparisonFigure.Map(solved.Solved.Field, comparison)),
                new ReportPicture(ComparisonFigure.Lines(solved.Solved.Report, comparison))),
        };
    }
}
