using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Reports what of a layer does not close.</summary>
internal static class OpenOutlines
{
    private const int Most = 200; // ends of a layer that are looked at; far fewer are shown

    /// <summary>Adds a fault for each pair of loose ends, nearest first met, and for curves between outlines.</summary>
    public static void Report(PlanarMap map, LayerCover cover, string layer, Reach reach, SectionLog log)
    {
        if (cover.OpenEdges.Count == 0)
        {
            return;
        }

        Dictionary<int, (int Ends, int Source)> at = [];
        foreach (int e in cover.OpenEdges)
        {
            WovenEdge edge = map.Edges[e];
            at[edge.Start] = (at.GetValueOrDefault(edge.Start).Ends + 1, edge.Source);
            at[edge.End] = (at.GetValueOrDefault(edge.End).Ends + 1, edge.Source);
        }

        HashSet<int> held = [.. cover.ClosedEdges.SelectMany(e => new[] { map.Edges[e].Start, map.Edges[e].End })];
        List<int> loose = [.. at.Where(p => p.Value.Ends == 1 && !held.Contains(p.Key)).Select(p => p.Key).Order()];
        if (loose.Count == 0)
        {
            WovenEdge stray = map.Edges[cover.OpenEdges[0]];
            log.Add(SectionMessages.LooseCurve(log, layer, stray.Curve.At(0.5), stray.Source), stray.Curve.At(0.5), stray.Source);
            return;
        }

        HashSet<int> told = [];
        foreach (int v in loose)
        {
            if (told.Count >= Most || !told.Add(v))
            {
                continue;
            }

            int mate = loose.Where(w => !told.Contains(w)).DefaultIfEmpty(-1).MinBy(w => w < 0 ? 0 : map.Points[v].DistanceTo(map.Points[w]));
            if (mate < 0)
            {
                log.Add(SectionMessages.LooseCurve(log, layer, map.Points[v], at[v].Source), map.Points[v], at[v].Source);
                continue;
            }

            told.Add(mate);
            (Point a, Point b) = (map.Points[v], map.Points[mate]);
            log.Add(SectionMessages.OpenOutline(log, layer, (a, b), (at[v].Source, at[mate].Source), reach.Join), a, at[v].Source);
        }
    }

    /// <summary>Adds a fault when a layer has no closed outline, or a rim or beam more than one.</summary>
    public static void ReportCount(UsedLayer layer, LayerCover cover, SectionLog log)
    {
        string what = UsedLayers.Purpose(layer.Role);
        if (cover.Outlines == 0 && cover.OpenEdges.Count == 0)
        {
            log.Add(SectionMessages.NoOutline(layer.Name, what));
        }

        if (cover.Outlines > 1 && layer.Role != LayerRole.Part)
        {
            log.Add(SectionMessages.NotOneOutline(layer.Name, what, cover.Outlines));
        }
    }
}
