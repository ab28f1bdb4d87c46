using System.Text;

namespace PoleField.Drawing;

/// <summary>Says what a file is that is no DXF, by its first bytes.</summary>
internal static class DxfForeign
{
    /// <summary>Bytes that are looked at.</summary>
    public const int Beginning = 512;

    /// <summary>What the file is, or null when it may be a drawing in DXF.</summary>
    public static string? Recognise(ReadOnlySpan<byte> ahead)
    {
        ReadOnlySpan<byte> first = ahead.Length > Beginning ? ahead[..Beginning] : ahead;
        ReadOnlySpan<byte> text = first.Trim(" \t\r\n"u8);
        if (text.IsEmpty)
        {
            return first.IsEmpty ? "empty" : "blank";
        }

        if (!first.ContainsAnyExcept((byte)0))
        {
            return "nothing but NUL bytes";
        }

        return Binary(first) ?? Markup(text) ?? Other(text);
    }

    private static string? Binary(ReadOnlySpan<byte> first) => first switch
    {
        [0x1F, 0x8B, ..] => "compressed with gzip (unpack it first)",
        [(byte)'P', (byte)'K', 3 or 5, ..] => "a ZIP archive (unpack it first)",
        [0xFD, (byte)'7', (byte)'z', (byte)'X', (byte)'Z', ..] => "compressed with xz (unpack it first)",
        [(byte)'7', (byte)'z', 0xBC, ..] => "a 7z archive (unpack it first)",
        [(byte)'%', (byte)'P', (byte)'D', (byte)'F', ..] => "a PDF document",
        [(byte)'%', (byte)'!', (byte)'P', (byte)'S', ..] => "a PostScript document",
        [0x89, (byte)'P', (byte)'N', (byte)'G', ..] => "a PNG picture",
        [0xFF, 0xD8, 0xFF, ..] => "a JPEG picture",
        [(byte)'G', (byte)'I', (byte)'F', (byte)'8', ..] => "a GIF picture",
        [(byte)'B', (byte)'M', _, _, _, _, 0, 0, 0, 0, ..] => "a BMP picture",
        [(byte)'I', (byte)'I', 42, 0, ..] or [(byte)'M', (byte)'M', 0, 42, ..] => "a TIFF picture",
        [0x7F, (byte)'E', (byte)'L', (byte)'F', ..] or [(byte)'M', (byte)'Z', ..] => "a program",
        [(byte)'A', (byte)'C', (byte)'1', (byte)'0', >= (byte)'0' and <= (byte)'9', >= (byte)'0' and <= (byte)'9', ..] =>
            $"a DWG drawing (version {Encoding.ASCII.GetString(first[..6])})",
        _ => null,
    };

    private static string? Markup(ReadOnlySpan<byte> text)
    {
        if (text[0] != (byte)'<')
        {
            return null;
        }

        string start = Encoding.Latin1.GetString(text);
        bool Has(string word) => start.Contains(word, StringComparison.OrdinalIgnoreCase);
        return Has("<svg") ? "an SVG picture" : Has("<html") || Has("<!doctype html") ? "a web page (HTML)" : "an XML document";
    }

    private static string? Other(ReadOnlySpan<byte> text)
    {
        if (text.StartsWith("ISO-10303-21"u8))
        {
            return "a STEP model";
        }

        if (text.StartsWith("solid "u8))
        {
            return "an STL model";
        }

        // A drawing begins with a group code.
        byte first = text[0];
        if (first is (>= (byte)'0' and <= (byte)'9') or (byte)'-' or (byte)'+')
        {
            return null;
        }

        string shown = DxfReport.Shown(Encoding.Latin1.GetString(text[..Math.Min(24, text.Length)]));
        return $"of an unknown kind (it begins with \"{shown}\")";
    }
}
