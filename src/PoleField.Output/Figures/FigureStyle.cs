using System.Globalization;
using OxyPlot;
using OxyPlot.Axes;

namespace PoleField.Output.Figures;

/// <summary>How a line is drawn; kinds differ by dash as well as by shade so that a grey print keeps them apart.</summary>
/// <param name="Colour">Colour.</param>
/// <param name="Thickness">Thickness, points.</param>
/// <param name="Dash">Lengths of dashes and gaps in multiples of the thickness; empty for a solid line.</param>
internal sealed record Pen(OxyColor Colour, double Thickness, params double[] Dash);

/// <summary>The common look: dark text on white paper, thin frames, units on every axis, colour maps of even lightness.</summary>
internal static class FigureStyle
{
    public const string Font = "DejaVu Sans";
    public const double TextSize = 12;
    public const double SmallSize = 11;
    public const double TitleSize = 14.5;
    public const double LineHeight = 16;
    private const double WhiteShare = 0.36;

    public static OxyColor Paper { get; } = OxyColors.White;

    public static OxyColor Ink { get; } = OxyColor.FromRgb(0x1c, 0x1e, 0x22);

    public static OxyColor Soft { get; } = OxyColor.FromRgb(0x6b, 0x70, 0x78);

    public static OxyColor Grid { get; } = OxyColor.FromRgb(0xe3, 0xe5, 0xe8);

    public static OxyColor Veil { get; } = OxyColor.FromAColor(0xdc, OxyColors.White);

    /// <summary>The computed curve.</summary>
    public static Pen Main { get; } = new(OxyColor.FromRgb(0x0b, 0x3c, 0x6f), 2.0);

    /// <summary>A curve to compare with.</summary>
    public static Pen Reference { get; } = new(OxyColor.FromRgb(0xc0, 0x6a, 0x12), 1.8, 5, 3);

    /// <summary>Outlines of parts.</summary>
    public static Pen Outline { get; } = new(Ink, 1.5);

    /// <summary>Outline of the aperture.</summary>
    public static Pen Aperture { get; } = new(Ink, 1.6, 4, 2.5);

    /// <summary>Field lines and contours.</summary>
    public static Pen Contour { get; } = new(Ink, 0.8);

    /// <summary>
    /// Colours for unsigned values, dark to light (cividis: Nuñez, Anderton and Renslow, PLoS ONE 13 (2018) e0199239), mixed
    /// with white so that dark lines and names show on all of them; the lightness stays monotone.
    /// </summary>
    public static IReadOnlyList<OxyColor> Unsigned { get; } =
        [.. OxyPalettes.Cividis(256).Colors.Select(c => OxyColor.Interpolate(c, OxyColors.White, WhiteShare))];

    /// <summary>
    /// Colours for signed deviations: blue below, white at zero, brown above. The lightness is even on both sides, so in
    /// grey only the size is seen; figures that use it add contours, dashed below zero.
    /// </summary>
    public static IReadOnlyList<OxyColor> Signed { get; } = MakeSigned();

    /// <summary>A number as figures show it: invariant, a true minus sign, at most the given significant digits.</summary>
    public static string Number(double value, int digits = 4)
    {
        if (!double.IsFinite(value))
        {
            return "–";
        }

        if (value == 0.0)
        {
            return "0";
        }

        int decimals = digits - 1 - (int)Math.Floor(Math.Log10(Math.Abs(value)));
        string text = decimals is >= 0 and <= 8 || (decimals < 0 && decimals > -4)
            ? Math.Round(value, Math.Max(0, decimals)).ToString("0.########", CultureInfo.InvariantCulture)
            : value.ToString("0.###e0", CultureInfo.InvariantCulture);
        return text.Replace('-', '−');
    }

    /// <summary>The largest of 1, 2, 5 times a power of ten that is not above the value, which must be positive.</summary>
    public static double NiceStep(double value)
    {
        double power = Math.Pow(10, Math.Floor(Math.Log10(value)));
        double mantissa = value / power;
        return (mantissa >= 5 ? 5 : mantissa >= 2 ? 2 : 1) * power;
    }

    /// <summary>An axis with its quantity and unit.</summary>
    public static LinearAxis Axis(AxisPosition position, string title, double from, double to) => Dress(
        new LinearAxis { Position = position, Minimum = from, Maximum = to, LabelFormatter = v => Tick(v) }, title);

    /// <summary>A logarithmic axis with its quantity and unit.</summary>
    public static LogarithmicAxis LogAxis(AxisPosition position, string title, double from, double to) => Dress(
        new LogarithmicAxis { Position = position, Minimum = from, Maximum = to, LabelFormatter = PowerOfTen }, title);

    private static string Tick(double value) =>
        (Math.Abs(value) < 1e-12 ? "0" : value.ToString("G6", CultureInfo.InvariantCulture)).Replace('-', '−');

    private static string PowerOfTen(double value)
    {
        const string superscripts = "⁰¹²³⁴⁵⁶⁷⁸⁹";
        int power = (int)Math.Round(Math.Log10(value));
        return Math.Abs((value / Math.Pow(10, power)) - 1) > 1e-9 ? "" : power switch
        {
            0 => "1",
            1 => "10",
            < 0 => "10⁻" + superscripts[-power],
            _ => "10" + superscripts[power],
        };
    }

    private static T Dress<T>(T axis, string title)
        where T : Axis
    {
        axis.Title = title;
        axis.TitleFontSize = TextSize;
        axis.FontSize = SmallSize;
        axis.AxisTitleDistance = 8;
        axis.TickStyle = TickStyle.Outside;
        axis.MajorTickSize = 5;
        axis.MinorTickSize = 2.5;
        axis.TicklineColor = Soft;
        axis.AxislineColor = Ink;
        axis.MajorGridlineStyle = LineStyle.Solid;
        axis.MajorGridlineColor = Grid;
        axis.MajorGridlineThickness = 0.8;
        axis.CropGridlines = true;
        axis.IsZoomEnabled = false;
        axis.IsPanEnabled = false;
        return axis;
    }

    private static List<OxyColor> MakeSigned()
    {
        OxyColor[] stops =
        [
            OxyColor.FromRgb(0x14, 0x3d, 0x73), OxyColor.FromRgb(0x5b, 0x8e, 0xc4), OxyColor.FromRgb(0xfa, 0xfa, 0xf8),
            OxyColor.FromRgb(0xc9, 0x8a, 0x4b), OxyColor.FromRgb(0x6e, 0x3a, 0x0c),
        ];
        List<OxyColor> colours = [];
        for (int i = 0; i < 255; i++)
        {
            double place = i / 254.0 * (stops.Length - 1);
            int k = Math.Min((int)place, stops.Length - 2);
            colours.Add(OxyColor.Interpolate(stops[k], stops[k + 1], place - k));
        }

        return colours;
    }
}
