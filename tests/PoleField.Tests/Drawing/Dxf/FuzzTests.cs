// Truth: whatever happens to a drawing's bytes, reading ends, with a sketch or with an InputException that names faults;
// an undamaged coordinate is never lost silently.
using System.Diagnostics;
using System.Text;
using PoleField.Drawing;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class FuzzTests
{
    private const int Seed = 20250611;
    private const double MostSeconds = 5;
    private const long MostBytes = 64 << 20; // of one small drawing

    // One drawing in so many is also cut into regions.
    private const int SectionedShare = 10;

    private static readonly int Mutations = RandomRuns.Count("POLEFIELD_RANDOM_DRAWINGS", 5_000);

    private static readonly SectionRequest Request = new() { PartLayers = ["IRON", "COIL"], MaterialKeys = ["steel", "coil"], CurrentLayers = ["COIL"], BeamLayer = "BEAM" };

    private static readonly HandDrawn Drawing = HandDrawn.With(
        "0 LINE; 5 1; 8 IRON; 10 0; 20 0; 11 1.5; 21 0.25",
        "0 ARC; 8 IRON; 10 5; 20 20; 40 5; 50 0; 51 90",
        "0 CIRCLE; 8 IRON; 10 5; 20 20; 40 5; 230 -1",
        "0 ELLIPSE; 8 IRON; 10 1; 20 2; 11 3; 21 0; 40 0.5; 41 0; 42 1.5",
        "0 LWPOLYLINE; 8 COIL; 90 3; 70 1; 10 0; 20 0; 42 0.5; 10 1; 20 0; 10 1; 20 1",
        "0 POLYLINE; 8 COIL; 66 1; 70 4; 0 VERTEX; 70 16; 10 0; 20 9; 0 VERTEX; 70 8; 10 0; 20 0; 0 VERTEX; 70 8; 10 1; 20 1; 0 SEQEND",
        "0 SPLINE; 8 BEAM; 70 4; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 1; 20 0; 10 1; 20 1; 10 0; 20 1; 41 1; 41 0.7; 41 1",
        "0 SPLINE; 8 BEAM; 70 1; 11 0; 21 0; 11 1; 21 1; 11 2; 21 0",
        "0 INSERT; 8 IRON; 2 B; 10 0; 20 0; 41 2; 50 30; 70 3; 71 2; 44 5; 45 5",
        "0 TEXT; 8 A; 10 0; 20 0; 1 EOF")
        with
    { Tables = HandDrawn.Layer("IRON"), Blocks = HandDrawn.Block("B", "0 CIRCLE; 8 0; 10 0; 20 0; 40 1; 0 INSERT; 8 0; 2 C; 10 0; 20 0") + ";" + HandDrawn.Block("C", "0 LINE; 8 0; 10 0; 20 0; 11 1; 21 1") };

    [Theory]
    [InlineData(false)]
    [InlineData(true)]
    public void Mutated_drawings_are_read_or_refused(bool isBinary)
    {
        byte[] original = isBinary ? Drawing.Binary(wideCodes: true) : Encoding.ASCII.GetBytes(Drawing.Text());
        var random = new Random(Seed);
        var limits = new DxfReadOptions { Limits = new DxfLimits { Curves = 2000, BlockCopies = 2000 } };
        int refused = 0;
        for (int trial = 0; trial < Mutations; trial++)
        {
            byte[] mutated = Mutate(original, random);
            long allocated = GC.GetAllocatedBytesForCurrentThread();
            var clock = Stopwatch.StartNew();
            try
            {
                Sketch sketch = HandDrawn.Read(mutated, limits);
                if (trial % SectionedShare == 0)
                {
                    SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, Request with { MirrorLeftRight = random.Next(4) == 0 });
                    Assert.Equal(reading.IsSound, reading.Findings.All(f => f.Severity != Severity.Fault));
                }
            }
            catch (InputException e)
            {
                refused++;
                Assert.NotEmpty(e.Message);
                Assert.Contains(e.Findings, f => f.Severity == Severity.Fault);
            }
            catch (Exception e) when (e is not Xunit.Sdk.XunitException)
            {
                Assert.Fail($"Trial {trial} of seed {Seed}: {e}\n{Encoding.Latin1.GetString(mutated)}");
            }

            allocated = GC.GetAllocatedBytesForCurrentThread() - allocated;
            Assert.True(
                clock.Elapsed.TotalSeconds < MostSeconds && allocated < MostBytes,
                $"Trial {trial} of seed {Seed} took {clock.Elapsed.TotalSeconds:f1} s and {allocated >> 20} MB.\n{Encoding.Latin1.GetString(mutated)}");
        }

        Assert.InRange(refused, Mutations / 4, Mutations - 1);
    }

    // Found by mutation: products of such weights overflow, and the search for the box of the curve never ended.
    [Theory]
    [InlineData("41 1; 41 1e308; 41 1")]
    [InlineData("41 1; 41 1e-308; 41 1")]
    public void A_spline_whose_weights_have_no_digits_is_refused(string weights) =>
        Assert.Contains("a weight is 1E", HandDrawn.With($"0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 1; 20 0; 10 1; 20 1; 10 0; 20 1; {weights}").Fault().Text, StringComparison.Ordinal);

    [Theory]
    [InlineData("0 SPLINE; 8 A; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 10 1; 20 0; 10 1e300; 20 1; 10 0; 20 1")]
    [InlineData("0 LWPOLYLINE; 8 A; 10 0; 20 0; 42 1e150; 10 1; 20 0")]
    public void A_curve_that_reaches_out_of_the_world_between_its_ends_is_refused(string entity) =>
        Assert.Equal("limit", HandDrawn.With(entity).Fault().What);

    [Fact]
    public void A_drawing_that_lost_a_coordinate_pair_is_never_read()
    {
        // Every x, y, radius or angle of the lines and arcs, one at a time.
        string[] entities = ["0 LINE; 8 IRON; 10 0; 20 0; 11 1.5; 21 0.25", "0 ARC; 8 IRON; 10 5; 20 20; 40 5; 50 0; 51 90",
            "0 LWPOLYLINE; 8 COIL; 70 1; 10 0; 20 0; 10 1; 20 0; 10 1; 20 1"];
        foreach (string entity in entities)
        {
            string[] pairs = entity.Split("; ");
            for (int i = 0; i < pairs.Length; i++)
            {
                if (pairs[i][..2] is "10" or "20" or "11" or "21" or "40" or "50" or "51")
                {
                    HandDrawn.With(string.Join("; ", pairs.Where((_, k) => k != i))).Fault();
                }
            }
        }
    }

    private static byte[] Mutate(byte[] original, Random random)
    {
        var bytes = new List<byte>(original);
        int changes = 1 + random.Next(3);
        for (int c = 0; c < changes && bytes.Count > 2; c++)
        {
            int at = random.Next(bytes.Count);
            int length = Math.Min(random.Next(1, 30), bytes.Count - at);
            switch (random.Next(7))
            {
                case 0:
                    bytes[at] = (byte)random.Next(256);
                    break;
                case 1:
                    bytes[at] ^= (byte)(1 << random.Next(8));
                    break;
                case 2:
                    bytes.RemoveRange(at, length);
                    break;
                case 3:
                    bytes.InsertRange(random.Next(bytes.Count), bytes.GetRange(at, length));
                    break;
                case 4:
                    bytes.RemoveRange(at, bytes.Count - at);
                    break;
                case 5:
                    bytes[at] = (byte)"0123456789-+.eE,\r\n "[random.Next(19)];
                    break;
                default:
                    bytes.InsertRange(at, "1e308\n"u8.ToArray());
                    break;
            }
        }

        return [.. bytes];
    }
}
