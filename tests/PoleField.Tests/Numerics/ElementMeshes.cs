using PoleField.Numerics;

namespace PoleField.Tests.Numerics;

/// <summary>Unknowns of triangle elements on an m × m square, as the field solver numbers them.</summary>
internal sealed class ElementMeshes
{
    private ElementMeshes(int size, int[] start, int[] unknowns)
    {
        Size = size;
        Start = start;
        Unknowns = unknowns;
    }

    public int Size { get; }

    public int[] Start { get; }

    public int[] Unknowns { get; }

    public SymmetricPattern Pattern() => SymmetricPattern.FromElements(Size, Start, Unknowns);

    /// <summary>Squares cut in two, with unknowns on vertices and order − 1 on each edge; none on the rim if it is fixed.</summary>
    public static ElementMeshes Triangles(int m, int order, bool fixedRim = true)
    {
        var vertex = new int[(m + 1) * (m + 1)];
        int size = 0;
        for (int i = 0; i < vertex.Length; i++)
        {
            vertex[i] = fixedRim && IsOnRim(i, m) ? -1 : size++;
        }

        var edges = new Dictionary<(int, int), int>();
        var unknowns = new List<int>();
        var start = new List<int> { 0 };
        foreach ((int A, int B, int C) t in Corners(m))
        {
            int[] corners = [t.A, t.B, t.C];
            unknowns.AddRange(corners.Select(c => vertex[c]));
            for (int k = 0; k < 3; k++)
            {
                int a = Math.Min(corners[k], corners[(k + 1) % 3]), b = Math.Max(corners[k], corners[(k + 1) % 3]);
                bool onRim = IsOnRim(a, m) && IsOnRim(b, m) && RimSides(a, m).Intersect(RimSides(b, m)).Any();
                if (!edges.TryGetValue((a, b), out int first))
                {
                    first = fixedRim && onRim ? -1 : size;
                    edges[(a, b)] = first;
                    size += first < 0 ? 0 : order - 1;
                }

                unknowns.AddRange(Enumerable.Range(0, order - 1).Select(i => first < 0 ? -1 : first + i));
            }

            start.Add(unknowns.Count);
        }

        return new ElementMeshes(size, [.. start], [.. unknowns]);
    }

    /// <summary>Elements with arbitrary unknowns: nothing of a mesh, some unknowns in no element, some elements empty.</summary>
    public static ElementMeshes Arbitrary(int size, int elements, int seed)
    {
        var random = new Random(seed);
        var unknowns = new List<int>();
        var start = new List<int> { 0 };
        for (int e = 0; e < elements; e++)
        {
            int count = random.Next(0, 7);
            for (int i = 0; i < count; i++)
            {
                unknowns.Add(random.Next(-1, size));
            }

            start.Add(unknowns.Count);
        }

        return new ElementMeshes(size, [.. start], [.. unknowns]);
    }

    /// <summary>Values of a positive definite matrix: off-diagonal entries in (−1, 1), every row dominated by its diagonal.</summary>
    public static double[] PositiveDefinite(SymmetricPattern pattern, int seed)
    {
        var random = new Random(seed);
        var values = new double[pattern.EntryCount];
        var rowSum = new double[pattern.Size];
        for (int j = 0; j < pattern.Size; j++)
        {
            for (int k = pattern.ColumnStart[j] + 1; k < pattern.ColumnStart[j + 1]; k++)
            {
                values[k] = (2 * random.NextDouble()) - 1;
                rowSum[j] += Math.Abs(values[k]);
                rowSum[pattern.Rows[k]] += Math.Abs(values[k]);
            }
        }

        for (int j = 0; j < pattern.Size; j++)
        {
            values[pattern.ColumnStart[j]] = rowSum[j] + 0.01 + random.NextDouble();
        }

        return values;
    }

    /// <summary>The five-point Laplacian of the unit spacing on m × m inner points, zero outside.</summary>
    public static (SymmetricPattern Pattern, double[] Values) Laplacian(int m)
    {
        var unknowns = new List<int>();
        for (int i = 0; i < m * m; i++)
        {
            if (i % m + 1 < m)
            {
                unknowns.AddRange([i, i + 1]);
            }

            if (i + m < m * m)
            {
                unknowns.AddRange([i, i + m]);
            }
        }

        int[] start = [.. Enumerable.Range(0, (unknowns.Count / 2) + 1).Select(e => 2 * e)];
        SymmetricPattern pattern = SymmetricPattern.FromElements(m * m, start, [.. unknowns]);
        var values = new double[pattern.EntryCount];
        Array.Fill(values, -1.0);
        for (int j = 0; j < m * m; j++)
        {
            values[pattern.ColumnStart[j]] = 4.0;
        }

        return (pattern, values);
    }

    private static bool IsOnRim(int i, int m) => RimSides(i, m).Any();

    private static IEnumerable<int> RimSides(int i, int m)
    {
        (int x, int y) = (i % (m + 1), i / (m + 1));
        return new[] { (x == 0, 0), (x == m, 1), (y == 0, 2), (y == m, 3) }.Where(s => s.Item1).Select(s => s.Item2);
    }

    private static IEnumerable<(int A, int B, int C)> Corners(int m)
    {
        for (int y = 0; y < m; y++)
        {
            for (int x = 0; x < m; x++)
            {
                int a = (y * (m + 1)) + x, b = a + 1, c = a + m + 2, d = a + m + 1;
                yield return (a, b, c);
                yield return (a, c, d);
            }
        }
    }
}
