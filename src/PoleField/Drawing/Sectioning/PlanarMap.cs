using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The plane cut into faces by edges that meet only at their ends.</summary>
/// <remarks>Half-edge 2e runs along edge e, 2e + 1 against it. Face 0 is the unbounded one.</remarks>
internal sealed class PlanarMap
{
    private readonly int[] _next;
    private readonly int[] _faceOfHalf;

    /// <summary>Finds the faces.</summary>
    public PlanarMap(IReadOnlyList<Point> points, IReadOnlyList<WovenEdge> edges)
    {
        Points = points;
        Edges = edges;
        Box box = Box.Empty;
        foreach (WovenEdge e in edges)
        {
            box = box.Including(e.Curve.Bounds);
        }

        Origin = edges.Count > 0 ? box.Centre : default;
        _next = NextHalves();
        List<Cycle> cycles = FindCycles();
        int[] faceOfCycle = FaceNesting.FacesOf(this, cycles, out int faces);
        _faceOfHalf = new int[2 * edges.Count];
        double[] areas = new double[faces];
        for (int c = 0; c < cycles.Count; c++)
        {
            areas[faceOfCycle[c]] += cycles[c].Area;
            foreach (int h in Walk(cycles[c].Half))
            {
                _faceOfHalf[h] = faceOfCycle[c];
            }
        }

        areas[0] = double.PositiveInfinity;
        Areas = areas;
    }

    /// <summary>End points.</summary>
    public IReadOnlyList<Point> Points { get; }

    /// <summary>Edges.</summary>
    public IReadOnlyList<WovenEdge> Edges { get; }

    /// <summary>Middle of everything; areas are summed about it.</summary>
    public Point Origin { get; }

    /// <summary>Area of each face, m².</summary>
    public IReadOnlyList<double> Areas { get; }

    /// <summary>Face on the left of an edge.</summary>
    public int Left(int edge) => _faceOfHalf[2 * edge];

    /// <summary>Face on the right of an edge.</summary>
    public int Right(int edge) => _faceOfHalf[(2 * edge) + 1];

    /// <summary>Face on the left of a half-edge.</summary>
    public int FaceOf(int half) => _faceOfHalf[half];

    /// <summary>Point where a half-edge starts.</summary>
    public int StartOf(int half) => (half & 1) == 0 ? Edges[half >> 1].Start : Edges[half >> 1].End;

    /// <summary>Half-edges of the cycle through one, in order of travel with their face on the left.</summary>
    public IEnumerable<int> Walk(int half)
    {
        int h = half;
        do
        {
            yield return h;
            h = _next[h];
        }
        while (h != half);
    }

    private int[] NextHalves()
    {
        int[] next = new int[2 * Edges.Count];
        int[] first = new int[Points.Count + 1];
        for (int h = 0; h < next.Length; h++)
        {
            first[StartOf(h) + 1]++;
        }

        for (int v = 0; v < Points.Count; v++)
        {
            first[v + 1] += first[v];
        }

        int[] leaving = new int[next.Length];
        int[] filled = [.. first];
        for (int h = 0; h < next.Length; h++)
        {
            leaving[filled[StartOf(h)]++] = h;
        }

        for (int v = 0; v < Points.Count; v++)
        {
            Span<int> around = leaving.AsSpan(first[v], first[v + 1] - first[v]);
            VertexOrder.Sort(this, v, around);
            for (int i = 0; i < around.Length; i++)
            {
                // Arriving against the leaving half-edge i, the face on the left goes on with the one clockwise of it.
                next[around[i] ^ 1] = around[(i + around.Length - 1) % around.Length];
            }
        }

        return next;
    }

    private List<Cycle> FindCycles()
    {
        List<Cycle> cycles = [];
        bool[] seen = new bool[_next.Length];
        for (int half = 0; half < seen.Length; half++)
        {
            if (seen[half])
            {
                continue;
            }

            double area = 0;
            foreach (int h in Walk(half))
            {
                seen[h] = true;
                area += ((h & 1) == 0 ? 1 : -1) * Edges[h >> 1].Curve.AreaTerm(Origin);
            }

            cycles.Add(new Cycle(half, area));
        }

        return cycles;
    }

    /// <summary>A closed walk with one face on its left.</summary>
    /// <param name="Half">One of its half-edges.</param>
    /// <param name="Area">Signed area inside it, m²; counter-clockwise walks are positive.</param>
    internal readonly record struct Cycle(int Half, double Area);
}
