using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Output.Maps;

namespace PoleField.Tests.Output;

/// <summary>A small field map and mesh whose values are the closed form of two conductors.</summary>
internal static class SampleMap
{
    public static MapProvenance Origin { get; } = new("Map of two conductors, µ-metal", new string('c', 64), new string('5', 64), "0.1.0", 1e-4);

    public static FieldMap Make() => FieldMap.Sample(
        MapGrid.Rectangle(new Point(-0.2e-3, 3.5e-3), new Point(0.2e-3, 3.8e-3), 0.1e-3),
        p => (p.Y, p.Z) switch
        {
            ( < -0.15e-3, < 3.55e-3) => MapSample.Nothing,
            ( < -0.05e-3, < 3.55e-3) => MapSample.From(new FieldSample(0, 0.5, 1, 10, 2), _ => "POLE, \"A\""),
            _ => MapSample.From(TwoConductorScene.At(p)),
        },
        Origin);

    public static IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> Cells()
    {
        foreach (Corners t in Triangles())
        {
            Point[] nodes = [t.A, t.B, t.C, Point.Between(t.A, t.B, 0.5), Point.Between(t.B, t.C, 0.5), Point.Between(t.C, t.A, 0.5)];
            int region = ((1 / 3.0) * (t.A + t.B + t.C)).Z < 4e-3 ? 2 : CrossSection.Air;
            yield return (nodes, [.. nodes.Select(p => At(p, region))], region);
        }
    }

    private static IEnumerable<Corners> Triangles() => LevelLineTests.Grid(_ => 0, cells: 8)
        .Select(t => new Corners(Place(t.P0), Place(t.P1), Place(t.P2)));

    private static Point Place(Point p) => new Point(0, 4e-3) + (2e-3 * p);

    private static FieldSample At(Point p, int region)
    {
        (double a, double by, double bz) = TwoConductorScene.Field(p);
        return new FieldSample(a, by, bz, Math.Sqrt((by * by) + (bz * bz)) / (4e-7 * Math.PI), region);
    }

    private readonly record struct Corners(Point A, Point B, Point C);
}
