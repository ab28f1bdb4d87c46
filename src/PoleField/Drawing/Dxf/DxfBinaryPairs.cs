using System.Buffers.Binary;

namespace PoleField.Drawing;

/// <summary>Pairs of a binary drawing: group codes of one byte (R12) or two, values by the range of the code.</summary>
internal sealed class DxfBinaryPairs : DxfPairs
{
    private const byte LongCode = 255;

    private readonly DxfBytes _bytes;
    private readonly bool _wideCodes;
    private Kind _kind;
    private int _valueLength;
    private int _valueEnd;

    /// <summary>Starts after the file's mark.</summary>
    public DxfBinaryPairs(DxfBytes bytes, DxfReport report, DxfLimits limits)
        : base(report, limits)
    {
        _bytes = bytes;

        // The first pair is group 0 with a text: its first letter is the second byte, or the third of two-byte codes.
        _bytes.Need(2);
        _wideCodes = _bytes.Ahead is [0, 0, ..];
    }

    private enum Kind
    {
        Text,
        Real,
        Short,
        Integer,
        Long,
        Truth,
        Chunk,
    }

    /// <summary>The mark binary files begin with.</summary>
    public static ReadOnlySpan<byte> Mark => "AutoCAD Binary DXF\r\n\u001a\0"u8;

    /// <inheritdoc/>
    public override string Text => _kind == Kind.Text ? Texts.Decode(Value.Trim(" \t"u8)) : string.Empty;

    /// <inheritdoc/>
    public override string Where => FormattableString.Invariant($" at byte {_bytes.Position}");

    private ReadOnlySpan<byte> Value => _bytes.Ahead[.._valueLength];

    /// <inheritdoc/>
    public override bool TryReal(out double value)
    {
        value = _kind == Kind.Real ? BinaryPrimitives.ReadDoubleLittleEndian(Value) : double.NaN;
        return double.IsFinite(value);
    }

    /// <inheritdoc/>
    public override bool TryInteger(out long value)
    {
        value = _kind switch
        {
            Kind.Short => BinaryPrimitives.ReadInt16LittleEndian(Value),
            Kind.Integer => BinaryPrimitives.ReadInt32LittleEndian(Value),
            Kind.Long => BinaryPrimitives.ReadInt64LittleEndian(Value),
            Kind.Truth => Value[0],
            _ => 0,
        };
        return _kind is Kind.Short or Kind.Integer or Kind.Long or Kind.Truth;
    }

    /// <inheritdoc/>
    protected override bool Move()
    {
        _bytes.Skip(_valueEnd);
        _valueEnd = 0;
        if (!_bytes.Need(1))
        {
            return false;
        }

        Code = ReadCode();
        _kind = KindOf(Code);
        switch (_kind)
        {
            case Kind.Text:
                FindText();
                break;
            case Kind.Chunk:
                Demand(1);
                Take(1 + _bytes.Ahead[0]);
                break;
            default:
                Take(_kind switch { Kind.Real or Kind.Long => 8, Kind.Integer => 4, Kind.Short => 2, _ => 1 });
                break;
        }

        return true;
    }

    private int ReadCode()
    {
        if (!_wideCodes && _bytes.Ahead[0] != LongCode)
        {
            int code = _bytes.Ahead[0];
            _bytes.Skip(1);
            return code;
        }

        int lead = _wideCodes ? 0 : 1;
        Demand(lead + 2);
        int wide = BinaryPrimitives.ReadInt16LittleEndian(_bytes.Ahead[lead..]);
        _bytes.Skip(lead + 2);
        return wide;
    }

    private Kind KindOf(int code) => code switch
    {
        >= 0 and <= 9 => Kind.Text,
        <= 59 and >= 10 => Kind.Real,
        <= 79 and >= 60 => Kind.Short,
        <= 99 and >= 90 => Kind.Integer,
        100 or 101 or 102 or 105 => Kind.Text,
        <= 149 and >= 110 => Kind.Real,
        <= 169 and >= 160 => Kind.Long,
        <= 179 and >= 170 => Kind.Short,
        <= 239 and >= 210 => Kind.Real,
        <= 289 and >= 270 => Kind.Short,
        <= 299 and >= 290 => Kind.Truth,
        <= 309 and >= 300 => Kind.Text,
        <= 319 and >= 310 => Kind.Chunk,
        <= 369 and >= 320 => Kind.Text,
        <= 389 and >= 370 => Kind.Short,
        <= 399 and >= 390 => Kind.Text,
        <= 409 and >= 400 => Kind.Short,
        <= 419 and >= 410 => Kind.Text,
        <= 429 and >= 420 => Kind.Integer,
        <= 439 and >= 430 => Kind.Text,
        <= 459 and >= 440 => Kind.Integer,
        <= 469 and >= 460 => Kind.Real,
        <= 481 and >= 470 => Kind.Text,
        1004 => Kind.Chunk,
        999 or (<= 1009 and >= 1000) => Kind.Text,
        <= 1059 and >= 1010 => Kind.Real,
        <= 1070 and >= 1060 => Kind.Short,
        1071 => Kind.Integer,
        _ => throw Report.Stop(
            "bad-group-code",
            FormattableString.Invariant($"{code} is not a group code (byte {_bytes.Position} of the binary file)."),
            "The file is damaged; export the drawing again."),
    };

    private void FindText()
    {
        int from = 0;
        while (true)
        {
            int at = _bytes.Ahead[from..].IndexOf((byte)0);
            if (at >= 0)
            {
                _valueLength = from + at;
                _valueEnd = _valueLength + 1;
                return;
            }

            from = _bytes.Ahead.Length;
            if (from > Limits.ValueBytes)
            {
                throw Report.Stop(
                    "limit",
                    FormattableString.Invariant($"The text at byte {_bytes.Position} is longer than {Limits.ValueBytes} bytes."),
                    "The file is damaged or not a drawing; export it again.");
            }

            Demand(from + 1);
        }
    }

    private void Take(int length)
    {
        Demand(length);
        _valueLength = length;
        _valueEnd = length;
    }

    private void Demand(int length)
    {
        if (!_bytes.Need(length))
        {
            throw Truncated("inside a pair");
        }
    }
}
