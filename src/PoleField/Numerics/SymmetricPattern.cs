namespace PoleField.Numerics;

/// <summary>Pattern of a sparse symmetric matrix: its lower triangle with the diagonal, by columns.</summary>
public sealed class SymmetricPattern
{
    private SymmetricPattern(int size, int[] columnStart, int[] rows)
    {
        Size = size;
        ColumnStart = columnStart;
        Rows = rows;
    }

    /// <summary>Number of rows and columns.</summary>
    public int Size { get; }

    internal int[] ColumnStart { get; }

    internal int[] Rows { get; }

    /// <summary>Number of stored entries.</summary>
    public int EntryCount => Rows.Length;

    /// <summary>From elements.</summary>
    public static SymmetricPattern FromElements(int size, ReadOnlySpan<int> start, ReadOnlySpan<int> unknowns)
    {
        var sets = new SortedSet<int>[size];
        for (int i = 0; i < size; i++) { sets[i] = [i]; }
        for (int e = 0; e + 1 < start.Length; e++)
        {
            foreach (int a in unknowns[start[e]..start[e + 1]])
                foreach (int b in unknowns[start[e]..start[e + 1]])
                    if (a >= 0 && b >= a) sets[a].Add(b);
        }
        var cs = new int[size + 1];
        var rows = new List<int>();
        for (int i = 0; i < size; i++) { rows.AddRange(sets[i]); cs[i + 1] = rows.Count; }
        return new SymmetricPattern(size, cs, [.. rows]);
    }

    /// <summary>Position.</summary>
    public int PositionOf(int row, int column) => Array.BinarySearch(Rows, ColumnStart[column], ColumnStart[column + 1] - ColumnStart[column], row);
}
