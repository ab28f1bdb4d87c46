namespace PoleField.Beam;

/// <summary>
/// A state of a beam particle whose moment follows the field adiabatically: the force on it is μ(B) grad|B|.
/// </summary>
/// <param name="Name">Name for tables, such as "F = 2, m = -1".</param>
/// <param name="Share">Share of the beam in this state; the shares of a species sum to 1.</param>
/// <param name="Moment">Effective moment −dE/dB (J/T) at a field (T); positive towards stronger field.</param>
public sealed record MomentState(string Name, double Share, Func<double, double> Moment);

/// <summary>What flies: mass and the states of the moment.</summary>
public sealed record Species
{
    private Species(string name, double mass, IReadOnlyList<MomentState> states)
    {
        Name = name;
        Mass = mass;
        States = states;
    }

    /// <summary>Name.</summary>
    public string Name { get; }

    /// <summary>Mass, kg.</summary>
    public double Mass { get; }

    /// <summary>States of the moment with their shares.</summary>
    public IReadOnlyList<MomentState> States { get; }

    /// <summary>A moment of fixed size that stands along the field or against it, half of the beam each.</summary>
    /// <param name="mass">Mass, kg, positive.</param>
    /// <param name="moment">Size of the moment, J/T, positive.</param>
    public static Species WithFixedMoment(double mass, double moment) => new(
        "fixed moment",
        Positive(mass, nameof(mass)),
        [
            new MomentState("along the field", 0.5, _ => Positive(moment, nameof(moment))),
            new MomentState("against the field", 0.5, _ => -moment),
        ]);

    /// <summary>
    /// A cluster whose moment relaxes at a temperature: every particle has the thermal mean μ (coth x − 1/x), x = μB/kT
    /// (Langevin 1905).
    /// </summary>
    /// <param name="mass">Mass, kg, positive.</param>
    /// <param name="moment">Size of the moment, J/T, positive.</param>
    /// <param name="temperature">Temperature of the cluster, K, positive.</param>
    public static Species Relaxed(double mass, double moment, double temperature)
    {
        double perField = Positive(moment, nameof(moment)) / (PhysicalConstants.Boltzmann * Positive(temperature, nameof(temperature)));
        return new Species(
            "relaxed moment",
            Positive(mass, nameof(mass)),
            [new MomentState("thermal mean", 1.0, field => moment * Langevin(perField * field))]);
    }

    /// <summary>An atom of electronic angular momentum ½ with hyperfine structure, all states equally filled.</summary>
    internal static Species Of(Atom atom) => new(atom.Name, atom.Mass, BreitRabi.States(atom));

    private static double Langevin(double x)
    {
        // Below this the closed form loses digits and the series is exact to rounding.
        const double small = 0.02;
        double square = x * x;
        return Math.Abs(x) < small
            ? x / 3 * (1 - (square / 15) + (2 * square * square / 315))
            : (1 / Math.Tanh(x)) - (1 / x);
    }

    private static double Positive(double value, string name) => value > 0 && double.IsFinite(value)
        ? value
        : throw new ArgumentOutOfRangeException(name, value, "Must be positive and finite.");
}
