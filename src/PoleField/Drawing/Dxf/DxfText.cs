using System.Globalization;
using System.Text;
using System.Text.RegularExpressions;

namespace PoleField.Drawing;

/// <summary>Turns the bytes of texts into strings: code pages, UTF-8, and \U+XXXX escapes.</summary>
internal sealed partial class DxfText
{
    private const int MostKept = 10_000;
    private const int LongestKept = 128;

    private static readonly Encoding StrictUtf8 = new UTF8Encoding(false, throwOnInvalidBytes: true);

    private readonly Dictionary<string, string> _kept = [];
    private Encoding? _fallback;
    private bool _utf8First = true;

    /// <summary>All bytes are UTF-8, whatever the header says.</summary>
    public bool IsUtf8 { get; set; }

    /// <summary>Name of the encoding, for people.</summary>
    public string Name => IsUtf8 || _fallback is null ? "UTF-8" : _fallback.WebName;

    /// <summary>Sets the encoding from the header's version and code page. Returns false when the code page is unknown.</summary>
    public bool Choose(string? version, string? codePage)
    {
        // From AC1021 (2007) on, texts are UTF-8.
        bool modern = string.CompareOrdinal(version, "AC1021") >= 0 && version?.Length == 6;
        _utf8First = IsUtf8 || modern || codePage is null;
        _fallback = PageNumber(codePage) is { } number ? Page(number) : null;
        return codePage is null || _fallback is not null;
    }

    /// <summary>The text of some bytes.</summary>
    /// <param name="bytes">The bytes.</param>
    /// <param name="mayRepeat">True for names, which come again and again and are kept.</param>
    public string Decode(ReadOnlySpan<byte> bytes, bool mayRepeat = true)
    {
        if (mayRepeat && bytes.Length <= LongestKept && Ascii.IsValid(bytes))
        {
            Span<char> text = stackalloc char[bytes.Length];
            Encoding.ASCII.GetChars(bytes, text);
            var lookup = _kept.GetAlternateLookup<ReadOnlySpan<char>>();
            if (lookup.TryGetValue(text, out string? known))
            {
                return known;
            }

            string decoded = Unescape(text.ToString());
            if (_kept.Count < MostKept)
            {
                lookup[text] = decoded;
            }

            return decoded;
        }

        return Unescape(DecodeRaw(bytes));
    }

    private string DecodeRaw(ReadOnlySpan<byte> bytes)
    {
        if (_utf8First)
        {
            try
            {
                return StrictUtf8.GetString(bytes);
            }
            catch (DecoderFallbackException)
            {
                // Old files without a code page: the code page below.
            }
        }

        return (_fallback ?? Page(1252) ?? Encoding.Latin1).GetString(bytes);
    }

    private static string Unescape(string text) => text.Contains("\\U+", StringComparison.OrdinalIgnoreCase)
        ? Escape().Replace(text, m => ((char)ushort.Parse(m.Groups[1].ValueSpan, NumberStyles.AllowHexSpecifier, CultureInfo.InvariantCulture)).ToString())
        : text;

    private static int? PageNumber(string? name)
    {
        if (name is null)
        {
            return null;
        }

        string upper = name.ToUpperInvariant();
        int? fixedNumber = upper switch
        {
            "BIG5" => 950,
            "GB2312" => 936,
            "KSC5601" => 949,
            "JOHAB" => 1361,
            "ASCII" => 1252,
            "UTF-8" or "UTF8" => 65001,
            "MACINTOSH" => 10000,
            _ => null,
        };
        if (fixedNumber is not null)
        {
            return fixedNumber;
        }

        Match match = NumberedPage().Match(upper);
        if (!match.Success || !int.TryParse(match.Groups[2].ValueSpan, NumberStyles.None, CultureInfo.InvariantCulture, out int number))
        {
            return null;
        }

        // ISO8859-n is page 28590 + n.
        return match.Groups[1].Value.StartsWith("ISO", StringComparison.Ordinal) ? 28590 + number : number;
    }

    private static Encoding? Page(int number)
    {
        try
        {
            return CodePagesEncodingProvider.Instance.GetEncoding(number) ?? Encoding.GetEncoding(number);
        }
        catch (Exception e) when (e is ArgumentException or NotSupportedException)
        {
            return null;
        }
    }

    [GeneratedRegex(@"\\U\+([0-9A-F]{4})", RegexOptions.IgnoreCase | RegexOptions.CultureInvariant)]
    private static partial Regex Escape();

    [GeneratedRegex(@"^(ANSI_|DOS|ISO_?-?8859[-_]|CP|WINDOWS-)([0-9]{1,5})$", RegexOptions.CultureInvariant)]
    private static partial Regex NumberedPage();
}
