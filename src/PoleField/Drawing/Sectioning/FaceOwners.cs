using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Gives every face to one part: where outlines lie in outlines, to the innermost.</summary>
internal sealed class FaceOwners
{
    /// <summary>Owner of faces that no part covers.</summary>
    public const int Air = -1;

    /// <summary>Owner of faces beyond the rim.</summary>
    public const int Beyond = -2;

    private readonly PlanarMap _map;
    private readonly IReadOnlyList<UsedLayer> _layers;
    private readonly IReadOnlyList<LayerCover> _covers;
    private readonly List<int> _offset = []; // of each layer's regions in the common numbering
    private readonly double _exact;
    private readonly bool[] _thin;
    private readonly List<int>[] _claims;  // regions over each face, common numbering
    private readonly int[] _faces;         // number of faces of each region, thin ones not counted
    private readonly Dictionary<(int, int), int> _shared = [];
    private readonly Dictionary<(int, int), (double Area, int Face)> _overlaps = []; // by layers

    /// <summary>Decides the owners and reports overlaps.</summary>
    /// <param name="map">Faces.</param>
    /// <param name="layers">Used layers.</param>
    /// <param name="covers">What each layer covers, in the order of the layers.</param>
    /// <param name="reach">Faces thinner than its join length are no overlap.</param>
    /// <param name="log">Where overlaps go.</param>
    public FaceOwners(PlanarMap map, IReadOnlyList<UsedLayer> layers, IReadOnlyList<LayerCover> covers, Reach reach, SectionLog log)
    {
        (_map, _layers, _covers, _exact) = (map, layers, covers, reach.Exact);
        int regions = 0;
        foreach (LayerCover c in covers)
        {
            _offset.Add(regions);
            regions += c.Regions;
        }

        _thin = ThinFaces(reach.Join);
        _faces = new int[regions];
        _claims = [.. Enumerable.Range(0, map.Areas.Count).Select(Claims)];
        CountShared();
        Owner = [.. Enumerable.Range(0, map.Areas.Count).Select(OwnerOf)];
        Report(log);
    }

    /// <summary>For each face: its region in the common numbering, or <see cref="Air"/> or <see cref="Beyond"/>.</summary>
    public IReadOnlyList<int> Owner { get; }

    /// <summary>Layer of a region in the common numbering.</summary>
    public int LayerOf(int region)
    {
        int layer = _offset.BinarySearch(region);
        layer = layer >= 0 ? layer : ~layer - 1;
        while (layer + 1 < _offset.Count && _offset[layer + 1] == region)
        {
            layer++; // layers without regions share their offset with the next
        }

        return layer;
    }

    private bool[] ThinFaces(double join)
    {
        double[] perimeter = new double[_map.Areas.Count];
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            double length = _map.Edges[e].Curve.Length;
            perimeter[_map.Left(e)] += length;
            perimeter[_map.Right(e)] += length;
        }

        return [.. Enumerable.Range(0, perimeter.Length).Select(f => _map.Areas[f] <= 0.5 * join * perimeter[f])];
    }

    private List<int> Claims(int face)
    {
        List<int> claims = [];
        for (int l = 0; l < _covers.Count; l++)
        {
            int region = _covers[l].RegionOfFace[face];
            if (_layers[l].Role == LayerRole.Part && region >= 0)
            {
                claims.Add(_offset[l] + region);
            }
        }

        return claims;
    }

    private void CountShared()
    {
        for (int f = 1; f < _claims.Length; f++)
        {
            if (_thin[f])
            {
                continue;
            }

            foreach (int r in _claims[f])
            {
                _faces[r]++;
                foreach (int s in _claims[f])
                {
                    if (r < s)
                    {
                        _shared[(r, s)] = _shared.GetValueOrDefault((r, s)) + 1;
                    }
                }
            }
        }
    }

    private int OwnerOf(int face)
    {
        bool beyond = _layers.Any(l => l.Role == LayerRole.Rim && _covers[l.Index].RegionOfFace[face] < 0);
        List<int> claims = _claims[face];
        if (claims.Count == 0)
        {
            return beyond ? Beyond : Air;
        }

        int owner = claims[0];
        foreach (int other in claims.Skip(1))
        {
            int shared = _shared.GetValueOrDefault((owner, other));
            bool ownerInside = shared == _faces[owner], otherInside = shared == _faces[other];
            int a = LayerOf(owner), b = LayerOf(other);
            bool contested = ownerInside == otherInside && _layers[a].Key != _layers[b].Key && !_thin[face];
            if (contested)
            {
                (double area, int first) = _overlaps.GetValueOrDefault((a, b), (0, face));
                _overlaps[(a, b)] = (area + _map.Areas[face], first);
            }

            owner = otherInside && !ownerInside ? other : owner;
        }

        return owner;
    }

    private void Report(SectionLog log)
    {
        foreach (((int a, int b), (double area, int face)) in _overlaps.OrderBy(o => o.Key))
        {
            (Point at, int source) = Corner(face);
            log.Add(SectionMessages.Overlap(log, _layers[a].Name, _layers[b].Name, area, at), at, source);
        }

        foreach (UsedLayer rim in _layers.Where(l => l.Role == LayerRole.Rim))
        {
            foreach (UsedLayer part in _layers.Where(l => l.Role == LayerRole.Part))
            {
                List<int> outside = [.. Enumerable.Range(1, _thin.Length - 1).Where(f =>
                    !_thin[f] && _covers[part.Index].RegionOfFace[f] >= 0 && _covers[rim.Index].RegionOfFace[f] < 0)];
                if (outside.Count > 0 && _covers[rim.Index].Regions > 0)
                {
                    (Point at, int source) = Corner(outside[0]);
                    log.Add(SectionMessages.OutsideRim(log, part.Name, rim.Name, outside.Sum(f => _map.Areas[f]), at), at, source);
                }
            }
        }
    }

    // Lowest leftmost end point on the border of a face.
    private (Point At, int Source) Corner(int face)
    {
        (Point At, int Source) best = (new Point(double.PositiveInfinity, 0), -1);
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            if (_map.Left(e) != face && _map.Right(e) != face)
            {
                continue;
            }

            foreach (Point p in new[] { _map.Points[_map.Edges[e].Start], _map.Points[_map.Edges[e].End] })
            {
                if (p.Y < best.At.Y - _exact || (p.Y < best.At.Y + _exact && p.Z < best.At.Z))
                {
                    best = (p, _map.Edges[e].Source);
                }
            }
        }

        return best;
    }
}
