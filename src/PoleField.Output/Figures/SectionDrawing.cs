using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>Exact curves as polylines fine enough for the eye.</summary>
internal static class SectionDrawing
{
    /// <summary>The boundary between different parts, within the tolerance (metres) of the curves.</summary>
    public static IReadOnlyList<IReadOnlyList<Point>> Outlines(CrossSection section, double tolerance) =>
    [
        .. section.Edges
            .Where(e => PartOf(section, e.Left) != PartOf(section, e.Right))
            .Select(e => Flatten(e.Curve, tolerance)),
    ];

    /// <summary>An outline as one closed polyline.</summary>
    public static IReadOnlyList<Point> Flatten(Outline outline, double tolerance)
    {
        List<Point> points = [outline.Curves[0].Start];
        foreach (Curve c in outline.Curves)
        {
            points.AddRange(Flatten(c, tolerance).Skip(1));
        }

        return points;
    }

    /// <summary>A curve as a polyline within the tolerance, from start to end.</summary>
    public static IReadOnlyList<Point> Flatten(Curve curve, double tolerance)
    {
        if (curve is Line)
        {
            return [curve.Start, curve.End];
        }

        List<Point> points = [curve.Start];
        const int pieces = 8; // a closed curve or one with turning points must not be taken for its chord
        for (int i = 0; i < pieces; i++)
        {
            Refine(i / (double)pieces, (i + 1) / (double)pieces);
        }

        return points;

        void Refine(double from, double to)
        {
            Point a = curve.At(from), b = curve.At(to), middle = curve.At(0.5 * (from + to));
            if (middle.DistanceTo(Point.Between(a, b, 0.5)) > tolerance && to - from > 1e-4)
            {
                Refine(from, 0.5 * (from + to));
                Refine(0.5 * (from + to), to);
                return;
            }

            points.Add(b);
        }
    }

    /// <summary>A view with the shape of the plot area around what must be seen.</summary>
    public static Box View(Box seen, double widthOverHeight)
    {
        double width = Math.Max(seen.Width, seen.Height * widthOverHeight);
        double height = width / widthOverHeight;
        Point half = new(width / 2, height / 2);
        return new Box(seen.Centre - half, seen.Centre + half);
    }

    /// <summary>The section and the aperture with a little room, inside the circle that is meshed around them.</summary>
    public static Box WholeView(CrossSection section, Aperture aperture)
    {
        Box all = section.Bounds.Including(aperture.Outline.Bounds);
        return all.Inflated(0.045 * all.Diagonal);
    }

    /// <summary>Part around the aperture worth a closer look: the faces on both sides of the beam.</summary>
    public static Box BeamView(CrossSection section, Aperture aperture)
    {
        Box beam = aperture.Outline.Bounds;
        double nearest = section.Edges.Min(e => e.Curve.DistanceTo(beam.Centre));
        double half = Math.Max(0.8 * Math.Max(beam.Width, beam.Height), 2.2 * nearest);
        return Box.Around(beam.Centre).Inflated(half);
    }

    private static int PartOf(CrossSection section, int region) =>
        region == CrossSection.Outside ? int.MinValue : section.Regions[region].Part;
}
