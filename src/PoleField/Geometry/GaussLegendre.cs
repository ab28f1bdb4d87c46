namespace PoleField.Geometry;

/// <summary>Gauss-Legendre rules on [0, 1]: n points integrate polynomials up to degree 2n − 1 exactly.</summary>
internal static class GaussLegendre
{
    /// <summary>Most points of a rule.</summary>
    public const int MostPoints = 32;

    private static readonly (double Node, double Weight)[][] Rules = [.. Enumerable.Range(1, MostPoints).Select(Make)];

    /// <summary>Nodes and weights of the rule with 1 to <see cref="MostPoints"/> points.</summary>
    public static ReadOnlySpan<(double Node, double Weight)> Rule(int points) => Rules[points - 1];

    // Roots of the Legendre polynomial by Newton from Tricomi's estimate (Abramowitz & Stegun 22.16.6), weights 25.4.29.
    private static (double Node, double Weight)[] Make(int n)
    {
        var rule = new (double, double)[n];
        for (int i = 0; i < n; i++)
        {
            double x = -Math.Cos(Math.PI * (i + 0.75) / (n + 0.5));
            double slope = 1;
            for (int step = 0; step < 8; step++)
            {
                (double value, slope) = Legendre(n, x);
                x -= value / slope;
            }

            (_, slope) = Legendre(n, x);
            rule[i] = (0.5 * (1 + x), 1 / ((1 - (x * x)) * slope * slope));
        }

        return rule;
    }

    private static (double Value, double Slope) Legendre(int n, double x)
    {
        double before = 1, value = x;
        for (int k = 2; k <= n; k++)
        {
            (before, value) = (value, ((((2 * k) - 1) * x * value) - ((k - 1) * before)) / k);
        }

        return (value, n * ((x * value) - before) / ((x * x) - 1));
    }
}
