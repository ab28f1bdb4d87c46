namespace PoleField.Geometry;

/// <summary>Nearest point of a curve to a place: roots of (C(t) − p)·C′(t) by Newton steps kept inside brackets.</summary>
internal static class NearestPoint
{
    // A bracket halves at least every second step, so 120 steps exhaust the 53 digits of a double.
    private const int MostSteps = 120;

    /// <summary>
    /// Searches the parameters of <paramref name="range"/> in equal samples and returns the best parameter found,
    /// <paramref name="best"/> if there is none nearer.
    /// </summary>
    public static double Improve(Curve curve, Point p, double best, (double From, double To) range, int samples)
    {
        double least = (curve.At(best) - p).SquaredLength;
        double before = range.From;
        double slopeBefore = Slope(curve, p, before);
        for (int i = 1; i <= samples; i++)
        {
            double t = i == samples ? range.To : range.From + ((range.To - range.From) * i / samples);
            double slope = Slope(curve, p, t);
            if (slopeBefore <= 0.0 && slope >= 0.0)
            {
                double root = Root(curve, p, before, t);
                double distance = (curve.At(root) - p).SquaredLength;
                if (distance < least)
                {
                    (least, best) = (distance, root);
                }
            }

            (before, slopeBefore) = (t, slope);
        }

        return best;
    }

    private static double Slope(Curve curve, Point p, double t) => (curve.At(t) - p).Dot(curve.Derivative(t));

    private static double Root(Curve curve, Point p, double low, double high)
    {
        double t = 0.5 * (low + high);
        for (int step = 0; step < MostSteps && low < t && t < high; step++)
        {
            Point gap = curve.At(t) - p;
            Point d = curve.Derivative(t);
            double slope = gap.Dot(d);
            if (slope == 0.0)
            {
                return t;
            }

            (low, high) = slope < 0.0 ? (t, high) : (low, t);
            double newton = t - (slope / (d.SquaredLength + gap.Dot(curve.SecondDerivative(t))));
            bool converged = Math.Abs(newton - t) <= 1e-15;
            bool useful = newton > low && newton < high && (step % 2 == 0 || step < 8);
            if (converged)
            {
                return Math.Clamp(newton, low, high);
            }

            t = useful ? newton : 0.5 * (low + high);
        }

        return Math.Clamp(t, low, high);
    }
}
