using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Shows what is visible: blocks expanded, hidden things left out and counted.</summary>
internal sealed class DxfExpansion(DxfDocument document, DxfReport report, DxfLimits limits, double metresPerUnit)
{
    private readonly List<SketchCurve> _curves = [];
    private readonly Dictionary<(string Layer, string Kind, string Why), int> _skipped = [];
    private readonly List<(string Layer, string Kind, string Why)> _skippedOrder = [];
    private readonly Dictionary<string, string> _spelling = new(StringComparer.OrdinalIgnoreCase);
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
    public void Run() => Show(document.Entities, new Surroundings(Affine.Identity, null, "CONTINUOUS"));

    /// <summary>What a block's content takes from the INSERTs around it.</summary>
    private readonly record struct Surroundings(Affine Map, string? Layer, string LineType);

    private void Show(List<DxfItem> items, Surroundings around)
    {
        foreach (DxfItem item in items)
        {
            string layer = LayerOf(item, around);
            if (Hidden(item, layer) is { } why)
            {
                Skip(layer, item.Kind, why);
                continue;
            }

            if (item is DxfOther)
            {
                (string reason, string cure, _) = DxfWords.NotRead(item.Kind);
                Skip(layer, item.Kind, reason + "; cure: " + cure);
            }
            else if (item.Problem is { } problem)
            {
                report.Fault(problem.What, problem.Text, problem.Fix, item.Place with { Layer = layer });
            }
            else if (item is DxfInsert insert)
            {
                Copy(insert, layer, around);
            }
            else if (item is DxfShape shape)
            {
                Show(shape, layer, around);
            }
        }
    }

    private void Show(DxfShape shape, string layer, Surroundings around)
    {
        string lineType = LineTypeOf(shape, layer, around);
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

    /// <summary>Reason of pieces that have no length.</summary>
    public const string NoLength = "it has no length";

    /// <summary>Beginning of the reason of centre lines.</summary>
    public const string CentreLine = "it is drawn as a centre line, line type";

    private void Copy(DxfInsert insert, string layer, Surroundings around)
    {
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

        string lineType = LineTypeOf(insert, layer, around);
        _path.Add(block);
        for (long row = 0; row < rows; row++)
        {
            for (long column = 0; column < columns; column++)
            {
                if (++_copies > limits.BlockCopies)
                {
                    throw Limit(insert, FormattableString.Invariant(
                        $"Block {DxfReport.Shown(block.Name)} is within more than {limits.BlockCopies} copies of blocks; limit reached at {Path()}."));
                }

                Point shift = (column * columnShift) + (row * rowShift);
                Affine map = around.Map.After(Affine.Shift(shift).After(insert.ToParent.After(Affine.Shift(-block.Base))));
                Show(block.Items, new Surroundings(map, layer, lineType));
            }
        }

        _path.RemoveAt(_path.Count - 1);
    }

    /// <summary>Reason of external references.</summary>
    public const string External = "it is an external reference, which is not in the file";

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
        _cost += curve is Nurbs nurbs ? nurbs.Knots.Count * (long)(nurbs.Degree + 1) / 4 : 1;
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
        foreach (Point p in (ReadOnlySpan<Point>)[curve.Start, curve.End])
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

    private string LayerOf(DxfItem item, Surroundings around)
    {
        string written = item.Layer == "0" && around.Layer is not null ? around.Layer : item.Layer;
        if (!_spelling.TryGetValue(written, out string? spelled))
        {
            spelled = document.Layers.TryGetValue(written, out DxfLayer? layer) ? layer.Name : written;
            _spelling.Add(written, spelled);
        }

        return spelled;
    }

    private string LineTypeOf(DxfItem item, string layer, Surroundings around)
    {
        string written = item.LineType ?? "BYLAYER";
        if (written.Equals("BYBLOCK", StringComparison.OrdinalIgnoreCase))
        {
            return around.LineType;
        }

        bool byLayer = written.Equals("BYLAYER", StringComparison.OrdinalIgnoreCase);
        return byLayer && document.Layers.TryGetValue(layer, out DxfLayer? found) ? found.LineType : written;
    }

    private string? Hidden(DxfItem item, string layer)
    {
        if (item.IsOnPaper)
        {
            return "it is on a paper sheet, not in the model";
        }

        if (item.IsInvisible)
        {
            return "it is marked invisible";
        }

        if (!document.Layers.TryGetValue(layer, out DxfLayer? found))
        {
            return null;
        }

        // A layer that is off hides what lies on it, but not what an INSERT on it shows on other layers.
        return found.IsFrozen ? "its layer is frozen" : found.IsOff && item is not DxfInsert ? "its layer is switched off" : null;
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
