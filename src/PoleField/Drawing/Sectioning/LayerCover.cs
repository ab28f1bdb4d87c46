namespace PoleField.Drawing;

/// <summary>What the closed outlines of one layer cover.</summary>
/// <remarks>
/// Outlines inside outlines alternate between material and hole. Where three or more curves of the layer meet (outlines that
/// share an edge), alternation has no meaning and every face of that connected figure is material.
/// </remarks>
internal sealed class LayerCover
{
    private readonly PlanarMap _map;
    private readonly UnionFind _faces;  // faces of the map that no edge of the layer separates
    private readonly List<int> _edges = []; // the layer's edges that bound something
    private readonly Dictionary<int, bool> _inside = []; // by set of faces

    /// <summary>Finds what one layer covers.</summary>
    /// <param name="map">All edges.</param>
    /// <param name="layer">Index of the layer.</param>
    /// <param name="isOfLayer">For each edge: whether it counts as drawn by this layer.</param>
    public LayerCover(PlanarMap map, int layer, Func<int, bool> isOfLayer)
    {
        (_map, Layer) = (map, layer);
        _faces = new UnionFind(map.Areas.Count);
        List<int> mine = [];
        for (int e = 0; e < map.Edges.Count; e++)
        {
            if (isOfLayer(e))
            {
                mine.Add(e);
            }
            else
            {
                _faces.Union(map.Left(e), map.Right(e));
            }
        }

        List<int> open = [];
        mine.ForEach(e => (SetLeft(e) == SetRight(e) ? open : _edges).Add(e));
        OpenEdges = open;
        Spread(Figures());
        (RegionOfFace, Regions, Outlines) = Number();
    }

    /// <summary>Index of the layer.</summary>
    public int Layer { get; }

    /// <summary>Edges of the layer that bound nothing: parts of open outlines.</summary>
    public IReadOnlyList<int> OpenEdges { get; }

    /// <summary>Edges of the layer that bound faces.</summary>
    public IReadOnlyList<int> ClosedEdges => _edges;

    /// <summary>Covered region of each face, −1 where the layer covers nothing.</summary>
    public IReadOnlyList<int> RegionOfFace { get; }

    /// <summary>Number of covered regions.</summary>
    public int Regions { get; }

    /// <summary>Number of closed outlines, holes included.</summary>
    public int Outlines { get; }

    /// <summary>Area of the covered regions, m².</summary>
    public double Area
    {
        get
        {
            double area = 0;
            for (int f = 1; f < RegionOfFace.Count; f++)
            {
                area += RegionOfFace[f] >= 0 ? _map.Areas[f] : 0;
            }

            return area;
        }
    }

    private int SetLeft(int e) => _faces.Find(_map.Left(e));

    private int SetRight(int e) => _faces.Find(_map.Right(e));

    // Connected figures of the layer's edges, with whether alternation makes sense in them.
    private List<(List<int> Edges, bool Alternates)> Figures()
    {
        Dictionary<int, int> firstAt = []; // point to position in _edges
        Dictionary<int, int> ends = [];
        UnionFind sets = new(_edges.Count);
        for (int i = 0; i < _edges.Count; i++)
        {
            foreach (int v in new[] { _map.Edges[_edges[i]].Start, _map.Edges[_edges[i]].End })
            {
                ends[v] = ends.GetValueOrDefault(v) + 1;
                if (!firstAt.TryAdd(v, i))
                {
                    sets.Union(firstAt[v], i);
                }
            }
        }

        Dictionary<int, (List<int> Edges, bool Alternates)> figures = [];
        for (int i = 0; i < _edges.Count; i++)
        {
            int set = sets.Find(i);
            (List<int> edges, bool alternates) = figures.GetValueOrDefault(set, ([], true));
            WovenEdge e = _map.Edges[_edges[i]];
            edges.Add(_edges[i]);
            figures[set] = (edges, alternates && int.IsEvenInteger(ends[e.Start]) && int.IsEvenInteger(ends[e.End]));
        }

        return [.. figures.OrderBy(f => f.Key).Select(f => f.Value)];
    }

    // From the unbounded face inwards: a figure is met first from the face it lies in.
    private void Spread(List<(List<int> Edges, bool Alternates)> figures)
    {
        Dictionary<int, List<int>> figuresAt = [];
        for (int i = 0; i < figures.Count; i++)
        {
            foreach (int set in figures[i].Edges.SelectMany(e => new[] { SetLeft(e), SetRight(e) }).Distinct())
            {
                (figuresAt.TryGetValue(set, out List<int>? at) ? at : figuresAt[set] = []).Add(i);
            }
        }

        bool[] done = new bool[figures.Count];
        Queue<int> sets = new([_faces.Find(0)]);
        _inside[_faces.Find(0)] = false;
        while (sets.TryDequeue(out int set))
        {
            foreach (int i in figuresAt.GetValueOrDefault(set) ?? [])
            {
                if (!done[i])
                {
                    done[i] = true;
                    Enter(figures[i].Edges, figures[i].Alternates, set, sets);
                }
            }
        }
    }

    private void Enter(List<int> edges, bool alternates, int from, Queue<int> sets)
    {
        if (!alternates)
        {
            foreach (int set in edges.SelectMany(e => new[] { SetLeft(e), SetRight(e) }))
            {
                if (_inside.TryAdd(set, !_inside[from]))
                {
                    sets.Enqueue(set);
                }
            }

            return;
        }

        Dictionary<int, List<int>> beyond = [];
        foreach (int e in edges)
        {
            (beyond.TryGetValue(SetLeft(e), out List<int>? right) ? right : beyond[SetLeft(e)] = []).Add(SetRight(e));
            (beyond.TryGetValue(SetRight(e), out List<int>? left) ? left : beyond[SetRight(e)] = []).Add(SetLeft(e));
        }

        Queue<int> waiting = new([from]);
        while (waiting.TryDequeue(out int set))
        {
            foreach (int other in beyond[set])
            {
                if (_inside.TryAdd(other, !_inside[set]))
                {
                    waiting.Enqueue(other);
                    sets.Enqueue(other);
                }
            }
        }
    }

    private (int[] RegionOfFace, int Regions, int Outlines) Number()
    {
        Dictionary<int, int> region = [];
        foreach (int e in _edges)
        {
            foreach (int set in new[] { SetLeft(e), SetRight(e) })
            {
                if (_inside.GetValueOrDefault(set))
                {
                    region.TryAdd(set, region.Count);
                }
            }
        }

        int[] regionOfFace = new int[_map.Areas.Count];
        for (int f = 0; f < regionOfFace.Length; f++)
        {
            regionOfFace[f] = region.GetValueOrDefault(_faces.Find(f), -1);
        }

        return (regionOfFace, region.Count, _inside.Count - 1);
    }
}
