using PoleField.Numerics;

namespace PoleField.Tests.Numerics;

/// <summary>Plain dense arithmetic that the sparse code is compared with.</summary>
internal static class DenseMatrix
{
    public static double[,] Of(SymmetricPattern pattern, double[] values)
    {
        var full = new double[pattern.Size, pattern.Size];
        for (int j = 0; j < pattern.Size; j++)
        {
            for (int k = pattern.ColumnStart[j]; k < pattern.ColumnStart[j + 1]; k++)
            {
                full[pattern.Rows[k], j] = values[k];
                full[j, pattern.Rows[k]] = values[k];
            }
        }

        return full;
    }

    /// <summary>Non-zeros of the Cholesky factor when eliminating in the order given, entry by entry.</summary>
    public static bool[,] Fill(SymmetricPattern pattern, ReadOnlySpan<int> order)
    {
        int n = pattern.Size;
        var position = new int[n];
        for (int i = 0; i < n; i++)
        {
            position[order[i]] = i;
        }

        var filled = new bool[n, n];
        for (int j = 0; j < n; j++)
        {
            foreach (int i in pattern.Rows.AsSpan(pattern.ColumnStart[j]..pattern.ColumnStart[j + 1]))
            {
                filled[Math.Max(position[i], position[j]), Math.Min(position[i], position[j])] = true;
            }
        }

        for (int k = 0; k < n; k++)
        {
            for (int i = k + 1; i < n; i++)
            {
                for (int j = k + 1; j <= i && filled[i, k]; j++)
                {
                    filled[i, j] |= filled[j, k];
                }
            }
        }

        return filled;
    }
}
