using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The steps from sorted layers to a section.</summary>
internal sealed class SectionReader(UsedLayers layers, SectionRequest request, SectionLog log)
{
    /// <summary>Runs all steps.</summary>
    public SectionReading Read()
    {
        foreach ((string name, string wanted) in layers.Missing)
        {
            log.Add(new Finding(Severity.Fault, "missing-layer", $"Layer {name}, named as {wanted}, is not in the sketch.", "Name a layer that is there.") { Layer = name });
        }

        Outline? beam = ReadBeam();
        (CrossSection? section, IReadOnlyList<PartShape> parts) = ReadSection();
        return new SectionReading
        {
            Section = log.HasFaults ? null : section,
            Beam = beam,
            Parts = parts,
            IgnoredLayers = layers.Ignored,
            Findings = log.Findings,
        };
    }

    private (CrossSection?, IReadOnlyList<PartShape>) ReadSection()
    {
        Reach reach = Reach.For(BoundsOf(layers.SectionCurves), request.Join);
        Net net = EndJoining.Join(layers.Section, layers.SectionCurves, reach, log);
        List<WovenEdge> edges = Weaving.Weave(net, layers.Section, reach, log);
        PlanarMap map = new(net.Points, edges);
        List<LayerCover> covers = [.. layers.Section.Select(l => new LayerCover(map, l.Index, e => edges[e].Layers.Contains(l.Index)))];
        foreach (UsedLayer l in layers.Section)
        {
            OpenOutlines.Report(map, covers[l.Index], l.Name, reach, log);
            CountOutlines(l, covers[l.Index]);
        }

        FaceOwners owners = new(map, layers.Section, covers, reach, log);
        List<PartShape> parts = Shapes(map, covers, owners);
        if (log.HasFaults)
        {
            return (null, parts);
        }

        List<string> names = [.. layers.Section.Where(l => l.Role == LayerRole.Part).Select(l => l.Name)];
        return (new SectionAssembly(map, owners).Whole(names, request.RimLayer is not null), parts);
    }

    private Outline? ReadBeam()
    {
        if (layers.Beam is not UsedLayer beam)
        {
            return null;
        }

        Reach reach = Reach.For(BoundsOf(layers.BeamCurves), request.Join);
        Net net = EndJoining.Join([beam], layers.BeamCurves, reach, log);
        List<WovenEdge> edges = Weaving.Weave(net, [beam], reach, log);
        PlanarMap map = new(net.Points, edges);
        LayerCover cover = new(map, 0, _ => true);
        OpenOutlines.Report(map, cover, beam.Name, reach, log);
        CountOutlines(beam, cover);
        if (cover.Outlines != 1 || cover.OpenEdges.Count > 0)
        {
            return null;
        }

        int half = map.Left(0) == 0 ? 1 : 0;
        return Outline.FromCurves([.. map.Walk(half).Select(h => (h & 1) == 0 ? edges[h >> 1].Curve : edges[h >> 1].Curve.Reversed())]);
    }

    private void CountOutlines(UsedLayer layer, LayerCover cover)
    {
        string what = layer.Role switch { LayerRole.Part => "a part", LayerRole.Rim => "the rim", _ => "the beam" };
        if (cover.Outlines == 0 && cover.OpenEdges.Count == 0)
        {
            log.Add(SectionMessages.NoOutline(layer.Name, what));
        }

        if (cover.Outlines > 1 && layer.Role != LayerRole.Part)
        {
            log.Add(SectionMessages.NotOneOutline(layer.Name, what, cover.Outlines));
        }
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

    private static Box BoundsOf(IReadOnlyList<Piece> curves)
    {
        Box box = Box.Empty;
        foreach (Piece p in curves)
        {
            box = box.Including(p.Curve.Bounds);
        }

        return box;
    }
}
