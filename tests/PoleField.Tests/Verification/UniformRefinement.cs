using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Tests.Verification;

/// <summary>Every triangle cut into four at its edges' middles (on curves: the middle of the parameter).</summary>
internal static class UniformRefinement
{
    public static Mesh Of(Mesh mesh)
    {
        MeshEdges edges = MeshEdges.Of(mesh);
        int n = mesh.Vertices.Count;
        var vertices = new List<Point>(mesh.Vertices);
        var curveEdges = new List<CurveEdge>();
        for (int k = 0; k < edges.Count; k++)
        {
            (int a, int b) = edges.Ends(k);
            int c = edges.CurveEdgeOf(k);
            if (c < 0)
            {
                vertices.Add(Point.Between(vertices[a], vertices[b], 0.5));
                continue;
            }

            CurveEdge e = mesh.CurveEdges[c];
            double t = 0.5 * (e.TA + e.TB);
            vertices.Add(e.Curve.At(t));
            curveEdges.Add(e with { B = n + k, TB = t });
            curveEdges.Add(e with { A = n + k, TA = t });
        }

        var triangles = new List<int>();
        var regions = new List<int>();
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            int a = mesh.Triangles[3 * t], b = mesh.Triangles[(3 * t) + 1], c = mesh.Triangles[(3 * t) + 2];
            int ab = n + edges.OfTriangle(t, 0), bc = n + edges.OfTriangle(t, 1), ca = n + edges.OfTriangle(t, 2);
            triangles.AddRange([a, ab, ca, ab, b, bc, ca, bc, c, ab, bc, ca]);
            regions.AddRange(Enumerable.Repeat(mesh.Regions[t], 4));
        }

        return new Mesh(
            mesh.Section, [.. vertices], [.. triangles], [.. regions], [.. curveEdges], mesh.Circle, mesh.Infinity);
    }
}
