namespace PoleField.Numerics;

/// <summary>
/// One factorisation, front by front: each is a dense matrix of what its columns couple; its columns are eliminated and
/// what is left, its update, is added to its parent.
/// </summary>
/// <remarks>
/// Liu, The multifrontal method for sparse matrix solution: theory and practice, SIAM Review 34 (1992) 82, recalled from
/// memory. Updates are added in the order of the children whatever the thread, so the factor does not depend on threads.
/// </remarks>
internal sealed unsafe class Multifrontal
{
    private readonly CholeskyAnalysis _analysis;
    private readonly double* _entries;
    private readonly double* _factor;
    private readonly UpdateStore _store;

    // Updates of the roots of subtrees and of the fronts above, until their parent has taken them.
    private readonly PinnedNumbers?[] _kept;
    // Where the update of each front is (a pointer).
    private readonly nint[] _updateOf;
    private readonly Lock _gate = new();
    private int _failedColumn = int.MaxValue;
    private double _failedPivot;

    public Multifrontal(CholeskyAnalysis analysis, double* entries, double* factor, UpdateStore store)
    {
        _analysis = analysis;
        _entries = entries;
        _factor = factor;
        _store = store;
        _updateOf = new nint[analysis.Fronts.Count];
        _kept = new PinnedNumbers?[analysis.Fronts.Count];
    }

    /// <summary>Fills the factor's panels.</summary>
    /// <exception cref="NotPositiveDefiniteException">A pivot is not positive.</exception>
    public void Run(int threads)
    {
        FactorizationPlan plan = _analysis.Plan;
        int crew = plan.IsWorthSharing ? threads : 1;
        EliminateSubtrees(crew);
        for (int s = 0; s < plan.IsAbove.Length && _failedColumn == int.MaxValue; s++)
        {
            if (plan.IsAbove[s])
            {
                EliminateKept(s, crew);
            }
        }

        if (_failedColumn < int.MaxValue)
        {
            throw new NotPositiveDefiniteException(_analysis.Fronts.UnknownAt[_failedColumn], _failedPivot);
        }
    }

    private void EliminateSubtrees(int crew)
    {
        int taken = -1;
        if (crew == 1)
        {
            TakeSubtrees(ref taken);
            return;
        }

        Parallel.For(0, crew, new ParallelOptions { MaxDegreeOfParallelism = crew }, _ => TakeSubtrees(ref taken));
    }

    private void TakeSubtrees(ref int taken)
    {
        FactorizationPlan plan = _analysis.Plan;
        int[] roots = plan.Subtrees;
        PinnedNumbers even = _store.Take(plan.StackSizes[0]), odd = _store.Take(plan.StackSizes[1]);
        for (int next; (next = Interlocked.Increment(ref taken)) < roots.Length;)
        {
            EliminateSubtree(roots[next], even.Start, odd.Start);
        }

        _store.Return(even);
        _store.Return(odd);
    }

    // Updates of the children of a front are the topmost of the stack that its own update does not go to.
    private void EliminateSubtree(int root, double* evenTop, double* oddTop)
    {
        FactorizationPlan plan = _analysis.Plan;
        double** top = stackalloc double*[] { evenTop, oddTop };
        for (int s = plan.First[root]; s < root; s++)
        {
            FrontLayout front = _analysis.Layout(s);
            int side = plan.Depth[s] & 1;
            if (!Eliminate(s, front, top[side], 1))
            {
                return;
            }

            top[side] += front.UpdateSize;
            ReadOnlySpan<int> children = plan.Children[s];
            if (!children.IsEmpty)
            {
                top[1 - side] = (double*)_updateOf[children[0]];
            }
        }

        EliminateKept(root, 1);
    }

    // A front whose update others than its own thread may take.
    private void EliminateKept(int s, int crew)
    {
        FrontLayout front = _analysis.Layout(s);
        PinnedNumbers kept = _store.Take(front.UpdateSize);
        _kept[s] = kept;
        if (!Eliminate(s, front, kept.Start, crew))
        {
            return;
        }

        foreach (int child in _analysis.Plan.Children[s])
        {
            if (_kept[child] is { } update)
            {
                _kept[child] = null;
                _store.Return(update);
            }
        }
    }

    private bool Eliminate(int s, FrontLayout front, double* update, int crew)
    {
        double* panel = _factor + _analysis.PanelStart[s];
        Scatter(s, front, panel);
        ReadOnlySpan<int> children = _analysis.Plan.Children[s];
        fixed (int* local = _analysis.RowInParent)
        {
            foreach (int child in children)
            {
                FrontAssembly.AddToPanel(Child(child, local), front, panel);
            }

            int failed = FrontElimination.FactorPanel(panel, front, crew);
            if (failed >= 0)
            {
                double pivot = panel[front.PanelRow(failed) + (8 * failed)];
                Fail(_analysis.Fronts.ColumnStart[s] + failed, pivot);
                return false;
            }

            FrontElimination.FormUpdate(panel, front, update, crew);
            foreach (int child in children)
            {
                FrontAssembly.AddToUpdate(Child(child, local), front, update);
            }
        }

        _updateOf[s] = (nint)update;
        return true;
    }

    private ChildUpdate Child(int child, int* local)
    {
        int[] start = _analysis.Fronts.Rows.Start;
        return new ChildUpdate((double*)_updateOf[child], local + start[child], start[child + 1] - start[child]);
    }

    private void Scatter(int s, FrontLayout front, double* panel)
    {
        new Span<double>(panel, checked((int)front.PanelSize)).Clear();
        EntryMap map = _analysis.Entries;
        int first = map.Start[s], count = map.Start[s + 1] - first;
        ReadOnlySpan<int> source = map.Source.AsSpan(first, count), target = map.Target.AsSpan(first, count);
        for (int k = 0; k < source.Length; k++)
        {
            panel[target[k]] = _entries[source[k]];
        }
    }

    // Of several subtrees that fail the first in the order of elimination counts, whichever ran first.
    private void Fail(int column, double pivot)
    {
        lock (_gate)
        {
            if (column < _failedColumn)
            {
                _failedColumn = column;
                _failedPivot = pivot;
            }
        }
    }
}
