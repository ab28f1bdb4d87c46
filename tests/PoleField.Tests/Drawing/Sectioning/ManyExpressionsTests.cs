// Truth: areas of polygons with bulged sides in closed form (shoelace and circular segments); how a drawing states its
// curves must not matter.
using CsCheck;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Tests.Drawing.Dxf;
using PoleField.Tests.House;
using Xunit;
using static PoleField.Tests.Drawing.Sectioning.Drafts;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class ManyExpressionsTests
{
    private const double Relative = 1e-9;

    private static readonly string[] Layers = ["IRON", "PIN", "COIL"];

    private static Gen<(int Seed, int Corners)> Draws { get; } = Gen.Select(Gen.Int[0, 1_000_000], Gen.Int[4, 9]);

    /// <summary>A closed chain of lines and arcs: each corner with the bulge of the side that leaves it.</summary>
    private sealed record Shape(string Layer, (Point Corner, double Bulge)[] Sides)
    {
        public IEnumerable<Side> All => Sides.Select((s, i) => new Side(Layer, s.Corner, Sides[(i + 1) % Sides.Length].Corner, s.Bulge));

        public double Area => All.Sum(s => (0.5 * s.From.Cross(s.To)) + s.Segment);

        public Shape Mapped(Affine map) => this with { Sides = [.. Sides.Select(s => (map.Apply(s.Corner), map.Determinant < 0 ? -s.Bulge : s.Bulge))] };
    }

    /// <summary>A straight or circular side; the bulge is the tangent of a quarter of its angle, positive counter-clockwise.</summary>
    private readonly record struct Side(string Layer, Point From, Point To, double Bulge)
    {
        public double Angle => 4 * Math.Atan(Bulge);

        public double Radius => From.DistanceTo(To) / (2 * Math.Abs(Math.Sin(Angle / 2)));

        public double Segment => Bulge == 0 ? 0 : 0.5 * Math.Sign(Bulge) * Radius * Radius * (Math.Abs(Angle) - Math.Sin(Math.Abs(Angle)));

        public Point Centre => Point.Between(From, To, 0.5) + ((1 - (Bulge * Bulge)) / (4 * Bulge) * (To - From).Perpendicular);

        // Where the tangents at both ends meet.
        public Point Apex => Point.Between(From, To, 0.5) - (0.5 * Math.Tan(Angle / 2) * (To - From).Perpendicular);
    }

    [Theory]
    [InlineData("loose")]
    [InlineData("polylines")]
    [InlineData("old polylines")]
    [InlineData("block")]
    [InlineData("splines")]
    public void TheSameOutlinesStatedOtherwiseAreTheSameRegions(string way) => Draws.SampleFixed((seed, corners) =>
    {
        Random random = new(seed);
        Shape[] shapes = [Pole(random, corners), Circle(random), Coil(random)];
        HandDrawn drawing = Express(way, shapes, random);

        CrossSection s = Sound(drawing.Read(), Parts(Layers));

        Assert.Equal(4, s.Regions.Count);
        Near(shapes[0].Area - shapes[1].Area, Areas(s, "IRON"));
        Near(shapes[1].Area, Areas(s, "PIN"));
        Near(shapes[2].Area, Areas(s, "COIL"));
    }, iter: 40);

    private static void Near(double expected, double[] areas) =>
        Assert.InRange(Assert.Single(areas), expected * (1 - Relative), expected * (1 + Relative));

    private static Shape Pole(Random random, int corners) => new("IRON", [.. Enumerable.Range(0, corners).Select(i => (
        Point.Polar(18 + (4 * random.NextDouble()), Math.Tau * (i + (0.2 * random.NextDouble())) / corners),
        random.Next(3) == 0 ? 0 : 0.36 * (random.NextDouble() - 0.5)))]);

    private static Shape Circle(Random random)
    {
        double radius = 1 + (3 * random.NextDouble()), from = random.NextDouble();
        return new("PIN", [.. Enumerable.Range(0, 4).Select(i => (Point.Polar(radius, from + (Math.PI / 2 * i)), Math.Tan(Math.PI / 8)))]);
    }

    private static Shape Coil(Random random)
    {
        double width = 5 + random.NextDouble(), height = 8 + random.NextDouble();
        return new("COIL", [(new Point(40, 0), 0), (new Point(40 + width, 0), 0), (new Point(40 + width, height), 0.3), (new Point(40, height), 0)]);
    }

    private static HandDrawn Express(string way, Shape[] shapes, Random random) => way switch
    {
        "loose" => HandDrawn.With(Shuffled(shapes.SelectMany(s => Loose(s, random)), random)),
        "polylines" => HandDrawn.With(Shuffled(shapes.Select(Light), random)),
        "old polylines" => HandDrawn.With(Shuffled(shapes.Select(Old), random)),
        "splines" => HandDrawn.With(Shuffled(shapes.SelectMany(s => s.All.Select(Spline)), random)),
        _ => InBlock(shapes, random),
    };

    private static string[] Shuffled(IEnumerable<string> entities, Random random)
    {
        string[] all = [.. entities];
        random.Shuffle(all);
        return all;
    }

    private static IEnumerable<string> Loose(Shape shape, Random random)
    {
        if (shape.Layer != "PIN")
        {
            return shape.All.Select(s => random.Next(2) == 0 ? Single(s) : Single(new Side(s.Layer, s.To, s.From, -s.Bulge)));
        }

        double radius = shape.Sides[0].Corner.Length;
        string circle = FormattableString.Invariant($"8 PIN; 10 0; 20 0; 40 {radius}");
        return random.Next(2) == 0 ? ["0 CIRCLE; " + circle] : [$"0 ARC; {circle}; 50 30; 51 210", $"0 ARC; {circle}; 50 210; 51 30"];
    }

    private static string Single(Side s)
    {
        if (s.Bulge == 0)
        {
            return FormattableString.Invariant($"0 LINE; 8 {s.Layer}; 10 {s.From.Y}; 20 {s.From.Z}; 11 {s.To.Y}; 21 {s.To.Z}");
        }

        (Point start, Point end) = s.Bulge > 0 ? (s.From, s.To) : (s.To, s.From);
        double Degrees(Point p) => Math.Atan2(p.Z - s.Centre.Z, p.Y - s.Centre.Y) * 180 / Math.PI;
        return FormattableString.Invariant(
            $"0 ARC; 8 {s.Layer}; 10 {s.Centre.Y}; 20 {s.Centre.Z}; 40 {s.Radius}; 50 {Degrees(start)}; 51 {Degrees(end)}");
    }

    private static string Light(Shape shape) => $"0 LWPOLYLINE; 8 {shape.Layer}; 70 1; "
        + string.Join("; ", shape.Sides.Select(s => FormattableString.Invariant($"10 {s.Corner.Y}; 20 {s.Corner.Z}; 42 {s.Bulge}")));

    private static string Old(Shape shape) => $"0 POLYLINE; 8 {shape.Layer}; 66 1; 70 1; "
        + string.Join("; ", shape.Sides.Select(s => FormattableString.Invariant($"0 VERTEX; 8 0; 10 {s.Corner.Y}; 20 {s.Corner.Z}; 42 {s.Bulge}")))
        + "; 0 SEQEND";

    private static string Spline(Side s) => s.Bulge == 0
        ? FormattableString.Invariant($"0 SPLINE; 8 {s.Layer}; 71 1; 40 0; 40 0; 40 1; 40 1; 10 {s.From.Y}; 20 {s.From.Z}; 10 {s.To.Y}; 20 {s.To.Z}")
        : FormattableString.Invariant($"0 SPLINE; 8 {s.Layer}; 71 2; 40 0; 40 0; 40 0; 40 1; 40 1; 40 1; 41 1; 41 {Math.Cos(s.Angle / 2)}; 41 1; ")
            + FormattableString.Invariant($"10 {s.From.Y}; 20 {s.From.Z}; 10 {s.Apex.Y}; 20 {s.Apex.Z}; 10 {s.To.Y}; 20 {s.To.Z}");

    // The content is drawn where the block's place, turn, size and side put it back.
    private static HandDrawn InBlock(Shape[] shapes, Random random)
    {
        double size = 0.5 + random.NextDouble(), turn = 360 * random.NextDouble(), side = random.Next(2) == 0 ? 1 : -1;
        (double s, double c) = Math.SinCos(turn * Math.PI / 180);
        Point at = new(100 * random.NextDouble(), -50 * random.NextDouble());
        double u = 1 / (size * side), v = 1 / size;
        Affine back = new(u * c, u * s, -v * s, v * c, -u * ((c * at.Y) + (s * at.Z)), v * ((s * at.Y) - (c * at.Z)));
        return HandDrawn.With(FormattableString.Invariant($"0 INSERT; 8 0; 2 MAGNET; 10 {at.Y}; 20 {at.Z}; 41 {size * side}; 42 {size}; 50 {turn}")) with
        {
            Blocks = HandDrawn.Block("MAGNET", string.Join("; ", shapes.Select(shape => Light(shape.Mapped(back))))),
        };
    }
}
