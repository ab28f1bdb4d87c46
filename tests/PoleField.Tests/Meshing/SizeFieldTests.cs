// Truth: the definition min(ceiling, min(size + growth·distance)) evaluated over all sources, and its Lipschitz bound.
using PoleField.Geometry;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Meshing;

public sealed class SizeFieldTests
{
    private const int Seed = 7;

    [Theory]
    [InlineData(0, 0.35)]
    [InlineData(1, 0.35)]
    [InlineData(7, 0.0)]
    [InlineData(50, 0.35)]
    [InlineData(5000, 0.35)]
    [InlineData(5000, 1.5)]
    public void EqualsTheMinimumOverAllSources(int count, double growth)
    {
        Random random = new(Seed);
        (Point At, double Size)[] sources = [.. Enumerable.Range(0, count).Select(_ => Source(random))];
        SizeField field = SizeField.FromSources(0.8, growth, sources);

        for (int i = 0; i < 300; i++)
        {
            Point p = new((3 * random.NextDouble()) - 1, (3 * random.NextDouble()) - 1);
            double expected = sources.Select(s => s.Size + (growth * s.At.DistanceTo(p))).Append(0.8).Min();

            Assert.Equal(expected, field.At(p), 1e-12);
        }
    }

    [Fact]
    public void FurtherSourcesOnlyLower()
    {
        Random random = new(Seed);
        (Point At, double Size)[] first = [.. Enumerable.Range(0, 500).Select(_ => Source(random))];
        (Point At, double Size)[] second = [.. Enumerable.Range(0, 500).Select(_ => Source(random))];
        SizeField before = SizeField.FromSources(0.8, 0.35, first);
        SizeField after = before.With(second);
        SizeField atOnce = SizeField.FromSources(0.8, 0.35, [.. first, .. second]);

        for (int i = 0; i < 300; i++)
        {
            Point p = new(random.NextDouble(), random.NextDouble());

            Assert.True(after.At(p) <= before.At(p));
            Assert.Equal(atOnce.At(p), after.At(p), 1e-12);
        }
    }

    [Fact]
    public void ScalingScalesEverySizeAtItsSource()
    {
        SizeField field = SizeField.FromSources(1, 0.5, [(new Point(0, 0), 0.1), (new Point(3, 0), 0.2)]).Scaled(0.5);

        Assert.Equal(0.05, field.At(new Point(0, 0)), 1e-15);
        Assert.Equal(0.1, field.At(new Point(3, 0)), 1e-15);
        Assert.Equal(0.5, field.At(new Point(100, 0)), 1e-15);
    }

    [Theory]
    [InlineData(0.0, 0.3, 1.0)]
    [InlineData(double.NaN, 0.3, 1.0)]
    [InlineData(1.0, -0.1, 1.0)]
    [InlineData(1.0, 0.3, 0.0)]
    [InlineData(1.0, 0.3, double.NaN)]
    public void RefusesSizesThatAreNone(double ceiling, double growth, double size) =>
        Assert.Throws<ArgumentException>(() => SizeField.FromSources(ceiling, growth, [(new Point(0, 0), size)]));

    private static (Point At, double Size) Source(Random random) =>
        (new Point(random.NextDouble(), random.NextDouble()), 0.01 + (0.3 * random.NextDouble()));
}
