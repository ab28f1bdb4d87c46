namespace PoleField.Numerics;

/// <summary>The update of a child front and, increasing, the local row in its parent of each of its rows.</summary>
internal readonly unsafe struct ChildUpdate(double* numbers, int* local, int rows)
{
    /// <summary>Triangle of slabs.</summary>
    public double* Numbers { get; } = numbers;

    /// <summary>Local row in the parent of each row.</summary>
    public int* Local { get; } = local;

    /// <summary>Number of rows.</summary>
    public int Rows { get; } = rows;
}

/// <summary>Adds the update of a child front into its parent's panel and update.</summary>
internal static unsafe class FrontAssembly
{
    /// <summary>Adds the columns of the child that the parent eliminates.</summary>
    public static void AddToPanel(ChildUpdate child, FrontLayout parent, double* panel)
    {
        int columns = ColumnsBelow(child, parent.Columns);
        double** row = stackalloc double*[8];
        for (int first = 0; first < child.Rows && columns > 0; first += 8)
        {
            int height = Math.Min(8, child.Rows - first);
            for (int i = 0; i < height; i++)
            {
                row[i] = panel + parent.PanelRow(child.Local[first + i]);
            }

            AddSlab(child, row, new Part(first, height, 0, columns));
        }
    }

    /// <summary>Adds the columns of the child that the parent does not eliminate.</summary>
    public static void AddToUpdate(ChildUpdate child, FrontLayout parent, double* update)
    {
        int columns = ColumnsBelow(child, parent.Columns);
        double** row = stackalloc double*[8];
        for (int first = columns & ~7; first < child.Rows; first += 8)
        {
            int height = Math.Min(8, child.Rows - first);
            for (int i = 0; i < height; i++)
            {
                int below = Math.Max(0, child.Local[first + i] - parent.Columns);
                row[i] = update + FrontLayout.TriangleRow(below) - (8 * (nint)parent.Columns);
            }

            AddSlab(child, row, new Part(first, height, columns, child.Rows));
        }
    }

    private static int ColumnsBelow(ChildUpdate child, int columns)
    {
        int low = 0, high = child.Rows;
        while (low < high)
        {
            int middle = (low + high) >> 1;
            if (child.Local[middle] < columns)
            {
                low = middle + 1;
            }
            else
            {
                high = middle;
            }
        }

        return low;
    }

    private static void AddSlab(ChildUpdate child, double** row, Part part)
    {
        double* slab = child.Numbers + FrontLayout.TriangleRow(part.Row);
        int* local = child.Local;
        int j = part.FromColumn, full = Math.Min(part.ToColumn, part.Row + 1);
        if (part.Height == 8)
        {
            double* r0 = row[0], r1 = row[1], r2 = row[2], r3 = row[3];
            double* r4 = row[4], r5 = row[5], r6 = row[6], r7 = row[7];
            for (; j < full; j++)
            {
                nint column = 8 * (nint)local[j];
                double* from = slab + (8 * (nint)j);
                r0[column] += from[0];
                r1[column] += from[1];
                r2[column] += from[2];
                r3[column] += from[3];
                r4[column] += from[4];
                r5[column] += from[5];
                r6[column] += from[6];
                r7[column] += from[7];
            }
        }

        for (int end = Math.Min(part.ToColumn, part.Row + part.Height); j < end; j++)
        {
            nint column = 8 * (nint)local[j];
            double* from = slab + (8 * (nint)j);
            for (int i = Math.Max(0, j - part.Row); i < part.Height; i++)
            {
                row[i][column] += from[i];
            }
        }
    }

    // Rows and columns of a child that are added together.
    private readonly record struct Part(int Row, int Height, int FromColumn, int ToColumn);
}
