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
        var start = new int[fronts.Count + 1];
        ForEach(pattern, columnOf, (column, _, _) => start[frontOf[column] + 1]++);
        for (int s = 0; s < fronts.Count; s++)
        {
            start[s + 1] += start[s];
        }

        int[] next = start.AsSpan(0, fronts.Count).ToArray();
        var source = new int[pattern.EntryCount];
        var target = new int[pattern.EntryCount];
        var columns = new int[pattern.EntryCount];
        ForEach(pattern, columnOf, (column, row, entry) =>
        {
            int k = next[frontOf[column]]++;
            source[k] = entry;
            target[k] = row;
            columns[k] = column;
        });
        PlaceInPanels(fronts, start, columns, target);
        return new EntryMap(start, source, target);
    }

    private static void ForEach(SymmetricPattern pattern, int[] columnOf, Action<int, int, int> use)
    {
        for (int j = 0; j < pattern.Size; j++)
        {
            int own = columnOf[j];
            for (int k = pattern.ColumnStart[j]; k < pattern.ColumnStart[j + 1]; k++)
            {
                int other = columnOf[pattern.Rows[k]];
                use(Math.Min(own, other), Math.Max(own, other), k);
            }
        }
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
