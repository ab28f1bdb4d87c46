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
        Run = request =>
        {
            RampReport ramp = Curve(request);
            return new Analysis(
                (writer, ink) => RampText.Of(ramp).Write(writer, ink, request.Solved.Case.Case!.Title),
                [s => RampJson.Write(AnalysisOutput.HeadOf(request.Solved), ramp, s)],
                ramp.AccuracyMet);
        },
        Report = new ReportPart(["excitation"], AddTo),
    };

    private static RampReport Curve(AnalysisRequest request)
    {
        CaseFile file = request.Solved.Case.Case!;
        var settings = new RampSettings(file.Ramp.Factors, file.Ramp.Onset, CompareStep.WiresOf(file));
        return Ramp.Of(request.Solved.Solved, settings, request.Options, request.Progress, request.Cancellation);
    }

    private static ReportPage AddTo(AnalysisRequest request, ReportPage page)
    {
        bool asked = !ReferenceEquals(request.Solved.Case.Case!.Ramp, RampSection.Default);
        if (!asked || !(request.Solved.Solved.Report.Circuit.AmpereTurns > 0))
        {
            return page;
        }

        RampReport ramp = Curve(request);
        ExcitationPoint[] points = [.. ramp.Steps.Prepend(ramp.Start).Select(
            s => new ExcitationPoint(s.AmpereTurns, s.Report.Beam.Field, s.Report.Beam.Gradient))];
        Figure figure = ExcitationFigure.Draw(
            points, ramp.OnsetFactor * request.Solved.Solved.Report.Circuit.AmpereTurns, RampText.Onset(ramp));
        return page with { Ramp = RampText.Of(ramp).ForPage(new ReportPicture(figure)) };
    }
}
