using System.Buffers;
using System.Runtime.Intrinsics;

namespace PoleField.Numerics;

/// <summary>Forward and backward substitution with the panels of a factor.</summary>
internal static unsafe class TriangularSolve
{
    /// <summary>Solves for right sides that follow one another, in place.</summary>
    public static void Solve(CholeskyAnalysis analysis, double* factor, Span<double> rightSides, int count)
    {
        int n = analysis.Size;
        double[] x = ArrayPool<double>.Shared.Rent(n + 8);
        int[] unknownAt = analysis.Fronts.UnknownAt;
        for (int k = 0; k < count; k++)
        {
            Span<double> own = rightSides.Slice(k * n, n);
            for (int i = 0; i < n; i++)
            {
                x[i] = own[unknownAt[i]];
            }

            fixed (double* start = x)
            {
                Forward(analysis, factor, start);
                Backward(analysis, factor, start);
            }

            for (int i = 0; i < n; i++)
            {
                own[unknownAt[i]] = x[i];
            }
        }

        ArrayPool<double>.Shared.Return(x);
    }

    private static void Forward(CholeskyAnalysis analysis, double* factor, double* x)
    {
        Supernodes fronts = analysis.Fronts;
        double* sum = stackalloc double[8];
        for (int s = 0; s < fronts.Count; s++)
        {
            FrontLayout front = analysis.Layout(s);
            double* panel = factor + analysis.PanelStart[s];
            double* own = x + fronts.ColumnStart[s];
            for (int b = 0; b < front.PivotSlabs; b++)
            {
                double* slab = panel + FrontLayout.TriangleSlab(b);
                int width = Math.Min(8, front.Columns - (8 * b));
                Dot(slab, own, 8 * b, sum);
                double* tile = slab + (64 * b);
                double* target = own + (8 * b);
                for (int i = 0; i < width; i++)
                {
                    double value = target[i] - sum[i];
                    for (int j = 0; j < i; j++)
                    {
                        value -= tile[(8 * j) + i] * target[j];
                    }

                    target[i] = value / tile[9 * i];
                }
            }

            ReadOnlySpan<int> rows = fronts.Rows[s];
            double* below = panel + front.PivotSize;
            for (int first = 0; first < rows.Length; first += 8, below += 8 * front.Columns)
            {
                Dot(below, own, front.Columns, sum);
                int height = Math.Min(8, rows.Length - first);
                for (int i = 0; i < height; i++)
                {
                    x[rows[first + i]] -= sum[i];
                }
            }
        }
    }

    private static void Backward(CholeskyAnalysis analysis, double* factor, double* x)
    {
        Supernodes fronts = analysis.Fronts;
        double* known = stackalloc double[8];
        for (int s = fronts.Count - 1; s >= 0; s--)
        {
            FrontLayout front = analysis.Layout(s);
            double* panel = factor + analysis.PanelStart[s];
            double* own = x + fronts.ColumnStart[s];
            ReadOnlySpan<int> rows = fronts.Rows[s];
            double* below = panel + front.PivotSize;
            for (int first = 0; first < rows.Length; first += 8, below += 8 * front.Columns)
            {
                int height = Math.Min(8, rows.Length - first);
                for (int i = 0; i < 8; i++)
                {
                    known[i] = i < height ? x[rows[first + i]] : 0.0;
                }

                SubtractTransposed(below, known, front.Columns, own);
            }

            for (int b = front.PivotSlabs - 1; b >= 0; b--)
            {
                double* slab = panel + FrontLayout.TriangleSlab(b);
                int width = Math.Min(8, front.Columns - (8 * b));
                double* tile = slab + (64 * b);
                double* target = own + (8 * b);
                for (int i = width - 1; i >= 0; i--)
                {
                    double value = target[i];
                    for (int j = i + 1; j < width; j++)
                    {
                        value -= tile[(8 * i) + j] * target[j];
                    }

                    target[i] = value / tile[9 * i];
                }

                for (int i = 0; i < 8; i++)
                {
                    known[i] = i < width ? target[i] : 0.0;
                }

                SubtractTransposed(slab, known, 8 * b, own);
            }
        }
    }

    // sum = slab · x
    private static void Dot(double* slab, double* x, int columns, double* sum)
    {
        Vector256<double> low = default, high = default;
        for (int j = 0; j < columns; j++, slab += 8)
        {
            Vector256<double> xj = Vector256.Create(x[j]);
            low = Vector256.MultiplyAddEstimate(Vector256.Load(slab), xj, low);
            high = Vector256.MultiplyAddEstimate(Vector256.Load(slab + 4), xj, high);
        }

        low.Store(sum);
        high.Store(sum + 4);
    }

    // x −= slabᵀ · known
    private static void SubtractTransposed(double* slab, double* known, int columns, double* x)
    {
        Vector256<double> low = Vector256.Load(known), high = Vector256.Load(known + 4);
        for (int j = 0; j < columns; j++, slab += 8)
        {
            x[j] -= Vector256.Sum((Vector256.Load(slab) * low) + (Vector256.Load(slab + 4) * high));
        }
    }
}
