using PoleField.Beam;
using PoleField.Output.Figures;

namespace PoleField.Output.Pages;

/// <summary>The numbers behind the profile figure.</summary>
public static class ProfileNumbers
{
    /// <summary>Both profiles of a report as one table.</summary>
    public static ReportTable Of(BeamReport report) => new(
        "Profiles through the beam's centre",
        ["along", "y (mm)", "z (mm)", "|B| (T)", "d|B|/dz (T/m)"],
        [.. report.ProfileY.Select(v => Row("y", v)), .. report.ProfileZ.Select(v => Row("z", v))]);

    private static IReadOnlyList<string> Row(string along, BeamValues v) =>
    [
        along, FigureStyle.Number(1e3 * v.At.Y, 5), FigureStyle.Number(1e3 * v.At.Z, 5), FigureStyle.Number(v.Field, 7), FigureStyle.Number(v.Gradient, 7),
    ];
}
