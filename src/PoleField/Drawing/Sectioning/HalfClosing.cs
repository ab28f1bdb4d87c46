using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Prepares a half model: what comes near y = 0 is put there, and outlines that end on it are closed along it.</summary>
internal sealed class HalfClosing
{
    private readonly Net _net;
    private readonly IReadOnlyList<UsedLayer> _layers;
    private readonly Reach _reach;
    private readonly SectionLog _log;

    private HalfClosing(Net net, IReadOnlyList<UsedLayer> layers, Reach reach, SectionLog log)
    {
        (_net, _layers, _reach, _log) = (net, layers, reach, log);
    }

    /// <summary>Changes the net in place; reports layers that reach across the symmetry line.</summary>
    public static void Close(Net net, IReadOnlyList<UsedLayer> layers, Reach reach, SectionLog log)
    {
        net.IsHalf = true;
        HalfClosing closing = new(net, layers, reach, log);
        foreach (UsedLayer layer in layers)
        {
            closing.CheckSide(layer);
        }

        closing.CutWhereTouching();
        closing.PutOnAxis();
        foreach (UsedLayer layer in layers)
        {
            closing.CloseAlongAxis(layer);
        }
    }

    /// <summary>True when a curve between two points of the net lies on the symmetry line.</summary>
    public static bool IsOnAxis(Curve curve) => curve is Line && curve.Start.Y == 0 && curve.End.Y == 0;

    private void CheckSide(UsedLayer layer)
    {
        Piece? deepest = _net.Pieces.Where(p => p.Layer == layer.Index).MinBy(p => p.Curve.Bounds.Min.Y);
        if (deepest is not null && deepest.Curve.Bounds.Min.Y < -_reach.Join)
        {
            Point at = deepest.Curve.At(Leftmost(deepest.Curve));
            _log.Add(SectionMessages.AcrossSymmetry(_log, layer.Name, at), at, deepest.Source);
        }
    }

    // A bent curve may touch the line between its ends; it gets a point there.
    private void CutWhereTouching()
    {
        List<Piece> pieces = [];
        foreach (Piece p in _net.Pieces)
        {
            double t = p.Curve is Line || p.Curve.Bounds.Min.Y > _reach.Join ? 0 : Leftmost(p.Curve);
            Point at = p.Curve.At(t);
            if (Math.Abs(at.Y) > _reach.Join || at.DistanceTo(p.Curve.Start) <= _reach.Join || at.DistanceTo(p.Curve.End) <= _reach.Join)
            {
                pieces.Add(p);
                continue;
            }

            int v = _net.Points.Count;
            _net.Points.Add(at);
            pieces.Add(p with { Curve = p.Curve.Part(0, t), End = v, Whole = false });
            pieces.Add(p with { Curve = p.Curve.Part(t, 1), Start = v, Whole = false });
        }

        _net.Pieces = pieces;
    }

    private static double Leftmost(Curve curve)
    {
        const int samples = 64, steps = 60;
        double best = Enumerable.Range(0, samples + 1).Select(i => (double)i / samples).MinBy(t => curve.At(t).Y);
        double low = Math.Max(0, best - (1.0 / samples)), high = Math.Min(1, best + (1.0 / samples));
        for (int i = 0; i < steps; i++)
        {
            double middle = 0.5 * (low + high);
            (low, high) = curve.Derivative(middle).Y < 0 ? (middle, high) : (low, middle);
        }

        double found = 0.5 * (low + high);
        return curve.At(found).Y < curve.At(best).Y ? found : best;
    }

    private void PutOnAxis()
    {
        Dictionary<double, int> onAxis = [];
        int[] same = [.. Enumerable.Range(0, _net.Points.Count)];
        for (int v = 0; v < same.Length; v++)
        {
            if (Math.Abs(_net.Points[v].Y) <= _reach.Join)
            {
                _net.Points[v] = new Point(0, _net.Points[v].Z);
                same[v] = onAxis.TryAdd(_net.Points[v].Z, v) ? v : onAxis[_net.Points[v].Z];
            }
        }

        _net.Pieces = [.. _net.Pieces.Select(p => p with { Start = same[p.Start], End = same[p.End] }).Where(p => !(p.IsClosed && p.Curve is Line))];
        _net.Refit();
    }

    // Along the line the inside begins and ends wherever an odd number of the layer's curves arrives.
    private void CloseAlongAxis(UsedLayer layer)
    {
        List<Piece> drawn = [.. _net.Pieces.Where(p => p.Layer == layer.Index && IsOnAxis(p.Curve))];
        Dictionary<int, (int Ends, int Source)> arriving = [];
        foreach (Piece p in _net.Pieces.Where(p => p.Layer == layer.Index && !IsOnAxis(p.Curve)))
        {
            foreach (int v in new[] { p.Start, p.End }.Where(v => _net.Points[v].Y == 0))
            {
                arriving[v] = (arriving.GetValueOrDefault(v).Ends + 1, p.Source);
            }
        }

        List<int> turns = [.. arriving.Where(a => int.IsOddInteger(a.Value.Ends)).Select(a => a.Key).OrderBy(v => _net.Points[v].Z)];
        if (int.IsOddInteger(turns.Count))
        {
            return;
        }

        _net.Pieces.RemoveAll(drawn.Contains);
        for (int i = 0; i < turns.Count; i += 2)
        {
            (int a, int b) = (turns[i], turns[i + 1]);
            Line line = new(_net.Points[a], _net.Points[b]);
            _net.Pieces.Add(new Piece(line, a, b, layer.Index, arriving[a].Source));
            if (!drawn.Exists(d => d.Curve.DistanceTo(line.At(0.5)) <= _reach.Join))
            {
                _log.Add(SectionMessages.ClosedOnSymmetry(_log, layer.Name, line), line.At(0.5), arriving[a].Source);
            }
        }
    }
}
