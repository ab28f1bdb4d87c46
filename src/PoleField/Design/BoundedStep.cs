namespace PoleField.Design;

/// <summary>The damped least-squares step (Levenberg 1944, Marquardt 1963) with each unknown kept between bounds.</summary>
internal static class BoundedStep
{
    /// <summary>Step δ minimising |r + Jδ|² + damping·Σ(Dδ)² with low ≤ δ ≤ high, D the columns' lengths.</summary>
    /// <param name="rows">Residual and derivative row of each equation.</param>
    /// <param name="damping">Damping, &gt; 0.</param>
    /// <param name="low">Lower bounds of the step.</param>
    /// <param name="high">Upper bounds of the step.</param>
    public static double[] Of(IReadOnlyList<(double Residual, double[] Row)> rows, double damping, double[] low, double[] high)
    {
        int n = low.Length;
        var matrix = new double[n, n];
        var right = new double[n];
        foreach ((double residual, double[] row) in rows)
        {
            for (int i = 0; i < n; i++)
            {
                right[i] -= row[i] * residual;
                for (int j = 0; j < n; j++)
                {
                    matrix[i, j] += row[i] * row[j];
                }
            }
        }

        double mean = Enumerable.Range(0, n).Average(i => matrix[i, i]);
        for (int i = 0; i < n; i++)
        {
            matrix[i, i] += damping * (matrix[i, i] + (1e-3 * mean));
        }

        // Unknowns that would leave their range are put on its edge and the others solved again.
        var step = new double[n];
        var bound = new bool[n];
        for (int pass = 0; pass <= n; pass++)
        {
            Solve(matrix, right, step, bound);
            bool left = false;
            for (int i = 0; i < n; i++)
            {
                if (!bound[i] && (step[i] < low[i] || step[i] > high[i]))
                {
                    step[i] = Math.Clamp(step[i], low[i], high[i]);
                    (bound[i], left) = (true, true);
                }
            }

            if (!left)
            {
                break;
            }
        }

        return step;
    }

    // Cholesky on the unknowns that are free.
    private static void Solve(double[,] matrix, double[] right, double[] step, bool[] bound)
    {
        int[] free = [.. Enumerable.Range(0, right.Length).Where(i => !bound[i])];
        int n = free.Length;
        var factor = new double[n, n];
        var x = new double[n];
        for (int i = 0; i < n; i++)
        {
            x[i] = right[free[i]];
            for (int k = 0; k < right.Length; k++)
            {
                x[i] -= bound[k] ? matrix[free[i], k] * step[k] : 0;
            }

            for (int j = 0; j <= i; j++)
            {
                double sum = matrix[free[i], free[j]];
                for (int k = 0; k < j; k++)
                {
                    sum -= factor[i, k] * factor[j, k];
                }

                factor[i, j] = i == j ? Math.Sqrt(sum) : sum / factor[j, j];
            }
        }

        for (int i = 0; i < n; i++)
        {
            for (int k = 0; k < i; k++)
            {
                x[i] -= factor[i, k] * x[k];
            }

            x[i] /= factor[i, i];
        }

        for (int i = n - 1; i >= 0; i--)
        {
            for (int k = i + 1; k < n; k++)
            {
                x[i] -= factor[k, i] * x[k];
            }

            x[i] /= factor[i, i];
            step[free[i]] = x[i];
        }
    }
}
