using System.Buffers.Binary;
using System.Globalization;
using System.Text;
using PoleField.Drawing;
using Assert = Xunit.Assert;

namespace PoleField.Tests.Drawing.Dxf;

/// <summary>Drawings written by hand: pairs as "code value" between semicolons.</summary>
internal sealed record HandDrawn
{
    public string Header { get; init; } = "9 $INSUNITS; 70 4";

    public string Tables { get; init; } = "";

    public string Blocks { get; init; } = "";

    public string Entities { get; init; } = "";

    public string LineEnd { get; init; } = "\n";

    public static HandDrawn With(params string[] entities) => new() { Entities = string.Join(";", entities) };

    public static string Pairs(string pairs, string lineEnd = "\n")
    {
        var text = new StringBuilder();
        foreach ((int code, string value) in Split(pairs))
        {
            text.Append(CultureInfo.InvariantCulture, $"{code,3}").Append(lineEnd).Append(value).Append(lineEnd);
        }

        return text.ToString();
    }

    public static string Layer(string name, int flags = 0, int color = 7, string lineType = "CONTINUOUS") =>
        FormattableString.Invariant($"0 LAYER; 2 {name}; 70 {flags}; 62 {color}; 6 {lineType}");

    public static string Block(string name, string content, string more = "10 0; 20 0") =>
        $"0 BLOCK; 2 {name}; 70 0; {more}; {content}; 0 ENDBLK";

    public string AllPairs() => string.Join(";", new[]
    {
        Header.Length > 0 ? $"0 SECTION; 2 HEADER; {Header}; 0 ENDSEC" : "",
        Tables.Length > 0 ? $"0 SECTION; 2 TABLES; 0 TABLE; 2 LAYER; 70 1; {Tables}; 0 ENDTAB; 0 ENDSEC" : "",
        Blocks.Length > 0 ? $"0 SECTION; 2 BLOCKS; {Blocks}; 0 ENDSEC" : "",
        $"0 SECTION; 2 ENTITIES; {Entities}; 0 ENDSEC; 0 EOF",
    }.Where(s => s.Length > 0));

    public string Text() => Pairs(AllPairs(), LineEnd);

    /// <summary>The same drawing in the binary form, with group codes of one byte (R12) or two.</summary>
    public byte[] Binary(bool wideCodes)
    {
        using var bytes = new MemoryStream();
        bytes.Write("AutoCAD Binary DXF\r\n\u001a\0"u8);
        Span<byte> number = stackalloc byte[8];
        foreach ((int code, string value) in Split(AllPairs()))
        {
            if (wideCodes || code >= 255)
            {
                if (!wideCodes)
                {
                    bytes.WriteByte(255);
                }

                BinaryPrimitives.WriteInt16LittleEndian(number, (short)code);
                bytes.Write(number[..2]);
            }
            else
            {
                bytes.WriteByte((byte)code);
            }

            if (code is >= 10 and <= 59 or >= 210 and <= 239)
            {
                BinaryPrimitives.WriteDoubleLittleEndian(number, double.Parse(value, CultureInfo.InvariantCulture));
                bytes.Write(number);
            }
            else if (code is >= 60 and <= 79)
            {
                BinaryPrimitives.WriteInt16LittleEndian(number, short.Parse(value, CultureInfo.InvariantCulture));
                bytes.Write(number[..2]);
            }
            else if (code is >= 90 and <= 99)
            {
                BinaryPrimitives.WriteInt32LittleEndian(number, int.Parse(value, CultureInfo.InvariantCulture));
                bytes.Write(number[..4]);
            }
            else
            {
                bytes.Write(Encoding.UTF8.GetBytes(value));
                bytes.WriteByte(0);
            }
        }

        return bytes.ToArray();
    }

    public Sketch Read(DxfReadOptions? options = null) => Read(Text(), options);

    public static Sketch Read(string text, DxfReadOptions? options = null) => Read(Encoding.UTF8.GetBytes(text), options);

    public static Sketch Read(byte[] bytes, DxfReadOptions? options = null)
    {
        using var stream = new MemoryStream(bytes);
        return DxfReader.Read(stream, "pole.dxf", options);
    }

    /// <summary>The faults of a drawing that cannot be read.</summary>
    public static IReadOnlyList<Finding> Faults(byte[] bytes, DxfReadOptions? options = null)
    {
        InputException refusal = Assert.Throws<InputException>(() => Read(bytes, options));
        Assert.All(refusal.Findings, f => Assert.Equal("pole.dxf", f.File));
        return [.. refusal.Findings.Where(f => f.Severity == Severity.Fault)];
    }

    public IReadOnlyList<Finding> Faults(DxfReadOptions? options = null) => Faults(Encoding.UTF8.GetBytes(Text()), options);

    public Finding Fault(DxfReadOptions? options = null) => Assert.Single(Faults(options));

    private static IEnumerable<(int Code, string Value)> Split(string pairs)
    {
        foreach (string pair in pairs.Split(';', StringSplitOptions.TrimEntries | StringSplitOptions.RemoveEmptyEntries))
        {
            int blank = pair.IndexOf(' ', StringComparison.Ordinal);
            string code = blank < 0 ? pair : pair[..blank];
            yield return (int.Parse(code, CultureInfo.InvariantCulture), blank < 0 ? "" : pair[(blank + 1)..].Trim());
        }
    }
}
