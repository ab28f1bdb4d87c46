using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Makes the cross-section from the faces and their owners.</summary>
internal sealed class SectionAssembly
{
    private readonly PlanarMap _map;
    private readonly FaceOwners _owners;
    private readonly UnionFind _joined;  // faces that belong to one region
    private readonly Dictionary<int, int> _region = []; // set of faces to region of the section
    private readonly List<Region> _regions = [];
    private readonly List<Point> _vertices = [];    // in the order the edges use them
    private readonly int[] _vertexOf;               // of each point of the map and then of each point's image; −1 while unused
    private readonly List<SectionEdge> _edges = [];

    /// <summary>Numbers the regions.</summary>
    public SectionAssembly(PlanarMap map, FaceOwners owners)
    {
        (_map, _owners) = (map, owners);
        _vertexOf = new int[2 * map.Points.Count];
        Array.Fill(_vertexOf, -1);
        _joined = new UnionFind(map.Areas.Count);
        for (int e = 0; e < map.Edges.Count; e++)
        {
            if (owners.Owner[map.Left(e)] == owners.Owner[map.Right(e)])
            {
                _joined.Union(map.Left(e), map.Right(e));
            }
        }
    }

    /// <summary>The section as drawn.</summary>
    public CrossSection Whole(IReadOnlyList<string> parts, bool hasRim)
    {
        NumberRegions();
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            (int left, int right) = (RegionOf(_map.Left(e)), RegionOf(_map.Right(e)));
            if (left != right)
            {
                WovenEdge edge = _map.Edges[e];
                Add(edge.Start, edge.End, edge.Curve, left, right);
            }
        }

        return new CrossSection(_vertices, _edges, _regions, parts, hasRim);
    }

    /// <summary>The half as drawn and its mirror image in y = 0.</summary>
    public CrossSection Mirrored(IReadOnlyList<string> parts, bool hasRim)
    {
        NumberRegions();
        HashSet<int> touching = [CrossSection.Air];
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            if (IsOnAxis(e))
            {
                touching.Add(RegionOf(_map.Left(e)));
                touching.Add(RegionOf(_map.Right(e)));
            }
        }

        int drawn = _regions.Count;
        int[] image = new int[drawn];
        for (int r = 0; r < drawn; r++)
        {
            Region half = _regions[r];
            Box bounds = half.Bounds.IsEmpty ? half.Bounds : new Box(new Point(0 - half.Bounds.Max.Y, half.Bounds.Min.Z), new Point(0 - half.Bounds.Min.Y, half.Bounds.Max.Z));
            if (touching.Contains(r))
            {
                image[r] = r;
                _regions[r] = half with { Area = 2 * half.Area, Bounds = half.Bounds.Including(bounds) };
            }
            else
            {
                image[r] = _regions.Count;
                _regions.Add(half with { Bounds = bounds, MirrorImage = true });
            }
        }

        int points = _map.Points.Count;
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            (int left, int right) = (RegionOf(_map.Left(e)), RegionOf(_map.Right(e)));
            if (left == right || IsOnAxis(e))
            {
                continue;
            }

            WovenEdge edge = _map.Edges[e];
            Add(edge.Start, edge.End, edge.Curve, left, right);
            Add(Image(edge.Start), Image(edge.End), CurveEnds.Mirrored(edge.Curve), ImageRegion(right), ImageRegion(left));
        }

        return new CrossSection(_vertices, _edges, _regions, parts, hasRim);

        int Image(int v) => _map.Points[v].Y == 0 ? v : points + v;
        int ImageRegion(int r) => r < 0 ? r : image[r];
    }

    private bool IsOnAxis(int e) => HalfClosing.IsOnAxis(_map.Edges[e].Curve);

    private int RegionOf(int face) =>
        _owners.Owner[face] == FaceOwners.Beyond ? CrossSection.Outside
        : _owners.Owner[face] == FaceOwners.Air ? CrossSection.Air
        : _region[_joined.Find(face)];

    // Air first, then the parts in the order of the case, each in the order of its curves.
    private void NumberRegions()
    {
        int faces = _map.Areas.Count;
        Box[] bounds = Enumerable.Repeat(Box.Empty, faces).ToArray();
        int[] firstEdge = Enumerable.Repeat(int.MaxValue, faces).ToArray();
        for (int e = 0; e < _map.Edges.Count; e++)
        {
            foreach (int set in (ReadOnlySpan<int>)[_joined.Find(_map.Left(e)), _joined.Find(_map.Right(e))])
            {
                bounds[set] = bounds[set].Including(_map.Edges[e].Curve.Bounds);
                firstEdge[set] = Math.Min(firstEdge[set], e);
            }
        }

        double[] area = new double[faces];
        double air = 0;
        Box airBounds = Box.Empty;
        for (int f = 0; f < faces; f++)
        {
            area[_joined.Find(f)] += _map.Areas[f];
            if (_owners.Owner[f] == FaceOwners.Air)
            {
                air += _map.Areas[f];
                airBounds = airBounds.Including(bounds[_joined.Find(f)]);
            }
        }

        _regions.Add(new Region(-1, air, airBounds));
        IEnumerable<int> sets = Enumerable.Range(0, faces).Where(f => _joined.Find(f) == f && _owners.Owner[f] >= 0);
        foreach (int set in sets.OrderBy(s => _owners.LayerOf(_owners.Owner[s])).ThenBy(s => firstEdge[s]).ThenBy(s => s))
        {
            _region[set] = _regions.Count;
            _regions.Add(new Region(_owners.LayerOf(_owners.Owner[set]), area[set], bounds[set]));
        }
    }

    private void Add(int start, int end, Curve curve, int left, int right)
    {
        _edges.Add(new SectionEdge(Vertex(start, curve.Start), Vertex(end, curve.End), curve, left, right));

        int Vertex(int point, Point place)
        {
            if (_vertexOf[point] < 0)
            {
                _vertexOf[point] = _vertices.Count;
                _vertices.Add(place);
            }

            return _vertexOf[point];
        }
    }
}
