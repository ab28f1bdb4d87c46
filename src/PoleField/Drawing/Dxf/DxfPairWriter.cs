using System.Globalization;
using System.Text;

namespace PoleField.Drawing;

/// <summary>Writes pairs of group code and value as ASCII text.</summary>
internal sealed class DxfPairWriter(Stream stream) : IDisposable
{
    private readonly StreamWriter _out = new(stream, Encoding.ASCII, leaveOpen: true) { NewLine = "\r\n" };

    /// <summary>A text.</summary>
    public DxfPairWriter Text(int code, string value)
    {
        _out.Write(code.ToString(CultureInfo.InvariantCulture).PadLeft(3));
        _out.WriteLine();
        _out.WriteLine(Escaped(value));
        return this;
    }

    /// <summary>A whole number.</summary>
    public DxfPairWriter Whole(int code, long value) => Text(code, value.ToString(CultureInfo.InvariantCulture));

    /// <summary>A handle.</summary>
    public DxfPairWriter Handle(int code, int value) => Text(code, value.ToString("X", CultureInfo.InvariantCulture));

    /// <summary>A number with as many digits as it takes to read the same number again.</summary>
    public DxfPairWriter Real(int code, double value)
    {
        // Zero without a sign; a number that looks whole still reads as a real.
        string text = (value + 0.0).ToString("R", CultureInfo.InvariantCulture);
        return Text(code, text.AsSpan().ContainsAny('.', 'E') ? text : text + ".0");
    }

    /// <summary>A point of the plane at height 0: groups code, code + 10 and code + 20.</summary>
    public DxfPairWriter Place(int code, Geometry.Point p) => Flat(code, p).Real(code + 20, 0);

    /// <summary>A point of the plane: groups code and code + 10.</summary>
    public DxfPairWriter Flat(int code, Geometry.Point p) => Real(code, p.Y).Real(code + 10, p.Z);

    /// <inheritdoc/>
    public void Dispose() => _out.Dispose();

    private static string Escaped(string text)
    {
        if (Ascii.IsValid(text))
        {
            return text;
        }

        var escaped = new StringBuilder();
        foreach (char c in text)
        {
            if (char.IsAscii(c))
            {
                escaped.Append(c);
            }
            else
            {
                escaped.Append(CultureInfo.InvariantCulture, $"\\U+{(int)c:X4}");
            }
        }

        return escaped.ToString();
    }
}
