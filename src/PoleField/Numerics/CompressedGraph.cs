namespace PoleField.Numerics;

/// <summary>
/// A pattern with what is redundant for ordering taken out. Unknowns of the same elements are one <em>group</em> (those of
/// a mesh edge). A group whose elements all belong to another group's too (an edge, to its end points) is
/// <em>attached</em>: eliminated just before that one it adds nothing. The others, <em>leading</em> groups, are the
/// vertices of the graph to be ordered; of a triangle mesh these are the mesh vertices.
/// </summary>
/// <remarks>
/// Supervariables: Davis, Direct Methods for Sparse Linear Systems (2006), section 7.1, recalled from memory. Ordering
/// 200 000 unknowns of quadratic triangles is ordering 50 000 vertices.
/// </remarks>
internal sealed class CompressedGraph
{
    // An attached group has at most this many elements: an edge has two, a bubble one.
    private const int MostElementsOfAttached = 2;

    // Divisible by 1, 2 and 3, so that the weight of an attached group is shared exactly among its leading ones.
    private const int WeightOfUnknown = 6;

    private readonly SymmetricPattern _pattern;

    private CompressedGraph(SymmetricPattern pattern)
    {
        _pattern = pattern;
        Members = Group(pattern, out int[] groupOf);
        Groups = GroupsOfElements(pattern, groupOf, Members.Count);
        ElementLists covers = FindCovers();
        LeadingOf = new int[Members.Count];
        int leading = 0;
        for (int g = 0; g < LeadingOf.Length; g++)
        {
            LeadingOf[g] = covers[g].IsEmpty ? leading++ : -1;
        }

        Leaders = new int[leading];
        for (int g = 0; g < LeadingOf.Length; g++)
        {
            if (LeadingOf[g] >= 0)
            {
                Leaders[LeadingOf[g]] = g;
            }
        }

        Attachments = KeepLeading(covers);
        LeadingOfElement = FindLeadingOfElements();
        Graph = BuildGraph();
    }

    /// <summary>Unknowns of each group, increasing.</summary>
    public ElementLists Members { get; }

    /// <summary>Groups of each element, without repetition.</summary>
    public ElementLists Groups { get; }

    /// <summary>Vertex of a leading group, −1 for an attached one.</summary>
    public int[] LeadingOf { get; }

    /// <summary>Group of each vertex of <see cref="Graph"/>.</summary>
    public int[] Leaders { get; }

    /// <summary>Vertices that a group is attached to (none for a leading group).</summary>
    public ElementLists Attachments { get; }

    /// <summary>Vertices of <see cref="Graph"/> of each element.</summary>
    public ElementLists LeadingOfElement { get; }

    /// <summary>Leading groups, neighbours when they share an element.</summary>
    public WeightedGraph Graph { get; }

    public static CompressedGraph Of(SymmetricPattern pattern) => new(pattern);

    /// <summary>Elements of a group.</summary>
    public ReadOnlySpan<int> ElementsOf(int group) => _pattern.ElementsOf[Members.Items[Members.Start[group]]];

    // Unknowns with the same elements share their first element, so only its unknowns need comparing.
    private static ElementLists Group(SymmetricPattern pattern, out int[] groupOf)
    {
        int n = pattern.Size;
        groupOf = new int[n];
        Array.Fill(groupOf, -1);
        int count = 0;
        for (int i = 0; i < n; i++)
        {
            if (groupOf[i] >= 0)
            {
                continue;
            }

            groupOf[i] = count;
            ReadOnlySpan<int> own = pattern.ElementsOf[i];
            foreach (int j in own.IsEmpty ? [] : pattern.Elements[own[0]])
            {
                if (j > i && groupOf[j] < 0 && Same(own, pattern.ElementsOf[j]))
                {
                    groupOf[j] = count;
                }
            }

            count++;
        }

        var start = new int[n + 1];
        for (int i = 0; i <= n; i++)
        {
            start[i] = i;
        }

        return new ElementLists(start, groupOf).Transpose(count);
    }

