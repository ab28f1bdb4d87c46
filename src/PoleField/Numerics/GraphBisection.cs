namespace PoleField.Numerics;

/// <summary>A light vertex separator of a graph into two parts of similar weight, by coarse graphs.</summary>
internal sealed class GraphBisection(int vertices)
{
    // Coarsening ends here; separators of so small a graph are found by trying.
    private const int Coarsest = 45;

    // A coarse vertex weighs at most this part of the whole.
    private const double LargestCoarse = 1.0 / 24;

    // A coarse graph with more than this part of the vertices is not worth having.
    private const double LeastReduction = 0.8;

    // A side weighs at most this part of the whole.
    private const double LargestSide = 0.6;

    private const int Passes = 6;

    // Separators grown from several places compete, fewer in a small graph (there are many of them); the coarse graph of at
    // most the size of decision tells which is the lightest. With four tries in small ones too there were 0.3 % fewer
    // operations, with one 2 % more (quadratic triangles, 196 000 unknowns).
    private const int Tries = 4;
    private const int TriesWhenSmall = 2;
    private const int Small = 1500;
    private const int DecisionSize = 500;

    private readonly SeparatorRefinement _refinement = new(vertices);
    private readonly int[] _queue = new int[vertices];

    /// <summary>Side of each vertex: 0, 1, or <see cref="SeparatorRefinement.Separator"/>.</summary>
    public byte[] Separate(WeightedGraph graph)
    {
        int total = graph.TotalWeight(), largestSide = (int)(LargestSide * total);
        List<Level> levels = Coarsen(graph, Math.Max(1, (int)(LargestCoarse * total)));
        WeightedGraph coarsest = levels.Count > 0 ? levels[^1].Coarse : graph;
        int decide = levels.FindIndex(level => level.Fine.Count <= DecisionSize);
        decide = decide < 0 ? levels.Count : decide;

        byte[] best = [];
        int tries = graph.Count < Small ? TriesWhenSmall : Tries, least = int.MaxValue, seed = 0;
        for (int t = 0; t < tries; t++)
        {
            byte[] side = Grow(coarsest, seed, total / 2, out int last);
            _refinement.Refine(coarsest, side, largestSide, Passes);
            for (int i = levels.Count - 1; i >= decide; i--)
            {
                side = Project(levels[i], side, largestSide);
            }

            int weight = _refinement.Weights[2] + Excess(largestSide);
            if (weight < least)
            {
                least = weight;
                best = side;
            }

            // The far ends of the graph first.
            seed = t < 2 ? last : (int)((long)coarsest.Count * t / tries);
        }

        for (int i = decide - 1; i >= 0; i--)
        {
            best = Project(levels[i], best, largestSide);
        }

        return best;
    }

    private static List<Level> Coarsen(WeightedGraph graph, int largestWeight)
    {
        var levels = new List<Level>();
        while (graph.Count > Coarsest)
        {
            (WeightedGraph coarse, int[] coarseOf) = GraphCoarsening.Contract(graph, largestWeight);
            if (coarse.Count > LeastReduction * graph.Count)
            {
                break;
            }

            levels.Add(new Level(graph, coarse, coarseOf));
            graph = coarse;
        }

        return levels;
    }

    private byte[] Project(Level level, byte[] coarseSide, int largestSide)
    {
        var side = new byte[level.Fine.Count];
        for (int v = 0; v < side.Length; v++)
        {
            side[v] = coarseSide[level.CoarseOf[v]];
        }

        _refinement.Refine(level.Fine, side, largestSide, Passes);
        return side;
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

    private sealed record Level(WeightedGraph Fine, WeightedGraph Coarse, int[] CoarseOf);
}
