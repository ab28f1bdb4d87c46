namespace PoleField.Drawing;

/// <summary>The sketch sorted by what the request makes of its layers.</summary>
internal sealed class UsedLayers
{
    private readonly Sketch _sketch;
    private readonly Dictionary<string, UsedLayer> _used = new(StringComparer.OrdinalIgnoreCase); // as the format compares names
    private readonly Dictionary<string, int> _curves = new(StringComparer.OrdinalIgnoreCase);
    private readonly List<UsedLayer> _section = [];
    private readonly List<(string Layer, string For)> _missing = [];
    private readonly List<string> _twice = [];

    /// <summary>Sorts the curves by layer.</summary>
    public UsedLayers(Sketch sketch, SectionRequest request)
    {
        if (request.MaterialKeys.Count != request.PartLayers.Count)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"Each of the {request.PartLayers.Count} part layers needs a material key; got {request.MaterialKeys.Count}."), nameof(request));
        }

        _sketch = sketch;
        foreach (SketchCurve c in sketch.Curves)
        {
            _curves[c.Layer] = _curves.GetValueOrDefault(c.Layer) + 1;
        }

        for (int i = 0; i < request.PartLayers.Count; i++)
        {
            Take(request.PartLayers[i], LayerRole.Part, request.MaterialKeys[i]);
        }

        Take(request.RimLayer, LayerRole.Rim, "");
        Beam = Take(request.BeamLayer, LayerRole.Beam, "");
        SectionCurves = CurvesOf(l => l.Role != LayerRole.Beam);
        BeamCurves = CurvesOf(l => l.Role == LayerRole.Beam);
    }

    /// <summary>Parts in the order of the case, then the rim; layers that the sketch lacks are left out.</summary>
    public IReadOnlyList<UsedLayer> Section => _section;

    /// <summary>The beam's layer.</summary>
    public UsedLayer? Beam { get; }

    /// <summary>Curves of parts and rim, metres; their points are not known yet (−1).</summary>
    public IReadOnlyList<Piece> SectionCurves { get; }

    /// <summary>Curves of the beam's layer, metres.</summary>
    public IReadOnlyList<Piece> BeamCurves { get; }

    /// <summary>Requested layers that hold no curve, with what each was wanted for.</summary>
    public IReadOnlyList<(string Layer, string For)> Missing => _missing;

    /// <summary>Layers that were named for more than one purpose.</summary>
    public IReadOnlyList<string> Twice => _twice;

    /// <summary>Layers that nobody asked for, by name.</summary>
    public IReadOnlyList<(string Layer, int Curves)> Ignored =>
        [.. _curves.Where(c => !_used.ContainsKey(c.Key)).Select(c => (c.Key, c.Value)).OrderBy(c => c.Key, StringComparer.Ordinal)];

    /// <summary>What a layer is named as, in words.</summary>
    public static string Purpose(LayerRole role) => role switch { LayerRole.Part => "a part", LayerRole.Rim => "the rim", _ => "the beam" };

    private UsedLayer? Take(string? name, LayerRole role, string key)
    {
        if (name is null)
        {
            return null;
        }

        if (_used.ContainsKey(name))
        {
            _twice.Add(name);
            return null;
        }

        if (!_curves.ContainsKey(name))
        {
            _missing.Add((name, Purpose(role)));
            return null;
        }

        UsedLayer layer = new(role == LayerRole.Beam ? 0 : _section.Count, name, role, key);
        _used[name] = layer;
        if (role != LayerRole.Beam)
        {
            _section.Add(layer);
        }

        return layer;
    }

    private List<Piece> CurvesOf(Func<UsedLayer, bool> wanted)
    {
        List<Piece> pieces = [];
        for (int i = 0; i < _sketch.Curves.Count; i++)
        {
            SketchCurve c = _sketch.Curves[i];
            if (_used.TryGetValue(c.Layer, out UsedLayer? layer) && wanted(layer))
            {
                pieces.Add(new Piece(CurveEnds.ToMetres(c.Curve, _sketch.Unit.Metres), -1, -1, layer.Index, i));
            }
        }

        return pieces;
    }
}
