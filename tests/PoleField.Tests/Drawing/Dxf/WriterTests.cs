// Truth: round trip: what is written reads back as the same curves, and writing that again gives the same bytes; an
// independent reader (the Python library of Debian's package python3-ezdxf) finds no fault and measures the same curves.
using System.Diagnostics;
using System.Globalization;
using System.Text;
using CsCheck;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Tests.Geometry;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Drawing.Dxf;

public sealed class WriterTests
{
    private const string Python = "/usr/bin/python3";

    [Fact]
    public void Random_sketches_read_back_as_they_were_and_write_the_same_bytes_again() =>
        RandomCurves.Any.Array[1, 12].SampleFixed(
            curves =>
            {
                Sketch sketch = Sketch(LengthUnit.Millimetre, curves);
                byte[] first = Written(sketch);

                Sketch back = HandDrawn.Read(first);
                byte[] second = Written(back);

                Assert.Equal(Encoding.ASCII.GetString(first), Encoding.ASCII.GetString(second));
                Assert.Equal(sketch.Curves.Select(c => c.Layer), back.Curves.Select(c => c.Layer));
                for (int i = 0; i < curves.Length; i++)
                {
                    AssertSame(curves[i], back.Curves[i].Curve);
                }
            },
            iter: 200);

    [Fact]
    public void Lines_and_splines_read_back_to_the_bit() =>
        Gen.OneOf(RandomCurves.Line, RandomCurves.Spline).SampleFixed(
            curve => Assert.Equal(curve, Assert.Single(HandDrawn.Read(Written(Sketch(LengthUnit.Millimetre, curve))).Curves).Curve),
            iter: 300);

    [Fact]
    public void An_arc_that_is_nearly_whole_keeps_its_gap()
    {
        var arc = new CircularArc(new Point(3, 4), 50, 0.3, 6.2831852);

        Curve back = Assert.Single(HandDrawn.Read(Written(Sketch(LengthUnit.Millimetre, arc))).Curves).Curve;

        Assert.Equal(arc.Start.DistanceTo(arc.End), back.Start.DistanceTo(back.End), 1e-12);
        Assert.Equal(0, arc.At(0.5).DistanceTo(back.At(0.5)), 1e-12);
    }

    [Theory]
    [InlineData(1e-4)]
    [InlineData(1e-7)]
    public void Arcs_that_are_shallow_keep_their_ends(double sweep)
    {
        var arc = new CircularArc(new Point(3, 4), 50, 0.3, -sweep);

        SketchCurve back = Assert.Single(HandDrawn.Read(Written(Sketch(LengthUnit.Millimetre, arc))).Curves);

        Assert.Equal((arc.Start, arc.End), (back.Curve.Start, back.Curve.End));
        Assert.Equal(0, arc.At(0.5).DistanceTo(back.Curve.At(0.5)), 1e-12);
    }

    [Fact]
    public void The_unit_and_layers_in_any_script_survive()
    {
        Curve line = new Line(new Point(0, 0), new Point(1, 1e-17));
        var inch = new LengthUnit("in", 0.0254);
        Sketch sketch = new("a", inch, UnitOrigin.CaseFile, [new SketchCurve(line, "EISENKÖRPER 鉄 \U0001F9F2", "LINE", null, 0)], [], []);

        byte[] bytes = Written(sketch);
        Sketch back = HandDrawn.Read(bytes);

        Assert.All(bytes, b => Assert.InRange(b, 9, 126));
        Assert.Equal((inch, UnitOrigin.InsertUnits), (back.Unit, back.UnitOrigin));
        Assert.Equal((line, "EISENKÖRPER 鉄 \U0001F9F2"), (back.Curves[0].Curve, back.Curves[0].Layer));
    }

    [Fact]
    public void Units_without_a_code_and_broken_layer_names_are_refused()
    {
        Curve line = new Line(new Point(0, 0), new Point(1, 0));

        Assert.Contains("furlong", Assert.Throws<ArgumentException>(() => Written(Sketch(new LengthUnit("furlong", 201.168), line))).Message, StringComparison.Ordinal);
        Sketch broken = new("a", LengthUnit.Millimetre, UnitOrigin.CaseFile, [new SketchCurve(line, "A\n  0\nEOF", "LINE", null, 0)], [], []);
        Assert.Throws<ArgumentException>(() => Written(broken));
    }

    [Fact]
    public void An_empty_sketch_is_a_sound_drawing() => Assert.Empty(HandDrawn.Read(Written(Sketch(LengthUnit.Millimetre))).Curves);

