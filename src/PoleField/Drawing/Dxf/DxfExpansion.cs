using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Shows what is visible: blocks expanded, hidden things left out and counted.</summary>
internal sealed class DxfExpansion(DxfDocument document, DxfReport report, DxfLimits limits, double metresPerUnit)
{
    /// <summary>Reason of pieces that have no length.</summary>
    public const string NoLength = "it has no length";

    /// <summary>Beginning of the reason of centre lines.</summary>
    public const string CentreLine = "it is drawn as a centre line, line type";

    /// <summary>Reason of external references.</summary>
    public const string External = "it is an external reference, which is not in the file";

    private const string Continuous = "CONTINUOUS";

    private readonly List<SketchCurve> _curves = [];
    private readonly Dictionary<(string Layer, string Kind, string Why), int> _skipped = [];
    private readonly List<(string Layer, string Kind, string Why)> _skippedOrder = [];
    private readonly Dictionary<string, DxfLayer> _layers = new(document.Layers, StringComparer.OrdinalIgnoreCase);
    private readonly List<DxfBlock> _path = [];
    private readonly double _farthest = limits.Coordinate / metresPerUnit;
    private long _cost;
    private int _copies;

    /// <summary>All visible curves, in the order of the file.</summary>
    public IReadOnlyList<SketchCurve> Curves => _curves;

    /// <summary>What was left out, in the order it was first met.</summary>
    public IReadOnlyList<SkippedEntities> Skipped =>
        [.. _skippedOrder.Select(k => new SkippedEntities(k.Layer, k.Kind, k.Why, _skipped[k]))];

    /// <summary>Lowest and highest z of visible entities.</summary>
    public (double Low, double High) Heights { get; private set; } = (double.PositiveInfinity, double.NegativeInfinity);

    /// <summary>Visible splines that were made through fit points, by layer.</summary>
    public Dictionary<string, (int Count, DxfPlace First)> Fitted { get; } = [];

    /// <summary>Expands the drawing.</summary>
    /// <exception cref="InputException">A limit was reached.</exception>
    public void Run() => Show(document.Entities, new Surroundings(Affine.Identity, null, Continuous));

    /// <summary>What a block's content takes from the INSERTs around it.</summary>
    private readonly record struct Surroundings(Affine Map, DxfLayer? Layer, string LineType);

    private void Show(List<DxfItem> items, Surroundings around)
    {
        foreach (DxfItem item in items)
        {
            DxfLayer onLayer = LayerOf(item, around);
            string layer = onLayer.Name;
            if (Hidden(item, onLayer) is { } why)
            {
                Skip(layer, item.Kind, why);
                continue;
            }

            if (item is DxfOther)
            {
                Skip(layer, item.Kind, DxfWords.NotRead(item.Kind).Why);
            }
            else if (item.Problem is { } problem)
            {
                report.Fault(problem.What, problem.Text, problem.Fix, item.Place with { Layer = layer });
            }
            else if (item is DxfInsert insert)
            {
                Copy(insert, onLayer, around);
            }
            else if (item is DxfShape shape)
            {
                Show(shape, onLayer, around);
            }
        }
    }

    private void Show(DxfShape shape, DxfLayer onLayer, Surroundings around)
    {
        string layer = onLayer.Name;
        string lineType = LineTypeOf(shape, onLayer, around);
        if (DxfWords.IsCentreLine(lineType))
        {
            Skip(layer, shape.Kind, $"{CentreLine} {DxfReport.Shown(lineType)}");
            return;
        }

        for (int i = 0; i < shape.Dropped; i++)
        {
            Skip(layer, shape.Kind, NoLength);
        }

        if (shape.Curves.Count == 0)
        {
            return;
        }

        Heights = (Math.Min(Heights.Low, shape.Height), Math.Max(Heights.High, shape.Height));
        if (shape.IsFitted)
        {
            Fitted.TryGetValue(layer, out (int Count, DxfPlace First) known);
            Fitted[layer] = (known.Count + 1, known.Count == 0 ? shape.Place with { Layer = layer } : known.First);
        }

        foreach (Curve curve in shape.Curves)
        {
            Spend(curve, shape.Place);
            if (Placed(curve, around.Map) is { } placed)
            {
                CheckPlace(placed, shape, layer);
                _curves.Add(new SketchCurve(placed, layer, shape.Kind, shape.Place.Handle, shape.Place.Line));
            }
            else
            {
                Skip(layer, shape.Kind, NoLength);
            }
        }
    }

