namespace PoleField.Numerics;

/// <summary>Nodes and weights of a one-dimensional Gauss rule on [0, 1].</summary>
/// <param name="Nodes">Nodes, increasing, inside (0, 1).</param>
/// <param name="Weights">Positive weights; for weight function 1 they sum to 1, for (1 − x) to ½.</param>
public sealed record GaussRule(double[] Nodes, double[] Weights)
{
    private const int MostNewtonSteps = 100;

    /// <summary>Gauss–Legendre rule with n points: exact for polynomials of degree 2n − 1.</summary>
    public static GaussRule Legendre(int n) => Jacobi(n, 0);

    /// <summary>Gauss–Jacobi rule for the weight (1 − x) on [0, 1] with n points: exact for degree 2n − 1.</summary>
    public static GaussRule LinearWeight(int n) => Jacobi(n, 1);

    /// <summary>
    /// Roots of the Jacobi polynomial P_n^(α,0) by Newton's method with deflation of the roots already found; weights from
    /// its derivative (Abramowitz and Stegun 25.4.33 with 22.5.2, recalled from memory; the tests integrate all monomials).
    /// </summary>
    private static GaussRule Jacobi(int n, int alpha)
    {
        var nodes = new double[n];
        var weights = new double[n];
        for (int k = 0; k < n; k++)
        {
            double x = -Math.Cos(Math.PI * (k + 0.75) / (n + 0.5 + (0.5 * alpha)));
            for (int step = 0; step < MostNewtonSteps; step++)
            {
                (double p, double dp) = Polynomial(n, alpha, x);
                double deflation = 0;
                for (int j = 0; j < k; j++)
                {
                    deflation += 1.0 / (x - ((2 * nodes[j]) - 1));
                }

                double move = p / (dp - (p * deflation));
                x -= move;
                if (Math.Abs(move) < 1e-15)
                {
                    break;
                }
            }

            (_, double derivative) = Polynomial(n, alpha, x);
            nodes[k] = 0.5 * (1 + x);

            // On [-1, 1]: w = 2^(α+1) / ((1 − x²) P'(x)²) for β = 0 and integer α; the map to [0, 1] takes out 2^(α+1).
            weights[k] = 1.0 / ((1 - (x * x)) * derivative * derivative);
        }

        return new GaussRule(nodes, weights);
    }

    /// <summary>P_n^(α,0) and its derivative at x by the three-term recurrence (Abramowitz and Stegun 22.7.1).</summary>
    private static (double P, double Derivative) Polynomial(int n, int alpha, double x)
    {
        double previous = 0;
        double dPrevious = 0;
        double current = 1;
        double dCurrent = 0;
        for (int k = 0; k < n; k++)
        {
            double next, dNext;
            if (k == 0)
            {
                next = 0.5 * (alpha + ((alpha + 2) * x));
                dNext = 0.5 * (alpha + 2);
            }
            else
            {
                double c = (2 * k) + alpha;
                double a1 = 2 * (k + 1) * (k + alpha + 1) * c;
                double a2 = (c + 1) * alpha * alpha;
                double a3 = c * (c + 1) * (c + 2);
                double a4 = 2 * (k + alpha) * k * (c + 2);
                next = (((a2 + (a3 * x)) * current) - (a4 * previous)) / a1;
                dNext = (((a2 + (a3 * x)) * dCurrent) + (a3 * current) - (a4 * dPrevious)) / a1;
            }

            (previous, dPrevious, current, dCurrent) = (current, dCurrent, next, dNext);
        }

        return (current, dCurrent);
    }
}
