// Truth: the rules of HTML, its content policy and accessibility, and the embedded result read back.
using System.Text;
using System.Text.RegularExpressions;
using PoleField.Output.Figures;
using PoleField.Output.Pages;
using PoleField.Output.Results;
using Xunit;

namespace PoleField.Tests.Output;

public sealed partial class HtmlReportTests
{
    private static readonly FieldScene Scene = TwoConductorScene.Scene(cells: 60);
    private static readonly string Full = HtmlReport.Text(Page());

    [Fact]
    public void TheEmbeddedDataAreTheResultFile()
    {
        string json = EmbeddedPattern().Match(Full).Groups[1].Value;

        ResultFile read = ResultJson.Read(new MemoryStream(Encoding.UTF8.GetBytes(json)));

        Assert.Equal(JsonText.Of(ResultJson.ToFile(SampleResult.Make())), JsonText.Of(read));
        Assert.DoesNotContain('<', json);
    }

    [Fact]
    public void ThePageFetchesNothingAndRunsNothing()
    {
        Assert.Contains("Content-Security-Policy\" content=\"default-src 'none'; style-src 'unsafe-inline'; img-src data:\"", Full, StringComparison.Ordinal);
        Assert.Single(ScriptPattern().Matches(Full)); // the data block
        Assert.All(LinkPattern().Matches(Full), m => Assert.Matches("^(#|data:)", m.Groups[1].Value));
        Assert.DoesNotContain("@import", Full, StringComparison.Ordinal);
    }

    [Fact]
    public void TextOfTheCaseCannotBecomeMarkup()
    {
        Assert.Contains("<h1>Ridge and groove &lt;µ &amp; &quot;quotes&quot;&gt;</h1>", Full, StringComparison.Ordinal);
        Assert.DoesNotContain("<µ", Full, StringComparison.Ordinal);
    }

    [Fact]
    public void EveryIdIsThereOnce()
    {
        string[] ids = [.. IdPattern().Matches(Full).Select(m => m.Groups[1].Value)];

        Assert.True(ids.Length > 10);
        Assert.Equal(ids.Length, ids.Distinct().Count());
        Assert.All(AnchorPattern().Matches(Full), m => Assert.Contains(m.Groups[1].Value, ids));
    }

    [Fact]
    public void EveryTableHasACaptionAndScopesAndEveryPictureAName()
    {
        int tables = Count("<table>");
        Assert.Equal(tables, Count("<caption>"));
        Assert.Equal(tables, Count("<thead>"));
        Assert.DoesNotContain("<th>", Full, StringComparison.Ordinal);
        Assert.Equal(Count("<th "), Count("<th scope=\"col\"") + Count("<th scope=\"row\">"));
        Assert.Equal(Count("<svg "), Count("role=\"img\""));
        Assert.Equal(Count("<svg "), Count("<title id="));
        Assert.Equal(3, Count("<svg "));
    }

    [Theory]
    [InlineData(true, true, "✓ The requirement is met")]
    [InlineData(false, true, "✗ 1 of 1 requirements not met")]
    [InlineData(true, false, "✗ The asked accuracy was not reached")]
    public void TheVerdictIsAWordAndASign(bool met, bool accurate, string words)
    {
        SolveResult sample = SampleResult.Make();
        SolveResult result = sample with
        {
            Requirements = [new RequirementResult("gradient_min", "T/m", 300, met ? 310 : 290, met)],
            Record = sample.Record with { AccuracyReached = accurate ? 1e-5 : 1e-2 },
        };

        Assert.Contains(words, HtmlReport.Text(new ReportPage { Result = ResultJson.ToFile(result) }), StringComparison.Ordinal);
    }

    [Fact]
    public void SectionsThatAreNullAreLeftOut()
    {
        string bare = HtmlReport.Text(new ReportPage { Result = ResultJson.ToFile(SampleResult.Make()) });

        Assert.DoesNotContain("Excitation curve", bare, StringComparison.Ordinal);
        Assert.DoesNotContain("<svg", bare, StringComparison.Ordinal);
        Assert.Contains("<section id=\"ramp\"", Full, StringComparison.Ordinal);
        Assert.Contains("Onset at 2.4 kA &amp; more.", Full, StringComparison.Ordinal);
    }

    [Fact]
    public void TheSamePageIsTheSameBytes() => Assert.Equal(Full, HtmlReport.Text(Page()));

    [Theory]
    [InlineData(310.25, 0.0015, "310.2500 ± 0.0015")]
    [InlineData(-1.25, 0.02, "−1.250 ± 0.020")]
    [InlineData(1234.5, 30, "1234 ± 30")]
    [InlineData(1.25, double.NaN, "1.25")]
    public void AValueIsShownWithTheDigitsItsErrorBarAllows(double value, double error, string text) =>
        Assert.Equal(text, ResultTables.WithError(value, error));

    [Fact]
    public void TheColoursOfAMapRiseInLightness()
    {
        // Relative luminance of IEC 61966-2-1 (sRGB); a grey print keeps the order of the values from a sixteenth of the scale on.
        double[] light = [.. FigureStyle.Unsigned.Select(c => (0.2126 * Linear(c.R)) + (0.7152 * Linear(c.G)) + (0.0722 * Linear(c.B)))];

        Assert.All(Enumerable.Range(1, 15), i => Assert.True(light[16 * i] > light[16 * (i - 1)] - 1e-3));
        Assert.True(light[255] > 3 * light[0]);
        static double Linear(byte channel) => channel / 255.0 <= 0.04045 ? channel / 255.0 / 12.92 : Math.Pow(((channel / 255.0) + 0.055) / 1.055, 2.4);
    }

    private static ReportPage Page() => new()
    {
        Result = ResultJson.ToFile(SampleResult.Make()),
        Field = [new(FieldFigure.Whole(Scene)), new(FieldFigure.Beam(Scene))],
        Aperture = [],
        Sections =
        [
            new ReportSection
            {
                Id = "ramp",
                Heading = "Excitation curve",
                Remarks = ["Onset at 2.4 kA & more."],
                Pictures =
                [
                    new(
                        ExcitationFigure.Draw(SampleRamp.Make(), "Three points."),
                        new ReportTable("Excitation", ["ampere-turns (A)", "|B| (T)"], [["1000", "0.5"], ["2000", "0.99"]])),
                ],
            },
        ],
    };

    private static int Count(string text) => Regex.Count(Full, Regex.Escape(text));

    [GeneratedRegex("<script type=\"application/json\" id=\"result\">\n(.*?)\n</script>", RegexOptions.Singleline)]
    private static partial Regex EmbeddedPattern();

    [GeneratedRegex("<script")]
    private static partial Regex ScriptPattern();

    [GeneratedRegex("(?:href|src)=\"([^\"]*)\"")]
    private static partial Regex LinkPattern();

    [GeneratedRegex(" id=\"([^\"]*)\"")]
    private static partial Regex IdPattern();

    [GeneratedRegex("href=\"#([^\"]*)\"")]
    private static partial Regex AnchorPattern();
}