    [EzdxfFact]
    public void An_independent_reader_finds_no_fault_and_the_same_curves()
    {
        Curve[] curves =
        [
            new Line(new Point(-1.5, 0.1), new Point(2, 1)),
            new CircularArc(new Point(1, 2), 3, 0.5, 2),
            new CircularArc(new Point(1, 2), 3, 0.5, -5),
            new CircularArc(new Point(1, 2), 3, 0.7, 1e-3),
            new CircularArc(new Point(4, 2), 0.5, 0, Math.Tau),
            new EllipticArc(new Point(4, 2), new Point(1, 1), 0.5, 0.3, -4),
            new EllipticArc(new Point(4, 2), new Point(0.2, 0), 0.5, 0.3, 4),
            new Nurbs(2, [0, 0, 0, 1, 1, 1], [new(1, 0), new(1, 1), new(0, 1)], [1, 0.70710678118654757, 1]),
            NurbsInterpolation.Through([new(0, 0), new(1, 1), new(2, 0), new(3, 2), new(4, 0)]),
        ];
        string file = Path.Combine(Path.GetTempPath(), Path.GetRandomFileName() + ".dxf");
        File.WriteAllBytes(file, Written(Sketch(LengthUnit.Millimetre, curves)));
        try
        {
            string[] lines = Run(Script, file).Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);

            Assert.Equal("errors 0 fixes 0 units 4 version AC1015", lines[0]);
            Assert.Equal("markers unlike the reader's own:", lines[1]);
            Assert.Equal(curves.Length + 2, lines.Length);
            for (int i = 0; i < curves.Length; i++)
            {
                // Polygon length of the independent reader's own flattening, height over chords 1e-5: below the true length.
                double length = double.Parse(lines[i + 2], CultureInfo.InvariantCulture);
                Assert.InRange(length, curves[i].Length * (1 - 5e-5), curves[i].Length * (1 + 1e-9));
            }
        }
        finally
        {
            File.Delete(file);
            File.Delete(file + ".again");
        }
    }

    private const string Script = """
        import sys, ezdxf
        from ezdxf import path
        doc = ezdxf.readfile(sys.argv[1])
        audit = doc.audit()
        for e in audit.errors + audit.fixes:
            print(e.code, e.message, file=sys.stderr)
        print("errors", len(audit.errors), "fixes", len(audit.fixes), "units", doc.units, "version", doc.dxfversion)

        # The reader forgives wrong subclass markers; written anew by it they are right.
        def markers(name):
            lines = [line.strip() for line in open(name)]
            section, entities = "", []
            for code, value in zip(lines[::2], lines[1::2]):
                if code == "2" and entities and entities[-1][0] == "SECTION":
                    section = value
                if code == "0":
                    entities.append((value, section, []))
                if code == "100":
                    entities[-1][2].append(value)
            return [(kind, found) for kind, section, found in entities if section == "ENTITIES"]

        doc.saveas(sys.argv[1] + ".again")
        pairs = zip(markers(sys.argv[1]), markers(sys.argv[1] + ".again"))
        print("markers unlike the reader's own:", *[f"{ours} not {theirs}" for ours, theirs in pairs if ours != theirs])
        for e in doc.modelspace():
            if e.dxftype() == "LINE":
                points = [e.dxf.start, e.dxf.end]
            elif e.dxftype() == "LWPOLYLINE":
                points = list(path.make_path(e).flattening(1e-5))
            else:
                points = list(e.flattening(1e-5))
            print(repr(sum(a.distance(b) for a, b in zip(points, points[1:]))))
        """;

    private static string Run(string script, string argument)
    {
        var start = new ProcessStartInfo(Python, ["-c", script, argument]) { RedirectStandardOutput = true, RedirectStandardError = true };
        using Process process = Process.Start(start)!;
        string complaints = process.StandardError.ReadToEnd();
        string answer = process.StandardOutput.ReadToEnd();
        process.WaitForExit();
        Assert.True(process.ExitCode == 0 && complaints.Length == 0, complaints);
        return answer;
    }

    private static Sketch Sketch(LengthUnit unit, params Curve[] curves) => new(
        "made", unit, UnitOrigin.CaseFile, [.. curves.Select((c, i) => new SketchCurve(c, $"LAYER {i % 3}", "?", null, 0))], [], []);

    private static byte[] Written(Sketch sketch)
    {
        using var stream = new MemoryStream();
        DxfWriter.Write(sketch, stream);
        return stream.ToArray();
    }

    // Clockwise arcs come back the other way round.
    private static void AssertSame(Curve expected, Curve actual)
    {
        bool turned = expected switch
        {
            CircularArc { IsFullCircle: true } => false,
            CircularArc a => a.Sweep < 0 && actual is CircularArc { Sweep: > 0 },
            EllipticArc a => a.Sweep < 0,
            _ => false,
        };
        Curve same = turned ? expected.Reversed() : expected;
        if (expected is CircularArc { IsFullCircle: true } circle)
        {
            Assert.Equal((circle.Centre, circle.Radius), (((CircularArc)actual).Centre, ((CircularArc)actual).Radius));
            return;
        }

        // Angles are rounded to 1e-12 degrees, ratios to 15 digits.
        foreach (double t in (double[])[0, 0.3, 0.7, 1])
        {
            Assert.True(same.At(t).DistanceTo(actual.At(t)) < 1e-12, $"{same} {actual}");
        }
    }

    /// <summary>A test that needs the independent reader and says so when it is not there.</summary>
    private sealed class EzdxfFactAttribute : FactAttribute
    {
        public EzdxfFactAttribute()
        {
            if (!Directory.Exists("/usr/lib/python3/dist-packages/ezdxf"))
            {
                Skip = "NOT CHECKED against an independent reader: install Debian's package python3-ezdxf.";
            }
        }
    }
}
