namespace PoleField.Numerics;

/// <summary>
/// Elimination tree of the leading groups in a given order, with what elimination of each costs. Vertices are numbered
/// by elimination (a postorder: every subtree is a run of numbers that ends at its root).
/// </summary>
/// <remarks>
/// Tree: Liu, The role of elimination trees in sparse factorization, SIAM J. Matrix Anal. Appl. 11 (1990) 134.
/// Counts: Gilbert, Ng, Peyton, SIAM J. Matrix Anal. Appl. 15 (1994) 1075, as described by Davis (2006), section 4.4.
/// Both recalled from memory; the tests compare with elimination done entry by entry.
/// </remarks>
internal sealed class EliminationTree
{
    private EliminationTree(int[] order, int[] parent)
    {
        Order = order;
        Parent = parent;
        Position = new int[order.Length];
        for (int k = 0; k < order.Length; k++)
        {
            Position[order[k]] = k;
        }
    }

    /// <summary>Vertex eliminated k-th.</summary>
    public int[] Order { get; }

    /// <summary>When a vertex is eliminated.</summary>
    public int[] Position { get; }

    /// <summary>Parent of the k-th, −1 for a root.</summary>
    public int[] Parent { get; }

    public static EliminationTree Of(WeightedGraph graph, ReadOnlySpan<int> order)
    {
        int n = graph.Count;
        var position = new int[n];
        for (int k = 0; k < n; k++)
        {
            position[order[k]] = k;
        }

        int[] parent = Parents(graph, order, position);
        int[] post = Postorder(parent);
        var number = new int[n];
        for (int k = 0; k < n; k++)
        {
            number[post[k]] = k;
        }

        var postOrder = new int[n];
        var postParent = new int[n];
        for (int k = 0; k < n; k++)
        {
            int old = post[k];
            postOrder[k] = order[old];
            postParent[k] = parent[old] < 0 ? -1 : number[parent[old]];
        }

        return new EliminationTree(postOrder, postParent);
    }

    /// <summary>Nodes of a forest such that children come before their parent, a subtree in one run.</summary>
    public static int[] Postorder(ReadOnlySpan<int> parent)
    {
        int n = parent.Length;
        var firstChild = new int[n];
        var sibling = new int[n];
        Array.Fill(firstChild, -1);
        int root = -1;
        for (int k = n - 1; k >= 0; k--)
        {
            ref int head = ref parent[k] < 0 ? ref root : ref firstChild[parent[k]];
            sibling[k] = head;
            head = k;
        }

        var post = new int[n];
        int count = 0;
        for (; root >= 0; root = sibling[root])
        {
            for (int node = root; node >= 0;)
            {
                if (firstChild[node] >= 0)
                {
                    int child = firstChild[node];
                    firstChild[node] = -1;
                    node = child;
                    continue;
                }

                post[count++] = node;
                node = node == root ? -1 : sibling[node] >= 0 ? sibling[node] : parent[node];
            }
        }

        return post;
    }

    /// <summary>
    /// Unknowns eliminated with each vertex (its own and those of the groups attached to it, if it is the first of their
    /// vertices) and unknowns of later ones that are then coupled.
    /// </summary>
    public (int[] Columns, int[] Rows) Counts(CompressedGraph compressed, ReadOnlySpan<int> clusterOfGroup)
    {
        int n = Order.Length;
        var columns = new int[n];
        for (int g = 0; g < clusterOfGroup.Length; g++)
        {
            columns[clusterOfGroup[g]] += compressed.Members[g].Length;
        }

        var first = new int[n];
        Array.Fill(first, -1);
        for (int k = 0; k < n; k++)
        {
            for (int j = k; j >= 0 && first[j] < 0; j = Parent[j])
            {
                first[j] = k;
            }
        }

        int[] rows = CountLeaves(compressed, clusterOfGroup, first);
        for (int k = 0; k < n; k++)
        {
            if (Parent[k] >= 0)
            {
                rows[Parent[k]] += rows[k];
            }
        }

        return (columns, rows);
    }

    /// <summary>Number of the vertex with which each group is eliminated.</summary>
    public int[] ClustersOf(CompressedGraph compressed)
    {
        var cluster = new int[compressed.Members.Count];
        for (int g = 0; g < cluster.Length; g++)
        {
            if (compressed.LeadingOf[g] >= 0)
            {
                cluster[g] = Position[compressed.LeadingOf[g]];
                continue;
            }

            cluster[g] = int.MaxValue;
            foreach (int v in compressed.Attachments[g])
            {
                cluster[g] = Math.Min(cluster[g], Position[v]);
            }
        }

        return cluster;
    }

    private static int[] Parents(WeightedGraph graph, ReadOnlySpan<int> order, int[] position)
    {
        int n = graph.Count;
        var parent = new int[n];
        var ancestor = new int[n];
        for (int k = 0; k < n; k++)
        {
            parent[k] = -1;
            ancestor[k] = -1;
            foreach (int v in graph.Around(order[k]))
            {
                for (int i = position[v]; i >= 0 && i < k;)
                {
                    int next = ancestor[i];
                    ancestor[i] = k;
                    if (next < 0)
                    {
                        parent[i] = k;
                    }

                    i = next;
                }
            }
        }

        return parent;
    }

    // +w at each leaf of a row's subtree, −w where branches join and where the row's own elimination ends it.
    private int[] CountLeaves(CompressedGraph compressed, ReadOnlySpan<int> clusterOfGroup, int[] first)
    {
        int n = Order.Length;
        var delta = new int[n];
        var deepest = new int[clusterOfGroup.Length];
        var lastLeaf = new int[clusterOfGroup.Length];
        Array.Fill(deepest, -1);
        Array.Fill(lastLeaf, -1);
        var ancestor = new int[n];
        for (int k = 0; k < n; k++)
        {
            ancestor[k] = k;
        }

        for (int k = 0; k < n; k++)
        {
            foreach (int e in compressed.ElementsOf(compressed.Leaders[Order[k]]))
            {
                foreach (int g in compressed.Groups[e])
                {
                    if (clusterOfGroup[g] <= k || first[k] <= deepest[g])
                    {
                        continue;
                    }

                    deepest[g] = first[k];
                    int weight = compressed.Members[g].Length;
                    delta[k] += weight;
                    delta[lastLeaf[g] < 0 ? clusterOfGroup[g] : Find(ancestor, lastLeaf[g])] -= weight;
                    lastLeaf[g] = k;
                }
            }

            if (Parent[k] >= 0)
            {
                ancestor[k] = Parent[k];
            }
        }

        return delta;
    }

    private static int Find(int[] ancestor, int node)
    {
        int root = node;
        while (ancestor[root] != root)
        {
            root = ancestor[root];
        }

        while (ancestor[node] != root)
        {
            (node, ancestor[node]) = (ancestor[node], root);
        }

        return root;
    }
}