    private void Copy(DxfInsert insert, DxfLayer onLayer, Surroundings around)
    {
        string layer = onLayer.Name;
        if (!document.Blocks.TryGetValue(insert.Block, out DxfBlock? block))
        {
            report.Fault(
                "unknown-block",
                $"INSERT on layer {DxfReport.Shown(layer)} shows block \"{DxfReport.Shown(insert.Block)}\", which the file does not define.",
                "Export the drawing again with its blocks, or explode them first.",
                insert.Place with { Layer = layer });
            return;
        }

        if (block.IsExternal)
        {
            Skip(layer, "INSERT", External);
            return;
        }

        CheckNesting(insert, block);
        (long columns, Point columnShift) = insert.Columns;
        (long rows, Point rowShift) = insert.Rows;
        if (columns > limits.ArrayCells || rows > limits.ArrayCells || columns * rows > limits.ArrayCells)
        {
            throw Limit(insert, FormattableString.Invariant(
                $"INSERT of block {DxfReport.Shown(block.Name)} asks for {columns} by {rows} copies; the limit is {limits.ArrayCells}."));
        }

        string lineType = LineTypeOf(insert, onLayer, around);
        Affine local = insert.ToParent.After(Affine.Shift(-block.Base));
        _path.Add(block);
        for (long row = 0; row < rows; row++)
        {
            for (long column = 0; column < columns; column++)
            {
                if (++_copies > limits.BlockCopies)
                {
                    throw Limit(insert, FormattableString.Invariant(
                        $"The drawing shows more than {limits.BlockCopies} copies of blocks; limit reached at {Path()}."));
                }

                Point shift = (column * columnShift) + (row * rowShift);
                Affine here = local with { Y0 = local.Y0 + shift.Y, Z0 = local.Z0 + shift.Z };
                Show(block.Items, new Surroundings(around.Map.After(here), onLayer, lineType));
            }
        }

        _path.RemoveAt(_path.Count - 1);
    }

    private void CheckNesting(DxfInsert insert, DxfBlock block)
    {
        if (_path.Contains(block))
        {
            throw report.Stop(
                "block-cycle",
                $"Block {DxfReport.Shown(block.Name)} contains itself: {Path()} > {DxfReport.Shown(block.Name)}.",
                "The file is damaged; explode the block and export again.",
                insert.Place);
        }

        if (_path.Count >= limits.BlockDepth)
        {
            throw Limit(insert, FormattableString.Invariant(
                $"Blocks are nested more than {limits.BlockDepth} deep; limit reached at {Path()}."));
        }
    }

    private string Path()
    {
        const int shown = 5;
        string start = _path.Count > shown ? "... > " : string.Empty;
        return start + string.Join(" > ", _path.Skip(_path.Count - shown).Select(b => DxfReport.Shown(b.Name)));
    }

    private InputException Limit(DxfItem item, string text) => report.Stop(
        "limit", text, "The file is damaged or hostile; explode the blocks you need and export again.", item.Place);

    private void Spend(Curve curve, DxfPlace place)
    {
        _cost += curve is Nurbs nurbs ? nurbs.Knots.Count * (long)(nurbs.Degree + 1) : 1;
        if (_cost > limits.Curves)
        {
            string within = _path.Count == 0 ? string.Empty : $"; limit reached at {Path()}";
            throw report.Stop(
                "limit",
                FormattableString.Invariant($"The drawing has more than {limits.Curves} curves{within}."),
                "The file is damaged or hostile, or holds more than a cross-section; export less.",
                place);
        }
    }

    private static Curve? Placed(Curve curve, Affine map)
    {
        if (map == Affine.Identity)
        {
            return curve;
        }

        try
        {
            return curve.Transformed(map);
        }
        catch (ArgumentException)
        {
            // The map shrinks the curve to a point.
            return null;
        }
    }

    private void CheckPlace(Curve curve, DxfShape shape, string layer)
    {
        Box box = curve is Nurbs spline ? spline.Hull : curve.Bounds;
        foreach (Point p in (ReadOnlySpan<Point>)[box.Min, box.Max])
        {
            if (!(Math.Abs(p.Y) <= _farthest) || !(Math.Abs(p.Z) <= _farthest))
            {
                report.Fault(
                    "limit",
                    FormattableString.Invariant(
                        $"{shape.Kind} on layer {DxfReport.Shown(layer)} reaches ({p.Y}, {p.Z}); coordinates up to {_farthest} drawing units are read."),
                    "Delete what lies far away, or correct the drawing's unit.",
                    shape.Place with { Layer = layer });
                return;
            }
        }
    }

    // A layer exists by being used; its name is spelled as in the table, or else as at its first use.
    private DxfLayer LayerOf(DxfItem item, Surroundings around)
    {
        if (item.Layer == "0" && around.Layer is not null)
        {
            return around.Layer;
        }

        if (!_layers.TryGetValue(item.Layer, out DxfLayer? layer))
        {
            layer = new DxfLayer(item.Layer, IsFrozen: false, IsOff: false, Continuous);
            _layers.Add(item.Layer, layer);
        }

        return layer;
    }

    private static string LineTypeOf(DxfItem item, DxfLayer layer, Surroundings around) => item.LineType switch
    {
        null => layer.LineType,
        string written when written.Equals("BYBLOCK", StringComparison.OrdinalIgnoreCase) => around.LineType,
        string written when written.Equals("BYLAYER", StringComparison.OrdinalIgnoreCase) => layer.LineType,
        string written => written,
    };

    private static string? Hidden(DxfItem item, DxfLayer layer)
    {
        if (item.IsOnPaper)
        {
            return "it is on a paper sheet, not in the model";
        }

        if (item.IsInvisible)
        {
            return "it is marked invisible";
        }

        // A layer that is off hides what lies on it, but not what an INSERT on it shows on other layers.
        return layer.IsFrozen ? "its layer is frozen" : layer.IsOff && item is not DxfInsert ? "its layer is switched off" : null;
    }

    private void Skip(string layer, string kind, string why)
    {
        (string, string, string) key = (layer, kind, why);
        if (!_skipped.TryGetValue(key, out int count))
        {
            _skippedOrder.Add(key);
        }

        _skipped[key] = count + 1;
    }
}
