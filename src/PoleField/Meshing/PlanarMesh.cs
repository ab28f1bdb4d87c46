using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>One sheet in the making: a triangulation, the curves it follows and the pieces they are cut into.</summary>
internal sealed class PlanarMesh
{
    private PlanarMesh(Triangulation triangulation, IReadOnlyList<BoundaryCurve> curves, List<CurvePiece> pieces)
    {
        Triangulation = triangulation;
        Curves = curves;
        Pieces = pieces;
    }

    public Triangulation Triangulation { get; }

    public IReadOnlyList<BoundaryCurve> Curves { get; }

    public List<CurvePiece> Pieces { get; }

    /// <summary>
    /// Triangulates corners, ends of pieces and extra places, recovers the pieces and drops what lies outside. Vertices are
    /// numbered: corners, then ends of pieces, then extra places.
    /// </summary>
    public static PlanarMesh Start(
        IReadOnlyList<Point> corners,
        IReadOnlyList<BoundaryCurve> curves,
        IReadOnlyList<(int Curve, double From, double To)> cuts,
        IReadOnlyList<Point> extra)
    {
        List<Point> places = [.. corners];
        List<CurvePiece> pieces = new(cuts.Count);
        for (int i = 0; i < cuts.Count; i++)
        {
            (int curve, double from, double to) = cuts[i];
            int a = from == 0 ? curves[curve].Start : places.Count - 1;
            int b = curves[curve].End;
            if (to < 1)
            {
                b = places.Count;
                places.Add(curves[curve].Curve.At(to));
            }

            pieces.Add(new CurvePiece(a, b, curve, from, to));
        }

        places.AddRange(extra);
        Triangulation triangulation = new(2 * places.Count);
        foreach (Point p in places)
        {
            triangulation.AddVertex(p);
        }

        Connect(triangulation, [.. places], UsedCorners(corners.Count, curves));
        for (int s = 0; s < pieces.Count; s++)
        {
            triangulation.Constrain(pieces[s].A, pieces[s].B, s);
        }

        triangulation.RemoveAll(RegionFlood.Regions(triangulation, curves, pieces), CrossSection.Outside);
        return new PlanarMesh(triangulation, curves, pieces);
    }

    private static bool[] UsedCorners(int count, IReadOnlyList<BoundaryCurve> curves)
    {
        bool[] used = new bool[count];
        foreach (BoundaryCurve c in curves)
        {
            used[c.Start] = true;
            used[c.End] = true;
        }

        return used;
    }

    private static void Connect(Triangulation triangulation, Point[] places, bool[] usedCorners)
    {
        triangulation.StartAround(Box.Around(places));
        int near = 0;
        foreach (int v in HilbertOrder.Of(places))
        {
            if (v >= usedCorners.Length || usedCorners[v])
            {
                near = triangulation.Insert(v, near);
                triangulation.Changed.Clear();
            }
        }
    }
}
