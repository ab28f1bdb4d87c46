using System.Buffers.Text;
using System.Globalization;

namespace PoleField.Drawing;

/// <summary>Pairs of a text drawing: a line with the group code, a line with the value.</summary>
internal sealed class DxfTextPairs(DxfBytes bytes, DxfReport report, DxfLimits limits) : DxfPairs(report, limits)
{
    private const byte CarriageReturn = (byte)'\r';
    private const byte LineFeed = (byte)'\n';
    private const int LowestCode = -5;
    private const int HighestCode = 1071;
    private const int HandleCode = 5;

    private int _lines;
    private int _valueLength;
    private int _valueEnd;
    private string? _text; // the value, once somebody asked for it

    /// <inheritdoc/>
    public override string Text => _text ??= Texts.Decode(Trimmed(Value), mayRepeat: Code != HandleCode);

    /// <inheritdoc/>
    public override string Where => FormattableString.Invariant($" after line {_lines}");

    // The value stays in the window until the next move.
    private ReadOnlySpan<byte> Value => bytes.Ahead[.._valueLength];

    /// <inheritdoc/>
    public override bool TryReal(out double value) =>
        double.TryParse(Trimmed(Value), NumberStyles.AllowLeadingSign | NumberStyles.AllowDecimalPoint | NumberStyles.AllowExponent, CultureInfo.InvariantCulture, out value)
        && double.IsFinite(value);

    /// <inheritdoc/>
    public override bool TryInteger(out long value)
    {
        ReadOnlySpan<byte> text = Trimmed(Value);
        return Utf8Parser.TryParse(text, out value, out int used) && used == text.Length;
    }

    /// <inheritdoc/>
    protected override bool Move()
    {
        do
        {
            bytes.Skip(_valueEnd);
            _valueEnd = 0;
            _text = null;
            if (!bytes.Need(1))
            {
                return false;
            }

            int length = FindLine(out int end);
            Line = _lines;
            if (!bytes.Need(end + 1))
            {
                throw Truncated("between a group code and its value");
            }

            ReadCode(bytes.Ahead[..length]);
            bytes.Skip(end);

            _valueLength = FindLine(out _valueEnd);
        }
        while (Code == 999);
        return true;
    }

    private void ReadCode(ReadOnlySpan<byte> line)
    {
        ReadOnlySpan<byte> text = Trimmed(line);
        bool number = Utf8Parser.TryParse(text, out int code, out int used) && used == text.Length;
        if (!number || code < LowestCode || code > HighestCode)
        {
            throw Report.Stop(
                "bad-group-code",
                $"\"{DxfReport.Shown(Texts.Decode(text))}\" is not a group code ({LowestCode} to {HighestCode}): from here on the pairs of code and value are out of step.",
                "Export the drawing again; if it was edited by hand, look for a lost or extra line just before this one.",
                new DxfPlace(Line));
        }

        Code = code;
    }

    private static ReadOnlySpan<byte> Trimmed(ReadOnlySpan<byte> text)
    {
        int from = 0, to = text.Length;
        while (from < to && text[from] is (byte)' ' or (byte)'\t')
        {
            from++;
        }

        while (from < to && text[to - 1] is (byte)' ' or (byte)'\t')
        {
            to--;
        }

        return text[from..to];
    }

    // Length of the line ahead and where the next one begins. Ends of line: LF, CR LF, CR, CR CR LF.
    private int FindLine(out int end)
    {
        _lines++;
        int from = 0;
        while (true)
        {
            int at = bytes.Ahead[from..].IndexOfAny(CarriageReturn, LineFeed, (byte)0);
            if (at >= 0)
            {
                at += from;
                end = EndOfLine(at);
                return at;
            }

            from = bytes.Ahead.Length;
            if (from > Limits.ValueBytes)
            {
                throw Report.Stop(
                    "limit",
                    FormattableString.Invariant($"The line is longer than {Limits.ValueBytes} bytes."),
                    "The file is damaged or not a drawing; export it again.",
                    new DxfPlace(_lines));
            }

            if (!bytes.Need(from + 1))
            {
                end = from;
                return from;
            }
        }
    }

    private int EndOfLine(int at)
    {
        byte mark = bytes.Ahead[at];
        if (mark == 0)
        {
            throw Report.Stop(
                "nul-bytes",
                "The line holds a NUL byte: the file is damaged.",
                "Copy or export the drawing again.",
                new DxfPlace(_lines));
        }

        if (mark == LineFeed)
        {
            return at + 1;
        }

        bytes.Need(at + 3);
        ReadOnlySpan<byte> after = bytes.Ahead[(at + 1)..];
        return after.StartsWith([LineFeed]) ? at + 2 : after.StartsWith([CarriageReturn, LineFeed]) ? at + 3 : at + 1;
    }
}
