namespace PoleField.Numerics;

/// <summary>
/// Where the entries of the matrix go: for front s, entries Start[s] .. Start[s + 1] − 1 put value Source[k] at number
/// Target[k] of its panel.
/// </summary>
internal sealed class EntryMap
{
    private EntryMap(int[] start, int[] source, int[] target)
    {
        Start = start;
        Source = source;
        Target = target;
    }

    public int[] Start { get; }

    public int[] Source { get; }

    public int[] Target { get; }

    public static EntryMap Of(SymmetricPattern pattern, Supernodes fronts, int[] columnOf)
    {
        int[] frontOf = FrontOfColumn(fronts);
        int[] start = CountEntries(pattern, fronts, columnOf, frontOf);
        int[] next = start.AsSpan(0, fronts.Count).ToArray();
        var source = new int[pattern.EntryCount];
        var target = new int[pattern.EntryCount];
        var columns = new int[pattern.EntryCount];

        // In the order of elimination, because neighbours are then mostly near in memory.
        for (int own = 0; own < columnOf.Length; own++)
        {
            int unknown = fronts.UnknownAt[own];
            for (int entry = pattern.ColumnStart[unknown]; entry < pattern.ColumnStart[unknown + 1]; entry++)
            {
                int other = columnOf[pattern.Rows[entry]];
                int column = Math.Min(own, other);
                int k = next[frontOf[column]]++;
                source[k] = entry;
                target[k] = own ^ other ^ column;
                columns[k] = column;
            }
        }

        PlaceInPanels(fronts, start, columns, target);
        return new EntryMap(start, source, target);
    }

    private static int[] CountEntries(SymmetricPattern pattern, Supernodes fronts, int[] columnOf, int[] frontOf)
    {
        var start = new int[fronts.Count + 1];
        for (int own = 0; own < columnOf.Length; own++)
        {
            int unknown = fronts.UnknownAt[own];
            for (int entry = pattern.ColumnStart[unknown]; entry < pattern.ColumnStart[unknown + 1]; entry++)
            {
                start[frontOf[Math.Min(own, columnOf[pattern.Rows[entry]])] + 1]++;
            }
        }

        for (int s = 0; s < fronts.Count; s++)
        {
            start[s + 1] += start[s];
        }

        return start;
    }

    private static int[] FrontOfColumn(Supernodes fronts)
    {
        var frontOf = new int[fronts.UnknownAt.Length];
        for (int s = 0; s < fronts.Count; s++)
        {
            frontOf.AsSpan(fronts.ColumnStart[s], fronts.Columns(s)).Fill(s);
        }

        return frontOf;
    }

    private static void PlaceInPanels(Supernodes fronts, int[] start, int[] columns, int[] target)
    {
        var local = new int[fronts.UnknownAt.Length];
        for (int s = 0; s < fronts.Count; s++)
        {
            int first = fronts.ColumnStart[s], width = fronts.Columns(s);
            ReadOnlySpan<int> rows = fronts.Rows[s];
            var front = new FrontLayout(width, rows.Length);
            for (int i = 0; i < rows.Length; i++)
            {
                local[rows[i]] = width + i;
            }

            for (int k = start[s]; k < start[s + 1]; k++)
            {
                int row = target[k] < first + width ? target[k] - first : local[target[k]];
                target[k] = checked((int)(front.PanelRow(row) + (8 * (columns[k] - first))));
            }
        }
    }
}
