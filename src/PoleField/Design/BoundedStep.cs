namespace PoleField.Design;

/// <summary>The damped least-squares step (Levenberg 1944, Marquardt 1963) with each unknown kept between bounds.</summary>
internal static class BoundedStep
{
    private const int MostPasses = 12;

    /// <summary>
    /// Step δ minimising Σ(r + Jδ)² + damping·Σ(Dδ)² with low ≤ δ ≤ high, D the columns' lengths. Of one-sided equations only what is
    /// above zero counts.
    /// </summary>
    /// <param name="rows">The equations.</param>
    /// <param name="damping">Damping, &gt; 0.</param>
    /// <param name="low">Lower bounds of the step.</param>
    /// <param name="high">Upper bounds of the step.</param>
    public static double[] Of(IReadOnlyList<StepRow> rows, double damping, double[] low, double[] high)
    {
        bool[] counts = [.. rows.Select(r => !r.OneSided || r.Residual > 0)];
        for (int pass = 0; ; pass++)
        {
            double[] step = OfCounting([.. rows.Where((_, k) => counts[k])], damping, low, high);
            bool[] then = [.. rows.Select(r => !r.OneSided || r.At(step) > 0)];
            if (pass == MostPasses || then.SequenceEqual(counts))
            {
                return step;
            }

            // Late passes only add, so that they end.
            counts = pass < MostPasses / 2 ? then : [.. counts.Zip(then, (a, b) => a || b)];
        }
    }

    private static double[] OfCounting(StepRow[] rows, double damping, double[] low, double[] high)
    {
        int n = low.Length;
        var matrix = new double[n, n];
        var right = new double[n];
        foreach (StepRow row in rows)
        {
            for (int i = 0; i < n; i++)
            {
                right[i] -= row.Derivatives[i] * row.Residual;
                for (int j = 0; j < n; j++)
                {
                    matrix[i, j] += row.Derivatives[i] * row.Derivatives[j];
                }
            }
        }

        double mean = Enumerable.Range(0, n).Average(i => matrix[i, i]);
        for (int i = 0; i < n; i++)
        {
            matrix[i, i] += damping * (matrix[i, i] + (1e-3 * mean));
        }

        // Unknowns that would leave their range are put on its edge, and let go again when they pull inwards.
        var step = new double[n];
        var bound = new bool[n];
        for (int pass = 0; pass <= 3 * n; pass++)
        {
            Solve(matrix, right, step, bound);
            bool changed = false;
            for (int i = 0; i < n; i++)
            {
                if (!bound[i] && (step[i] < low[i] || step[i] > high[i]))
                {
                    step[i] = Math.Clamp(step[i], low[i], high[i]);
                    (bound[i], changed) = (true, true);
                }
            }

            if (!changed && !Release(matrix, right, step, (bound, high)))
            {
                break;
            }
        }

        for (int i = 0; i < n; i++)
        {
            step[i] = Math.Clamp(step[i], low[i], high[i]);
        }

        return step;
    }

    // Lets go the one on an edge that pulls inwards most; false when none does.
    private static bool Release(double[,] matrix, double[] right, double[] step, (bool[] Bound, double[] High) edge)
    {
        (int best, double most) = (-1, 0);
        for (int i = 0; i < step.Length; i++)
        {
            if (!edge.Bound[i])
            {
                continue;
            }

            double slope = -right[i];
            for (int k = 0; k < step.Length; k++)
            {
                slope += matrix[i, k] * step[k];
            }

            double pull = (step[i] >= edge.High[i] ? slope : -slope) / Math.Sqrt(matrix[i, i]);
            (best, most) = pull > most ? (i, pull) : (best, most);
        }

        if (best >= 0)
        {
            edge.Bound[best] = false;
        }

        return best >= 0;
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

/// <summary>One equation of a least-squares step.</summary>
/// <param name="Residual">Its value now.</param>
/// <param name="Derivatives">By each unknown.</param>
/// <param name="OneSided">Only a value above zero counts.</param>
internal readonly record struct StepRow(double Residual, double[] Derivatives, bool OneSided = false)
{
    /// <summary>Its value after a step, to first order.</summary>
    public double At(double[] step)
    {
        double value = Residual;
        for (int i = 0; i < step.Length; i++)
        {
            value += Derivatives[i] * step[i];
        }

        return value;
    }
}
