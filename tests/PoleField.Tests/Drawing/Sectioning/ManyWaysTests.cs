// Truth: areas of rectangle, half disc and half ellipse in closed form; the way of drawing must not matter.
using CsCheck;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Tests.House;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class ManyWaysTests
{
    private const double Join = 0.002; // mm

    private sealed record Manner(int Seed, bool SharedOnce, bool Cut, bool Repeat, bool Gaps, bool Ellipse);

    private static Gen<Manner> Manners { get; } =
        Gen.Select(Gen.Int[0, 1_000_000], Gen.Bool, Gen.Bool, Gen.Bool, Gen.Bool, Gen.Bool, (seed, once, cut, repeat, gaps, ellipse) =>
            new Manner(seed, once, cut, repeat && !gaps, gaps, ellipse));

    [Fact]
    public void SamePoleDrawnInManyWaysGivesTheSameRegions() => Manners.SampleFixed(m =>
    {
        CrossSection s = Sound(Drawn(m), Parts("YOKE", "POLE", "COIL", "PIN"));

        double tolerance = m.Gaps ? 0.1 : 1e-8; // mm²; gaps of a micrometre along some ten millimetres
        Close(320 - (4 * Math.PI), Areas(s, "YOKE"), tolerance);
        Close(96 + (m.Ellipse ? 24 * Math.PI : 32 * Math.PI), Areas(s, "POLE"), tolerance);
        Close(27, Areas(s, "COIL"), tolerance);
        Close(4 * Math.PI, Areas(s, "PIN"), tolerance);
        Assert.Equal(5, s.Regions.Count);
    }, iter: 400);

    [Fact]
    public void TheSameSketchGivesTheSameBits()
    {
        Manner m = new(7, true, true, false, true, true);

        CrossSection a = Sound(Drawn(m), Parts("YOKE", "POLE", "COIL", "PIN"));
        CrossSection b = Sound(Drawn(m), Parts("YOKE", "POLE", "COIL", "PIN"));

        Assert.Equal(a.Vertices, b.Vertices);
        Assert.Equal(a.Edges, b.Edges);
        Assert.Equal(a.Regions, b.Regions);
    }

    private static void Close(double expected, double[] areas, double tolerance) =>
        Assert.InRange(Assert.Single(areas), expected - tolerance, expected + tolerance);

    private static Sketch Drawn(Manner m)
    {
        Random random = new(m.Seed);
        Curve nose = m.Ellipse
            ? new EllipticArc(new Point(0, 4), new Point(8, 0), 6, Math.PI, Math.PI)
            : new CircularArc(new Point(0, 4), 8, Math.PI, Math.PI);
        List<SketchCurve> curves =
        [
            .. Rectangle("YOKE", -20, 10, 20, 18),
            Line("POLE", -8, 10, -8, 4),
            new SketchCurve(nose, "POLE", "ELLIPSE", null, 0),
            Line("POLE", 8, 4, 8, 10),
            Line("COIL", 8, 5, 14, 5), Line("COIL", 14, 5, 14, 9.5), Line("COIL", 14, 9.5, 8, 9.5),
            Circle("PIN", -14, 14, 2),
        ];
        if (!m.SharedOnce)
        {
            curves.AddRange([Line("POLE", 8, 10, -8, 10), Line("COIL", 8, 9.5, 8, 5)]);
        }

        if (m.Cut)
        {
            curves = [.. curves.SelectMany(c => Cut(c, 0.1 + (0.8 * random.NextDouble())))];
        }

        if (m.Gaps)
        {
            curves = [.. curves.Select(c => Jolted(c, random))];
        }

        if (m.Repeat)
        {
            curves.AddRange(curves.Where(_ => random.Next(3) == 0).ToList());
        }

        SketchCurve[] all = [.. curves.Select(c => random.Next(2) == 0 ? c : c with { Curve = c.Curve.Reversed() })];
        random.Shuffle(all);
        return Sketch(all);
    }

    private static SketchCurve[] Cut(SketchCurve c, double t) =>
        [c with { Curve = c.Curve.Part(0, t) }, c with { Curve = c.Curve.Part(t, 1) }];

    // Ends of straight curves move by less than a third of the join tolerance, as careless drawings have them.
    private static SketchCurve Jolted(SketchCurve c, Random random)
    {
        Point Off() => Point.Polar(0.3 * Join * random.NextDouble(), Math.Tau * random.NextDouble());
        return c.Curve is Line l ? c with { Curve = new Line(l.Start + Off(), l.End + Off()) } : c;
    }
}
