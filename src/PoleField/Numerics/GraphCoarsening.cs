namespace PoleField.Numerics;

/// <summary>Makes a smaller graph of a graph by putting vertices together with their neighbours.</summary>
/// <remarks>
/// Stars of a vertex and all its neighbours, then the vertices left over each to the lightest star beside it, as in
/// smoothed aggregation (Vaněk, Mandel, Brezina, Computing 56 (1996) 179, recalled from memory). Matching pairs by their
/// common edges, the usual way, took twice the time and gave no better separators.
/// </remarks>
internal static class GraphCoarsening
{
    /// <summary>The coarse graph and the coarse vertex of each vertex.</summary>
    public static (WeightedGraph Coarse, int[] CoarseOf) Contract(WeightedGraph graph, int largestWeight)
    {
        var coarseOf = new int[graph.Count];
        int count = FormStars(graph, coarseOf, largestWeight);
        count = JoinRest(graph, coarseOf, count, largestWeight);
        return (Contract(graph, coarseOf, count), coarseOf);
    }

    private static int FormStars(WeightedGraph graph, int[] coarseOf, int largestWeight)
    {
        Array.Fill(coarseOf, -1);
        int count = 0;
        for (int v = 0; v < graph.Count; v++)
        {
            if (coarseOf[v] >= 0)
            {
                continue;
            }

            bool free = true;
            int weight = graph.Weights[v];
            foreach (int u in graph.Around(v))
            {
                free &= coarseOf[u] < 0;
                weight += graph.Weights[u];
            }

            if (!free || weight > largestWeight)
            {
                continue;
            }

            coarseOf[v] = count;
            foreach (int u in graph.Around(v))
            {
                coarseOf[u] = count;
            }

            count++;
        }

        return count;
    }

    private static int JoinRest(WeightedGraph graph, int[] coarseOf, int stars, int largestWeight)
    {
        var weights = new int[graph.Count];
        for (int v = 0; v < graph.Count; v++)
        {
            if (coarseOf[v] >= 0)
            {
                weights[coarseOf[v]] += graph.Weights[v];
            }
        }

        int count = stars;
        for (int v = 0; v < graph.Count; v++)
        {
            if (coarseOf[v] >= 0)
            {
                continue;
            }

            int best = -1;
            foreach (int u in graph.Around(v))
            {
                int other = coarseOf[u];
                if (other >= 0 && (best < 0 || weights[other] < weights[best]))
                {
                    best = other;
                }
            }

            if (best < 0 || weights[best] + graph.Weights[v] > largestWeight)
            {
                best = count++;
            }

            coarseOf[v] = best;
            weights[best] += graph.Weights[v];
        }

        return count;
    }

    private static WeightedGraph Contract(WeightedGraph graph, int[] coarseOf, int count)
    {
        int n = graph.Count;
        var memberStart = new int[count + 1];
        var weights = new int[count];
        for (int v = 0; v < n; v++)
        {
            memberStart[coarseOf[v] + 1]++;
            weights[coarseOf[v]] += graph.Weights[v];
        }

        for (int c = 0; c < count; c++)
        {
            memberStart[c + 1] += memberStart[c];
        }

        int[] next = memberStart.AsSpan(0, count).ToArray();
        var members = new int[n];
        for (int v = 0; v < n; v++)
        {
            members[next[coarseOf[v]]++] = v;
        }

        var start = new int[count + 1];
        int[] neighbours = GC.AllocateUninitializedArray<int>(graph.Start[n]);
        int[] marked = next;
        Array.Fill(marked, -1);
        int end = 0;
        for (int c = 0; c < count; c++)
        {
            marked[c] = c;
            for (int m = memberStart[c]; m < memberStart[c + 1]; m++)
            {
                foreach (int u in graph.Around(members[m]))
                {
                    int other = coarseOf[u];
                    if (marked[other] != c)
                    {
                        marked[other] = c;
                        neighbours[end++] = other;
                    }
                }
            }

            start[c + 1] = end;
        }

        return new WeightedGraph(count, start, neighbours, weights);
    }
}
