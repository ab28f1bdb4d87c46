using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Turns finished sheets into a <see cref="Mesh"/>.</summary>
internal static class MeshAssembly
{
    /// <summary>Joins the first sheet and, for open surroundings, the disc with the same rim.</summary>
    public static Mesh Join(CrossSection section, PlanarMesh inside, OpenCircle? circle, PlanarMesh? disc)
    {
        List<Point> vertices = [];
        List<int> triangles = new(3 * inside.Triangulation.TriangleCount);
        // What is near in the plane is near in memory: passes over the mesh are faster for it.
        int[] order = HilbertOrder.OfTriangles(inside.Triangulation);
        int[] numbers = Append(inside.Triangulation, order, vertices, triangles, []);
        int[] flooded = RegionFlood.Regions(inside.Triangulation, inside.Curves, inside.Pieces);
        List<int> regions = [.. order.Select(t => flooded[t])];
        CurveEdge[] edges = Edges(inside, numbers);
        int infinity = -1;
        if (disc is not null)
        {
            int[] rim = [.. edges.Where(e => e.SectionEdge < 0).Select(e => e.A)];
            int[] discNumbers = Append(disc.Triangulation, HilbertOrder.OfTriangles(disc.Triangulation), vertices, triangles, rim);
            infinity = discNumbers[rim.Length];
            regions.AddRange(Enumerable.Repeat(Mesh.Exterior, disc.Triangulation.TriangleCount));
        }

        return new Mesh(section, [.. vertices], [.. triangles], [.. regions], edges, circle, infinity);
    }

    // Takes the triangles in order and numbers the vertices they use; the first ones may have numbers already.
    private static int[] Append(
        Triangulation from, int[] order, List<Point> vertices, List<int> triangles, ReadOnlySpan<int> known)
    {
        int[] numbers = new int[from.VertexCount];
        Array.Fill(numbers, Triangulation.None);
        known.CopyTo(numbers);
        foreach (int t in order)
        {
            for (int h = 3 * t; h < (3 * t) + 3; h++)
            {
                int v = from.Origin(h);
                if (numbers[v] == Triangulation.None)
                {
                    numbers[v] = vertices.Count;
                    vertices.Add(from.Place(v));
                }

                triangles.Add(numbers[v]);
            }
        }

        return numbers;
    }

    // In the order of curves and along them.
    private static CurveEdge[] Edges(PlanarMesh mesh, int[] numbers)
    {
        int[] order = [.. Enumerable.Range(0, mesh.Pieces.Count)
            .OrderBy(i => mesh.Pieces[i].Curve).ThenBy(i => mesh.Pieces[i].TA)];
        CurveEdge[] edges = new CurveEdge[order.Length];
        for (int i = 0; i < order.Length; i++)
        {
            CurvePiece p = mesh.Pieces[order[i]];
            BoundaryCurve curve = mesh.Curves[p.Curve];
            bool chord = !curve.IsStraight && Refinement.StaysStraight(mesh, order[i]);
            edges[i] = chord
                ? new CurveEdge(numbers[p.A], numbers[p.B], new Line(curve.Curve.At(p.TA), curve.Curve.At(p.TB)), 0, 1, curve.SectionEdge)
                : new CurveEdge(numbers[p.A], numbers[p.B], curve.Curve, p.TA, p.TB, curve.SectionEdge);
        }

        return edges;
    }
}