    private static bool Same(ReadOnlySpan<int> a, ReadOnlySpan<int> b) =>
        a.Length == b.Length && a[0] == b[0] && a[^1] == b[^1] && (a.Length <= 2 || a.SequenceEqual(b));

    private static ElementLists GroupsOfElements(SymmetricPattern pattern, int[] groupOf, int groupCount)
    {
        ElementLists elements = pattern.Elements;
        var start = new int[elements.Count + 1];
        var items = new int[elements.Items.Length];
        var marked = new int[groupCount];
        Array.Fill(marked, -1);
        int count = 0;
        for (int e = 0; e < elements.Count; e++)
        {
            foreach (int unknown in elements[e])
            {
                if (unknown >= 0 && marked[groupOf[unknown]] != e)
                {
                    marked[groupOf[unknown]] = e;
                    items[count++] = groupOf[unknown];
                }
            }

            start[e + 1] = count;
        }

        return new ElementLists(start, items.AsSpan(0, count).ToArray());
    }

    // All groups that cover each group; those that are themselves covered are taken out later.
    private ElementLists FindCovers()
    {
        var start = new int[Members.Count + 1];
        var items = new List<int>(3 * Members.Count);
        for (int g = 0; g < Members.Count; g++)
        {
            ReadOnlySpan<int> own = ElementsOf(g);
            foreach (int other in Candidates(own))
            {
                if (Covers(other, own))
                {
                    items.Add(other);
                }
            }

            start[g + 1] = items.Count;
        }

        return new ElementLists(start, [.. items]);
    }

    private ElementLists KeepLeading(ElementLists covers)
    {
        var start = new int[Members.Count + 1];
        int[] items = covers.Items;
        int count = 0;
        for (int g = 0; g < Members.Count; g++)
        {
            foreach (int other in covers[g])
            {
                if (LeadingOf[other] >= 0)
                {
                    items[count++] = LeadingOf[other];
                }
            }

            start[g + 1] = count;
        }

        return new ElementLists(start, items);
    }

    private ReadOnlySpan<int> Candidates(ReadOnlySpan<int> own) =>
        own.IsEmpty || own.Length > MostElementsOfAttached ? [] : Groups[own[0]];

    // The other group has all these elements and more.
    private bool Covers(int other, ReadOnlySpan<int> own)
    {
        ReadOnlySpan<int> theirs = ElementsOf(other);
        return theirs.Length > own.Length && (own.Length == 1 || theirs.Contains(own[1]));
    }

    private ElementLists FindLeadingOfElements()
    {
        var start = new int[Groups.Count + 1];
        var items = new int[Groups.Items.Length];
        int count = 0;
        for (int e = 0; e < Groups.Count; e++)
        {
            foreach (int group in Groups[e])
            {
                if (LeadingOf[group] >= 0)
                {
                    items[count++] = LeadingOf[group];
                }
            }

            start[e + 1] = count;
        }

        return new ElementLists(start, items);
    }

    private WeightedGraph BuildGraph()
    {
        int n = Leaders.Length;
        var start = new int[n + 1];
        var neighbours = new List<int>(8 * n);
        var marked = new int[n];
        Array.Fill(marked, -1);
        for (int v = 0; v < n; v++)
        {
            marked[v] = v;
            foreach (int e in ElementsOf(Leaders[v]))
            {
                foreach (int other in LeadingOfElement[e])
                {
                    if (marked[other] != v)
                    {
                        marked[other] = v;
                        neighbours.Add(other);
                    }
                }
            }

            start[v + 1] = neighbours.Count;
        }

        return new WeightedGraph(n, start, [.. neighbours], Weights());
    }

    private int[] Weights()
    {
        var weights = new int[Leaders.Length];
        for (int g = 0; g < Members.Count; g++)
        {
            int weight = WeightOfUnknown * Members[g].Length;
            if (LeadingOf[g] >= 0)
            {
                weights[LeadingOf[g]] += weight;
            }

            ReadOnlySpan<int> leaders = Attachments[g];
            foreach (int v in leaders)
            {
                weights[v] += weight / leaders.Length;
            }
        }

        return weights;
    }
}
