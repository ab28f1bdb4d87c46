namespace PoleField.Geometry;

/// <summary>Integrals along curves by Gauss rules that halve their intervals until both halves agree with the whole.</summary>
internal static class ArcLength
{
    private const int Points = 16;
    private const double Tolerance = 1e-14;
    private const int MostHalvings = 40;

    /// <summary>Length of a curve between the first and last of the given parameters; smooth between neighbours.</summary>
    public static double Of(Curve curve, ReadOnlySpan<double> breaks)
    {
        double rough = 0;
        for (int i = 1; i < breaks.Length; i++)
        {
            rough += Integral(t => curve.Derivative(t).Length, breaks[i - 1], breaks[i]);
        }

        double sum = 0;
        for (int i = 1; i < breaks.Length; i++)
        {
            sum += Adaptive(t => curve.Derivative(t).Length, (breaks[i - 1], breaks[i]), Tolerance * rough);
        }

        return sum;
    }

    /// <summary>Integral over a range to an absolute tolerance.</summary>
    public static double Adaptive(Func<double, double> f, (double From, double To) range, double tolerance) =>
        Adaptive(f, range, Integral(f, range.From, range.To), tolerance, MostHalvings);

    private static double Adaptive(
        Func<double, double> f, (double From, double To) range, double whole, double tolerance, int halvings)
    {
        double middle = 0.5 * (range.From + range.To);
        double first = Integral(f, range.From, middle);
        double second = Integral(f, middle, range.To);
        if (halvings == 0 || Math.Abs(first + second - whole) <= tolerance + (Tolerance * Math.Abs(whole)))
        {
            return first + second;
        }

        return Adaptive(f, (range.From, middle), first, 0.5 * tolerance, halvings - 1)
            + Adaptive(f, (middle, range.To), second, 0.5 * tolerance, halvings - 1);
    }

    private static double Integral(Func<double, double> f, double from, double to)
    {
        double sum = 0;
        foreach ((double node, double weight) in GaussLegendre.Rule(Points))
        {
            sum += weight * f(from + (node * (to - from)));
        }

        return (to - from) * sum;
    }
}
