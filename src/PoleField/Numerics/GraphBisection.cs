namespace PoleField.Numerics;

/// <summary>A light vertex separator of a graph into two parts of similar weight, by coarse graphs.</summary>
internal sealed class GraphBisection(int vertices)
{
    // Coarsening ends here; separators of so small a graph are found by trying.
    private const int Coarsest = 60;

    // A coarse vertex weighs at most this part of the whole.
    private const double LargestCoarse = 1.0 / 24;

    // A side weighs at most this part of what is not in between.
    private const double LargestSide = 0.6;

    private const int Passes = 6;

    private readonly SeparatorRefinement _refinement = new(vertices);
    private readonly int[] _queue = new int[vertices];

    /// <summary>Side of each vertex: 0, 1, or <see cref="SeparatorRefinement.Separator"/>.</summary>
    public byte[] Separate(WeightedGraph graph)
    {
        int total = graph.TotalWeight();
        int largestSide = (int)(LargestSide * total);
        var levels = new Stack<(WeightedGraph Fine, int[] CoarseOf)>();
        WeightedGraph level = graph;
        while (level.Count > Coarsest)
        {
            (WeightedGraph coarse, int[] coarseOf) = GraphCoarsening.Contract(level, Math.Max(1, (int)(LargestCoarse * total)));
            if (coarse.Count > 0.8 * level.Count)
            {
                break;
            }

            levels.Push((level, coarseOf));
            level = coarse;
        }

        byte[] side = BestStart(level, largestSide, total);
        while (levels.TryPop(out (WeightedGraph Fine, int[] CoarseOf) next))
        {
            var fine = new byte[next.Fine.Count];
            for (int v = 0; v < fine.Length; v++)
            {
                fine[v] = side[next.CoarseOf[v]];
            }

            side = fine;
            _refinement.Refine(next.Fine, side, largestSide, Passes);
        }

        return side;
    }

    // Regions grown from several vertices; the lightest refined boundary wins.
    private byte[] BestStart(WeightedGraph graph, int largestSide, int total)
    {
        int tries = vertices > 0 ? 6 : 1;
        byte[] best = [];
        int least = int.MaxValue;
        int seed = 0;
        for (int t = 0; t < tries; t++)
        {
            byte[] side = Grow(graph, seed, total / 2, out int last);
            _refinement.Refine(graph, side, largestSide, Passes);
            int weight = _refinement.Weights[2] + Excess(largestSide);
            if (weight < least)
            {
                least = weight;
                best = side;
            }

            seed = t == 0 ? last : t == 1 ? last : (int)((long)graph.Count * t / tries);
        }

        return best;
    }

    private int Excess(int largestSide) =>
        Math.Max(0, Math.Max(_refinement.Weights[0], _refinement.Weights[1]) - largestSide);

    private byte[] Grow(WeightedGraph graph, int seed, int wanted, out int last)
    {
        int n = graph.Count;
        var side = new byte[n];
        Array.Fill(side, (byte)1);
        var seen = new bool[n];
        int head = 0, tail = 0, weight = 0, next = 0;
        _queue[tail++] = seed;
        seen[seed] = true;
        last = seed;
        while (weight < wanted)
        {
            if (head == tail)
            {
                while (seen[next])
                {
                    next++;
                }

                seen[next] = true;
                _queue[tail++] = next;
            }

            int v = _queue[head++];
            side[v] = 0;
            weight += graph.Weights[v];
            foreach (int u in graph.Around(v))
            {
                if (!seen[u])
                {
                    seen[u] = true;
                    _queue[tail++] = u;
                }
            }
        }

        for (; head < tail; head++)
        {
            last = _queue[head];
            foreach (int u in graph.Around(last))
            {
                if (!seen[u])
                {
                    seen[u] = true;
                    _queue[tail++] = u;
                }
            }
        }

        MarkBoundary(graph, side);
        return side;
    }

    private static void MarkBoundary(WeightedGraph graph, byte[] side)
    {
        for (int v = 0; v < graph.Count; v++)
        {
            if (side[v] != 0)
            {
                continue;
            }

            foreach (int u in graph.Around(v))
            {
                if (side[u] == 1)
                {
                    side[v] = SeparatorRefinement.Separator;
                    break;
                }
            }
        }
    }
}
