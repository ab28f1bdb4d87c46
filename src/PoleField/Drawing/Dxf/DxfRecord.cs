using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The pairs of one entity as they stand in the file; used again for the next one.</summary>
internal sealed class DxfRecord(DxfReport report, DxfLimits limits)
{
    private readonly List<(int Code, double Value)> _numbers = [];
    private readonly List<(int Code, int Line, string Text)> _bad = [];
    private bool _wanted;

    /// <summary>Entity as the format names it.</summary>
    public string Kind { get; private set; } = string.Empty;

    /// <summary>Line of the entity's group 0.</summary>
    public int Line { get; private set; }

    /// <summary>Layer as written.</summary>
    public string Layer { get; private set; } = "0";

    /// <summary>Handle.</summary>
    public string? Handle { get; private set; }

    /// <summary>Line type; null means that of the layer.</summary>
    public string? LineType { get; private set; }

    /// <summary>Name of the block an INSERT shows.</summary>
    public string? Name { get; private set; }

    /// <summary>True when the entity is marked invisible.</summary>
    public bool IsInvisible => Integer(60) == 1;

    /// <summary>True when it lies on a paper sheet.</summary>
    public bool IsOnPaper => Integer(67) == 1;

    /// <summary>True after a group that must be there was found missing or repeated.</summary>
    public bool IsIncomplete { get; private set; }

    /// <summary>All numbers, in the order of the file.</summary>
    public IReadOnlyList<(int Code, double Value)> Numbers => _numbers;

    /// <summary>Where the entity is, for messages.</summary>
    public DxfPlace Place => new(Line, Layer, Handle);

    /// <summary>Starts a new entity.</summary>
    /// <param name="kind">Kind of the entity.</param>
    /// <param name="line">Its line.</param>
    /// <param name="wanted">True when its numbers are to be read.</param>
    public void Begin(string kind, int line, bool wanted)
    {
        (Kind, Line, Layer, Handle, LineType, Name) = (kind, line, "0", null, null, null);
        _numbers.Clear();
        _bad.Clear();
        _wanted = wanted;
        IsIncomplete = false;
    }

    /// <summary>Takes the present pair.</summary>
    public void Add(DxfPairs pairs)
    {
        switch (pairs.Code)
        {
            case 2:
                Name = pairs.Text;
                break;
            case 5:
                Handle = pairs.Text;
                break;
            case 6:
                LineType = pairs.Text;
                break;
            case 8:
                Layer = pairs.Text;
                break;
            case 60 or 67:
            case (>= 70 and <= 79) when _wanted:
                AddInteger(pairs);
                break;
            case ((>= 10 and <= 59) or 210 or 220 or 230) when _wanted:
                AddReal(pairs);
                break;
        }
    }

    /// <summary>Reports the bad numbers; true when there were none.</summary>
    public bool IsSound()
    {
        foreach ((int code, int line, string text) in _bad)
        {
            bool comma = text.Contains(',', StringComparison.Ordinal);
            string number = code is >= 60 and <= 79 ? "whole number" : comma ? "number" : "finite number";
            report.Fault(
                "bad-number",
                $"\"{DxfReport.Shown(text)}\" is not a {number} ({Kind} on layer {DxfReport.Shown(Layer)}, {DxfWords.Meaning(Kind, code)}).",
                comma ? "Export with a decimal point." : "Export the drawing again.",
                new DxfPlace(line, Layer, Handle));
        }

        return _bad.Count == 0;
    }

    /// <summary>The integer of a group, or a default when it is not there.</summary>
    public long Integer(int code, long otherwise = 0) => (long)Real(code, otherwise);

    /// <summary>The number of a group, or a default when it is not there.</summary>
    public double Real(int code, double otherwise)
    {
        foreach ((int c, double value) in _numbers)
        {
            if (c == code)
            {
                return value;
            }
        }

        return otherwise;
    }

    /// <summary>The number of a group that must be there once; a fault and not-a-number otherwise.</summary>
    public double Required(int code)
    {
        double found = double.NaN;
        int count = 0;
        foreach ((int c, double value) in _numbers)
        {
            if (c == code)
            {
                found = value;
                count++;
            }
        }

        if (count != 1)
        {
            IsIncomplete = true;
            string meaning = DxfWords.Meaning(Kind, code);
            string has = count == 0 ? $"has no {meaning}" : FormattableString.Invariant($"has {meaning} {count} times");
            report.Fault(
                "missing-value",
                $"{Kind} on layer {DxfReport.Shown(Layer)} {has} (group {code}); it must be there once.",
                "The entity is damaged; export the drawing again or draw it anew.",
                Place);
            return double.NaN;
        }

        return found;
    }

    /// <summary>The point of the groups code (y) and code + 10 (z), which must be there once.</summary>
    public Point RequiredPoint(int code) => new(Required(code), Required(code + 10));

    private void AddReal(DxfPairs pairs)
    {
        if (pairs.TryReal(out double value))
        {
            Add(pairs.Code, value);
        }
        else
        {
            _bad.Add((pairs.Code, pairs.Line, pairs.Text));
        }
    }

    private void AddInteger(DxfPairs pairs)
    {
        if (pairs.TryInteger(out long value))
        {
            Add(pairs.Code, value);
        }
        else
        {
            _bad.Add((pairs.Code, pairs.Line, pairs.Text));
        }
    }

    private void Add(int code, double value)
    {
        // A vertex has at most four numbers of its own: two or three coordinates and a bulge or two widths.
        if (_numbers.Count > 5L * limits.Vertices)
        {
            throw report.Stop(
                "limit",
                FormattableString.Invariant($"{Kind} has more than {limits.Vertices} vertices."),
                "The file is damaged or hostile; export it again with coarser curves.",
                Place);
        }

        _numbers.Add((code, value));
    }
}
