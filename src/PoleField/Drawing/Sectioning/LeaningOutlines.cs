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

        HashSet<int> taken = TakenFaces(map, layers, covers);
        List<(int Layer, List<int> Halves)> waiting = [.. layers.Where(l => l.Role == LayerRole.Part)
            .SelectMany(l => Chains(map, covers[l.Index].OpenEdges).Where(c => Leans(map, c)).Select(c => (l.Index, c)))];

        // Closing one outline may leave only one meaning for the next.
        while (waiting.FindIndex(w => FreeSide(map, w.Halves, taken) >= 0) is int next and >= 0)
        {
            (int layer, List<int> halves) = waiting[next];
            waiting.RemoveAt(next);
            int side = FreeSide(map, halves, taken);
            taken.Add(map.FaceOf(side));
            HashSet<int> foreign = [.. map.Walk(side).Select(h => h >> 1).Where(e => !map.Edges[e].Layers.Contains(layer))];
            borrowed[layer].UnionWith(foreign);
            Point at = map.Edges[foreign.Min()].Curve.At(0.5);
            double length = foreign.Sum(e => map.Edges[e].Curve.Length);
            log.Add(SectionMessages.ClosedByNeighbour(log, layers[layer].Name, at, length), at, map.Edges[halves[0] >> 1].Source);
        }

        return borrowed;
    }

    // The unbounded face, what touches the rim, and what other parts cover.
    private static HashSet<int> TakenFaces(PlanarMap map, IReadOnlyList<UsedLayer> layers, IReadOnlyList<LayerCover> covers)
    {
        HashSet<int> taken = [0];
        foreach (UsedLayer layer in layers)
        {
            if (layer.Role == LayerRole.Rim)
            {
                taken.UnionWith(covers[layer.Index].ClosedEdges.SelectMany(e => new[] { map.Left(e), map.Right(e) }));
                continue;
            }

            IReadOnlyList<int> regions = covers[layer.Index].RegionOfFace;
            taken.UnionWith(Enumerable.Range(0, regions.Count).Where(f => regions[f] >= 0));
        }

        return taken;
    }

    // With the edge it leans on a chain parts two faces all along; one that ends in the open does not. And some of it is its own.
    private static bool Leans(PlanarMap map, List<int> halves) =>
        halves.TrueForAll(h => map.FaceOf(h) != map.FaceOf(h ^ 1)) && halves.Exists(h => map.Edges[h >> 1].Layers.Count == 1);

    // Half-edge with the one free face beside the whole chain on its left; −1 when there is none or a choice.
    private static int FreeSide(PlanarMap map, List<int> halves, HashSet<int> taken)
    {
        bool IsFree(IEnumerable<int> side) => side.Select(map.FaceOf).Distinct().Take(2).ToList() is [int face] && !taken.Contains(face);
        bool left = IsFree(halves), right = IsFree(halves.Select(h => h ^ 1));
        return left == right ? -1 : left ? halves[0] : halves[0] ^ 1;
    }

    // Open edges strung from end to end; branched ones are left out.
    private static IEnumerable<List<int>> Chains(PlanarMap map, IReadOnlyList<int> edges)
    {
        Dictionary<int, List<int>> leaving = [];
        foreach (int h in edges.SelectMany(e => new[] { 2 * e, (2 * e) + 1 }))
        {
            (leaving.TryGetValue(map.StartOf(h), out List<int>? list) ? list : leaving[map.StartOf(h)] = []).Add(h);
        }

        HashSet<int> used = [];
        foreach (int first in leaving.Where(l => l.Value.Count == 1).OrderBy(l => l.Key).Select(l => l.Value[0]))
        {
            List<int> halves = [];
            int h = first;
            while (used.Add(h >> 1))
            {
                halves.Add(h);
                List<int> on = leaving[map.StartOf(h ^ 1)];
                if (on.Count == 2)
                {
                    h = on[0] == (h ^ 1) ? on[1] : on[0];
                }
            }

            if (halves.Count > 0 && leaving[map.StartOf(halves[^1] ^ 1)].Count == 1)
            {
                yield return halves;
            }
        }
    }
}
