namespace PoleField.Materials;

/// <summary>
/// Slopes dH/dB at the nodes of a curve such that the Hermite cubics between them satisfy 0 &lt; dH/dB ≤ 1/μ0: the weighted
/// harmonic mean of F. N. Fritsch, J. Butland, SIAM J. Sci. Stat. Comput. 5 (1984) 300, then the condition of F. N. Fritsch,
/// R. E. Carlson, SIAM J. Numer. Anal. 17 (1980) 238 (slope ≤ 3 secants) applied to H and to B/μ0 − H at once.
/// </summary>
/// <remarks>The formulas are recalled from memory of the two papers; the tests hold them to their result, monotone pieces.</remarks>
internal sealed class MonotoneSlopes
{
    private const double Nu0 = PhysicalConstants.Nu0;

    private MonotoneSlopes(int pieces)
    {
        AtStart = new double[pieces];
        AtEnd = new double[pieces];
    }

    /// <summary>Slope of piece k at its start, m/H.</summary>
    public double[] AtStart { get; }

    /// <summary>Slope of piece k at its end, m/H; equal to the next piece's start except at a kink.</summary>
    public double[] AtEnd { get; }

    /// <summary>Nodes whose two sides allow no common slope.</summary>
    public List<int> Kinks { get; } = [];

    /// <summary>Slopes through nodes that rise in both coordinates with secants in (0, 1/μ0), first node at the origin.</summary>
    /// <param name="nodes">The nodes.</param>
    /// <param name="endSlope">Slope at the last node, m/H.</param>
    /// <param name="straightStart">The first piece is the chord itself: H/B is constant on it.</param>
    public static MonotoneSlopes Through(BhRow[] nodes, double endSlope, bool straightStart)
    {
        int pieces = nodes.Length - 1;
        MonotoneSlopes slopes = new(pieces);

        // Odd continuation through the origin: the first secant on both sides, hence a finite initial reluctivity.
        slopes.AtStart[0] = Secant(nodes, 0);
        slopes.AtEnd[pieces - 1] = endSlope;
        for (int k = 1; k < pieces; k++)
        {
            slopes.SetInterior(nodes, k, straightStart && k == 1 ? Secant(nodes, 0) : HarmonicMean(nodes, k));
        }

        return slopes;
    }

    private static double Secant(BhRow[] nodes, int k) =>
        (nodes[k + 1].FieldStrength - nodes[k].FieldStrength) / (nodes[k + 1].FluxDensity - nodes[k].FluxDensity);

    private static (double Low, double High) Allowed(double secant) =>
        (Math.Max(0, (3 * secant) - (2 * Nu0)), Math.Min(Nu0, 3 * secant));

    private static double HarmonicMean(BhRow[] nodes, int k)
    {
        double lengthBefore = nodes[k].FluxDensity - nodes[k - 1].FluxDensity;
        double lengthAfter = nodes[k + 1].FluxDensity - nodes[k].FluxDensity;
        double w1 = (2 * lengthAfter) + lengthBefore;
        double w2 = lengthAfter + (2 * lengthBefore);
        return (w1 + w2) / ((w1 / Secant(nodes, k - 1)) + (w2 / Secant(nodes, k)));
    }

    private void SetInterior(BhRow[] nodes, int k, double wanted)
    {
        (double Low, double High) left = Allowed(Secant(nodes, k - 1));
        (double Low, double High) right = Allowed(Secant(nodes, k));
        double low = Math.Max(left.Low, right.Low);
        double high = Math.Min(left.High, right.High);
        if (low <= high)
        {
            AtEnd[k - 1] = AtStart[k] = Math.Clamp(wanted, low, high);
            return;
        }

        AtEnd[k - 1] = Math.Clamp(wanted, left.Low, left.High);
        AtStart[k] = Math.Clamp(wanted, right.Low, right.High);
        Kinks.Add(k);
    }
}
