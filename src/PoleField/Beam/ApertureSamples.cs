using PoleField.Geometry;
using PoleField.Numerics;

namespace PoleField.Beam;

/// <summary>
/// Places at which the beam's field is looked at: Gauss points with area weights over the aperture, points on its edge for
/// the extremes, and the two profiles through the centre.
/// </summary>
internal sealed class ApertureSamples
{
    private const int PointsPerStrip = 8;   // Gauss points across each strip, and along each line in it
    private const int EdgePointsPerCurve = 24;
    private const int ProfilePoints = 41;

    private ApertureSamples(Point centre, Point[] inside, double[] weights, Point[] edge, Point[] profileY, Point[] profileZ)
    {
        Centre = centre;
        Inside = inside;
        Weights = weights;
        Edge = edge;
        ProfileY = profileY;
        ProfileZ = profileZ;
    }

    public Point Centre { get; }

    public Point[] Inside { get; }

    /// <summary>Area weights of <see cref="Inside"/>, summing to 1.</summary>
    public double[] Weights { get; }

    public Point[] Edge { get; }

    public Point[] ProfileY { get; }

    public Point[] ProfileZ { get; }

    public static ApertureSamples Of(Aperture aperture, ApertureShape shape) =>
        Of(aperture, shape, (PointsPerStrip, PointsPerStrip));

    /// <summary>With given numbers of Gauss points across each strip (lines) and along each line.</summary>
    public static ApertureSamples Of(Aperture aperture, ApertureShape shape, (int Lines, int Points) perStrip)
    {
        Point centre = aperture.Centre;
        (Point[] inside, double[] weights) = Strips(aperture, shape, perStrip);
        return new ApertureSamples(
            centre,
            inside,
            weights,
            [.. shape.EdgePoints(EdgePointsPerCurve)],
            Profile(shape.Across(centre.Z), centre.Y, y => new Point(y, centre.Z)),
            Profile(shape.Along(centre.Y), centre.Z, z => new Point(centre.Y, z)));
    }

    /// <summary>The same pattern at a shifted beam.</summary>
    public ApertureSamples ShiftedBy(Point by)
    {
        Point[] Shifted(Point[] places) => [.. places.Select(p => p + by)];
        return new ApertureSamples(
            Centre + by, Shifted(Inside), Weights, Shifted(Edge), Shifted(ProfileY), Shifted(ProfileZ));
    }

    // Strips between the heights of the outline's corners; in each the width is a smooth function of z.
    private static (Point[] Inside, double[] Weights) Strips(
        Aperture aperture, ApertureShape shape, (int Lines, int Points) perStrip)
    {
        GaussRule lines = GaussRule.Legendre(perStrip.Lines);
        GaussRule rule = GaussRule.Legendre(perStrip.Points);
        double[] levels = Levels(aperture.Outline);
        var inside = new List<Point>();
        var weights = new List<double>();
        for (int s = 0; s + 1 < levels.Length; s++)
        {
            double height = levels[s + 1] - levels[s];
            for (int i = 0; i < lines.Nodes.Length; i++)
            {
                double z = levels[s] + (height * lines.Nodes[i]);
                foreach ((double from, double to) in shape.Across(z))
                {
                    for (int j = 0; j < rule.Nodes.Length; j++)
                    {
                        inside.Add(new Point(from + ((to - from) * rule.Nodes[j]), z));
                        weights.Add(height * lines.Weights[i] * (to - from) * rule.Weights[j]);
                    }
                }
            }
        }

        double total = weights.Sum();
        return ([.. inside], [.. weights.Select(w => w / total)]);
    }

    private static double[] Levels(Outline outline)
    {
        double tolerance = 1e-9 * outline.Bounds.Height;
        var levels = new List<double>();
        IEnumerable<double> all = outline.Curves.Select(c => c.Start.Z)
            .Append(outline.Bounds.Min.Z).Append(outline.Bounds.Max.Z).Order();
        foreach (double z in all)
        {
            if (levels.Count == 0 || z - levels[^1] > tolerance)
            {
                levels.Add(z);
            }
        }

        return [.. levels];
    }

    private static Point[] Profile(IEnumerable<(double From, double To)> intervals, double through, Func<double, Point> place)
    {
        foreach ((double from, double to) in intervals)
        {
            if (from <= through && through <= to)
            {
                return [.. Enumerable.Range(0, ProfilePoints)
                    .Select(k => place(from + ((to - from) * k / (ProfilePoints - 1))))];
            }
        }

        return [place(through)];
    }
}
