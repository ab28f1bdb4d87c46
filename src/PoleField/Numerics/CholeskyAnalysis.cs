namespace PoleField.Numerics;

/// <summary>What the order of elimination and the pattern determine: made once per mesh, used for every factorisation.</summary>
/// <remarks>Immutable: factorisations of several matrices may run at once.</remarks>
public sealed class CholeskyAnalysis
{
    private CholeskyAnalysis(SymmetricPattern pattern, Supernodes fronts)
    {
        Pattern = pattern;
        Fronts = fronts;
        ColumnOf = new int[pattern.Size];
        for (int i = 0; i < ColumnOf.Length; i++)
        {
            ColumnOf[fronts.UnknownAt[i]] = i;
        }

        PanelStart = new long[fronts.Count + 1];
        for (int s = 0; s < fronts.Count; s++)
        {
            FrontLayout front = Layout(s);
            PanelStart[s + 1] = PanelStart[s] + front.PanelSize;
            double k = front.Columns, r = front.Rows;
            FactorEntries += (long)((k * (k + 1) / 2) + (k * r));
            Operations += FrontCost.Operations(k, r);
        }

        RowInParent = MapRowsToParents();
        Entries = EntryMap.Of(pattern, fronts, ColumnOf);
        Plan = FactorizationPlan.Of(fronts);
    }

    /// <summary>Entries of the factor, those that are zero but stored (to make fronts larger) included.</summary>
    public long FactorEntries { get; }

    /// <summary>Floating-point operations of a factorisation, those on stored zeros included.</summary>
    public double Operations { get; }

    /// <summary>Number of unknowns.</summary>
    public int Size => Pattern.Size;

    internal SymmetricPattern Pattern { get; }

    internal Supernodes Fronts { get; }

    /// <summary>Column of the permuted matrix of each unknown.</summary>
    internal int[] ColumnOf { get; }

    /// <summary>Start of each front's panel among the factor's numbers.</summary>
    internal long[] PanelStart { get; }

    /// <summary>For each row of <see cref="Supernodes.Rows"/> its local row in the parent front.</summary>
    internal int[] RowInParent { get; }

    internal EntryMap Entries { get; }

    internal FactorizationPlan Plan { get; }

    /// <summary>Orders and analyses a pattern; the result is the same on any number of threads.</summary>
    public static CholeskyAnalysis Analyse(SymmetricPattern pattern, int threads = 1)
    {
        CompressedGraph compressed = CompressedGraph.Of(pattern);
        int[] order = NestedDissection.Order(compressed.Graph, threads);
        return new CholeskyAnalysis(pattern, Supernodes.Of(compressed, EliminationTree.Of(compressed.Graph, order)));
    }

    /// <summary>
    /// Factors a matrix of this pattern; <paramref name="values"/> as in the pattern's value array. The factor is the same to
    /// the last bit for any number of threads.
    /// </summary>
    /// <exception cref="NotPositiveDefiniteException">A pivot is not positive.</exception>
    public CholeskyFactor Factor(ReadOnlySpan<double> values, int threads = 1)
    {
        var factor = new CholeskyFactor(this);
        factor.Refactor(values, threads);
        return factor;
    }

    internal FrontLayout Layout(int front) =>
        new(Fronts.Columns(front), Fronts.Rows.Start[front + 1] - Fronts.Rows.Start[front]);

    private int[] MapRowsToParents()
    {
        int[] rows = Fronts.Rows.Items, start = Fronts.Rows.Start;
        var local = new int[rows.Length];
        for (int s = 0; s < Fronts.Count; s++)
        {
            int parent = Fronts.Parent[s];
            if (parent < 0)
            {
                continue;
            }

            int firstColumn = Fronts.ColumnStart[parent], endColumn = Fronts.ColumnStart[parent + 1];
            int match = start[parent], columns = endColumn - firstColumn;
            for (int i = start[s]; i < start[s + 1]; i++)
            {
                if (rows[i] < endColumn)
                {
                    local[i] = rows[i] - firstColumn;
                    continue;
                }

                while (rows[match] != rows[i])
                {
                    match++;
                }

                local[i] = columns + (match - start[parent]);
            }
        }

        return local;
    }
}
