namespace PoleField.Numerics;

/// <summary>Pattern of a sparse symmetric matrix: its lower triangle with the diagonal, by columns.</summary>
/// <remarks>Invariant: in each column the rows increase, the first is the diagonal.</remarks>
public sealed class SymmetricPattern
{
    private SymmetricPattern(int[] columnStart, int[] rows, ElementLists elements, ElementLists elementsOf)
    {
        ColumnStart = columnStart;
        Rows = rows;
        Elements = elements;
        ElementsOf = elementsOf;
    }

    /// <summary>Number of rows and columns.</summary>
    public int Size => ColumnStart.Length - 1;

    /// <summary>Number of stored entries.</summary>
    public int EntryCount => Rows.Length;

    /// <summary>Start of column j in <see cref="Rows"/> at [j]; [Size] is the number of entries.</summary>
    internal int[] ColumnStart { get; }

    /// <summary>Rows of the entries.</summary>
    internal int[] Rows { get; }

    /// <summary>Unknowns of each element as given; negative where there is none.</summary>
    internal ElementLists Elements { get; }

    /// <summary>Elements of each unknown, increasing.</summary>
    internal ElementLists ElementsOf { get; }

    /// <summary>
    /// Pattern of a matrix assembled from elements: unknowns of element e are unknowns[start[e]] .. unknowns[start[e + 1] − 1]
    /// (negative ones are skipped). Every diagonal entry is part of the pattern.
    /// </summary>
    /// <exception cref="ArgumentException">An unknown is not below <paramref name="size"/>, or the starts do not fit.</exception>
    public static SymmetricPattern FromElements(int size, ReadOnlySpan<int> start, ReadOnlySpan<int> unknowns)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(size);
        Check(size, start, unknowns);
        var elements = new ElementLists(start.ToArray(), unknowns.ToArray());
        ElementLists elementsOf = elements.Transpose(size);
        (int[] rowStart, int[] columns) = RowsOfLowerTriangle(size, elements, elementsOf);
        (int[] columnStart, int[] rows) = Columns(size, rowStart, columns);
        return new SymmetricPattern(columnStart, rows, elements, elementsOf);
    }

    /// <summary>Position in the value array of entry (row, column), row ≥ column.</summary>
    /// <exception cref="ArgumentException">The entry is not in the pattern.</exception>
    public int PositionOf(int row, int column)
    {
        int first = ColumnStart[column];
        int position = Array.BinarySearch(Rows, first, ColumnStart[column + 1] - first, row);
        return position >= 0
            ? position
            : throw new ArgumentException(
                FormattableString.Invariant($"Entry ({row}, {column}) is not in the lower triangle of the pattern."));
    }

    /// <summary>
    /// Where the lower triangles of the element matrices go: element after element, entry (i, j), j ≤ i, of an element at
    /// i (i + 1) / 2 + j after its start, gives a position in the value array or −1 when one of its unknowns is negative.
    /// An unknown that an element names twice couples with itself: the value for (i, j) then counts once, although
    /// both (i, j) and (j, i) fall on the diagonal.
    /// </summary>
    public int[] ScatterMap()
    {
        var first = new int[Elements.Count + 1];
        for (int e = 0; e < Elements.Count; e++)
        {
            int n = Elements[e].Length;
            first[e + 1] = first[e] + (n * (n + 1) / 2);
        }

        var map = new int[first[^1]];
        Array.Fill(map, -1);
        var positionOfRow = new int[Size];
        for (int column = 0; column < Size; column++)
        {
            for (int k = ColumnStart[column]; k < ColumnStart[column + 1]; k++)
            {
                positionOfRow[Rows[k]] = k;
            }

            foreach (int e in ElementsOf[column])
            {
                MapColumn(Elements[e], column, positionOfRow, map.AsSpan(first[e]));
            }
        }

        return map;
    }

    /// <summary>product = A x for the matrix with these values.</summary>
    public void Multiply(ReadOnlySpan<double> values, ReadOnlySpan<double> x, Span<double> product)
    {
        CheckLengths(values.Length, x.Length, product.Length);
        product.Clear();
        for (int j = 0; j < Size; j++)
        {
            int k = ColumnStart[j];
            double xj = x[j];
            double sum = values[k] * xj;
            for (k++; k < ColumnStart[j + 1]; k++)
            {
                int i = Rows[k];
                sum += values[k] * x[i];
                product[i] += values[k] * xj;
            }

            product[j] += sum;
        }
    }

    private static void Check(int size, ReadOnlySpan<int> start, ReadOnlySpan<int> unknowns)
    {
        if (start.Length == 0 || start[0] != 0 || start[^1] != unknowns.Length)
        {
            throw new ArgumentException("Element starts must begin at 0 and end at the number of unknowns listed.");
        }

        for (int e = 1; e < start.Length; e++)
        {
            if (start[e] < start[e - 1])
            {
                throw new ArgumentException(FormattableString.Invariant($"Element {e} starts before the one ahead of it."));
            }
        }

        foreach (int unknown in unknowns)
        {
            if (unknown >= size)
            {
                throw new ArgumentException(FormattableString.Invariant(
                    $"An element names unknown {unknown}; the matrix has {size}."));
            }
        }
    }

    // Row i of the lower triangle, columns in the order of the elements. Two passes would sort them; the transpose does.
    private static (int[] Start, int[] Columns) RowsOfLowerTriangle(
        int size, ElementLists elements, ElementLists elementsOf)
    {
        var start = new int[size + 1];
        var columns = new int[Math.Max(16, elements.Items.Length * 3)];
        var marked = new int[size];
        Array.Fill(marked, -1);
        int count = 0;
        for (int i = 0; i < size; i++)
        {
            marked[i] = i;
            Reserve(ref columns, count + 1);
            columns[count++] = i;
            foreach (int e in elementsOf[i])
            {
                ReadOnlySpan<int> own = elements[e];
                Reserve(ref columns, count + own.Length);
                foreach (int j in own)
                {
                    if (j >= 0 && j < i && marked[j] != i)
                    {
                        marked[j] = i;
                        columns[count++] = j;
                    }
                }
            }

            start[i + 1] = count;
        }

        return (start, columns);
    }

    private static void Reserve(ref int[] array, int length)
    {
        if (length > array.Length)
        {
            Array.Resize(ref array, Math.Max(length, array.Length * 2));
        }
    }

    private static (int[] Start, int[] Rows) Columns(int size, int[] rowStart, int[] columns)
    {
        var start = new int[size + 1];
        int count = rowStart[size];
        foreach (int j in columns.AsSpan(0, count))
        {
            start[j + 1]++;
        }

        for (int j = 0; j < size; j++)
        {
            start[j + 1] += start[j];
        }

        int[] next = start.AsSpan(0, size).ToArray();
        var rows = new int[count];
        for (int i = 0; i < size; i++)
        {
            foreach (int j in columns.AsSpan(rowStart[i], rowStart[i + 1] - rowStart[i]))
            {
                rows[next[j]++] = i;
            }
        }

        return (start, rows);
    }

    private static void MapColumn(ReadOnlySpan<int> own, int column, int[] positionOfRow, Span<int> map)
    {
        for (int j = 0; j < own.Length; j++)
        {
            if (own[j] != column)
            {
                continue;
            }

            for (int i = 0; i < own.Length; i++)
            {
                if (own[i] >= column)
                {
                    map[i >= j ? (i * (i + 1) / 2) + j : (j * (j + 1) / 2) + i] = positionOfRow[own[i]];
                }
            }
        }
    }

    private void CheckLengths(int values, int x, int product)
    {
        if (values != EntryCount || x != Size || product != Size)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"Need {EntryCount} values and vectors of {Size}, got {values}, {x} and {product}."));
        }
    }
}
