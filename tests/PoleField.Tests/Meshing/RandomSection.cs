using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Tests.Meshing;

/// <summary>Valid sections made by chance: disjoint discs each hold a shape, some shapes hold another one.</summary>
internal static class RandomSection
{
    private const double SharpDegrees = 62;

    public static CrossSection Make(int seed)
    {
        Random random = new(seed);
        SectionFixture s = new();
        if (seed % 2 == 0)
        {
            s.Rectangle(CrossSection.Air, CrossSection.Outside, new Point(-3, -3), new Point(3, 3));
        }

        List<(Point Centre, double Radius)> taken = [];
        int wanted = random.Next(1, 9);
        for (int tries = 0; tries < 200 && taken.Count < wanted; tries++)
        {
            Point centre = new((4 * random.NextDouble()) - 2, (4 * random.NextDouble()) - 2);
            double radius = 0.02 + (0.8 * random.NextDouble() * random.NextDouble());

            // Now and then shapes come within a hundredth of their size.
            if (taken.TrueForAll(o => o.Centre.DistanceTo(centre) > 1.002 * (o.Radius + radius)))
            {
                taken.Add((centre, radius));
                Shape(s, random, centre, radius, CrossSection.Air);
            }
        }

        return s.Build();
    }

    /// <summary>Regions that have a corner sharper than refinement can better.</summary>
    public static HashSet<int> SharpRegions(CrossSection section)
    {
        HashSet<int> sharp = [];
        foreach (SectionEdge e in section.Edges)
        {
            foreach (SectionEdge f in section.Edges.Where(f => f != e && f.Start == e.End))
            {
                Point back = -e.Curve.Derivative(1), on = f.Curve.Derivative(0);
                double angle = Math.Atan2(on.Cross(back), on.Dot(back)) * 180 / Math.PI;
                if (angle > 0 && angle < SharpDegrees)
                {
                    sharp.Add(e.Left);
                }
                else if (angle < 0 && angle > -SharpDegrees)
                {
                    sharp.Add(e.Right);
                }
            }
        }

        return sharp;
    }

    private static void Shape(SectionFixture s, Random random, Point centre, double radius, int around)
    {
        int region = s.Region(FormattableString.Invariant($"part {centre.Y} {centre.Z} {radius}"));
        double turn = random.NextDouble() * Math.Tau;
        switch (random.Next(4))
        {
            case 0:
                s.Circle(region, around, centre, radius, turn);
                break;
            case 1:
                double half = (0.05 + (0.9 * random.NextDouble())) * Math.PI / 2;
                s.Polygon(region, around, [.. new[] { half, Math.PI - half, Math.PI + half, -half }.Select(a => centre + Point.Polar(radius, a + turn))]);
                break;
            case 2:
                Star(s, random, centre, radius, region, around);
                break;
            default:
                Point a = centre + Point.Polar(radius, turn), b = centre + Point.Polar(radius, turn + Math.PI);
                s.Edge(CircularArc.FromBulge(a, b, 0.1 + (0.9 * random.NextDouble())), region, around);
                s.Edge(CircularArc.FromBulge(b, a, 0.1 + (0.9 * random.NextDouble())), region, around);
                return;
        }

        if (random.Next(3) == 0)
        {
            // Smaller than every shape above is thick at its centre, but for the thinnest.
            Shape(s, random, centre, 0.03 * radius, region);
        }
    }

    private static void Star(SectionFixture s, Random random, Point centre, double radius, int region, int around)
    {
        int corners = random.Next(5, 12);
        Point[] places = new Point[corners];
        for (int i = 0; i < corners; i++)
        {
            double angle = (i + (0.8 * random.NextDouble())) * Math.Tau / corners;
            places[i] = centre + Point.Polar(radius * (0.3 + (0.7 * random.NextDouble())), angle);
        }

        s.Polygon(region, around, places);
    }
}
