// Truth: known texts in known encodings come back as written (code pages by the framework's own encoders).
using System.Text;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class EncodingTests
{
    [Theory]
    [InlineData("ANSI_1252", 1252, "EISENKÖRPER")]
    [InlineData("ANSI_1252", 1252, "Ã–")] // these bytes would be valid UTF-8 as well
    [InlineData("ANSI_1250", 1250, "ŻELAZO")]
    [InlineData("ANSI_1251", 1251, "ЖЕЛЕЗО")]
    [InlineData("ansi_932", 932, "鉄心")]
    [InlineData("ANSI_936", 936, "铁芯")]
    [InlineData("gb2312", 936, "铁芯")]
    [InlineData("DOS850", 850, "EISENKÖRPER")]
    [InlineData("ISO8859-2", 28592, "ŻELAZO")]
    public void Layer_names_in_any_code_page_are_readable(string header, int page, string layer)
    {
        Encoding encoding = CodePagesEncodingProvider.Instance.GetEncoding(page) ?? Encoding.GetEncoding(page);
        string text = Drawing($"9 $ACADVER; 1 AC1015; 9 $DWGCODEPAGE; 3 {header}", layer);

        Assert.Equal(layer, Assert.Single(HandDrawn.Read(encoding.GetBytes(text)).Curves).Layer);
    }

    [Theory]
    [InlineData("9 $ACADVER; 1 AC1021; 9 $DWGCODEPAGE; 3 ANSI_1252")]
    [InlineData("9 $ACADVER; 1 AC1032")]
    [InlineData("9 $ACADVER; 1 AC1009")]
    [InlineData("")]
    public void From_2007_on_and_without_a_code_page_texts_are_UTF_8(string header) => Assert.Equal(
        "EISENKÖRPER 鉄心", Assert.Single(HandDrawn.Read(Drawing(header, "EISENKÖRPER 鉄心")).Curves).Layer);

    [Fact]
    public void Bytes_that_are_no_UTF_8_are_western() => Assert.Equal(
        "EISENKÖRPER", Assert.Single(HandDrawn.Read(Encoding.Latin1.GetBytes(Drawing("", "EISENKÖRPER"))).Curves).Layer);

    [Fact]
    public void Escapes_are_letters() => Assert.Equal(
        "EISENKÖRPER 鉄 \U0001F9F2", Assert.Single(HandDrawn.Read(Drawing("9 $ACADVER; 1 AC1015; 9 $DWGCODEPAGE; 3 ANSI_1252", "EISENK\\U+00D6RPER \\u+9244 \\U+D83E\\U+DDF2")).Curves).Layer);

    [Fact]
    public void An_unknown_code_page_is_told() => Assert.Contains(
        HandDrawn.Read(Drawing("9 $DWGCODEPAGE; 3 KLINGON", "A")).Findings, f => f.What == "code-page" && f.Text.Contains("KLINGON", StringComparison.Ordinal));

    private static string Drawing(string header, string layer) =>
        (HandDrawn.With($"0 LINE; 8 {layer}; 10 0; 20 0; 11 25; 21 0") with { Header = header }).Text();
}
