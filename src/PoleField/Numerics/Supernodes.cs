namespace PoleField.Numerics;

/// <summary>
/// Runs of unknowns that are eliminated together as one dense front, and the tree of these fronts. Front s eliminates
/// the columns ColumnStart[s] .. ColumnStart[s + 1] − 1 of the permuted matrix and couples them with <see cref="Rows"/>.
/// </summary>
/// <remarks>
/// Supernodes with relaxed amalgamation: Ng and Peyton, SIAM J. Sci. Comput. 14 (1993) 1034; Ashcraft and Grimes, ACM
/// Trans. Math. Softw. 15 (1989) 291 (both recalled from memory). A front is merged into its parent when the model of
/// <see cref="FrontCost"/> finds the merged one no slower.
/// </remarks>
internal sealed class Supernodes
{
    private readonly CompressedGraph _compressed;
    private readonly int[] _clusterOfGroup;
    private readonly int[] _frontOfCluster;

    private Supernodes(CompressedGraph compressed, EliminationTree tree)
    {
        _compressed = compressed;
        _clusterOfGroup = tree.ClustersOf(compressed);
        (int[] columns, int[] rows) = tree.Counts(compressed, _clusterOfGroup);
        int[] top = Amalgamate(tree.Parent, columns, rows);
        _frontOfCluster = NumberFronts(tree.Parent, top, rows, out int[] parent, out int[] rowCount);
        Parent = parent;
        ColumnStart = new int[parent.Length + 1];
        UnknownAt = NumberColumns(columns);
        Rows = FindRows(tree, rowCount);
    }

    /// <summary>Parent of each front, −1 for a root; children come before it, a subtree in one run.</summary>
    public int[] Parent { get; }

    /// <summary>First column of each front; [Count] is the size of the matrix.</summary>
    public int[] ColumnStart { get; }

    /// <summary>Rows below the pivot block of each front, increasing.</summary>
    public ElementLists Rows { get; }

    /// <summary>Unknown that is the permuted matrix's column i.</summary>
    public int[] UnknownAt { get; }

    /// <summary>Number of fronts.</summary>
    public int Count => Parent.Length;

    public static Supernodes Of(CompressedGraph compressed, EliminationTree tree) => new(compressed, tree);

    /// <summary>Columns that front s eliminates.</summary>
    public int Columns(int s) => ColumnStart[s + 1] - ColumnStart[s];

    // The last cluster of the front to which each cluster belongs.
    private static int[] Amalgamate(int[] parent, int[] columns, int[] rows)
    {
        int n = parent.Length;
        var top = new int[n];
        var width = new int[n];
        var firstChild = new int[n];
        var sibling = new int[n];
        Array.Fill(firstChild, -1);
        for (int k = 0; k < n; k++)
        {
            top[k] = k;
            width[k] = columns[k];
            for (int child = firstChild[k], kept = -1; child >= 0;)
            {
                int next = sibling[child];
                if (FrontCost.MergingPays(width[child], rows[child], width[k], rows[k]))
                {
                    width[k] += width[child];
                    top[child] = k;
                }
                else
                {
                    sibling[child] = kept;
                    kept = child;
                }

                child = next;
            }

            if (parent[k] >= 0)
            {
                sibling[k] = firstChild[parent[k]];
                firstChild[parent[k]] = k;
            }
        }

        for (int k = n - 1; k >= 0; k--)
        {
            top[k] = top[top[k]];
        }

        return top;
    }

