using System.Buffers.Binary;
using System.IO.Compression;
using System.Text;
using OxyPlot;

namespace PoleField.Output.Figures;

/// <summary>
/// A picture of at most 255 colours and one fully transparent index as a PNG file (ISO/IEC 15948: colour type 3): a quarter of
/// the size of true colour, so that pages stay small.
/// </summary>
internal static class IndexedPng
{
    /// <summary>Index of a pixel without colour.</summary>
    public const byte Transparent = 255;

    private static ReadOnlySpan<byte> Signature => [0x89, 0x50, 0x4e, 0x47, 0x0d, 0x0a, 0x1a, 0x0a];

    /// <summary>Encodes a picture.</summary>
    /// <param name="pixels">Colour index of column c in row r, counted from the top, at [r·width + c].</param>
    /// <param name="width">Columns.</param>
    /// <param name="palette">At most 255 colours.</param>
    public static byte[] Encode(ReadOnlySpan<byte> pixels, int width, IReadOnlyList<OxyColor> palette)
    {
        int height = pixels.Length / width;
        using MemoryStream file = new();
        file.Write(Signature);

        byte[] header = new byte[13];
        BinaryPrimitives.WriteInt32BigEndian(header, width);
        BinaryPrimitives.WriteInt32BigEndian(header.AsSpan(4), height);
        header[8] = 8; // bits per index
        header[9] = 3; // colour type: palette
        Chunk(file, "IHDR", header);

        byte[] colours = new byte[3 * 256];
        byte[] alphas = new byte[256];
        for (int i = 0; i < 256; i++)
        {
            OxyColor c = i == Transparent ? OxyColors.White : palette[Math.Min(i, palette.Count - 1)];
            (colours[3 * i], colours[(3 * i) + 1], colours[(3 * i) + 2]) = (c.R, c.G, c.B);
            alphas[i] = i == Transparent ? (byte)0 : c.A;
        }

        Chunk(file, "PLTE", colours);
        Chunk(file, "tRNS", alphas);
        Chunk(file, "IDAT", Compress(pixels, width));
        Chunk(file, "IEND", []);
        return file.ToArray();
    }

    private static byte[] Compress(ReadOnlySpan<byte> pixels, int width)
    {
        using MemoryStream data = new();
        using (ZLibStream zlib = new(data, CompressionLevel.Optimal, leaveOpen: true))
        {
            for (int start = 0; start < pixels.Length; start += width)
            {
                zlib.WriteByte(0); // row filter: none, best for palettes
                zlib.Write(pixels.Slice(start, width));
            }
        }

        return data.ToArray();
    }

    private static void Chunk(MemoryStream file, string type, ReadOnlySpan<byte> data)
    {
        byte[] body = new byte[4 + data.Length];
        Encoding.ASCII.GetBytes(type, body);
        data.CopyTo(body.AsSpan(4));
        Span<byte> word = stackalloc byte[4];
        BinaryPrimitives.WriteInt32BigEndian(word, data.Length);
        file.Write(word);
        file.Write(body);
        BinaryPrimitives.WriteUInt32BigEndian(word, Checksum(body));
        file.Write(word);
    }

    // CRC-32 with the reversed polynomial of ISO/IEC 15948 annex D.
    private static uint Checksum(ReadOnlySpan<byte> bytes)
    {
        uint crc = uint.MaxValue;
        foreach (byte b in bytes)
        {
            crc ^= b;
            for (int bit = 0; bit < 8; bit++)
            {
                crc = (crc & 1) != 0 ? 0xedb88320u ^ (crc >> 1) : crc >> 1;
            }
        }

        return ~crc;
    }
}
