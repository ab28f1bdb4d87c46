namespace PoleField.Numerics;

/// <summary>Undirected graph with weighted vertices: neighbours of v are Neighbours[Start[v]] .. [Start[v + 1] − 1].</summary>
internal sealed class WeightedGraph(int count, int[] start, int[] neighbours, int[] weights)
{
    /// <summary>Number of vertices.</summary>
    public int Count { get; } = count;

    /// <summary>Where the neighbours of a vertex begin; may be longer than needed.</summary>
    public int[] Start { get; } = start;

    /// <summary>Both directions of every edge, no loops; may be longer than needed.</summary>
    public int[] Neighbours { get; } = neighbours;

    /// <summary>Weight of each vertex, ≥ 1; may be longer than needed.</summary>
    public int[] Weights { get; } = weights;

    /// <summary>Neighbours of one vertex.</summary>
    public ReadOnlySpan<int> Around(int vertex) =>
        Neighbours.AsSpan(Start[vertex], Start[vertex + 1] - Start[vertex]);

    /// <summary>Sum of the weights.</summary>
    public int TotalWeight()
    {
        int total = 0;
        foreach (int weight in Weights.AsSpan(0, Count))
        {
            total += weight;
        }

        return total;
    }
}
