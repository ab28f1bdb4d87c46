// Truth: hostile drawings whose size is known by construction are refused within the budget of 5 s and 512 MB, and the
// message names the limit; reading is linear in size. Times are of the processor, so that a busy machine changes nothing.
using System.Text;
using PoleField.Drawing;
using Xunit;
using Xunit.Abstractions;

namespace PoleField.Tests.Drawing.Dxf;

[Collection(nameof(LimitTests))]
public sealed class LimitTests(ITestOutputHelper output)
{
    private const string Line = "0 LINE; 8 A; 10 0; 20 0; 11 1; 21 0";

    [Theory]
    [InlineData("cycle", "block-cycle", "contains itself: b0 > b1 > b0")]
    [InlineData("deep", "limit", "more than 64 deep")]
    [InlineData("lines", "limit", "more than 2000000 curves")]
    [InlineData("empty", "limit", "more than 1000000 copies of blocks")]
    [InlineData("array", "limit", "32767 by 32767 copies; the limit is 100000")]
    [InlineData("arrays of splines", "limit", "more than 2000000 curves")]
    public void Block_bombs_are_refused_in_time(string bomb, string what, string text)
    {
        byte[] bytes = Encoding.ASCII.GetBytes(Bomb(bomb).Text());
        long before = GC.GetTotalAllocatedBytes();
        TimeSpan start = Environment.CpuUsage.TotalTime;

        Finding fault = Assert.Single(HandDrawn.Faults(bytes));

        TimeSpan time = Environment.CpuUsage.TotalTime - start;
        long megabytes = (GC.GetTotalAllocatedBytes() - before) >> 20;
        output.WriteLine(FormattableString.Invariant($"{bomb}: {time.TotalSeconds:0.00} s, {megabytes} MB allocated"));
        Assert.Equal(what, fault.What);
        Assert.Contains(text, fault.Text, StringComparison.Ordinal);
        Assert.True(time < TimeSpan.FromSeconds(5), time.ToString());
        Assert.True(megabytes < 512, megabytes.ToString(System.Globalization.CultureInfo.InvariantCulture));
    }

    [Fact]
    public void Counts_in_the_file_are_not_believed() => Assert.Single(
        HandDrawn.With("0 LWPOLYLINE; 8 A; 90 2147483647; 70 0; 10 0; 20 0; 10 1; 20 1").Read().Curves);

    [Fact]
    public void Every_limit_is_an_option_and_named()
    {
        void Refused(DxfLimits limits, string text, params string[] entities)
        {
            Finding fault = HandDrawn.With(entities).Fault(new DxfReadOptions { Limits = limits });
            Assert.Equal("limit", fault.What);
            Assert.Contains(text, fault.Text, StringComparison.Ordinal);
        }

        Refused(new DxfLimits { FileBytes = 100 }, "larger than 100 bytes", Line, Line, Line, Line, Line);
        Refused(new DxfLimits { Pairs = 12 }, "more than 12 pairs", Line, Line);
        Refused(new DxfLimits { Curves = 2 }, "more than 2 curves", Line, Line, Line);
        Refused(new DxfLimits { Vertices = 3 }, "more than 3 vertices", "0 LWPOLYLINE; 10 0; 20 0; 10 0; 20 0; 10 0; 20 0; 10 0; 20 0");
        Refused(new DxfLimits { ValueBytes = 1000 }, "longer than 1000 bytes", "0 TEXT; 1 " + new string('x', 200_000));
    }

    [Fact]
    public void A_hundred_thousand_entities_take_well_below_a_second_and_time_grows_linearly()
    {
        byte[] Drawing(int count)
        {
            var text = new StringBuilder();
            for (int i = 0; i < count; i++)
            {
                text.Append(HandDrawn.Pairs(FormattableString.Invariant(
                    $"0 LINE; 5 {i:X}; 100 AcDbEntity; 8 LAYER{i % 7}; 100 AcDbLine; 10 {i * 0.1234567}; 20 {i * 0.7654321}; 30 0.0; 11 {i}.5; 21 {i * 0.3}; 31 0.0")));
            }

            return Encoding.ASCII.GetBytes(
                HandDrawn.Pairs("0 SECTION; 2 ENTITIES") + text + HandDrawn.Pairs("0 ENDSEC; 0 EOF"));
        }

        double Seconds(byte[] bytes)
        {
            double best = double.PositiveInfinity;
            for (int i = 0; i < 3; i++)
            {
                TimeSpan start = Environment.CpuUsage.TotalTime;
                HandDrawn.Read(bytes);
                best = Math.Min(best, (Environment.CpuUsage.TotalTime - start).TotalSeconds);
            }

            return best;
        }

        byte[] small = Drawing(25_000), large = Drawing(100_000);
        Seconds(small);
        double few = Seconds(small), many = Seconds(large);

        output.WriteLine(FormattableString.Invariant($"25,000: {few:0.000} s; 100,000: {many:0.000} s ({large.Length >> 20} MB)"));
        Assert.True(many < 1.0, $"{many} s");
        Assert.True(many < 12 * few, $"{few} s, {many} s");
    }

    private static HandDrawn Bomb(string kind)
    {
        static string Insert(string block, string more = "") => $"0 INSERT; 8 A; 2 {block}; 10 0; 20 0" + more;
        const string spline = "0 SPLINE; 8 0; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 0; 20 0; 10 1; 20 2; 10 2; 20 0";
        string tenfold = string.Join(";", Enumerable.Range(0, 20).Select(i => HandDrawn.Block($"b{i}", string.Join(";", Enumerable.Repeat(Insert($"b{i + 1}"), 10)))));
        string blocks = kind switch
        {
            "cycle" => HandDrawn.Block("b0", Insert("b1")) + ";" + HandDrawn.Block("b1", Insert("B0")),
            "deep" => string.Join(";", Enumerable.Range(0, 4000).Select(i => HandDrawn.Block($"b{i}", Insert($"b{i + 1}")))) + ";" + HandDrawn.Block("b4000", Line),
            "lines" => tenfold.Replace("0 BLOCK; 2 b5;", "0 BLOCK; 2 b5x;", StringComparison.Ordinal) + ";"
                + HandDrawn.Block("b5", string.Join(";", Enumerable.Repeat(Line, 100))),
            "empty" => tenfold + ";" + HandDrawn.Block("b20", "999 nothing"),
            "arrays of splines" => HandDrawn.Block("b0", Insert("b1", "; 70 300; 71 300; 44 1; 45 1")) + ";" + HandDrawn.Block("b1", string.Join(";", Enumerable.Repeat(spline, 100))),
            _ => HandDrawn.Block("b0", Line),
        };
        return HandDrawn.With(Insert("b0", kind == "array" ? "; 70 32767; 71 32767; 44 1; 45 1" : "")) with { Blocks = blocks };
    }
}

/// <summary>Keeps the measurements apart from other tests' work.</summary>
[CollectionDefinition(nameof(LimitTests), DisableParallelization = true)]
public sealed class MeasuredAlone;
