using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// Closes outlines that were left open where they lean on another part, whose edge then serves both, if only one face can
/// be meant.
/// </summary>
internal static class LeaningOutlines
{
    /// <summary>For each layer the edges of others that also count as its own.</summary>
    public static IReadOnlyList<HashSet<int>> Find(
        PlanarMap map, IReadOnlyList<UsedLayer> layers, IReadOnlyList<LayerCover> covers, SectionLog log)
    {
        List<HashSet<int>> borrowed = [.. layers.Select(_ => new HashSet<int>())];
        if (covers.All(c => c.OpenEdges.Count == 0))
        {
            return borrowed;
        }

        HashSet<int> taken = [0];
        foreach (UsedLayer layer in layers)
        {
            bool isRim = layer.Role == LayerRole.Rim;
            for (int e = 0; isRim && e < map.Edges.Count; e++)
            {
                if (map.Edges[e].Layers.Contains(layer.Index))
                {
                    taken.UnionWith([map.Left(e), map.Right(e)]);
                }
            }

            IReadOnlyList<int> regions = covers[layer.Index].RegionOfFace;
            taken.UnionWith(Enumerable.Range(0, isRim ? 0 : regions.Count).Where(f => regions[f] >= 0));
        }

        foreach (UsedLayer layer in layers.Where(l => l.Role == LayerRole.Part))
        {
            foreach (List<int> chain in Chains(map, covers[layer.Index].OpenEdges))
            {
                HashSet<int> sides = [.. chain.SelectMany(e => new[] { map.Left(e), map.Right(e) })];
                List<int> free = [.. sides.Where(f => !taken.Contains(f))];
                if (sides.Count != 2 || free.Count != 1)
                {
                    continue;
                }

                int half = (2 * chain[0]) + (map.Left(chain[0]) == free[0] ? 0 : 1);
                HashSet<int> foreign = [.. map.Walk(half).Select(h => h >> 1).Where(e => !map.Edges[e].Layers.Contains(layer.Index))];
                borrowed[layer.Index].UnionWith(foreign);
                WovenEdge first = map.Edges[foreign.Min()];
                log.Add(
                    SectionMessages.ClosedByNeighbour(log, layer.Name, first.Curve.At(0.5), foreign.Sum(e => map.Edges[e].Curve.Length)),
                    first.Curve.At(0.5),
                    map.Edges[chain[0]].Source);
            }
        }

        return borrowed;
    }

    private static IEnumerable<List<int>> Chains(PlanarMap map, IReadOnlyList<int> edges)
    {
        UnionFind sets = new(edges.Count);
        Dictionary<int, int> at = [];
        for (int i = 0; i < edges.Count; i++)
        {
            foreach (int v in new[] { map.Edges[edges[i]].Start, map.Edges[edges[i]].End })
            {
                if (!at.TryAdd(v, i))
                {
                    sets.Union(at[v], i);
                }
            }
        }

        return Enumerable.Range(0, edges.Count).GroupBy(sets.Find).Select(g => g.Select(i => edges[i]).ToList());
    }
}
