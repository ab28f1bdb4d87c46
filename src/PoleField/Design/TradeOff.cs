using PoleField.Beam;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>How uniform the gradient can be for each gradient that must hold.</summary>
public static class TradeOff
{
    private const int StepsEach = 6;
    private static readonly double[] Shares = [1.06, 1.03, 0.97, 0.94, 0.9, 0.85];

    /// <summary>
    /// Goes from a tuned shape to larger and smaller gradients and makes each as uniform as it can; the tuned shape itself is among
    /// the results, which come in falling order of the gradient asked for.
    /// </summary>
    /// <param name="magnet">Magnet as drawn.</param>
    /// <param name="aperture">Where the beam flies.</param>
    /// <param name="settings">As for the tuned shape; its hold on the gradient is replaced.</param>
    /// <param name="tuned">The tuned shape.</param>
    /// <param name="cancellation">Ends it with the shapes found so far.</param>
    public static IReadOnlyList<(double LeastGradient, TuneResult Shape)> Run(
        Magnet magnet, Aperture aperture, TuneSettings settings, TuneResult tuned, CancellationToken cancellation = default)
    {
        double own = Math.Abs(tuned.State.Steps.Last(s => s.Accepted).Gradient);
        var found = new List<(double LeastGradient, TuneResult Shape)> { (own, tuned) };
        foreach (IEnumerable<double> side in new[] { Shares.Where(s => s > 1).Order(), Shares.Where(s => s < 1).OrderDescending() })
        {
            TuneState start = tuned.State;
            foreach (double share in side)
            {
                if (cancellation.IsCancellationRequested)
                {
                    break;
                }

                TuneResult shape = Tuning.Run(
                    magnet,
                    aperture,
                    settings with
                    {
                        Start = start with { Damping = 1e-2 },
                        MostSteps = StepsEach,
                        Holds = [.. settings.Holds.Where(h => h.Of != HeldQuantity.Gradient), new TuneHold(HeldQuantity.Gradient, true, share * own)],
                    },
                    null,
                    cancellation);
                found.Add((share * own, shape));
                start = shape.State;
            }
        }

        return [.. found.OrderByDescending(f => f.LeastGradient)];
    }
}
