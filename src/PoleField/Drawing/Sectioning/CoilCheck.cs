using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Finds coil outlines whose current would not be what the case states.</summary>
internal sealed class CoilCheck
{
    private readonly PlanarMap _map;
    private readonly FaceOwners _owners;
    private readonly UsedLayers _layers;
    private readonly SectionLog _log;
    private readonly HashSet<int> _coils; // indices of layers that carry current

    private CoilCheck(PlanarMap map, FaceOwners owners, UsedLayers layers, SectionLog log)
    {
        (_map, _owners, _layers, _log) = (map, owners, layers, log);
        _coils = [];
    }

    /// <summary>Reports coils on the symmetry line of a half model, and coil outlines that other parts cut in pieces.</summary>
    public static void Report(PlanarMap map, FaceOwners owners, UsedLayers layers, SectionRequest request, SectionLog log)
    {
        HashSet<string> carrying = new(request.CurrentLayers, StringComparer.OrdinalIgnoreCase);
        CoilCheck check = new(map, owners, layers, log);
        check._coils.UnionWith(layers.Section.Where(l => carrying.Contains(l.Name)).Select(l => l.Index));
        if (check._coils.Count == 0)
        {
            return;
        }

        check.ReportCut();
        if (request.MirrorLeftRight)
        {
            check.ReportOnAxis();
        }
    }

    // A coil on the symmetry line would lie in the place of its own image.
    private void ReportOnAxis()
    {
        HashSet<int> told = [];
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            foreach (int face in (ReadOnlySpan<int>)[_map.Left(e), _map.Right(e)])
            {
                if (HalfClosing.IsOnAxis(_map.Edges[e].Curve) && CoilOf(face) is int coil && told.Add(coil))
                {
                    Point at = _map.Edges[e].Curve.At(0.5);
                    _log.Add(SectionMessages.CoilOnSymmetry(_log, _layers.Section[coil].Name, at), at, _map.Edges[e].Source);
                }
            }
        }
    }

    // Faces of one outline that no path inside it joins.
    private void ReportCut()
    {
        UnionFind joined = new(_map.Areas.Count);
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            if (_owners.Owner[_map.Left(e)] == _owners.Owner[_map.Right(e)])
            {
                joined.Union(_map.Left(e), _map.Right(e));
            }
        }

        IEnumerable<int> pieces = Enumerable.Range(1, _map.Areas.Count - 1).Where(f => joined.Find(f) == f && CoilOf(f) is not null);
        foreach (IGrouping<int, int> outline in pieces.GroupBy(f => _owners.Owner[f]).Where(g => g.Count() > 1))
        {
            string layer = _layers.Section[_owners.LayerOf(outline.Key)].Name;
            int cut = Enumerable.Range(0, _map.Edges.Count).First(e => IsCut(e, outline.Key));
            Point at = _map.Edges[cut].Curve.At(0.5);
            _log.Add(SectionMessages.CoilCut(_log, layer, outline.Count(), at), at, _map.Edges[cut].Source);
        }
    }

    private int? CoilOf(int face) =>
        _owners.Owner[face] >= 0 && _owners.LayerOf(_owners.Owner[face]) is int layer && _coils.Contains(layer) ? layer : null;

    // An edge of another layer between the outline and what cuts it.
    private bool IsCut(int edge, int outline)
    {
        int left = _owners.Owner[_map.Left(edge)], right = _owners.Owner[_map.Right(edge)];
        return left != right && (left == outline || right == outline) && !_map.Edges[edge].Layers.Contains(_owners.LayerOf(outline));
    }
}
