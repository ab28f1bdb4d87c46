namespace PoleField.Numerics;

/// <summary>Lists of small whole numbers stored one after the other: list i is [Start[i], Start[i + 1]) of the items.</summary>
internal sealed class ElementLists(int[] start, int[] items)
{
    /// <summary>Where list i begins; one entry more than lists.</summary>
    public int[] Start { get; } = start;

    /// <summary>Items of all lists.</summary>
    public int[] Items { get; } = items;

    /// <summary>Number of lists.</summary>
    public int Count => Start.Length - 1;

    /// <summary>Items of one list.</summary>
    public ReadOnlySpan<int> this[int list] => Items.AsSpan(Start[list], Start[list + 1] - Start[list]);

    /// <summary>For every item value in [0, size) the lists that hold it, increasing; negative items are left out.</summary>
    public ElementLists Transpose(int size)
    {
        var start = new int[size + 1];
        foreach (int item in Items)
        {
            if (item >= 0)
            {
                start[item + 1]++;
            }
        }

        for (int i = 0; i < size; i++)
        {
            start[i + 1] += start[i];
        }

        int[] next = start.AsSpan(0, size).ToArray();
        var lists = new int[start[size]];
        for (int list = 0; list < Count; list++)
        {
            foreach (int item in this[list])
            {
                // A list that names an item twice counts once.
                if (item >= 0 && (next[item] == start[item] || lists[next[item] - 1] != list))
                {
                    lists[next[item]++] = list;
                }
            }
        }

        return Compacted(start, next, lists);
    }

    private static ElementLists Compacted(int[] start, int[] end, int[] items)
    {
        int write = 0;
        for (int i = 0; i < end.Length; i++)
        {
            int first = start[i];
            start[i] = write;
            if (write != first)
            {
                items.AsSpan(first, end[i] - first).CopyTo(items.AsSpan(write));
            }

            write += end[i] - first;
        }

        start[end.Length] = write;
        return new ElementLists(start, write == items.Length ? items : items.AsSpan(0, write).ToArray());
    }
}
