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
    private readonly bool?[] _inside;   // by set of faces; null where the spread has not come

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
        _inside = new bool?[map.Areas.Count];
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

    // For each edge that bounds something its connected figure, and for each figure whether alternation makes sense in it.
    private (int[] FigureOf, bool[] Alternates) Figures()
    {
        int[] firstAt = new int[_map.Points.Count]; // point to one more than the position in _edges
        int[] ends = new int[_map.Points.Count];
        UnionFind sets = new(_edges.Count);
        for (int i = 0; i < _edges.Count; i++)
        {
            foreach (int v in (ReadOnlySpan<int>)[_map.Edges[_edges[i]].Start, _map.Edges[_edges[i]].End])
            {
                ends[v]++;
                if (firstAt[v] == 0)
                {
                    firstAt[v] = i + 1;
                }

                sets.Union(firstAt[v] - 1, i);
            }
        }

        int[] figureOf = new int[_edges.Count];
        bool[] alternates = new bool[_edges.Count];
        Array.Fill(alternates, true);
        for (int i = 0; i < figureOf.Length; i++)
        {
            WovenEdge e = _map.Edges[_edges[i]];
            figureOf[i] = sets.Find(i);
            alternates[figureOf[i]] &= int.IsEvenInteger(ends[e.Start]) && int.IsEvenInteger(ends[e.End]);
        }

        return (figureOf, alternates);
    }

    // From the unbounded face inwards: a figure is met first from the face it lies in.
    private void Spread((int[] FigureOf, bool[] Alternates) figures)
    {
        (int[] first, int[] at) = EdgesOfSets();
        bool?[] around = new bool?[_edges.Count]; // by figure: whether it lies in material
        Queue<int> sets = new([_faces.Find(0)]);
        _inside[_faces.Find(0)] = false;
        while (sets.TryDequeue(out int set))
        {
            bool inside = _inside[set]!.Value;
            for (int k = first[set]; k < first[set + 1]; k++)
            {
                int i = at[k], figure = figures.FigureOf[i];
                around[figure] ??= inside;
                int other = SetLeft(_edges[i]) == set ? SetRight(_edges[i]) : SetLeft(_edges[i]);
                if (_inside[other] is null)
                {
                    _inside[other] = !(figures.Alternates[figure] ? inside : around[figure]!.Value);
                    sets.Enqueue(other);
                }
            }
        }
    }

    // Positions in _edges by the sets beside them: those of set s at [first[s]] to [first[s + 1] − 1].
    private (int[] First, int[] At) EdgesOfSets()
    {
        int[] first = new int[_map.Areas.Count + 1];
        foreach (int e in _edges)
        {
            first[SetLeft(e) + 1]++;
            first[SetRight(e) + 1]++;
        }

        for (int s = 1; s < first.Length; s++)
        {
            first[s] += first[s - 1];
        }

        int[] at = new int[2 * _edges.Count];
        int[] filled = [.. first];
        for (int i = 0; i < _edges.Count; i++)
        {
            at[filled[SetLeft(_edges[i])]++] = i;
            at[filled[SetRight(_edges[i])]++] = i;
        }

        return (first, at);
    }

    private (int[] RegionOfFace, int Regions, int Outlines) Number()
    {
        int[] regionOfSet = new int[_map.Areas.Count];
        Array.Fill(regionOfSet, -1);
        int regions = 0;
        foreach (int e in _edges)
        {
            foreach (int set in (ReadOnlySpan<int>)[SetLeft(e), SetRight(e)])
            {
                if (_inside[set] == true && regionOfSet[set] < 0)
                {
                    regionOfSet[set] = regions++;
                }
            }
        }

        int[] regionOfFace = [.. Enumerable.Range(0, regionOfSet.Length).Select(f => regionOfSet[_faces.Find(f)])];
        return (regionOfFace, regions, _inside.Count(i => i is not null) - 1);
    }
}
