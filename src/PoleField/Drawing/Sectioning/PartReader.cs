using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Reads parts and rim: from loose curves over a planar map to named regions.</summary>
internal sealed class PartReader(UsedLayers layers, SectionRequest request, SectionLog log)
{
    /// <summary>The section; null when there is a fault.</summary>
    public CrossSection? Read(out IReadOnlyList<PartShape> shapes)
    {
        IReadOnlyList<UsedLayer> used = layers.Section;
        Reach reach = Reach.For(layers.SectionCurves, request.Join);
        Net net = EndJoining.Join(used, layers.SectionCurves, reach, log);
        if (request.MirrorLeftRight)
        {
            HalfClosing.Close(net, used, reach, log);
        }

        PlanarMap map = new(net.Points, Weaving.Weave(net, reach, log));
        List<LayerCover> covers = Covers(map, reach);
        FaceOwners owners = new(map, used, covers, reach, log);
        CoilCheck.Report(map, owners, layers, request, log);
        shapes = Shapes(map, covers, owners);
        SectionRemarks.OnSize(shapes, log);
        if (log.HasFaults)
        {
            return null;
        }

        List<string> names = [.. used.Where(l => l.Role == LayerRole.Part).Select(l => l.Name)];
        SectionAssembly assembly = new(map, owners);
        bool hasRim = request.RimLayer is not null;
        return request.MirrorLeftRight ? assembly.Mirrored(names, hasRim) : assembly.Whole(names, hasRim);
    }

    private List<LayerCover> Covers(PlanarMap map, Reach reach)
    {
        List<LayerCover> covers = [.. layers.Section.Select(l => new LayerCover(map, l.Index, e => map.Edges[e].Layers.Contains(l.Index)))];
        IReadOnlyList<HashSet<int>> borrowed = LeaningOutlines.Find(map, layers.Section, covers, log);
        foreach (UsedLayer l in layers.Section)
        {
            HashSet<int> more = borrowed[l.Index];
            if (more.Count > 0)
            {
                covers[l.Index] = new LayerCover(map, l.Index, e => more.Contains(e) || map.Edges[e].Layers.Contains(l.Index));
            }

            OpenOutlines.Report(map, covers[l.Index], l.Name, reach, log);
            OpenOutlines.ReportCount(l, covers[l.Index], log);
        }

        return covers;
    }

    private List<PartShape> Shapes(PlanarMap map, List<LayerCover> covers, FaceOwners owners)
    {
        double[] areas = new double[layers.Section.Count];
        Box[] boxes = [.. layers.Section.Select(_ => Box.Empty)];
        for (int f = 1; f < map.Areas.Count; f++)
        {
            if (owners.Owner[f] >= 0)
            {
                areas[owners.LayerOf(owners.Owner[f])] += map.Areas[f];
            }
        }

        foreach (WovenEdge e in map.Edges)
        {
            foreach (int l in e.Layers)
            {
                boxes[l] = boxes[l].Including(e.Curve.Bounds);
            }
        }

        return [.. layers.Section.Where(l => l.Role == LayerRole.Part && covers[l.Index].Outlines > 0)
            .Select(l => new PartShape(l.Name, covers[l.Index].Outlines, areas[l.Index], boxes[l.Index]))];
    }
}
