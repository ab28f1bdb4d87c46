using PoleField.Beam;
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
        Pictures = [ComparisonFigure.GradientName, ComparisonFigure.FieldName, ProfileFigure.Name],
        IsInReport = _ => true,
        Run = request =>
        {
            SolvedMagnet solved = request.Solved.Solved;
            TwoWireComparison comparison = TwoWireComparison.Of(solved.Field, request.Solved.Case.Case!.Wires);
            return new Analysis(
                CompareText.Of(comparison, solved.Record.AccuracyReached),
                [s => AnalysisJson.Write(ResultOutput.HeadOf(request.Solved), comparison, s)])
            {
                Pictures =
                [
                    new ReportPicture(ComparisonFigure.Gradient(solved.Field, comparison)),
                    new ReportPicture(ComparisonFigure.Field(solved.Field, comparison)),
                    new ReportPicture(ComparisonFigure.Lines(solved.Report, comparison)),
                ],
            };
        },
    };
}
