using System.Runtime.CompilerServices;

namespace PoleField.Numerics;

/// <summary>Dense partial Cholesky elimination of one front.</summary>
/// <remarks>Every number is the same sum in the same order however the work is shared among threads.</remarks>
internal static unsafe class FrontElimination
{
    // Columns eliminated before the rest of the panel is updated, and depth of an update: eight rows of that depth stay in
    // the nearest cache.
    private const int BlockSlabs = 12;
    private const int Depth = 192;

    // Slabs of A kept in the second cache while a slab of B passes.
    private const int GroupSlabs = 8;

    /// <summary>Factors the panel: pivot block and rows below.</summary>
    /// <returns>The first column whose pivot is not positive, −1 when there is none.</returns>
    public static int FactorPanel(double* panel, FrontLayout front, int threads)
    {
        double* inverse = stackalloc double[8];
        int pivotSlabs = front.PivotSlabs;
        for (int block = 0; block < pivotSlabs; block += BlockSlabs)
        {
            int end = Math.Min(block + BlockSlabs, pivotSlabs);
            if (block > 0)
            {
                UpdateBlock(panel, front, (block, end), threads);
            }

            for (int b = block; b < end; b++)
            {
                int failed = FactorColumns(panel, front, block, b, inverse);
                if (failed >= 0)
                {
                    return failed;
                }
            }
        }

        return -1;
    }

    /// <summary>update = −(rows below) (rows below)ᵀ.</summary>
    public static void FormUpdate(double* panel, FrontLayout front, double* update, int threads)
    {
        int groups = (front.RowSlabs + GroupSlabs - 1) / GroupSlabs;
        if (threads > 1 && groups > 1)
        {
            Share(groups, threads, group => FormUpdateGroup(panel, front, update, group));
            return;
        }

        for (int group = 0; group < groups; group++)
        {
            FormUpdateGroup(panel, front, update, group);
        }
    }

    private static void FormUpdateGroup(double* panel, FrontLayout front, double* update, int group)
    {
        int first = group * GroupSlabs, last = Math.Min(front.RowSlabs, first + GroupSlabs);
        int start = FrontLayout.TriangleSlab(first);
        new Span<double>(update + start, FrontLayout.TriangleSlab(last) - start).Clear();
        for (int from = 0; from < front.Columns; from += Depth)
        {
            int depth = Math.Min(Depth, front.Columns - from);
            for (int b = 0; b < last; b++)
            {
                double* right = panel + front.RowSlab(b) + (8 * from);
                for (int a = Math.Max(first, b); a < last; a++)
                {
                    double* tile = update + FrontLayout.TriangleSlab(a) + (64 * b);
                    FrontKernels.Subtract(tile, panel + front.RowSlab(a) + (8 * from), right, depth);
                }
            }
        }
    }

    // Columns of slabs block .. end − 1 minus what the columns before them contribute.
    private static void UpdateBlock(double* panel, FrontLayout front, (int First, int End) block, int threads)
    {
        int slabs = front.PivotSlabs + front.RowSlabs - block.First;
        int groups = (slabs + GroupSlabs - 1) / GroupSlabs;
        if (threads > 1 && groups > 1)
        {
            Share(groups, threads, group => UpdateBlockGroup(panel, front, block, group));
            return;
        }

        for (int group = 0; group < groups; group++)
        {
            UpdateBlockGroup(panel, front, block, group);
        }
    }

    private static void UpdateBlockGroup(double* panel, FrontLayout front, (int First, int End) block, int group)
    {
        int pivotSlabs = front.PivotSlabs, before = 8 * block.First;
        int first = block.First + (group * GroupSlabs);
        int last = Math.Min(pivotSlabs + front.RowSlabs, first + GroupSlabs);
        for (int from = 0; from < before; from += Depth)
        {
            int depth = Math.Min(Depth, before - from);
            for (int b = block.First; b < block.End; b++)
            {
                int columns = Math.Min(8, front.Columns - (8 * b));
                double* right = panel + FrontLayout.TriangleSlab(b) + (8 * from);
                for (int a = Math.Max(first, b); a < last; a++)
                {
                    double* left = panel + SlabStart(front, pivotSlabs, a);
                    FrontKernels.Subtract(left + (64 * b), left + (8 * from), right, depth, columns);
                }
            }
        }
    }

    private static int FactorColumns(double* panel, FrontLayout front, int block, int b, double* inverse)
    {
        int columns = Math.Min(8, front.Columns - (8 * b)), pivotSlabs = front.PivotSlabs;
        int from = 64 * block, depth = 8 * (b - block);
        double* own = panel + FrontLayout.TriangleSlab(b);
        double* diagonal = own + (64 * b);
        if (depth > 0)
        {
            FrontKernels.Subtract(diagonal, own + from, own + from, depth, columns);
        }

        int failed = FrontKernels.Factor(diagonal, columns, inverse);
        if (failed >= 0)
        {
            return (8 * b) + failed;
        }

        int slabs = pivotSlabs + front.RowSlabs;
        for (int a = b + 1; a < slabs; a++)
        {
            double* left = panel + SlabStart(front, pivotSlabs, a);
            if (depth > 0)
            {
                FrontKernels.Subtract(left + (64 * b), left + from, own + from, depth, columns);
            }

            FrontKernels.SolveRight(left + (64 * b), diagonal, inverse, columns);
        }

        return -1;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static long SlabStart(FrontLayout front, int pivotSlabs, int slab) =>
        slab < pivotSlabs ? FrontLayout.TriangleSlab(slab) : front.RowSlab(slab - pivotSlabs);

    private static void Share(int parts, int threads, Action<int> work) =>
        Parallel.For(0, parts, new ParallelOptions { MaxDegreeOfParallelism = threads }, work);
}
