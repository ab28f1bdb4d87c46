using PoleField.Cli.Text;
using PoleField.Geometry;

namespace PoleField.Cli.Case;

/// <summary>An interval of allowed values, SI.</summary>
internal readonly record struct Allowed(double Min, double Max, bool MinItself = true)
{
    public static Allowed Any { get; } = new(double.NegativeInfinity, double.PositiveInfinity);

    public static Allowed Positive { get; } = new(0, double.PositiveInfinity, MinItself: false);

    public static Allowed NotNegative { get; } = new(0, double.PositiveInfinity);

    public bool Contains(double value) => (MinItself ? value >= Min : value > Min) && value <= Max;

    public string Words(Dimension? dimension)
    {
        string unit = dimension is null || dimension.Shown.Name.Length == 0 ? string.Empty : " " + dimension.Shown.Name;
        string Text(double value) => Numbers.Short(dimension?.Shown.FromSi(value) ?? value, 6) + unit;
        return (Max, MinItself) switch
        {
            (double.PositiveInfinity, false) => Min == 0 ? "greater than 0" : "greater than " + Text(Min),
            (double.PositiveInfinity, true) => "at least " + (Min == 0 ? "0" : Text(Min)),
            (_, false) => $"greater than {Text(Min)} and at most {Text(Max)}",
            _ => $"from {Text(Min)} to {Text(Max)}",
        };
    }
}

/// <summary>
/// Takes typed values out of one table. A key is known once it has been asked for, so the list of known keys cannot
/// drift from what is read; <see cref="Close"/> reports the rest.
/// </summary>
/// <remarks>After a fault the value returned is a stand-in: the case is never built when there are faults.</remarks>
internal sealed class TableReader(TomlTable table, string path, Faults faults)
{
    private readonly List<string> _known = [];

    public Spot At => table.At;

    public Faults Faults => faults;

    public bool Has(string key) => Find(key) is not null;

    /// <summary>Place of a key's value, or of the table when the key is not there.</summary>
    public Spot SpotOf(string key) => table.Find(key)?.Value.At ?? table.At;

    public string Where(string key) => path.Length == 0 ? key : $"{key} in [{path}]";

    public TomlNode? Find(string key)
    {
        if (!_known.Contains(key))
        {
            _known.Add(key);
        }

        return table.Find(key)?.Value;
    }

    public double? Quantity(string key, Dimension dimension, Allowed allowed) =>
        Find(key) is { } node ? QuantityOf(node, Where(key), dimension, allowed) : null;

    public double RequiredQuantity(string key, Dimension dimension, Allowed allowed)
    {
        double? value = Quantity(key, dimension, allowed);
        if (value is null)
        {
            Missing(key, $"\"{dimension.Example}\"");
        }

        return value ?? double.NaN;
    }

