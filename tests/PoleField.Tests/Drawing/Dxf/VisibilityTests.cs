// Truth: the exchange format's rules of visibility: frozen (bit 1 of group 70), off (negative colour), invisible (60 = 1),
// paper space (67 = 1); what is hidden is not there, and is told.
using PoleField.Drawing;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class VisibilityTests
{
    private const string Line = "0 LINE; 8 A; 10 0; 20 0; 11 1; 21 0";

    [Theory]
    [InlineData(1, 7, "its layer is frozen")]
    [InlineData(5, 7, "its layer is frozen")]
    [InlineData(0, -7, "its layer is switched off")]
    public void Hidden_layers_are_skipped_and_listed(int flags, int color, string why)
    {
        Sketch sketch = (HandDrawn.With(Line, Line) with { Tables = HandDrawn.Layer("a", flags, color) }).Read();

        Assert.Empty(sketch.Curves);
        Assert.Equal(new SkippedEntities("a", "LINE", why, 2), Assert.Single(sketch.Skipped));
        Assert.Contains(sketch.Findings, f => f.What == "no-curves");
    }

    [Theory]
    [InlineData("60 1", "invisible")]
    [InlineData("67 1", "paper")]
    public void Marked_entities_are_skipped_and_listed(string mark, string why)
    {
        Sketch sketch = HandDrawn.With(Line + "; " + mark, Line).Read();

        Assert.Single(sketch.Curves);
        Assert.Contains(why, Assert.Single(sketch.Skipped).Why, StringComparison.Ordinal);
    }

    [Fact]
    public void Freezing_layer_0_does_not_hide_block_content_but_freezing_the_copys_layer_hides_all()
    {
        const string insert = "0 INSERT; 8 IRON; 2 B; 10 0; 20 0";
        string block = HandDrawn.Block("B", "0 LINE; 8 0; 10 0; 20 0; 11 1; 21 0; " + Line);
        HandDrawn drawing = HandDrawn.With(insert) with { Blocks = block };

        Sketch zeroFrozen = (drawing with { Tables = HandDrawn.Layer("0", 1) }).Read();
        Sketch copyFrozen = (drawing with { Tables = HandDrawn.Layer("IRON", 1) }).Read();
        Sketch copyOff = (drawing with { Tables = HandDrawn.Layer("IRON", 0, -7) }).Read();

        Assert.Equal(2, zeroFrozen.Curves.Count);
        Assert.Empty(copyFrozen.Curves);
        Assert.Equal("A", Assert.Single(copyOff.Curves).Layer);
    }

    [Theory]
    [InlineData("CENTER2")]
    [InlineData("DashDotX2")]
    public void Centre_lines_are_skipped_with_a_warning(string lineType)
    {
        Sketch byEntity = HandDrawn.With(Line + "; 6 " + lineType).Read();
        Sketch byLayer = (HandDrawn.With(Line) with { Tables = HandDrawn.Layer("A", 0, 7, lineType) }).Read();

        foreach (Sketch sketch in (Sketch[])[byEntity, byLayer])
        {
            Assert.Empty(sketch.Curves);
            Finding told = Assert.Single(sketch.Findings, f => f.What == "centre-line");
            Assert.Equal((Severity.Warning, "A"), (told.Severity, told.Layer));
            Assert.Contains(lineType, told.Text, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("HATCH", true)]
    [InlineData("SOLID", true)]
    [InlineData("REGION", true)]
    [InlineData("3DSOLID", true)]
    [InlineData("WHATEVER", true)]
    [InlineData("TEXT", false)]
    [InlineData("DIMENSION", false)]
    [InlineData("POINT", false)]
    public void Other_entities_are_counted_with_why_and_cure(string kind, bool isWarned)
    {
        Sketch sketch = HandDrawn.With(Line, $"0 {kind}; 8 A; 10 0; 20 0; 1 EOF", $"0 {kind}; 8 A; 10 nonsense").Read();

        SkippedEntities skipped = Assert.Single(sketch.Skipped);
        Assert.Equal(("A", kind, 2), (skipped.Layer, skipped.Kind, skipped.Count));
        Assert.NotEmpty(skipped.Why);
        Finding[] warnings = [.. sketch.Findings.Where(f => f.What == "not-read" && f.Severity == Severity.Warning)];
        Assert.Equal(isWarned ? 1 : 0, warnings.Length);
        Assert.All(warnings, w => Assert.Contains(skipped.Why, w.Text, StringComparison.Ordinal));
        Assert.All(warnings, w => Assert.NotEmpty(w.Fix));
    }

    [Fact]
    public void Layers_are_the_same_in_any_case_and_keep_the_tables_spelling()
    {
        Sketch sketch = (HandDrawn.With(Line, Line.Replace("8 A", "8 iron", StringComparison.Ordinal), Line.Replace("8 A", "8 IRON", StringComparison.Ordinal))
            with
        { Tables = HandDrawn.Layer("Iron") }).Read();

        Assert.Equal(["A", "Iron", "Iron"], sketch.Curves.Select(c => c.Layer));
    }

    [Fact]
    public void Every_curve_knows_where_it_came_from()
    {
        Sketch sketch = HandDrawn.With("0 LINE; 5 2F; 8 A; 10 0; 20 0; 11 1; 21 0", "0 CIRCLE; 5 30; 8 A; 10 0; 20 0; 40 1").Read();

        // SECTION and HEADER take 10 lines, SECTION ENTITIES 4, the LINE 14.
        Assert.Equal([("LINE", "2F", 15), ("CIRCLE", "30", 29)], sketch.Curves.Select(c => (c.Kind, c.Handle!, c.Line)));
    }
}
