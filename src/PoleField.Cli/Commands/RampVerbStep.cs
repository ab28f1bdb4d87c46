using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield ramp CASE.toml</c>: the excitation curve and the onset of saturation.</summary>
internal static class RampVerbStep
{
    public static AnalysisStep Create() => new("ramp", "Excitation curve: field, gradient, spread and iron flux density against ampere-turns, onset of saturation.")
    {
        Examples =
        [
            ("polefield ramp magnet.toml", "prints the curve, writes magnet.ramp.json"),
            ("polefield ramp magnet.toml --json | jq .onset_factor", "the onset for programs"),
        ],
        Endings = _ => [".ramp.json"],
        Pictures = [ExcitationFigure.Name],
        IsInReport = file => !ReferenceEquals(file.Ramp, RampSection.Default),
        Run = request =>
        {
            RampReport ramp = Curve(request);
            return new Analysis(RampText.Of(ramp), [s => AnalysisJson.Write(ResultOutput.HeadOf(request.Solved), ramp, s)])
            {
                Pictures = [new ReportPicture(ExcitationFigure.Draw(ramp, RampText.Onset(ramp)))],
                Met = ramp.AccuracyMet,
            };
        },
    };

    private static RampReport Curve(AnalysisRequest request)
    {
        CaseFile file = request.Solved.Case.Case!;
        var settings = new RampSettings(file.Ramp.Factors, file.Ramp.Onset, file.Wires);
        return Ramp.Of(request.Solved.Solved, settings, request.Options, request.Progress, request.Cancellation);
    }
}
