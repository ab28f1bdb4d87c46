namespace PoleField.Numerics;

/// <summary>
/// Order of elimination by nested dissection: a small separator is eliminated last, the two parts it leaves before it, each
/// in the same way; small parts by minimum degree.
/// </summary>
/// <remarks>
/// George, SIAM J. Numer. Anal. 10 (1973) 345; multilevel separators after Karypis and Kumar, SIAM J. Sci. Comput. 20 (1998)
/// 359 (both recalled from memory). Coordinates are not used, so that a mesh of two sheets is as good as any.
/// </remarks>
internal sealed class NestedDissection
{
    // Parts of at most this many vertices are ordered by minimum degree.
    private const int LargestLeaf = 100;

    // Smaller parts are not worth another thread.
    private const int LeastToShare = 2000;

    private readonly WeightedGraph _graph;
    private readonly MinimumDegree _leaves;
    private readonly GraphBisection _bisection;
    private readonly int[] _order;
    private readonly int[] _localOf;

    private NestedDissection(WeightedGraph graph, int largestPart, int[] order)
    {
        _graph = graph;
        _leaves = new MinimumDegree(graph);
        _bisection = new GraphBisection(largestPart);
        _order = order;
        _localOf = new int[largestPart];
    }

    /// <summary>Vertices in the order of their elimination, the same on any number of threads.</summary>
    public static int[] Order(WeightedGraph graph, int threads = 1)
    {
        var order = new int[graph.Count];
        for (int v = 0; v < graph.Count; v++)
        {
            order[v] = v;
        }

        new NestedDissection(graph, graph.Count, order).Dissect(graph, 0, threads);
        return order;
    }

    // Orders the part whose vertices are in _order from `first` on, in the numbering of `part`.
    private void Dissect(WeightedGraph part, int first, int threads)
    {
        Span<int> own = _order.AsSpan(first, part.Count);
        if (part.Count <= LargestLeaf)
        {
            _leaves.Order(own);
            return;
        }

        byte[] side = _bisection.Separate(part);
        Span<int> sizes = [0, 0, 0];
        foreach (byte s in side)
        {
            sizes[s]++;
        }

        if (sizes[0] == 0 || sizes[1] == 0)
        {
            // All are (nearly) neighbours of all; no order is much better than another.
            return;
        }

        Sort(own, side, sizes);
        int second = sizes[0];
        WeightedGraph left = Extract(part, side, 0, sizes[0]), right = Extract(part, side, 1, sizes[1]);
        if (threads < 2 || part.Count < LeastToShare)
        {
            Dissect(left, first, 1);
            Dissect(right, first + second, 1);
            return;
        }

        var other = new NestedDissection(_graph, right.Count, _order);
        Parallel.Invoke(
            () => Dissect(left, first, (threads + 1) / 2),
            () => other.Dissect(right, first + second, threads / 2));
    }

    // Side 0, side 1, separator; each in the order it has.
    private static void Sort(Span<int> own, byte[] side, ReadOnlySpan<int> sizes)
    {
        int[] before = own.ToArray();
        Span<int> next = [0, sizes[0], sizes[0] + sizes[1]];
        for (int v = 0; v < before.Length; v++)
        {
            own[next[side[v]]++] = before[v];
        }
    }

    private WeightedGraph Extract(WeightedGraph part, byte[] side, int wanted, int size)
    {
        int count = 0, edges = 0;
        for (int v = 0; v < part.Count; v++)
        {
            if (side[v] == wanted)
            {
                _localOf[v] = count++;
                edges += part.Start[v + 1] - part.Start[v];
            }
        }

        var start = new int[size + 1];
        int[] neighbours = GC.AllocateUninitializedArray<int>(edges);
        int[] weights = GC.AllocateUninitializedArray<int>(size);
        int end = 0;
        count = 0;
        for (int v = 0; v < part.Count; v++)
        {
            if (side[v] != wanted)
            {
                continue;
            }

            foreach (int u in part.Around(v))
            {
                if (side[u] == wanted)
                {
                    neighbours[end++] = _localOf[u];
                }
            }

            weights[count++] = part.Weights[v];
            start[count] = end;
        }

        return new WeightedGraph(size, start, neighbours, weights);
    }
}
