using System.Globalization;
using PoleField.Cli.Case;

namespace PoleField.Cli.Text;

/// <summary>The one way numbers are written for people.</summary>
internal static class Numbers
{
    // An error bar is an estimate: two digits of it say all there is.
    private const int ErrorDigits = 2;

    /// <summary>A number with a number of significant digits, without exponent where that stays readable.</summary>
    public static string Significant(double value, int digits = 5)
    {
        if (!double.IsFinite(value))
        {
            return "-";
        }

        if (value == 0)
        {
            return "0";
        }

        int exponent = Exponent(value);
        return exponent is < -4 or > 7
            ? value.ToString((digits > 1 ? "0." + new string('#', digits - 1) : "0") + "e0", CultureInfo.InvariantCulture)
            : Fixed(value, Math.Max(0, digits - 1 - exponent));
    }

    /// <summary>"312.41 ± 0.25": both with the digits the error bar warrants.</summary>
    public static string WithError(double value, double error)
    {
        if (!(error > 0) || !double.IsFinite(error) || !double.IsFinite(value))
        {
            return Significant(value);
        }

        int decimals = ErrorDigits - 1 - Exponent(error);
        return decimals is < 0 or > 9
            ? $"{Significant(value, 6)} ± {Significant(error, ErrorDigits)}"
            : $"{Fixed(value, decimals)} ± {Fixed(error, decimals)}";
    }

    /// <summary>A value in the unit its kind is shown in, unit included.</summary>
    public static string InUnit(double value, Dimension dimension) =>
        $"{Short(dimension.Shown.FromSi(value))} {dimension.Shown.Name}".TrimEnd();

    /// <summary>A value with its error bar in the unit its kind is shown in.</summary>
    public static string InUnit(Measured measured, Dimension dimension)
    {
        Unit unit = dimension.Shown;
        return $"{WithError(unit.FromSi(measured.Value), unit.FromSi(measured.Error))} {unit.Name}".TrimEnd();
    }

    /// <summary>As short as the value allows: at most the given significant digits, no zeros at the end.</summary>
    public static string Short(double value, int digits = 6)
    {
        string text = Significant(value, digits);
        return text.Contains('.', StringComparison.Ordinal) && !text.Contains('e', StringComparison.Ordinal)
            ? text.TrimEnd('0').TrimEnd('.')
            : text;
    }

    /// <summary>Two digits with exponent, for accuracies: "1e-4".</summary>
    public static string Accuracy(double value) => value.ToString("0.#e0", CultureInfo.InvariantCulture);

    public static string Millimetres(double metres, int decimals = 3) => Fixed(metres * 1e3, decimals);

    public static string Percent(double ratio) => $"{Significant(ratio * 100, 3)} %";

    public static string Fixed(double value, int decimals)
    {
        string text = value.ToString("F" + decimals.ToString(CultureInfo.InvariantCulture), CultureInfo.InvariantCulture);
        return text.StartsWith('-') && text.All(c => c is '-' or '0' or '.') ? text[1..] : text;
    }

    // Decimal exponent after rounding to two digits, so that 0.0996 counts as 0.10.
    private static int Exponent(double value)
    {
        string text = Math.Abs(value).ToString("0.0e0", CultureInfo.InvariantCulture);
        return int.Parse(text[(text.IndexOf('e', StringComparison.Ordinal) + 1)..], CultureInfo.InvariantCulture);
    }
}
