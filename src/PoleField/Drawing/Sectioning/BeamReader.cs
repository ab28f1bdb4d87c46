using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Reads the one closed outline of the beam's layer.</summary>
internal sealed class BeamReader(UsedLayers layers, SectionRequest request, SectionLog log)
{
    /// <summary>The outline, metres; null without a layer or with a fault.</summary>
    public Outline? Read()
    {
        if (layers.Beam is not UsedLayer beam)
        {
            return null;
        }

        Reach reach = Reach.For(layers.BeamCurves, request.Join);
        Net net = EndJoining.Join([beam], layers.BeamCurves, reach, log);
        if (request.MirrorLeftRight)
        {
            HalfClosing.Close(net, [beam], reach, log);
        }

        PlanarMap map = new(net.Points, Weaving.Weave(net, reach, log));
        LayerCover cover = new(map, 0, _ => true);
        OpenOutlines.Report(map, cover, beam.Name, reach, log);
        OpenOutlines.ReportCount(beam, cover, log);
        if (cover.Outlines != 1 || cover.OpenEdges.Count > 0)
        {
            return null;
        }

        List<Curve> curves = [.. map.Walk(map.Left(0) == 0 ? 1 : 0)
            .Select(h => (h & 1) == 0 ? map.Edges[h >> 1].Curve : map.Edges[h >> 1].Curve.Reversed())];
        return Outline.FromCurves(request.MirrorLeftRight ? WithImage(curves) : curves);
    }

    // Beams that end on the symmetry line go on as their own image; others lie on the drawn side alone.
    private static List<Curve> WithImage(List<Curve> curves)
    {
        int axis = curves.FindIndex(HalfClosing.IsOnAxis);
        if (axis < 0)
        {
            return curves;
        }

        List<Curve> half = [.. curves.Skip(axis + 1).Concat(curves.Take(axis)).Where(c => !HalfClosing.IsOnAxis(c))];
        return [.. half, .. Enumerable.Reverse(half).Select(c => CurveEnds.Mirrored(c).Reversed())];
    }
}
