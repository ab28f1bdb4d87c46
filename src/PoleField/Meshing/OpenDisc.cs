using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>The second disc: the same rim vertices, its own inside, a vertex at its centre that stands for infinity.</summary>
internal static class OpenDisc
{
    private const double Growth = 0.35;

    /// <summary>
    /// Meshes the disc after its rim's pieces in the first sheet. Where a badly shaped triangle remains because the rim's edges
    /// there differ too much, the first sheet halves the longest of them and refines on, until the disc is good as well.
    /// </summary>
    /// <param name="circle">The circle.</param>
    /// <param name="size">Edge length inside, metres.</param>
    /// <param name="first">Mesh of the first sheet; its last curve is the circle.</param>
    /// <param name="firstRefinement">Refinement of the first sheet.</param>
    /// <param name="limits">Limits of refinement.</param>
    /// <param name="cancellation">Stops the work.</param>
    /// <returns>The disc's mesh: vertices 0 … n − 1 are the n rim vertices along the circle, vertex n its centre.</returns>
    public static PlanarMesh Fill(
        OpenCircle circle, double size, PlanarMesh first, Refinement firstRefinement, RefinementLimits limits, CancellationToken cancellation)
    {
        // Halving evens the rim out, one or two edges a round; after so many rounds a poor angle in the disc is accepted.
        const int rounds = 30;
        int curve = first.Curves.Count - 1;
        for (int round = 1; ; round++)
        {
            List<CurvePiece> rim = [.. first.Pieces.Where(p => p.Curve == curve).OrderBy(p => p.TA)];
            PlanarMesh disc = Fill(circle, size, first.Curves[curve].Curve, rim, limits with { PiecesFixed = true }, cancellation);
            SortedSet<double> halves = RimEdgesToHalve(disc, rim, limits.SmallestAngleDegrees);
            if (halves.Count == 0 || round == rounds)
            {
                return disc;
            }

            firstRefinement.SplitCurve(curve, halves);
            firstRefinement.Run(cancellation);
        }
    }

    // Middle parameter of the longest rim edge at each badly shaped triangle that touches the rim.
    private static SortedSet<double> RimEdgesToHalve(PlanarMesh disc, List<CurvePiece> rim, double smallestAngleDegrees)
    {
        SortedSet<double> halves = [];
        double sin = Math.Sin(smallestAngleDegrees * Math.PI / 180);
        for (int t = 0; t < disc.Triangulation.TriangleCount; t++)
        {
            int[] corners = [.. Enumerable.Range(3 * t, 3).Select(disc.Triangulation.Origin)];
            if (Refinement.SmallestSineSquared(disc.Triangulation, t) >= sin * sin)
            {
                continue;
            }

            int longest = -1;
            foreach (int v in corners.Where(v => v < rim.Count))
            {
                foreach (int i in new[] { v, (v + rim.Count - 1) % rim.Count })
                {
                    longest = longest < 0 || Extent(rim[i]) > Extent(rim[longest]) * (1 + 1e-9) ? i : longest;
                }
            }

            if (longest >= 0)
            {
                halves.Add(0.5 * (rim[longest].TA + rim[longest].TB));
            }
        }

        return halves;
    }

    private static double Extent(CurvePiece p) => p.TB - p.TA;

    private static PlanarMesh Fill(
        OpenCircle circle, double size, Curve curve, List<CurvePiece> rim, RefinementLimits limits, CancellationToken cancellation)
    {
        Point[] places = [.. rim.Select(p => curve.At(p.TA))];
        List<(Point At, double Size)> sources = [];
        for (int i = 0; i < rim.Count; i++)
        {
            Point next = places[(i + 1) % rim.Count];
            sources.Add((Point.Between(places[i], next, 0.5), places[i].DistanceTo(next)));
        }

        BoundaryCurve boundary = new(curve, -1, 0, 0, CrossSection.Air, CrossSection.Outside);
        PlanarMesh mesh = PlanarMesh.Start(
            [places[0]], [boundary], [.. rim.Select(p => (0, p.TA, p.TB))], [circle.Centre, .. FirstLayer(circle, places)]);
        SizeField wanted = SizeField.FromSources(size, Growth, sources);
        Refinement.Of(mesh, wanted, limits).Run(cancellation);
        return mesh;
    }

    // Good triangles along the rim are laid out beforehand, an apex over every side, so that few sides need halving.
    private static List<Point> FirstLayer(OpenCircle circle, Point[] rim)
    {
        const double height = 0.8; // over the side's length; 0.87 would be equilateral, the ring is narrower inside
        const double crowded = 0.6;
        List<(Point At, double Length)> apexes = [];
        for (int i = 0; i < rim.Length; i++)
        {
            Point a = rim[i], b = rim[(i + 1) % rim.Length];
            double length = a.DistanceTo(b);
            Point middle = Point.Between(a, b, 0.5);
            Point apex = middle + ((height * length / circle.Centre.DistanceTo(middle)) * (circle.Centre - middle));
            bool clash = apexes.Count > 0 && (IsClose(apex, length, apexes[^1]) || IsClose(apex, length, apexes[0]));
            Point before = rim[(i + rim.Length - 1) % rim.Length], after = rim[(i + 2) % rim.Length];
            bool encroaches = (before - apex).Dot(a - apex) < 0 || (b - apex).Dot(after - apex) < 0;
            if (!clash && !encroaches)
            {
                apexes.Add((apex, length));
            }
        }

        return [.. apexes.Select(a => a.At)];

        static bool IsClose(Point apex, double length, (Point At, double Length) other) =>
            apex.DistanceTo(other.At) < crowded * Math.Min(length, other.Length);
    }
}
