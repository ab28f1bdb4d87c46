namespace PoleField.Drawing;

/// <summary>Units of length by the codes of $INSUNITS.</summary>
internal static class DxfUnits
{
    private const double Inch = 0.0254;
    private const double Foot = 0.3048;

    // US survey foot: 1200/3937 m (Mendenhall order 1893).
    private const double SurveyFoot = 1200.0 / 3937.0;

    // Astronomical unit, light year and parsec: IAU 2012 and 2015 resolutions.
    private static readonly LengthUnit?[] ByCode =
    [
        null,
        new("in", Inch),
        new("ft", Foot),
        new("mi", 5280 * Foot),
        LengthUnit.Millimetre,
        new("cm", 1e-2),
        new("m", 1),
        new("km", 1e3),
        new("uin", 1e-6 * Inch),
        new("mil", 1e-3 * Inch),
        new("yd", 3 * Foot),
        new("angstrom", 1e-10),
        new("nm", 1e-9),
        new("um", 1e-6),
        new("dm", 1e-1),
        new("dam", 1e1),
        new("hm", 1e2),
        new("Gm", 1e9),
        new("au", 149597870700.0),
        new("ly", 9460730472580800.0),
        new("pc", 149597870700.0 * 648000 / Math.PI),
        new("US survey ft", SurveyFoot),
        new("US survey in", SurveyFoot / 12),
        new("US survey yd", 3 * SurveyFoot),
        new("US survey mi", 5280 * SurveyFoot),
    ];

    /// <summary>The unit of a code, null for 0 (no unit) and unknown codes.</summary>
    public static LengthUnit? Of(long code) => code > 0 && code < ByCode.Length ? ByCode[code] : null;

    /// <summary>The code of a unit, 0 when the format has none.</summary>
    public static int CodeOf(LengthUnit unit) => Math.Max(0, Array.FindIndex(ByCode, u => u?.Metres == unit.Metres));

    /// <summary>True for units of the inch family.</summary>
    public static bool IsImperial(int code) => code is 1 or 2 or 3 or 8 or 9 or 10 or >= 21;
}
