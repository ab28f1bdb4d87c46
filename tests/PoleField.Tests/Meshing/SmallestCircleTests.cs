// Truth: the smallest circle holds all places, and two or three of them that lie on it are in no open half of it.
using PoleField.Geometry;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Meshing;

public sealed class SmallestCircleTests
{
    [Theory]
    [InlineData(1, 3)]
    [InlineData(2, 10)]
    [InlineData(3, 500)]
    [InlineData(4, 3000)]
    public void HoldsAllAndCannotShrink(int seed, int count)
    {
        Random random = new(seed);
        Point[] places = [.. Enumerable.Range(0, count).Select(_ => new Point(random.NextDouble(), 0.3 * random.NextDouble()))];

        OpenCircle circle = SmallestCircle.Around(places);

        Assert.True(places.Max(p => p.DistanceTo(circle.Centre)) <= circle.Radius * (1 + 1e-9));
        double[] onIt = [.. places.Where(p => p.DistanceTo(circle.Centre) >= circle.Radius * (1 - 1e-9))
            .Select(p => Math.Atan2(p.Z - circle.Centre.Z, p.Y - circle.Centre.Y)).Order()];
        double widest = Enumerable.Range(0, onIt.Length)
            .Max(i => i + 1 < onIt.Length ? onIt[i + 1] - onIt[i] : onIt[0] + Math.Tau - onIt[i]);
        Assert.True(onIt.Length >= 2 && widest <= Math.PI + 1e-6);
    }

    [Fact]
    public void OfASquareIsItsCircumscribedCircle()
    {
        OpenCircle circle = SmallestCircle.Around([new(0, 0), new(2, 0), new(2, 2), new(0, 2), new(1, 1)]);

        Assert.Equal(Math.Sqrt(2), circle.Radius, 1e-12);
        Assert.Equal(1, circle.Centre.Y, 1e-12);
        Assert.Equal(1, circle.Centre.Z, 1e-12);
    }
}
