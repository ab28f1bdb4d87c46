// Truth: closed forms (level lines of a plane are straight, of a cone circles; field lines of two line currents are circles).
using PoleField.Geometry;
using PoleField.Output.Figures;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class LevelLineTests
{
    [Fact]
    public void ALevelOfAPlaneIsOneStraightLineOfTwoPoints()
    {
        IReadOnlyList<LevelLine> lines = LevelLines.Trace(Grid(p => p.Y + (2 * p.Z)), step: 0.75, tolerance: 1e-6);

        Assert.Equal(7, lines.Count); // levels −2.25, −1.5 … 2.25 cross the square; ±3 only touch its corners
        foreach (LevelLine line in lines)
        {
            Assert.Equal(2, line.Points.Count);
            Assert.All(line.Points, p => Assert.Equal(line.Level, p.Y + (2 * p.Z), 1e-12));
        }
    }

    [Fact]
    public void ALevelOfAConeIsOneClosedCircle()
    {
        IReadOnlyList<LevelLine> lines = LevelLines.Trace(Grid(p => p.Length), step: 0.4, tolerance: 1e-4);

        LevelLine circle = Assert.Single(lines, l => Math.Abs(l.Level - 0.4) < 1e-12);
        Assert.Equal(circle.Points[0], circle.Points[^1]);
        Assert.All(circle.Points, p => Assert.Equal(0.4, p.Length, 1e-2));
        Assert.Equal(Math.Tau * 0.4, Length(circle), 5e-3);
    }

    [Fact]
    public void PiecesOfAValueThatJumpsFromCellToCellAreJoinedWithoutGaps()
    {
        // As |B| of finite elements: each triangle has its own copy of the cone, off by up to 0.002.
        IEnumerable<ValueTriangle> jumping = Grid(p => p.Length).Select((t, i) =>
        {
            double off = 0.002 * Math.Sin(i);
            return t with { V0 = t.V0 + off, V1 = t.V1 + off, V2 = t.V2 + off };
        });

        IReadOnlyList<LevelLine> lines = LevelLines.Trace(jumping, step: 0.4, tolerance: 1e-4, join: 0.01);

        LevelLine longest = lines.Where(l => Math.Abs(l.Level - 0.4) < 1e-12).MaxBy(Length)!;
        Assert.Equal(Math.Tau * 0.4, Length(longest), 0.1);
        Assert.All(longest.Points, p => Assert.Equal(0.4, p.Length, 1e-2));
    }

    [Fact]
    public void FieldLinesOfTwoConductorsAreApollonianCircles()
    {
        FieldScene scene = TwoConductorScene.Scene(cells: 120);
        IEnumerable<ValueTriangle> potential = scene.Triangles.Select(
            t => new ValueTriangle(t.P0, t.P1, t.P2, t.S0.Potential, t.S1.Potential, t.S2.Potential));

        IReadOnlyList<LevelLine> lines = LevelLines.Trace(potential, step: 4e-3, tolerance: 1e-6);

        // Outside the conductors A = −(μ0 I/2π) ln(r₂/r₁): constant ratio of the distances along a line.
        double k = 4e-7 * Math.PI * TwoConductorScene.Current / Math.Tau;
        Point left = new(-TwoConductorScene.HalfSpacing, 0), right = new(TwoConductorScene.HalfSpacing, 0);
        Assert.True(lines.Count > 5);
        foreach (LevelLine line in lines)
        {
            double wanted = Math.Exp(-line.Level / k);
            foreach (Point p in line.Points.Where(p => p.DistanceTo(left) > 3e-3 && p.DistanceTo(right) > 3e-3))
            {
                // Linear interpolation over cells of 0.4 mm.
                Assert.Equal(wanted, p.DistanceTo(right) / p.DistanceTo(left), 0.01 * wanted);
            }
        }
    }

    [Fact]
    public void SimplifyingKeepsEveryLeftOutPointWithinTheTolerance()
    {
        Point[] wave = [.. Enumerable.Range(0, 400).Select(i => new Point(i * 0.01, Math.Sin(i * 0.01)))];

        IReadOnlyList<Point> simple = LevelLines.Simplify(wave, 1e-3);

        Assert.True(simple.Count < 60);
        Assert.All(wave, p => Assert.InRange(Enumerable.Range(1, simple.Count - 1).Min(i => Distance(p, simple[i - 1], simple[i])), 0, 1e-3));
    }

    internal static IEnumerable<ValueTriangle> Grid(Func<Point, double> f, int cells = 40)
    {
        for (int i = 0; i < cells; i++)
        {
            for (int j = 0; j < cells; j++)
            {
                Point a = At(i, j), b = At(i + 1, j), c = At(i + 1, j + 1), d = At(i, j + 1);
                yield return new ValueTriangle(a, b, c, f(a), f(b), f(c));
                yield return new ValueTriangle(a, c, d, f(a), f(c), f(d));
            }
        }

        Point At(int i, int j) => new(-1 + (2.0 * i / cells), -1 + (2.0 * j / cells));
    }

    private static double Length(LevelLine line) =>
        Enumerable.Range(1, line.Points.Count - 1).Sum(i => line.Points[i].DistanceTo(line.Points[i - 1]));

    private static double Distance(Point p, Point a, Point b)
    {
        double t = Math.Clamp((p - a).Dot(b - a) / (b - a).SquaredLength, 0, 1);
        return p.DistanceTo(Point.Between(a, b, t));
    }
}
