using System.Buffers;
using System.Runtime.Intrinsics;

namespace PoleField.Numerics;

/// <summary>Forward and backward substitution for eight right sides at once: the factor is read once for all.</summary>
internal static unsafe class BlockSolve
{
    /// <summary>Right sides that are solved together; unknown i of all of them is at [8 i] .. [8 i + 7].</summary>
    public const int Width = FrontKernels.Slab;

    /// <summary>Solves up to eight right sides that follow one another, in place.</summary>
    public static void Solve(CholeskyAnalysis analysis, double* factor, Span<double> rightSides, int count)
    {
        int n = analysis.Size;
        double[] x = ArrayPool<double>.Shared.Rent(Width * n);
        x.AsSpan(0, Width * n).Clear();
        int[] columnOf = analysis.ColumnOf;
        for (int k = 0; k < count; k++)
        {
            ReadOnlySpan<double> own = rightSides.Slice(k * n, n);
            for (int i = 0; i < n; i++)
            {
                x[(Width * columnOf[i]) + k] = own[i];
            }
        }

        fixed (double* start = x)
        {
            Forward(analysis, factor, start);
            Backward(analysis, factor, start);
        }

        for (int k = 0; k < count; k++)
        {
            Span<double> own = rightSides.Slice(k * n, n);
            for (int i = 0; i < n; i++)
            {
                own[i] = x[(Width * columnOf[i]) + k];
            }
        }

        ArrayPool<double>.Shared.Return(x);
    }

    private static void Forward(CholeskyAnalysis analysis, double* factor, double* x)
    {
        Supernodes fronts = analysis.Fronts;
        double* product = stackalloc double[FrontKernels.Tile];
        for (int s = 0; s < fronts.Count; s++)
        {
            FrontLayout front = analysis.Layout(s);
            double* panel = factor + analysis.PanelStart[s];
            double* own = x + ((long)Width * fronts.ColumnStart[s]);
            for (int b = 0; b < front.PivotSlabs; b++)
            {
                double* slab = panel + FrontLayout.TriangleSlab(b);
                int height = Math.Min(8, front.Columns - (8 * b));
                new Span<double>(product, FrontKernels.Tile).Clear();
                FrontKernels.Subtract(product, slab, own, 8 * b);
                for (int i = 0; i < height; i++)
                {
                    AddRow(own + (64 * b) + (8 * i), product + i);
                }

                SolveTile(slab + (64 * b), own + (64 * b), height);
            }

            ReadOnlySpan<int> rows = fronts.Rows[s];
            double* below = panel + front.PivotSize;
            for (int first = 0; first < rows.Length; first += 8, below += 8 * front.Columns)
            {
                new Span<double>(product, FrontKernels.Tile).Clear();
                FrontKernels.Subtract(product, below, own, front.Columns);
                int height = Math.Min(8, rows.Length - first);
                for (int i = 0; i < height; i++)
                {
                    AddRow(x + ((long)Width * rows[first + i]), product + i);
                }
            }
        }
    }

    private static void Backward(CholeskyAnalysis analysis, double* factor, double* x)
    {
        Supernodes fronts = analysis.Fronts;
        double* known = stackalloc double[FrontKernels.Tile];
        for (int s = fronts.Count - 1; s >= 0; s--)
        {
            FrontLayout front = analysis.Layout(s);
            double* panel = factor + analysis.PanelStart[s];
            double* own = x + ((long)Width * fronts.ColumnStart[s]);
            ReadOnlySpan<int> rows = fronts.Rows[s];
            double* below = panel + front.PivotSize;
            for (int first = 0; first < rows.Length; first += 8, below += 8 * front.Columns)
            {
                new Span<double>(known, FrontKernels.Tile).Clear();
                int height = Math.Min(8, rows.Length - first);
                for (int i = 0; i < height; i++)
                {
                    var row = new ReadOnlySpan<double>(x + ((long)Width * rows[first + i]), Width);
                    row.CopyTo(new Span<double>(known + (8 * i), Width));
                }

                SubtractTransposed(below, known, front.Columns, own);
            }

            for (int b = front.PivotSlabs - 1; b >= 0; b--)
            {
                double* slab = panel + FrontLayout.TriangleSlab(b);
                int height = Math.Min(8, front.Columns - (8 * b));
                SolveTransposedTile(slab + (64 * b), own + (64 * b), height);
                new Span<double>(known, FrontKernels.Tile).Clear();
                new ReadOnlySpan<double>(own + (64 * b), 8 * height).CopyTo(new Span<double>(known, 8 * height));
                SubtractTransposed(slab, known, 8 * b, own);
            }
        }
    }

    private static void AddRow(double* target, double* column)
    {
        for (int k = 0; k < 8; k++)
        {
            target[k] += column[8 * k];
        }
    }

    private static void SolveTile(double* tile, double* x, int size)
    {
        for (int i = 0; i < size; i++)
        {
            Vector256<double> low = Vector256.Load(x + (8 * i)), high = Vector256.Load(x + (8 * i) + 4);
            for (int j = 0; j < i; j++)
            {
                Vector256<double> l = Vector256.Create(-tile[(8 * j) + i]);
                low = Vector256.MultiplyAddEstimate(l, Vector256.Load(x + (8 * j)), low);
                high = Vector256.MultiplyAddEstimate(l, Vector256.Load(x + (8 * j) + 4), high);
            }

            Vector256<double> pivot = Vector256.Create(tile[9 * i]);
            (low / pivot).Store(x + (8 * i));
            (high / pivot).Store(x + (8 * i) + 4);
        }
    }

    private static void SolveTransposedTile(double* tile, double* x, int size)
    {
        for (int i = size - 1; i >= 0; i--)
        {
            Vector256<double> low = Vector256.Load(x + (8 * i)), high = Vector256.Load(x + (8 * i) + 4);
            for (int j = i + 1; j < size; j++)
            {
                Vector256<double> l = Vector256.Create(-tile[(8 * i) + j]);
                low = Vector256.MultiplyAddEstimate(l, Vector256.Load(x + (8 * j)), low);
                high = Vector256.MultiplyAddEstimate(l, Vector256.Load(x + (8 * j) + 4), high);
            }

            Vector256<double> pivot = Vector256.Create(tile[9 * i]);
            (low / pivot).Store(x + (8 * i));
            (high / pivot).Store(x + (8 * i) + 4);
        }
    }

    // x −= slabᵀ · known, eight wide.
    private static void SubtractTransposed(double* slab, double* known, int columns, double* x)
    {
        for (int j = 0; j < columns; j++, slab += 8, x += 8)
        {
            Vector256<double> low = Vector256.Load(x), high = Vector256.Load(x + 4);
            for (int i = 0; i < 8; i++)
            {
                Vector256<double> l = Vector256.Create(-slab[i]);
                low = Vector256.MultiplyAddEstimate(l, Vector256.Load(known + (8 * i)), low);
                high = Vector256.MultiplyAddEstimate(l, Vector256.Load(known + (8 * i) + 4), high);
            }

            low.Store(x);
            high.Store(x + 4);
        }
    }
}
