namespace PoleField.Numerics;

/// <summary>
/// How a factorisation walks the tree of fronts: subtrees that may run at once, then the fronts above them. Also the
/// memory for updates that wait for their parent.
/// </summary>
/// <remarks>
/// A front of even depth puts its update on one stack, of odd depth on the other: the updates of a front's children are then
/// always the topmost of the other stack, and nothing is moved.
/// </remarks>
internal sealed class FactorizationPlan
{
    // A subtree is split further while it holds more than this part of all operations.
    private const double LargestShare = 1.0 / 12;

    // Below this many operations sharing costs more than it gives.
    private const double WorthSharing = 2e6;

    private FactorizationPlan(Supernodes fronts)
    {
        int n = fronts.Count;
        var work = new double[n];
        First = new int[n];
        Depth = new int[n];
        Children = ChildrenOf(fronts.Parent);
        double total = 0;
        for (int s = 0; s < n; s++)
        {
            First[s] = s;
        }

        for (int s = 0; s < n; s++)
        {
            double own = FrontCost.Worth(fronts.Columns(s), fronts.Rows[s].Length);
            work[s] += own;
            total += own;
            int parent = fronts.Parent[s];
            if (parent >= 0)
            {
                work[parent] += work[s];
                First[parent] = Math.Min(First[parent], First[s]);
            }
        }

        for (int s = n - 1; s >= 0; s--)
        {
            Depth[s] = fronts.Parent[s] < 0 ? 0 : Depth[fronts.Parent[s]] + 1;
        }

        IsWorthSharing = total > WorthSharing;
        Subtrees = FindSubtrees(fronts.Parent, work, total * LargestShare);
        IsAbove = new bool[n];
        Array.Fill(IsAbove, true);
        foreach (int root in Subtrees)
        {
            IsAbove.AsSpan(First[root], root - First[root] + 1).Clear();
            GrowStacks(fronts, root);
        }
    }

    /// <summary>First front of the subtree under each front (a subtree is a run that ends at its root).</summary>
    public int[] First { get; }

    /// <summary>Number of fronts above each front.</summary>
    public int[] Depth { get; }

    /// <summary>Fronts whose parent each front is, increasing.</summary>
    public ElementLists Children { get; }

    /// <summary>Roots of the subtrees that may run at once, the largest first.</summary>
    public int[] Subtrees { get; }

    /// <summary>Whether a front is above all subtrees.</summary>
    public bool[] IsAbove { get; }

    /// <summary>Numbers that the two stacks of a subtree hold at most.</summary>
    public long[] StackSizes { get; } = new long[2];

    /// <summary>Whether more than one thread pays.</summary>
    public bool IsWorthSharing { get; }

    public static FactorizationPlan Of(Supernodes fronts) => new(fronts);

    // The root's own update goes elsewhere.
    private void GrowStacks(Supernodes fronts, int root)
    {
        Span<long> now = [0, 0];
        var waiting = new long[root - First[root] + 1];
        for (int s = First[root]; s < root; s++)
        {
            int side = Depth[s] & 1;
            long own = new FrontLayout(0, fronts.Rows[s].Length).UpdateSize;
            now[side] += own;
            StackSizes[side] = Math.Max(StackSizes[side], now[side]);
            now[1 - side] -= waiting[s - First[root]];
            waiting[fronts.Parent[s] - First[root]] += own;
        }
    }

    private static ElementLists ChildrenOf(int[] parent)
    {
        var each = new int[parent.Length + 1];
        for (int s = 0; s < each.Length; s++)
        {
            each[s] = s;
        }

        return new ElementLists(each, parent).Transpose(parent.Length);
    }

    private static int[] FindSubtrees(int[] parent, double[] work, double largest)
    {
        var roots = new List<int>();
        for (int s = 0; s < parent.Length; s++)
        {
            if (work[s] <= largest && (parent[s] < 0 || work[parent[s]] > largest))
            {
                roots.Add(s);
            }
        }

        return [.. roots.OrderByDescending(s => work[s]).ThenBy(s => s)];
    }
}
