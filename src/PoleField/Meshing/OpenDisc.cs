using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>The second disc: the same rim vertices, its own inside, a vertex at its centre that stands for infinity.</summary>
internal static class OpenDisc
{
    /// <summary>Size inside over the radius; smaller brings nothing there, the field is smooth.</summary>
    public const double RelativeSize = 0.3;

    private const double Growth = 0.35;

    /// <summary>Meshes the disc; vertices 0 … rim.Count − 1 are the rim's, the next is the centre.</summary>
    /// <param name="circle">The circle.</param>
    /// <param name="rim">Rim vertices counter-clockwise.</param>
    /// <param name="limits">Limits of refinement.</param>
    /// <param name="cancellation">Stops the work.</param>
    public static PlanarMesh Fill(
        OpenCircle circle, IReadOnlyList<Point> rim, RefinementLimits limits, CancellationToken cancellation)
    {
        int n = rim.Count;
        List<BoundaryCurve> sides = new(n);
        List<(int Curve, double From, double To)> cuts = new(n);
        List<(Point At, double Size)> sources = new(n);
        for (int i = 0; i < n; i++)
        {
            int next = (i + 1) % n;
            sides.Add(new BoundaryCurve(new Line(rim[i], rim[next]), -1, i, next, CrossSection.Air, CrossSection.Outside));
            cuts.Add((i, 0, 1));
            sources.Add((Point.Between(rim[i], rim[next], 0.5), rim[i].DistanceTo(rim[next])));
        }

        PlanarMesh mesh = PlanarMesh.Start(rim, sides, cuts, [circle.Centre, .. FirstLayer(circle, rim)]);
        SizeField size = SizeField.FromSources(RelativeSize * circle.Radius, Growth, sources);
        Refinement.Run(mesh, size, limits with { PiecesFixed = true }, cancellation);
        return mesh;
    }

    // The rim may not be split, so good triangles along it are laid out beforehand: an apex over every side.
    private static List<Point> FirstLayer(OpenCircle circle, IReadOnlyList<Point> rim)
    {
        const double height = 0.8; // over the side's length; 0.87 would be equilateral, the ring is narrower inside
        const double crowded = 0.6;
        List<(Point At, double Length)> apexes = [];
        for (int i = 0; i < rim.Count; i++)
        {
            Point a = rim[i], b = rim[(i + 1) % rim.Count];
            double length = a.DistanceTo(b);
            Point middle = Point.Between(a, b, 0.5);
            Point apex = middle + ((height * length / circle.Centre.DistanceTo(middle)) * (circle.Centre - middle));
            bool clash = apexes.Count > 0 && (IsClose(apex, length, apexes[^1]) || IsClose(apex, length, apexes[0]));
            if (!clash)
            {
                apexes.Add((apex, length));
            }
        }

        return [.. apexes.Select(a => a.At)];

        static bool IsClose(Point apex, double length, (Point At, double Length) other) =>
            apex.DistanceTo(other.At) < crowded * Math.Min(length, other.Length);
    }
}