    /// <summary>A bare number without unit.</summary>
    public double? Number(string key, Allowed allowed)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlNumber number:
                CheckRange(number.At, Where(key), (number.Value, allowed), null);
                return number.Value;
            case var other:
                WrongType(other, Where(key), "a number without unit", $"{key} = 1.5");
                return double.NaN;
        }
    }

    public int? WholeNumber(string key, int min, int max)
    {
        double? value = Number(key, new Allowed(min, max));
        if (value is { } number && double.IsFinite(number) && number != Math.Round(number))
        {
            faults.Add(SpotOf(key), "out-of-range", $"{Where(key)} must be a whole number.", $"Write {Math.Round(number):F0}.");
        }

        return value is { } v && v >= min && v <= max ? (int)v : null;
    }

    public string? Text(string key)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlText { Value.Length: > 0 } text:
                return text.Value;
            case TomlText empty:
                faults.Add(empty.At, "empty-text", $"{Where(key)} is empty.", "Give a name, or leave the key out.");
                return "?";
            case var other:
                WrongType(other, Where(key), "text in quotes", $"{key} = \"...\"");
                return "?";
        }
    }

    public string RequiredText(string key, string example)
    {
        string? text = Text(key);
        if (text is null)
        {
            Missing(key, $"\"{example}\"");
        }

        return text ?? "?";
    }

    public bool? Flag(string key)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlFlag flag:
                return flag.Value;
            case var other:
                WrongType(other, Where(key), "true or false", $"{key} = true");
                return null;
        }
    }

    /// <summary>One of a few words.</summary>
    public string? Choice(string key, params string[] choices)
    {
        string? text = Text(key);
        if (text is not null && text != "?" && !choices.Contains(text))
        {
            faults.Add(SpotOf(key), "unknown-choice", $"{Where(key)} is \"{text}\".", NearestName.Advice(text, choices));
        }

        return text;
    }

    /// <summary>A pair (y, z) of quantities.</summary>
    public Point? Pair(string key, Dimension dimension)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlList { Items.Count: 2 } list:
                return new Point(
                    QuantityOf(list.Items[0], Where(key), dimension, Allowed.Any),
                    QuantityOf(list.Items[1], Where(key), dimension, Allowed.Any));
            case var other:
                WrongType(other, Where(key), "a pair [y, z]", $"{key} = [\"{dimension.Example}\", \"{dimension.Example}\"]");
                return default(Point);
        }
    }

    public IReadOnlyList<TomlNode>? List(string key, string example)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlList list:
                return list.Items;
            case var other:
                WrongType(other, Where(key), "a list", $"{key} = {example}");
                return [];
        }
    }

    public TableReader? Table(string key)
    {
        switch (Find(key))
        {
            case null:
                return null;
            case TomlTable inner:
                return Inside(inner, key);
            case var other:
                WrongType(other, Where(key), "a table", path.Length == 0 ? $"[{key}]" : $"{key} = {{ ... }}");
                return null;
        }
    }

    public TableReader Inside(TomlTable inner, string key) => new(inner, path.Length == 0 ? key : $"{path}.{key}", faults);

    /// <summary>All entries of a table whose keys are names (layers, quantities), which makes every key known.</summary>
    public IReadOnlyList<TomlEntry> Entries()
    {
        _known.AddRange(table.Entries.Select(e => e.Key));
        return table.Entries;
    }

    public double QuantityOf(TomlNode node, string where, Dimension dimension, Allowed allowed)
    {
        double value;
        switch (node)
        {
            case TomlText text:
                if (Case.Quantity.Read(text.Value, dimension, out value) is { } mistake)
                {
                    faults.Add(text.At, mistake with { Text = $"{where}: {mistake.Text}" });
                    return double.NaN;
                }

                break;
            case TomlNumber number when dimension.Find(string.Empty) is { } bare:
                value = bare.ToSi(number.Value);
                break;
            case TomlNumber number:
                faults.Add(
                    number.At,
                    "missing-unit",
                    FormattableString.Invariant($"{where} is the bare number {number.Value}; {dimension.Name} needs a unit."),
                    FormattableString.Invariant(
                        $"Write it as text with its unit, like \"{number.Value} {dimension.Shown.Name}\" (units: {dimension.Allowed})."));
                return double.NaN;
            default:
                WrongType(node, where, dimension.Name + " in quotes", $"\"{dimension.Example}\"");
                return double.NaN;
        }

        CheckRange(node.At, where, (value, allowed), dimension);
        return value;
    }

    public void Missing(string key, string example) => faults.Add(
        table.At,
        "missing-key",
        path.Length == 0 ? $"The case has no {key}." : $"[{path}] has no {key}.",
        $"Add {key} = {example}.");

    public void WrongType(TomlNode node, string where, string wanted, string example) => faults.Add(
        node.At, "wrong-type", $"{where} is {node.Kind}; {wanted} is needed.", $"Write {example}.");

    /// <summary>Keys nobody asked for so far.</summary>
    public IEnumerable<string> Unknown => UnknownEntries.Select(e => e.Key);

    private IEnumerable<TomlEntry> UnknownEntries => table.Entries.Where(e => !_known.Contains(e.Key));

    /// <summary>Reports every key nobody asked for.</summary>
    public void Close()
    {
        foreach (TomlEntry entry in UnknownEntries)
        {
            string what = entry.Value is TomlTable && path.Length == 0 ? $"Unknown table [{entry.Key}]" : $"Unknown key \"{entry.Key}\"";
            faults.Add(
                entry.At,
                "unknown-key",
                path.Length == 0 ? what + "." : $"{what} in [{path}].",
                NearestName.Advice(entry.Key, _known));
        }
    }

    private void CheckRange(Spot at, string where, (double Value, Allowed Allowed) given, Dimension? dimension)
    {
        if (!double.IsFinite(given.Value) || !given.Allowed.Contains(given.Value))
        {
            string found = Numbers.Short(dimension?.Shown.FromSi(given.Value) ?? given.Value, 6);
            string unit = dimension is null ? string.Empty : " " + dimension.Shown.Name;
            faults.Add(
                at, "out-of-range", $"{where} is {found}{unit}.", $"It must be {given.Allowed.Words(dimension)}.");
        }
    }
}
