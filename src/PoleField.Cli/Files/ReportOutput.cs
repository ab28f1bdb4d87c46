using PoleField.Beam;
using PoleField.Cli.Text;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>Lays a result out as a report's page.</summary>
internal static class ReportOutput
{
    /// <summary>Names of the pictures of the solve.</summary>
    public static IReadOnlyList<string> Pictures { get; } = [.. CasePictures.OfSolution.Names, "gradient-map", ProfileFigure.Name, "saturation"];

    /// <summary>Names of the pictures that a result file alone gives.</summary>
    public static IReadOnlyList<string> PicturesOfResult { get; } = [ProfileFigure.Name];

    /// <summary>The page that a result file alone gives: all its numbers, and the profiles.</summary>
    public static ReportPage PageOf(ResultFile result)
    {
        Profiles computed = ProfilesOf(result);
        bool drawable = computed.AlongY.Count > 1 && computed.AlongZ.Count > 1;
        return new ReportPage
        {
            Result = result,
            Aperture = drawable ? [new ReportPicture(ProfileFigure.Draw(computed, Lines), ProfileNumbers.Of(result.Aperture))] : [],
            Sections = [.. OperationText.Of(result).Select(o => o.Answer.ForPage(o.Id, []))],
        };
    }

    /// <summary>The page with everything the solve itself tells.</summary>
    public static ReportPage PageOf(SolvedCase solved)
    {
        ResultFile result = ResultOutput.FileOf(solved);
        FieldScene scene = FieldScene.Of(solved.Solved);
        return PageOf(result) with
        {
            Field = [.. CasePictures.DrawField(scene).Select(f => new ReportPicture(f))],
            Aperture = [new ReportPicture(CasePictures.DrawGradient(solved.Solved)), BesideWires(solved, result)],
            Saturation = scene.IsIron.Any(iron => iron) ? new ReportPicture(SaturationFigure.Draw(scene)) : null,
        };
    }

    private const string Lines = "Lines through the beam's centre, inside the aperture.";

    // The wires are those of compare: stated by the case or fitted to the computed field; none where no two wires are near.
    private static ReportPicture BesideWires(SolvedCase solved, ResultFile result)
    {
        Figure figure;
        try
        {
            TwoWireComparison near = TwoWireComparison.Of(solved.Solved.Field, solved.Case.Case!.Wires);
            figure = ComparisonFigure.Lines(solved.Solved.Report, near);
        }
        catch (InputException)
        {
            figure = ProfileFigure.Draw(ProfilesOf(result), Lines + " No field of two wires is near this one.");
        }

        return new ReportPicture(figure, ProfileNumbers.Of(result.Aperture));
    }

    private static Profiles ProfilesOf(ResultFile result) => new(
        "computed",
        [.. result.Aperture.ProfileY.Select(v => new ProfilePoint(1e-3 * Known(v.Y), Known(v.Field), Known(v.Gradient)))],
        [.. result.Aperture.ProfileZ.Select(v => new ProfilePoint(1e-3 * Known(v.Z), Known(v.Field), Known(v.Gradient)))]);

    private static double Known(double? value) => value ?? double.NaN;
}
