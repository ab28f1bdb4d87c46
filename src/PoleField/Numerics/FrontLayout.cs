using System.Runtime.CompilerServices;

namespace PoleField.Numerics;

/// <summary>
/// Where the numbers of a front are. Its panel (the columns it eliminates) is stored by slabs of eight rows: slab b of the
/// triangular pivot block holds min(8 b + 8, columns) columns, each slab of the rows below all columns. The update (what is
/// added to later fronts) is a triangle of slabs alike. Rows that fill up the last slab are zero.
/// </summary>
internal readonly struct FrontLayout(int columns, int rows)
{
    /// <summary>Columns that the front eliminates.</summary>
    public int Columns { get; } = columns;

    /// <summary>Rows below them.</summary>
    public int Rows { get; } = rows;

    /// <summary>Slabs of the pivot block.</summary>
    public int PivotSlabs => (Columns + 7) >> 3;

    /// <summary>Slabs of the rows below.</summary>
    public int RowSlabs => (Rows + 7) >> 3;

    /// <summary>Numbers in the pivot block.</summary>
    public int PivotSize => TriangleSlab(PivotSlabs - 1) + (8 * Columns);

    /// <summary>Numbers in the panel.</summary>
    public long PanelSize => PivotSize + (8L * Columns * RowSlabs);

    /// <summary>Numbers in the update.</summary>
    public int UpdateSize => TriangleSlab(RowSlabs);

    /// <summary>Start of slab b of a triangle.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static int TriangleSlab(int b) => 32 * b * (b + 1);

    /// <summary>Place of row i, column 0 in a triangle of slabs.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static int TriangleRow(int i) => TriangleSlab(i >> 3) + (i & 7);

    /// <summary>Start of a slab of the rows below.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public long RowSlab(int b) => PivotSize + (8L * Columns * b);

    /// <summary>Place of column 0 of a local row (0 .. Columns − 1 the pivot block, then the rows below) in the panel.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public long PanelRow(int local)
    {
        if (local < Columns)
        {
            return TriangleRow(local);
        }

        int below = local - Columns;
        return RowSlab(below >> 3) + (below & 7);
    }
}
