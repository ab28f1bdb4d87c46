namespace PoleField.Beam;

/// <summary>A bundle of rays as it arrives: spread evenly between two heights, then over the height of its strip of the slit.</summary>
/// <param name="From">Lower height of the strip's middle ray, metres.</param>
/// <param name="To">Upper height.</param>
/// <param name="Strip">Height of the strip, metres, positive.</param>
/// <param name="Share">Share of the beam.</param>
/// <param name="Pull">Sign of the moment at the beam.</param>
internal readonly record struct RayBundle(double From, double To, double Strip, double Share, int Pull);

/// <summary>Adds ray bundles up to an intensity along z.</summary>
internal static class DetectorPattern
{
    private const int Bins = 801;
    private const double Outside = 0.02;   // share of the beam that may lie beyond each end of the picture
    private const double Top = 0.99;       // the peak is the middle of what is above this share of the maximum

    /// <summary>Range of heights worth showing, symmetric about the beam, metres.</summary>
    public static double Reach(IReadOnlyList<RayBundle> bundles, double slitHeight)
    {
        (double Size, double Share)[] sorted =
            [.. bundles.Select(b => (0.5 * Math.Abs(b.From + b.To), b.Share)).OrderBy(p => p.Item1)];
        double total = sorted.Sum(p => p.Share);
        double below = 0;
        double reach = 0;
        foreach ((double size, double share) in sorted)
        {
            below += share;
            reach = size;
            if (below >= (1 - (2 * Outside)) * total)
            {
                break;
            }
        }

        return 1.05 * (reach + slitHeight);
    }

    /// <summary>Middles of the bins.</summary>
    public static double[] Places(double reach) =>
        [.. Enumerable.Range(0, Bins).Select(i => reach * (((2.0 * i) + 1 - Bins) / Bins))];

    /// <summary>Intensity in each bin, 1/m, averaged over the bin exactly.</summary>
    public static double[] Intensity(IEnumerable<RayBundle> bundles, double reach)
    {
        var intensity = new double[Bins];
        double bin = 2 * reach / Bins;
        foreach (RayBundle b in bundles)
        {
            double half = 0.5 * b.Strip;
            int first = (int)Math.Clamp(Math.Floor((b.From - half + reach) / bin), 0, Bins);
            int last = (int)Math.Clamp(Math.Floor((b.To + half + reach) / bin), -1, Bins - 1);
            double before = Below(b, (first * bin) - reach);
            for (int k = first; k <= last; k++)
            {
                double after = Below(b, ((k + 1) * bin) - reach);
                intensity[k] += b.Share * (after - before) / bin;
                before = after;
            }
        }

        return intensity;
    }

    /// <summary>Height of the highest peak, metres; null where nothing arrives.</summary>
    public static double? Peak(double[] places, double[] intensity)
    {
        int best = 0;
        for (int i = 1; i < intensity.Length; i++)
        {
            best = intensity[i] > intensity[best] ? i : best;
        }

        if (!(intensity[best] > 0))
        {
            return null;
        }

        double level = Top * intensity[best];
        return 0.5 * (Crossing(places, intensity, best, level, -1) + Crossing(places, intensity, best, level, 1));
    }

    private static double Crossing(double[] places, double[] intensity, int from, double level, int step)
    {
        int i = from;
        while (i + step >= 0 && i + step < intensity.Length && intensity[i + step] >= level)
        {
            i += step;
        }

        int next = i + step;
        if (next < 0 || next >= intensity.Length)
        {
            return places[i];
        }

        double t = (intensity[i] - level) / (intensity[i] - intensity[next]);
        return places[i] + (t * (places[next] - places[i]));
    }

    // Share of a bundle below a height: two even distributions, of its spread and of its strip, on top of each other.
    private static double Below(RayBundle b, double z)
    {
        double spread = Math.Max(b.To - b.From, 1e-6 * b.Strip);
        double middle = 0.5 * (b.From + b.To);
        double wide = 0.5 * (spread + b.Strip);
        double narrow = 0.5 * Math.Abs(spread - b.Strip);
        double x = z - middle;
        return Math.Clamp((Ramp(x + wide) - Ramp(x + narrow) - Ramp(x - narrow) + Ramp(x - wide)) / (spread * b.Strip), 0, 1);
    }

    private static double Ramp(double x) => x > 0 ? 0.5 * x * x : 0;
}
