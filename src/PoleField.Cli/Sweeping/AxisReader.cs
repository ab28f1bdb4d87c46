using System.Globalization;
using PoleField.Cli.Case;

namespace PoleField.Cli.Sweeping;

/// <summary>Reads <c>--vary PATH=VALUES</c> against the values of a case.</summary>
/// <param name="values">All values of the case.</param>
internal sealed class AxisReader(IReadOnlyList<(IReadOnlyList<string> Keys, TomlNode Node)> values)
{
    private const int MostValues = 100_000;
    private const string Form = "Write PATH=START:STOP:COUNT or PATH=VALUE,VALUE,...: beam.width=2mm:4mm:5, parts.COIL*.ampere_turns=x0.5:x1.5:5.";

    /// <summary>The axis.</summary>
    /// <exception cref="InputException">It is not in that form, or the case has no such value.</exception>
    public Axis Read(string text)
    {
        int equals = text.IndexOf('=', StringComparison.Ordinal);
        if (equals < 1 || CasePath.Parse(text[..equals]) is not { } path)
        {
            throw Fault("vary-form", $"--vary {text} has no path of the case and values.", Form);
        }

        TomlNode[] places = [.. values.Where(v => path.Matches(v.Keys)).Select(v => v.Node)];
        if (places.Length == 0)
        {
            string[] known = [.. values.Select(v => string.Join('.', v.Keys).Replace(".[", "[", StringComparison.Ordinal)).Distinct()];
            throw Fault("vary-unknown", $"The case has no value {path.Text}.", NearestName.Advice(path.Text, known));
        }

        string[] words = [.. text[(equals + 1)..].Split(',').SelectMany(part => Spread(path, part.Trim()))];
        return words.Any(w => w.Length == 0)
            ? throw Fault("vary-form", $"--vary {path.Text} has an empty value.", Form)
            : Bound(path, places, words);
    }

    private static Axis Bound(CasePath path, TomlNode[] places, string[] words)
    {
        bool factor = words[0].StartsWith('x') && CaseChange.Split(words[0][1..]).Number is not null;
        string[] plain = factor ? [.. words.Select(w => w.StartsWith('x') ? w[1..] : w)] : words;
        (double? Number, string Unit)[] parsed = [.. plain.Select(CaseChange.Split)];
        (double? Number, string Unit)[] now = [.. places.Select(CaseChange.Split)];
        bool numbers = now.All(n => n.Number is not null);
        if (!numbers && (factor || now.Any(n => n.Number is not null)))
        {
            throw Fault("vary-kind", $"{path.Text} leads to words, which have no factor and no numbers beside them.", "Narrow the path, or list words.");
        }

        if (!numbers)
        {
            return new Axis(path, string.Empty, IsFactor: false, plain) { WritesBare = true };
        }

        string[] units = [.. parsed.Select(p => p.Unit).Where(u => u.Length > 0).Distinct()];
        string[] unitsNow = [.. now.Select(p => p.Unit).Distinct()];
        if (parsed.Any(p => p.Number is null) || units.Length > 1 || (factor && units.Length > 0) || (!factor && units.Length == 0 && unitsNow.Length > 1))
        {
            throw Fault("vary-kind", $"The values of {path.Text} are {string.Join(", ", words)}.", "Write numbers in one unit, or factors like x0.5 without unit.");
        }

        string unit = factor ? string.Empty : units.FirstOrDefault() ?? unitsNow[0];
        string shown = factor || unit.Length > 0 ? unit : BareUnit(path.Text);
        return new Axis(path, shown, factor, [.. parsed.Select(p => p.Number!.Value.ToString("R", CultureInfo.InvariantCulture))]) { WritesBare = unit.Length == 0 };
    }

    // The unit a bare number has there.
    private static string BareUnit(string path) => path switch
    {
        _ when path.EndsWith(".ampere_turns", StringComparison.OrdinalIgnoreCase) => "A",
        _ when path.EndsWith(".direction", StringComparison.OrdinalIgnoreCase) => "deg",
        _ => string.Empty,
    };

    // START:STOP:COUNT as single values; anything else as it is.
    private static IEnumerable<string> Spread(CasePath path, string text)
    {
        string[] parts = text.Split(':');
        if (parts.Length == 1)
        {
            return [text];
        }

        string mark = parts[0].StartsWith('x') ? "x" : string.Empty;
        (double? start, string startUnit) = CaseChange.Split(parts[0][mark.Length..]);
        (double? stop, string stopUnit) = CaseChange.Split(parts.Length > 1 && parts[1].StartsWith('x') ? parts[1][1..] : parts[1]);
        if (parts.Length != 3
            || start is not { } first
            || stop is not { } last
            || (startUnit.Length > 0 && stopUnit.Length > 0 && startUnit != stopUnit)
            || !int.TryParse(parts[2], NumberStyles.None, CultureInfo.InvariantCulture, out int count)
            || count is < 2 or > MostValues)
        {
            throw Fault("vary-form", $"--vary {path.Text}={text} is no range.", $"Write START:STOP:COUNT with numbers in one unit and a count from 2 to {MostValues}.");
        }

        string unit = startUnit.Length > 0 ? startUnit : stopUnit;
        return Enumerable.Range(0, count).Select(i => FormattableString.Invariant(
            $"{mark}{CaseChange.Rounded(((first * (count - 1 - i)) + (last * i)) / (count - 1)):R} {unit}").TrimEnd());
    }

    private static InputException Fault(string what, string text, string fix) => new([new Finding(Severity.Fault, what, text, fix)]);
}
