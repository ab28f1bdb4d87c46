namespace PoleField.Meshing;

/// <summary>
/// The edges of a mesh, numbered. Inner edges of the second disc are kept apart from those of the first even where they join
/// the same two rim vertices.
/// </summary>
public sealed class MeshEdges
{
    private readonly int[] _ofTriangle; // edge of triangle t from corner e to corner (e + 1) mod 3 at [3·t + e]
    private readonly int[] _ends;       // lower and higher end vertex of edge k at [2·k], [2·k + 1]
    private readonly int[] _curveEdge;  // index into Mesh.CurveEdges of edge k, or −1

    private MeshEdges(int[] ofTriangle, int[] ends, int[] curveEdge)
    {
        _ofTriangle = ofTriangle;
        _ends = ends;
        _curveEdge = curveEdge;
    }

    /// <summary>Number of edges.</summary>
    public int Count => _curveEdge.Length;

    /// <summary>Numbers the edges of a mesh.</summary>
    public static MeshEdges Of(Mesh mesh)
    {
        Dictionary<(int, int), int> onCurve = CurveEdgesByEnds(mesh);
        int[] starts = CountByLowerVertex(mesh);
        var entries = new (int Key, int Slot)[3 * mesh.TriangleCount];
        FillByLowerVertex(mesh, onCurve, (int[])starts.Clone(), entries);

        var ofTriangle = new int[3 * mesh.TriangleCount];
        var ends = new List<int>(4 * mesh.TriangleCount);
        var curveOf = new List<int>(2 * mesh.TriangleCount);
        for (int v = 0; v + 1 < starts.Length; v++)
        {
            Span<(int Key, int Slot)> group = entries.AsSpan(starts[v], starts[v + 1] - starts[v]);
            group.Sort();
            int previous = -1;
            foreach ((int key, int slot) in group)
            {
                if (key != previous)
                {
                    int higher = key >> 1;
                    bool innerOfSecondDisc = (key & 1) == 1;
                    ends.Add(v);
                    ends.Add(higher);
                    curveOf.Add(!innerOfSecondDisc && onCurve.TryGetValue((v, higher), out int c) ? c : -1);
                    previous = key;
                }

                ofTriangle[slot] = curveOf.Count - 1;
            }
        }

        return new MeshEdges(ofTriangle, [.. ends], [.. curveOf]);
    }

    /// <summary>Edge of triangle <paramref name="triangle"/> from corner <paramref name="side"/> to the next.</summary>
    public int OfTriangle(int triangle, int side) => _ofTriangle[(3 * triangle) + side];

    /// <summary>End vertices of an edge, the lower index first.</summary>
    public (int Lower, int Higher) Ends(int edge) => (_ends[2 * edge], _ends[(2 * edge) + 1]);

    /// <summary>Index of the edge in <see cref="Mesh.CurveEdges"/>, or −1 for an edge inside a region.</summary>
    public int CurveEdgeOf(int edge) => _curveEdge[edge];

    private static Dictionary<(int Lower, int Higher), int> CurveEdgesByEnds(Mesh mesh)
    {
        var byEnds = new Dictionary<(int, int), int>(mesh.CurveEdges.Count);
        for (int c = 0; c < mesh.CurveEdges.Count; c++)
        {
            CurveEdge e = mesh.CurveEdges[c];
            byEnds[(Math.Min(e.A, e.B), Math.Max(e.A, e.B))] = c;
        }

        return byEnds;
    }

    private static int[] CountByLowerVertex(Mesh mesh)
    {
        var starts = new int[mesh.Vertices.Count + 1];
        for (int slot = 0; slot < 3 * mesh.TriangleCount; slot++)
        {
            starts[EndsOf(mesh, slot).Lower + 1]++;
        }

        for (int v = 0; v + 1 < starts.Length; v++)
        {
            starts[v + 1] += starts[v];
        }

        return starts;
    }

    // The key is twice the higher vertex, plus one for inner edges of the second disc.
    private static void FillByLowerVertex(
        Mesh mesh, Dictionary<(int Lower, int Higher), int> onCurve, int[] next, (int Key, int Slot)[] entries)
    {
        for (int slot = 0; slot < 3 * mesh.TriangleCount; slot++)
        {
            (int lower, int higher) = EndsOf(mesh, slot);
            bool innerOfSecondDisc = mesh.Regions[slot / 3] == Mesh.Exterior
                && !(onCurve.TryGetValue((lower, higher), out int c) && mesh.CurveEdges[c].SectionEdge < 0);
            entries[next[lower]++] = ((2 * higher) + (innerOfSecondDisc ? 1 : 0), slot);
        }
    }

    private static (int Lower, int Higher) EndsOf(Mesh mesh, int slot)
    {
        int triangle = slot / 3;
        int side = slot % 3;
        int a = mesh.Triangles[slot];
        int b = mesh.Triangles[(3 * triangle) + ((side + 1) % 3)];
        return a < b ? (a, b) : (b, a);
    }
}
