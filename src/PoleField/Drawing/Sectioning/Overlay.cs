using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Lays pieces at one place together: an edge that several layers drew, or one layer drew twice, is there once.</summary>
internal sealed class Overlay
{
    private readonly Net _net;
    private readonly Reach _reach;
    private readonly SectionLog _log;
    private readonly Dictionary<int, IReadOnlyList<int>> _alone = []; // layer to the list of it alone

    private Overlay(Net net, Reach reach, SectionLog log)
    {
        (_net, _reach, _log) = (net, reach, log);
    }

    /// <summary>The edges, in the order of drawing.</summary>
    public static List<WovenEdge> LayTogether(Net net, Reach reach, SectionLog log) => new Overlay(net, reach, log).Edges();

    /// <summary>True for pieces between the same ends that are nowhere farther apart than the reach.</summary>
    public static bool AreAlike(Piece a, Piece b, Reach reach)
    {
        if (Math.Min(a.Start, a.End) != Math.Min(b.Start, b.End) || Math.Max(a.Start, a.End) != Math.Max(b.Start, b.End))
        {
            return false;
        }

        // Sampled at the quarters, where arcs between two points differ most.
        double most = a.Layer == b.Layer ? reach.Fine : reach.Join;
        return (a.Curve is Line && b.Curve is Line)
            || (a.Curve.DistanceTo(b.Curve.At(0.25)) <= most && a.Curve.DistanceTo(b.Curve.At(0.5)) <= most
                && a.Curve.DistanceTo(b.Curve.At(0.75)) <= most);
    }

    private List<WovenEdge> Edges()
    {
        // Pieces sorted by their ends; a run of equal ends may hold pieces that lie on each other.
        List<Piece> pieces = _net.Pieces;
        long[] ends = [.. pieces.Select(p => ((long)Math.Min(p.Start, p.End) * _net.Points.Count) + Math.Max(p.Start, p.End))];
        int[] order = [.. Enumerable.Range(0, pieces.Count)];
        Array.Sort(ends, order);
        int[][] runs = new int[pieces.Count][]; // pieces of equal ends, at the first of them; null where a piece is alone
        bool[] later = new bool[pieces.Count];  // true for the others of a run
        for (int from = 0, to; from < order.Length; from = to)
        {
            for (to = from + 1; to < order.Length && ends[to] == ends[from]; to++)
            {
            }

            if (to > from + 1)
            {
                int[] run = [.. order[from..to].Order()];
                runs[run[0]] = run;
                Array.ForEach(run[1..], i => later[i] = true);
            }
        }

        List<WovenEdge> edges = new(pieces.Count);
        for (int i = 0; i < pieces.Count; i++)
        {
            if (runs[i] is int[] run)
            {
                LayTogether([.. run.Select(k => pieces[k])], edges);
            }
            else if (!later[i])
            {
                edges.Add(Edge(pieces[i], Alone(pieces[i].Layer)));
            }
        }

        return edges;
    }

    private IReadOnlyList<int> Alone(int layer) =>
        _alone.TryGetValue(layer, out IReadOnlyList<int>? alone) ? alone : _alone[layer] = [layer];

    private void LayTogether(List<Piece> rest, List<WovenEdge> edges)
    {
        while (rest.Count > 0)
        {
            // A bent piece keeps its shape against a straight one; of equals the first drawn of the first layer.
            Piece keep = rest.FirstOrDefault(p => p.Curve is not Line) ?? rest[0];
            ILookup<bool, Piece> alike = rest.ToLookup(p => ReferenceEquals(p, keep) || AreAlike(keep, p, _reach));
            NoteRepeats(alike[true]);
            edges.Add(Edge(keep, [.. alike[true].Select(p => p.Layer).Distinct().Order()]));
            rest = [.. alike[false]];
        }
    }

    private static WovenEdge Edge(Piece p, IReadOnlyList<int> layers) => new(p.Curve, p.Start, p.End, layers, p.Source);

    private void NoteRepeats(IEnumerable<Piece> alike)
    {
        foreach (IGrouping<int, Piece> drawn in alike.GroupBy(p => p.Layer))
        {
            Piece first = drawn.First();
            foreach (Piece p in drawn.Skip(1))
            {
                Point at = p.Curve.At(0.5);
                _log.Add(SectionMessages.Repeat(_log, at, p.Curve.Length, first.Whole && p.Whole), at, p.Source);
            }
        }
    }
}