    private static int[] NumberFronts(int[] parent, int[] top, int[] rows, out int[] frontParent, out int[] rowCount)
    {
        int n = parent.Length;
        var front = new int[n];
        int count = 0;
        for (int k = 0; k < n; k++)
        {
            front[k] = top[k] == k ? count++ : -1;
        }

        var loose = new int[count];
        for (int k = 0; k < n; k++)
        {
            if (top[k] == k)
            {
                loose[front[k]] = parent[k] < 0 ? -1 : front[top[parent[k]]];
            }
        }

        int[] post = EliminationTree.Postorder(loose);
        var number = new int[count];
        for (int i = 0; i < count; i++)
        {
            number[post[i]] = i;
        }

        frontParent = new int[count];
        rowCount = new int[count];
        for (int k = 0; k < n; k++)
        {
            if (top[k] == k)
            {
                int old = front[k];
                frontParent[number[old]] = loose[old] < 0 ? -1 : number[loose[old]];
                rowCount[number[old]] = rows[k];
            }
        }

        var frontOf = new int[n];
        for (int k = 0; k < n; k++)
        {
            frontOf[k] = number[front[top[k]]];
        }

        return frontOf;
    }

    // Fronts in order; in each its clusters in order; in each the attached groups, then the leading one.
    private int[] NumberColumns(int[] columns)
    {
        int clusters = columns.Length;
        for (int k = 0; k < clusters; k++)
        {
            ColumnStart[_frontOfCluster[k] + 1] += columns[k];
        }

        for (int s = 0; s < Count; s++)
        {
            ColumnStart[s + 1] += ColumnStart[s];
        }

        int[] nextOfFront = ColumnStart.AsSpan(0, Count).ToArray();
        var next = new int[clusters];
        for (int k = 0; k < clusters; k++)
        {
            next[k] = nextOfFront[_frontOfCluster[k]];
            nextOfFront[_frontOfCluster[k]] += columns[k];
        }

        var unknownAt = new int[ColumnStart[Count]];
        for (int pass = 0; pass < 2; pass++)
        {
            for (int g = 0; g < _clusterOfGroup.Length; g++)
            {
                if (_compressed.LeadingOf[g] >= 0 == (pass == 1))
                {
                    foreach (int unknown in _compressed.Members[g])
                    {
                        unknownAt[next[_clusterOfGroup[g]]++] = unknown;
                    }
                }
            }
        }

        return unknownAt;
    }

    // Row by row: a row belongs to all fronts from those it is coupled with up to (not including) its own.
    private ElementLists FindRows(EliminationTree tree, int[] rowCount)
    {
        var start = new int[Count + 1];
        for (int s = 0; s < Count; s++)
        {
            start[s + 1] = start[s] + rowCount[s];
        }

        int[] next = start.AsSpan(0, Count).ToArray();
        var rows = new int[start[Count]];
        var marked = new int[Count];
        Array.Fill(marked, -1);
        int[] groupOf = GroupOfUnknown();
        var frontOfVertex = new int[tree.Order.Length];
        for (int k = 0; k < frontOfVertex.Length; k++)
        {
            frontOfVertex[tree.Order[k]] = _frontOfCluster[k];
        }

        for (int row = 0; row < UnknownAt.Length;)
        {
            int g = groupOf[UnknownAt[row]];
            int size = _compressed.Members[g].Length;
            int own = _frontOfCluster[_clusterOfGroup[g]];
            foreach (int e in _compressed.ElementsOf(g))
            {
                // A group is eliminated with a vertex of each of its elements, so the vertices say it all.
                foreach (int v in _compressed.LeadingOfElement[e])
                {
                    for (int s = frontOfVertex[v]; s >= 0 && s < own && marked[s] != g; s = Parent[s])
                    {
                        marked[s] = g;
                        for (int i = 0; i < size; i++)
                        {
                            rows[next[s]++] = row + i;
                        }
                    }
                }
            }

            row += size;
        }

        return new ElementLists(start, rows);
    }

    private int[] GroupOfUnknown()
    {
        var groupOf = new int[UnknownAt.Length];
        for (int g = 0; g < _compressed.Members.Count; g++)
        {
            foreach (int unknown in _compressed.Members[g])
            {
                groupOf[unknown] = g;
            }
        }

        return groupOf;
    }
}
