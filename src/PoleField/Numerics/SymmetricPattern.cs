namespace PoleField.Numerics;

/// <summary>Pattern of a sparse symmetric matrix: its lower triangle with the diagonal, by columns.</summary>
/// <remarks>Invariant: in each column the rows increase, the first is the diagonal.</remarks>
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

    /// <summary>Start of column j in <see cref="Rows"/> at [j]; [Size] is the number of entries.</summary>
    internal int[] ColumnStart { get; }

    /// <summary>Rows of the entries.</summary>
    internal int[] Rows { get; }

    /// <summary>Number of stored entries.</summary>
    public int EntryCount => Rows.Length;

    /// <summary>Pattern of a matrix assembled from elements: unknowns of element e are unknowns[start[e]] .. unknowns[start[e + 1] − 1] (negative ones are skipped).</summary>
    public static SymmetricPattern FromElements(int size, ReadOnlySpan<int> start, ReadOnlySpan<int> unknowns) =>
        throw new NotImplementedException("seam");

    /// <summary>Position in the value array of entry (row, column), row ≥ column; throws when the entry is not in the pattern.</summary>
    public int PositionOf(int row, int column) => throw new NotImplementedException("seam");
}
