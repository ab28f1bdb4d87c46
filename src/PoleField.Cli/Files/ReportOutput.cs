using PoleField.Beam;
using PoleField.Cli.Text;
using PoleField.Output.Figures;
using PoleField.Output.Pages;

namespace PoleField.Cli.Files;

/// <summary>Lays the solve of a case out as a report's page.</summary>
internal static class ReportOutput
{
    /// <summary>Names of the pictures of the solve.</summary>
    public static IReadOnlyList<string> Pictures { get; } = [.. CasePictures.OfSolution.Names, "gradient-map", "profiles", "saturation"];

    /// <summary>The page with everything the solve itself tells.</summary>
    public static ReportPage PageOf(SolvedCase result)
    {
        SolvedMagnet solved = result.Solved;
        FieldScene scene = FieldScene.Of(solved);
        return new ReportPage
        {
            Result = ResultOutput.Of(result),
            Field = [.. CasePictures.DrawField(scene).Select(f => new ReportPicture(f))],
            Aperture = [new ReportPicture(CasePictures.DrawGradient(solved)), Profiles(result)],
            Coil = CoilText.Coils(solved.Solution.Magnet, result.Case.Case?.Length)?.ForPage(),
            StrayField = CoilText.StrayFieldOf(solved)?.ForPage(),
            Saturation = scene.IsIron.Any(iron => iron) ? new ReportPicture(SaturationFigure.Draw(scene)) : null,
        };
    }

    /// <summary>All pictures of a page in its order.</summary>
    public static IReadOnlyList<Figure> PicturesOf(ReportPage page)
    {
        ReportSection?[] sections =
            [page.TwoWire, page.Ramp, page.Tolerance, page.Tuning, page.Coil, page.StrayField, page.Deflection, .. page.Further];
        IEnumerable<ReportPicture> pictures = page.Aperture.Concat(page.Field).Concat(page.Saturation is { } iron ? [iron] : [])
            .Concat(sections.OfType<ReportSection>().SelectMany(s => s.Pictures));
        return [.. pictures.Select(p => p.Figure)];
    }

    // Wires stated by the case are drawn beside; they carry the current that gives the computed field at the beam.
    private static ReportPicture Profiles(SolvedCase result)
    {
        BeamReport report = result.Solved.Report;
        var computed = new Profiles("computed", report.ProfileY, report.ProfileZ);
        string caption = "Lines through the beam's centre, inside the aperture.";
        Profiles? wires = null;
        if (result.Case.Case?.TwoWire is { HalfSpacing: { } a } stated)
        {
            wires = new TwoWireCurve(a, stated.Midpoint ?? default, report.Beam).Along(report);
            caption += FormattableString.Invariant($" Two-wire field: half spacing {1e3 * a:g4} mm, scaled to the computed field at the beam.");
        }

        return new ReportPicture(ProfileFigure.Draw(computed, caption, wires), ProfileNumbers.Of(report));
    }
}
