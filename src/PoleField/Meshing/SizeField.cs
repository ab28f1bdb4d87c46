using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Wanted edge length at every place: near each source its size, growing with distance at the field's rate, never above
/// the ceiling: min(ceiling, minᵢ(sizeᵢ + growth·|p − pᵢ|)).
/// </summary>
/// <remarks>
/// The sources sit in a tree of halves; a branch whose smallest size plus growth times distance cannot win is left out, so
/// evaluation costs O(log n). Sources that another one undercuts at their own place are dropped.
/// </remarks>
public sealed class SizeField
{
    private const int LeafSources = 6;

    private readonly (Point At, double Size)[] _sources; // in the order of the tree's leaves
    private readonly Node[] _nodes; // node i has children i + 1 and its Second

    private SizeField(double ceiling, double growth, (Point At, double Size)[] sources)
    {
        Ceiling = ceiling;
        Growth = growth;
        _sources = sources;
        List<Node> nodes = [];
        if (sources.Length > 0)
        {
            Build(nodes, 0, sources.Length);
        }

        _nodes = [.. nodes];
    }

    /// <summary>Largest edge length anywhere, metres, &gt; 0.</summary>
    public double Ceiling { get; }

    /// <summary>Growth of edge length per length of distance from a source, ≥ 0; 0.35 is usual.</summary>
    public double Growth { get; }

    /// <summary>The same size everywhere.</summary>
    /// <exception cref="ArgumentException">The size is not positive and finite.</exception>
    public static SizeField Uniform(double size) => FromSources(size, 0, []);

    /// <summary>A field with the given ceiling and growth and these sources (place, size in metres).</summary>
    /// <exception cref="ArgumentException">The ceiling or a size is not positive and finite, the growth is negative, or a place is not finite.</exception>
    public static SizeField FromSources(
        double ceiling, double growth, IReadOnlyList<(Point At, double Size)> sources)
    {
        if (!(ceiling > 0.0) || !double.IsFinite(ceiling) || !(growth >= 0.0) || !double.IsFinite(growth))
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"A size field needs a ceiling > 0 m and a growth >= 0; got {ceiling} m and {growth}."));
        }

        foreach ((Point at, double size) in sources)
        {
            if (!(size > 0.0) || !double.IsFinite(size) || !at.IsFinite)
            {
                throw new ArgumentException(FormattableString.Invariant(
                    $"A source of size needs a finite place and a size > 0 m; got {size} m at ({at.Y}, {at.Z}) m."), nameof(sources));
            }
        }

        SizeField all = new(ceiling, growth, [.. sources]);
        const double rounding = 1e-12;
        (Point At, double Size)[] needed = [.. all._sources.Where(s => all.At(s.At) >= s.Size * (1 - rounding)).Distinct()];
        return needed.Length == all._sources.Length ? all : new SizeField(ceiling, growth, needed);
    }

    /// <summary>Sources along a curve, no further apart than <paramref name="size"/>.</summary>
    public static IEnumerable<(Point At, double Size)> Along(Curve curve, double size)
    {
        int pieces = (int)Math.Min(1e6, Math.Ceiling(curve.Length / size) + 1);
        for (int i = 0; i <= pieces; i++)
        {
            yield return (curve.At((double)i / pieces), size);
        }
    }

    /// <summary>This field and further sources (used by adaptive refinement).</summary>
    /// <exception cref="ArgumentException">A size is not positive and finite, or a place is not finite.</exception>
    public SizeField With(IReadOnlyList<(Point At, double Size)> sources) =>
        FromSources(Ceiling, Growth, [.. _sources, .. sources]);

    /// <summary>This field with every size, and the ceiling, multiplied.</summary>
    /// <exception cref="ArgumentException">The factor is not positive and finite.</exception>
    public SizeField Scaled(double factor) =>
        FromSources(factor * Ceiling, Growth, [.. _sources.Select(s => (s.At, factor * s.Size))]);

    /// <summary>Wanted edge length at a place, metres.</summary>
    public double At(Point p)
    {
        double best = Ceiling;
        if (_nodes.Length == 0)
        {
            return best;
        }

        // Depth is below 64: every level halves the number of sources.
        Span<int> waiting = stackalloc int[64];
        int count = 0;
        int at = 0;
        while (true)
        {
            ref readonly Node node = ref _nodes[at];
            if (node.Least(p, Growth) < best)
            {
                if (node.Second < 0)
                {
                    best = BestOf(node, p, best);
                }
                else
                {
                    bool firstIsNearer = _nodes[at + 1].Least(p, Growth) <= _nodes[node.Second].Least(p, Growth);
                    waiting[count++] = firstIsNearer ? node.Second : at + 1;
                    at = firstIsNearer ? at + 1 : node.Second;
                    continue;
                }
            }

            if (count == 0)
            {
                return best;
            }

            at = waiting[--count];
        }
    }

    private double BestOf(in Node leaf, Point p, double best)
    {
        for (int i = leaf.From; i < leaf.To; i++)
        {
            best = Math.Min(best, _sources[i].Size + (Growth * p.DistanceTo(_sources[i].At)));
        }

        return best;
    }

    private int Build(List<Node> nodes, int from, int to)
    {
        Box box = Box.Empty;
        double least = double.PositiveInfinity;
        for (int i = from; i < to; i++)
        {
            box = box.Including(_sources[i].At);
            least = Math.Min(least, _sources[i].Size);
        }

        int index = nodes.Count;
        nodes.Add(new Node(box, least, from, to, -1));
        if (to - from <= LeafSources || box.Diagonal == 0.0)
        {
            return index;
        }

        bool wide = box.Width >= box.Height;
        Array.Sort(_sources, from, to - from, Comparer<(Point At, double Size)>.Create((a, b) => Compare(a, b, wide)));
        int middle = (from + to) / 2;
        Build(nodes, from, middle);
        int second = Build(nodes, middle, to);
        nodes[index] = new Node(box, least, from, to, second);
        return index;
    }

    private static int Compare((Point At, double Size) a, (Point At, double Size) b, bool wide)
    {
        int first = wide ? a.At.Y.CompareTo(b.At.Y) : a.At.Z.CompareTo(b.At.Z);
        int second = wide ? a.At.Z.CompareTo(b.At.Z) : a.At.Y.CompareTo(b.At.Y);
        return first != 0 ? first : second != 0 ? second : a.Size.CompareTo(b.Size);
    }

    private readonly record struct Node(Box Box, double LeastSize, int From, int To, int Second)
    {
        public double Least(Point p, double growth)
        {
            double dy = Math.Max(0, Math.Max(Box.Min.Y - p.Y, p.Y - Box.Max.Y));
            double dz = Math.Max(0, Math.Max(Box.Min.Z - p.Z, p.Z - Box.Max.Z));
            return LeastSize + (growth * Math.Sqrt((dy * dy) + (dz * dz)));
        }
    }
}
