using PoleField.Output.Results;

namespace PoleField.Output.Pages;

/// <summary>The numbers behind the profile figure.</summary>
public static class ProfileNumbers
{
    private const int Digits = 7;

    /// <summary>Both profiles of a result as one table.</summary>
    public static ReportTable Of(ApertureSection aperture) => new(
        "Profiles through the beam's centre",
        ["along", "place (mm)", "|B| (T)", "d|B|/dz (T/m)"],
        [
            .. aperture.ProfileY.Select(v => Row("y", v.Y, v.Field, v.Gradient)),
            .. aperture.ProfileZ.Select(v => Row("z", v.Z, v.Field, v.Gradient)),
        ]);

    private static IReadOnlyList<string> Row(string along, double? place, double? field, double? gradient) =>
        [along, ResultTables.Number(place), ResultTables.Number(field, Digits), ResultTables.Number(gradient, Digits)];
}
