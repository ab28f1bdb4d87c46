namespace PoleField.Materials;

/// <summary>
/// The curve above the last row of a table: J = Js − ΔJ/s², s = 1 + (H − Hn)/(2h), ΔJ = Js − Jn. Polarisation approaches Js
/// as 1/H² (the law of approach to saturation of Becker, Döring and Kronmüller) and dB/dH approaches μ0.
/// </summary>
/// <remarks>
/// Rebuilt from any two later points of itself it is the same curve. Every instance has Hn ≥ 0, ΔJ &gt; 0 and h &gt; 0.
/// </remarks>
public sealed class SaturationTail
{
    private const double Mu0 = PhysicalConstants.Mu0;

    private readonly double _startEnergy;

    private SaturationTail(BhRow start, double missing, double scale, double startEnergy)
    {
        Start = start;
        MissingPolarisation = missing;
        FieldScale = scale;
        _startEnergy = startEnergy;
    }

    /// <summary>Last row of the table, where the tail begins.</summary>
    public BhRow Start { get; }

    /// <summary>ΔJ = Js − Jn, T, &gt; 0: the polarisation still missing at the start.</summary>
    public double MissingPolarisation { get; }

    /// <summary>h, A/m, &gt; 0: dJ/dH at the start is ΔJ/h.</summary>
    public double FieldScale { get; }

    /// <summary>dH/dB at the start, m/H.</summary>
    public double StartSlope => 1.0 / (Mu0 + (MissingPolarisation / FieldScale));

    /// <summary>
    /// Lays the tail through the last two rows. Its slope at the join is kept at or below three times the last secant's, the
    /// limit up to which a monotone cubic can meet it with a common tangent (Fritsch, Carlson 1980).
    /// </summary>
    /// <param name="previous">The row before the last.</param>
    /// <param name="last">The last row.</param>
    /// <param name="saturation">Js, T, above the polarisation of both.</param>
    internal static SaturationTail Through(BhRow previous, BhRow last, double saturation)
    {
        double missing = saturation - last.Polarisation;
        double ratio = Math.Sqrt(missing / (saturation - previous.Polarisation));
        double scale = (last.FieldStrength - previous.FieldStrength) / (2 * (1 - ratio));
        double secant = (last.FieldStrength - previous.FieldStrength) / (last.FluxDensity - previous.FluxDensity);
        double leastRise = (1 / (3 * secant)) - Mu0;
        if (leastRise > 0 && missing < leastRise * scale)
        {
            scale = missing / leastRise;
        }

        return new SaturationTail(last, missing, scale, 0);
    }

    /// <summary>The same tail with the energy stored up to its start, J/m³.</summary>
    internal SaturationTail WithStartEnergy(double energy) => new(Start, MissingPolarisation, FieldScale, energy);

    /// <summary>Values at a flux density at or above the start's.</summary>
    internal MagneticState At(double b)
    {
        double beyond = b - Start.FluxDensity;
        double u = Parameter(beyond);
        double s = 1 + u;
        double rise = 2 * FieldScale * u;
        double slope = 1 / (Mu0 + (MissingPolarisation / FieldScale / (s * s * s)));
        double work = ((Start.FieldStrength + rise) * beyond) - (MissingPolarisation * rise * u / s) - (0.5 * Mu0 * rise * rise);
        return new MagneticState(Start.FieldStrength + rise, slope, _startEnergy + work);
    }

    /// <summary>B, T, at a field strength at or above the start's.</summary>
    internal double FluxDensityAt(double fieldStrength)
    {
        double rise = fieldStrength - Start.FieldStrength;
        double u = rise / (2 * FieldScale);
        return Start.FluxDensity + (Mu0 * rise) + Gain(u);
    }

    // Polarisation gained since the start; written so that nothing cancels near the join.
    private double Gain(double u) => MissingPolarisation * u * (u + 2) / ((1 + u) * (1 + u));

    // B − Bn is an increasing concave function of u = s − 1, so Newton's iterates from below rise monotonically to the root;
    // the loop ends when rounding stops the rise. No more than ΔJ is gained, hence the start.
    private double Parameter(double beyond)
    {
        double next = Math.Max(0, (beyond - MissingPolarisation) / (2 * Mu0 * FieldScale));
        double u;
        do
        {
            u = next;
            double s = 1 + u;
            double excess = beyond - (2 * Mu0 * FieldScale * u) - Gain(u);
            next = u + (excess / (2 * ((Mu0 * FieldScale) + (MissingPolarisation / (s * s * s)))));
        }
        while (next > u * (1 + 1e-15));

        return u;
    }
}
