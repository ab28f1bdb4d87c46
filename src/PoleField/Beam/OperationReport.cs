using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>What is stated about a magnet's use.</summary>
/// <param name="Length">Length along the beam, metres; null when not stated.</param>
/// <param name="Celsius">Temperature of the warm winding, °C.</param>
/// <param name="StrayLevels">Flux densities whose reach is wanted, T, rising.</param>
public sealed record OperationSetup(double? Length, double Celsius, IReadOnlyList<double> StrayLevels)
{
    /// <summary>80 °C, a winding in steady use (common practice); 0.5, 1, 3 and 10 mT.</summary>
    public static OperationSetup Default { get; } = new(null, 80, [StrayField.ImplantLevel, 1e-3, StrayField.AttractionLevel, 10e-3]);
}

/// <summary>How far the field reaches that exceeds a level.</summary>
/// <param name="Level">Flux density, T.</param>
/// <param name="Distance">Distance from the middle of the section, metres; null when it is not known.</param>
/// <param name="IsBound">True when the field is weaker already on the circle around the section, which the distance then is.</param>
public sealed record StrayReach(double Level, double? Distance, bool IsBound = false);

/// <summary>What running a magnet takes and what is around it: heat, pull, energy, inductance, stray field. Without its ends.</summary>
public sealed record OperationReport
{
    private const double Cold = 20;

    /// <summary>What was stated.</summary>
    public required OperationSetup Setup { get; init; }

    /// <summary>The coils whose copper share is known.</summary>
    public required IReadOnlyList<CoilReport> Coils { get; init; }

    /// <summary>The field around, by rising level; empty where it does not fall off (a background field, a closed model).</summary>
    public required IReadOnlyList<StrayReach> Stray { get; init; }

    /// <summary>The circuit, per metre of length.</summary>
    public required CircuitReport Circuit { get; init; }

    /// <summary>Heat of all coils at 20 °C, W/m; null when no coil's copper share is known.</summary>
    public double? ColdHeatPerMetre => Coils.Count == 0 ? null : Coils.Sum(c => c.HeatPerMetre(Cold));

    /// <summary>Heat of all coils at the stated temperature, W/m; null when no coil's copper share is known.</summary>
    public double? WarmHeatPerMetre => Coils.Count == 0 ? null : Coils.Sum(c => c.HeatPerMetre(Setup.Celsius));

    /// <summary>Flux linked with one turn of the winding, Wb per metre of length; null without currents.</summary>
    public double? LinkagePerMetre => Circuit.InductancePerMetre * Circuit.AmpereTurns;

    /// <summary>A quantity per metre times the length; null when either is not known.</summary>
    public double? OverLength(double? perMetre) => perMetre * Setup.Length;

    /// <summary>Works it out for a solved magnet.</summary>
    /// <param name="magnet">The magnet.</param>
    /// <param name="circuit">Its circuit.</param>
    /// <param name="fieldAt">|B| at a place, T; null where the model ends.</param>
    /// <param name="setup">What is stated.</param>
    public static OperationReport Of(Magnet magnet, CircuitReport circuit, Func<Geometry.Point, double?> fieldAt, OperationSetup setup)
    {
        // A uniform background never falls off, and a closed model ends at its rim.
        bool fallsOff = magnet.AppliedField == default && !magnet.Section.HasRim;
        return new OperationReport
        {
            Setup = setup,
            Coils = CoilReport.Of(magnet),
            Stray = fallsOff
                ? [.. setup.StrayLevels.Select(Reach)]
                : [],
            Circuit = circuit,
        };

        StrayReach Reach(double level)
        {
            double? distance = StrayField.Reach(fieldAt, magnet.Section.Bounds, level);
            return new StrayReach(level, distance, distance == StrayField.Nearest(magnet.Section.Bounds));
        }
    }
}
