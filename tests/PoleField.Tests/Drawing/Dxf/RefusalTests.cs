// Truth: a damaged or foreign file is refused with a message that says what it is, where, and what to do; nothing damaged
// is read as a smaller drawing. The damage is made here, so what must be said is known.
using System.IO.Compression;
using System.Text;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class RefusalTests
{
    private const string Line = "0 LINE; 5 2A; 8 COIL PLUS; 10 0; 20 0; 11 1; 21 0";

    [Theory]
    [InlineData("", "empty")]
    [InlineData("  \r\n\r\n", "blank")]
    [InlineData("<?xml version=\"1.0\"?><svg xmlns=\"http://www.w3.org/2000/svg\"/>", "SVG")]
    [InlineData("<!DOCTYPE html><html></html>", "HTML")]
    [InlineData("<?xml version=\"1.0\"?><a/>", "XML")]
    [InlineData("%PDF-1.7\n", "PDF")]
    [InlineData("AC1015\0\0\0\0\0\0", "DWG drawing (version AC1015)")]
    [InlineData("AC1032\0\0\0\0\0\0", "DWG drawing (version AC1032)")]
    [InlineData("PK\u0003\u0004", "ZIP")]
    [InlineData("ISO-10303-21;\nHEADER;", "STEP")]
    [InlineData("solid part\nfacet", "STL")]
    [InlineData("\0\0\0\0\0\0\0\0\0\0\0\0\0\0\0\0", "NUL")]
    [InlineData("Dear colleague,\n", "Dear colleague")]
    public void Other_files_are_called_by_their_name(string content, string name)
    {
        Finding fault = Assert.Single(HandDrawn.Faults(Encoding.Latin1.GetBytes(content)));

        Assert.Equal("not-dxf", fault.What);
        Assert.Contains(name, fault.Text, StringComparison.Ordinal);
        Assert.Contains("DXF", fault.Fix, StringComparison.Ordinal);
    }

    [Fact]
    public void Packed_drawings_and_pictures_are_called_by_their_name()
    {
        using var packed = new MemoryStream();
        using (var gzip = new GZipStream(packed, CompressionLevel.Fastest, leaveOpen: true))
        {
            gzip.Write(Encoding.ASCII.GetBytes(HandDrawn.With(Line).Text()));
        }

        Assert.Contains("gzip", Assert.Single(HandDrawn.Faults(packed.ToArray())).Text, StringComparison.Ordinal);
        Assert.Contains("PNG", Assert.Single(HandDrawn.Faults([0x89, (byte)'P', (byte)'N', (byte)'G', 13, 10, 26, 10])).Text, StringComparison.Ordinal);
        Assert.Contains("JPEG", Assert.Single(HandDrawn.Faults([0xFF, 0xD8, 0xFF, 0xE0])).Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("-18,000", "decimal point")]
    [InlineData("1,500,000", "decimal point")]
    [InlineData("nan", "Export")]
    [InlineData("NaN", "Export")]
    [InlineData("Infinity", "Export")]
    [InlineData("-1.#IND", "Export")]
    [InlineData("1E+400", "Export")]
    [InlineData("0x1F", "Export")]
    [InlineData("1 2", "Export")]
    [InlineData("", "Export")]
    [InlineData("(5)", "Export")]
    [InlineData("٣", "Export")]
    public void Values_that_are_no_numbers_are_named_with_line_layer_handle_and_meaning(string value, string fix)
    {
        Finding fault = HandDrawn.With(Line.Replace("21 0", "21 " + value, StringComparison.Ordinal)).Fault();

        Assert.Equal(("bad-number", 27, "COIL PLUS", "2A"), (fault.What, fault.Line, fault.Layer, fault.Handle));
        Assert.Contains($"\"{value}\" is not a {(fix == "Export" ? "finite " : "")}number (LINE on layer COIL PLUS, y of the end point)", fault.Text, StringComparison.Ordinal);
        Assert.Contains(fix, fault.Fix, StringComparison.Ordinal);
    }

    [Fact]
    public void Very_long_numbers_are_cut_in_messages()
    {
        Finding fault = HandDrawn.With(Line.Replace("21 0", "21 " + new string('x', 100_000), StringComparison.Ordinal)).Fault();

        Assert.InRange(fault.Text.Length, 100, 250);
    }

    [Theory]
    [InlineData("5\0")]
    [InlineData("\0")]
    public void NUL_bytes_are_refused_wherever_they_are(string value)
    {
        foreach (string code in (string[])["21", "8"])
        {
            string text = HandDrawn.With("0 LINE; 8 A; 10 0; 20 0; 11 1; 21 0").Text().Replace(
                code == "21" ? " 21\n0" : "  8\nA", $" {code}\n{value}", StringComparison.Ordinal);
            Finding fault = Assert.Single(HandDrawn.Faults(Encoding.ASCII.GetBytes(text)));

            Assert.Equal("nul-bytes", fault.What);
            Assert.NotNull(fault.Line);
        }
    }

    [Fact]
    public void All_bad_numbers_are_named_at_once_and_reading_stops_after_fifty()
    {
        string bad = Line.Replace("21 0", "21 a", StringComparison.Ordinal).Replace("10 0", "10 b", StringComparison.Ordinal);

        Assert.Equal(6, HandDrawn.With(bad, bad, bad).Faults().Count);
        Assert.Equal(50, HandDrawn.With([.. Enumerable.Repeat(bad, 100)]).Faults().Count);
    }

    [Theory]
    [InlineData("0 LINE; 8 A; 10 0; 20 0; 11 1", "has no y of the end point (group 21)")]
    [InlineData("0 LINE; 8 A; 10 0; 10 5; 20 0; 11 1; 21 1", "has x of the start point 2 times (group 10)")]
    [InlineData("0 ARC; 8 A; 10 0; 20 0; 40 1; 50 0", "has no end angle (group 51)")]
    [InlineData("0 CIRCLE; 8 A; 10 0; 20 0", "has no radius (group 40)")]
    [InlineData("0 INSERT; 8 A; 2 B; 20 0", "has no x of the insertion point (group 10)")]
    [InlineData("0 POLYLINE; 8 A; 0 VERTEX; 10 0; 0 VERTEX; 10 1; 20 1; 0 SEQEND", "has no y of a vertex (group 20)")]
    public void Lost_and_doubled_values_are_named(string entity, string text)
    {
        Finding fault = (HandDrawn.With(entity) with { Blocks = HandDrawn.Block("B", Line) }).Fault();

        Assert.Equal("missing-value", fault.What);
        Assert.Contains(text, fault.Text, StringComparison.Ordinal);
    }

    [Theory]
    [InlineData("0 CIRCLE; 8 A; 10 0; 20 0; 40 -1", "bad-curve", "its radius is -1; it must be positive")]
    [InlineData("0 ELLIPSE; 8 A; 10 0; 20 0; 11 1; 21 0; 40 -0.5", "bad-curve", "its ratio of the half axes is -0.5; it must be positive")]
    [InlineData("0 LWPOLYLINE; 8 A; 10 0; 10 1; 20 1", "bad-curve", "do not come in pairs")]
    [InlineData("0 LWPOLYLINE; 8 A; 10 0; 20 1; 10 4", "bad-curve", "has no y")]
    [InlineData("0 SPLINE; 8 A; 71 26; 40 0; 10 0; 20 0", "bad-curve", "degree is 26; 1 to 25")]
    [InlineData("0 SPLINE; 8 A; 40 0; 10 0; 20 0", "bad-curve", "degree is missing")]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1", "bad-curve", "5 knots")]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 0; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1", "bad-curve", "must not decrease")]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 0; 40 0; 40 0; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1", "bad-curve", "no range")]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1; 41 1; 41 -1; 41 1", "bad-curve", "a weight is -1; 1e-12 to 1e+12 is allowed")]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1; 41 1; 41 1", "bad-curve", "2 weights for 3")]
    [InlineData("0 LINE; 8 A; 10 0; 20 0; 30 0; 11 1; 21 0; 31 1", "not-flat", "z runs from 0 to 1")]
    [InlineData("0 ARC; 8 A; 10 0; 20 0; 40 1; 50 0; 51 90; 210 0; 220 0.5; 230 0.8660254", "not-flat", "tilted by 30 degrees")]
    [InlineData("0 LWPOLYLINE; 8 A; 10 0; 20 0; 10 1; 20 1; 210 1; 220 0; 230 0", "not-flat", "tilted by 90 degrees")]
    [InlineData("0 INSERT; 8 A; 2 B; 10 0; 20 0; 210 1; 220 0; 230 1", "not-flat", "tilted by 45 degrees")]
    [InlineData("0 INSERT; 8 A; 2 B; 10 0; 20 0; 41 0", "block-scale", "scale 0 by 1")]
    [InlineData("0 INSERT; 8 A; 2 NONE; 10 0; 20 0", "unknown-block", "\"NONE\"")]
    [InlineData("0 VERTEX; 8 A; 10 0; 20 0", "stray-vertex", "belongs to no POLYLINE")]
    [InlineData("0 POLYLINE; 8 A; 70 8; 0 VERTEX; 10 0; 20 0; 30 0; 0 VERTEX; 10 1; 20 0; 30 4; 0 SEQEND", "not-flat", "z runs from 0 to 4")]
    [InlineData("0 LINE; 8 A; 10 0; 20 0; 11 2e9; 21 0", "limit", "up to 1000000000 drawing units")]
    public void Entities_that_make_no_plane_curve_are_named(string entity, string what, string text)
    {
        HandDrawn drawing = HandDrawn.With(entity) with { Blocks = HandDrawn.Block("B", Line) };

        Finding fault = drawing.Fault();

        Assert.Equal((what, "A"), (fault.What, fault.Layer));
        Assert.Contains(text, fault.Text, StringComparison.Ordinal);
        Assert.NotEmpty(fault.Fix);
        Assert.Equal(Array.IndexOf(drawing.Text().Split('\n'), "ENTITIES") + 2, fault.Line);
    }

    [Fact]
    public void A_tilted_entity_on_a_frozen_layer_does_not_matter() => Assert.Empty(
        (HandDrawn.With("0 LINE; 8 A; 10 0; 20 0; 30 0; 11 1; 21 0; 31 1") with { Tables = HandDrawn.Layer("A", 1) }).Read().Curves);

    [Fact]
    public void Different_heights_are_laid_flat_with_a_warning() => Assert.Contains(
        HandDrawn.With(Line, "0 CIRCLE; 8 A; 10 0; 20 0; 30 2; 40 1").Read().Findings,
        f => f.What == "heights" && f.Severity == Severity.Warning);

    [Fact]
    public void A_file_cut_anywhere_before_its_end_mark_is_refused()
    {
        string text = (HandDrawn.With(Line, "0 CIRCLE; 8 A; 10 0; 20 0; 40 1") with { Blocks = HandDrawn.Block("B", Line) }).Text();

        for (int length = 1; length < text.Length - 2; length++)
        {
            IReadOnlyList<Finding> faults = HandDrawn.Faults(Encoding.ASCII.GetBytes(text[..length]));
            Assert.Contains(faults, f => f.What is "truncated" or "not-dxf");
        }
    }

    [Fact]
    public void A_binary_file_cut_anywhere_is_refused()
    {
        byte[] bytes = HandDrawn.With(Line).Binary(wideCodes: true);

        for (int length = 0; length < bytes.Length - 1; length++)
        {
            Assert.NotEmpty(HandDrawn.Faults(bytes[..length]));
        }
    }

    [Fact]
    public void A_lost_end_of_section_or_block_is_noticed()
    {
        string pairs = (HandDrawn.With(Line) with { Blocks = HandDrawn.Block("B", Line) }).AllPairs();

        foreach (string lost in (string[])["0 ENDBLK;", "0 ENDSEC;0 SECTION; 2 BLOCKS", "0 ENDSEC; 0 EOF"])
        {
            string damaged = pairs.Replace(lost, lost.Contains("EOF", StringComparison.Ordinal) ? "0 EOF" : lost.Contains("BLOCKS", StringComparison.Ordinal) ? "0 SECTION; 2 BLOCKS" : "", StringComparison.Ordinal);
            Assert.NotEqual(pairs, damaged);
            Assert.Equal("truncated", Assert.Single(HandDrawn.Faults(Encoding.ASCII.GetBytes(HandDrawn.Pairs(damaged)))).What);
        }
    }

    [Fact]
    public void A_lost_line_is_noticed_where_the_pairs_fall_out_of_step()
    {
        string[] lines = HandDrawn.With(Line).Text().Split('\n');
        string text = string.Join('\n', lines.Where((_, i) => i != 18));

        Finding fault = Assert.Single(HandDrawn.Faults(Encoding.ASCII.GetBytes(text)));

        Assert.Equal("bad-group-code", fault.What);
        Assert.Contains("out of step", fault.Text, StringComparison.Ordinal);
        Assert.InRange(fault.Line!.Value, 19, 27);
    }

    [Fact]
    public void Text_that_looks_like_structure_is_text() => Assert.Single(HandDrawn.With(
        "0 TEXT; 8 A; 1 ENDSEC", "0 TEXT; 8 A; 1 0", "0 TEXT; 8 A; 1", Line + "; 1001 ACAD; 1002 {; 1000 EOF; 1010 nonsense").Read().Curves);
}
