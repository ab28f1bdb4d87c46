using MathNet.Numerics;

namespace PoleField.Beam;

/// <summary>
/// Speeds of the beam as its flux counts them, cut into cells of known weight: what a detector sees that counts particles.
/// </summary>
public sealed class SpeedDistribution
{
    private readonly Func<double, double> _below;

    private SpeedDistribution(double mostProbable, double mean, double[] edges, Func<double, double> below)
    {
        MostProbable = mostProbable;
        Mean = mean;
        Edges = edges;
        _below = below;
    }

    /// <summary>Most probable speed in the flux, m/s.</summary>
    public double MostProbable { get; }

    /// <summary>Mean speed of the flux, m/s.</summary>
    public double Mean { get; }

    /// <summary>Temperature of an effusive source, K; null for others.</summary>
    public double? Temperature { get; private init; }

    /// <summary>Edges of the cells from slow to fast, m/s; the outer cells hold what lies beyond them.</summary>
    internal double[] Edges { get; }

    /// <summary>
    /// Effusive source, flux ∝ v³ exp(−v²/α²), α = √(2kT/m) (Ramsey, Molecular Beams, 1956, ch. II, recalled from memory):
    /// most probable √(3/2) α, mean (3√π/4) α.
    /// </summary>
    /// <param name="temperature">Temperature of the oven, K, positive.</param>
    /// <param name="mass">Mass, kg, positive.</param>
    public static SpeedDistribution Effusive(double temperature, double mass)
    {
        const int cells = 60;
        const double slowest = 0.1;   // of α: 5e-5 of the flux is slower
        const double fastest = 4.2;   // of α: 4e-7 of the flux is faster
        double alpha = Math.Sqrt(2 * PhysicalConstants.Boltzmann * temperature / mass);
        double ratio = fastest / slowest;
        double[] edges = [.. Enumerable.Range(0, cells + 1).Select(i => alpha * slowest * Math.Pow(ratio, (double)i / cells))];
        return new SpeedDistribution(Math.Sqrt(1.5) * alpha, 0.75 * Math.Sqrt(Math.PI) * alpha, edges, Below)
        {
            Temperature = temperature,
        };

        double Below(double speed)
        {
            double u = speed * speed / (alpha * alpha);

            // 1 − (1 + u) e^(−u), by its series where that would lose digits.
            return u < 1e-3 ? u * u * (0.5 - (u / 3) + (u * u / 8)) : 1 - ((1 + u) * Math.Exp(-u));
        }
    }

    /// <summary>A beam of about one speed, as of a nozzle: a normal distribution.</summary>
    /// <param name="speed">Mean speed, m/s, positive.</param>
    /// <param name="width">Full width at half maximum over the speed, 0 to 0.5; 0 for one speed.</param>
    public static SpeedDistribution Narrow(double speed, double width)
    {
        if (!(width >= 0) || width > 0.5)
        {
            throw new ArgumentOutOfRangeException(nameof(width), width, "The relative width of the speeds is 0 to 0.5.");
        }

        if (width == 0)
        {
            return new SpeedDistribution(speed, speed, [speed, speed], _ => 0);
        }

        const int cells = 32;
        const double reach = 4;       // standard deviations; 6e-5 of the beam lies beyond
        double sigma = speed * width / (2 * Math.Sqrt(2 * Math.Log(2)));
        double[] edges = [.. Enumerable.Range(0, cells + 1).Select(i => speed + (sigma * reach * ((2.0 * i / cells) - 1)))];
        return new SpeedDistribution(speed, speed, edges, v => 0.5 * SpecialFunctions.Erfc((speed - v) / (sigma * Math.Sqrt(2))));
    }

    /// <summary>Share of the flux between two speeds.</summary>
    internal double Share(double from, double to) => IsSingle ? 1 : Math.Max(0, Below(to) - Below(from));

    private bool IsSingle => Edges[0] == Edges[^1];

    private double Below(double speed) => speed <= Edges[0] ? 0 : speed >= Edges[^1] ? 1 : _below(speed);
}
