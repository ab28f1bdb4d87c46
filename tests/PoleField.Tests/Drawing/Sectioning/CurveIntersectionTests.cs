// Truth: intersections of conics in closed form.
using CsCheck;
using PoleField.Geometry;
using PoleField.Tests.House;
using Xunit;

namespace PoleField.Tests.Drawing.Sectioning;

public sealed class CurveIntersectionTests
{
    private const double Tolerance = 1e-9;

    [Fact]
    public void EllipseAndCircleMeetInFourPoints()
    {
        // y²/9 + z²/4 = 1 and y² + z² = 6.25
        EllipticArc ellipse = new(new Point(0, 0), new Point(3, 0), 2, 0.1, Math.Tau);
        CircularArc circle = new(new Point(0, 0), 2.5, 0.3, Math.Tau);
        double z = Math.Sqrt((1 - (6.25 / 9)) / ((1.0 / 4) - (1.0 / 9)));
        double y = Math.Sqrt(6.25 - (z * z));

        List<(double OnFirst, double OnSecond)> found = CurveIntersection.Find(ellipse, circle, Tolerance);

        Assert.Equal(4, found.Count);
        Assert.All(found, f =>
        {
            Point p = ellipse.At(f.OnFirst);
            Assert.Equal(y, Math.Abs(p.Y), 9);
            Assert.Equal(z, Math.Abs(p.Z), 9);
            Assert.InRange(p.DistanceTo(circle.At(f.OnSecond)), 0, Tolerance);
        });
    }

    [Theory]
    [InlineData(0.0, 2)]
    [InlineData(1.999, 2)] // just below the top
    [InlineData(2.001, 0)] // just above it
    public void LineCutsAnEllipseAtItsLevel(double level, int points)
    {
        EllipticArc ellipse = new(new Point(0, 0), new Point(3, 0), 2, 0.1, Math.Tau);
        Line line = new(new Point(-5, level), new Point(5, level));

        Assert.Equal(points, CurveIntersection.Find(ellipse, line, Tolerance).Count);
    }

    [Fact]
    public void LineTouchesACircleOnce() =>
        Assert.Single(CurveIntersection.Find(new CircularArc(new Point(1, 2), 3, 0, Math.Tau), new Line(new Point(-9, 5), new Point(9, 5)), Tolerance));

    [Fact]
    public void CirclesMeetWhereTheirRadiiSay()
    {
        // 3-4-5: circles of radius 3 and 4, centres 5 apart.
        List<(double OnFirst, double OnSecond)> found = CurveIntersection.Find(
            new CircularArc(new Point(0, 0), 3, 0, Math.Tau), new CircularArc(new Point(5, 0), 4, 1, Math.Tau), Tolerance);

        Assert.Equal(2, found.Count);
        Assert.All(found, f => Assert.Equal(1.8, new CircularArc(new Point(0, 0), 3, 0, Math.Tau).At(f.OnFirst).Y, 12));
    }

    [Fact]
    public void ArcsEndWhereTheySay() =>
        Assert.Empty(CurveIntersection.Find(
            new CircularArc(new Point(0, 0), 3, 0.1, 1), new Line(new Point(-5, -1), new Point(5, -1)), Tolerance));

    [Fact]
    public void EqualCurvesShareNoIsolatedPoint()
    {
        Assert.Empty(CurveIntersection.Find(new Line(new Point(0, 0), new Point(2, 1)), new Line(new Point(4, 2), new Point(1, 0.5)), Tolerance));
        Assert.Empty(CurveIntersection.Find(
            new CircularArc(new Point(0, 0), 3, 0, 2), new CircularArc(new Point(0, 0), 3, 1, 2), Tolerance));
    }

    [Fact]
    public void GeneralSearchAgreesWithTheClosedForm() =>
        Gen.Select(Gen.Double[-2, 2], Gen.Double[-2, 2], Gen.Double[0.5, 2], Gen.Double[0.5, 5], Gen.Double[0, 6]).SampleFixed((y, z, radius, sweep, start) =>
        {
            // Near-contacts and near-ends are counted by tolerance, not by geometry.
            double apart = new Point(y, z).Length;
            if (new[] { apart - radius - 1.3, apart - Math.Abs(radius - 1.3) }.Any(d => Math.Abs(d) < 1e-3))
            {
                return;
            }

            CircularArc arc = new(new Point(y, z), radius, start, sweep);
            EllipticArc same = new(new Point(y, z), new Point(radius, 0), radius, start, sweep);
            CircularArc other = new(new Point(0, 0), 1.3, 0.2, 5);

            List<(double, double)> closed = CurveIntersection.Find(arc, other, Tolerance);
            List<(double, double)> searched = CurveIntersection.Find(same, other, Tolerance);

            Assert.Equal(closed.Count, searched.Count);
            foreach (((double a, _), (double b, _)) in closed.Order().Zip(searched))
            {
                Assert.InRange(arc.At(a).DistanceTo(same.At(b)), 0, 1e-7);
            }
        }, iter: 300);
}
