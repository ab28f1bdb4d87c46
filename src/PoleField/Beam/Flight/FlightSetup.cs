namespace PoleField.Beam;

/// <summary>A beam on its way through the magnet to the detector. The slit stands at the entrance, centred on the aperture.</summary>
public sealed record FlightSetup
{
    /// <summary>What flies.</summary>
    public required Species Species { get; init; }

    /// <summary>How fast.</summary>
    public required SpeedDistribution Speeds { get; init; }

    /// <summary>Length of the magnet along the beam, metres, positive.</summary>
    public required double Length { get; init; }

    /// <summary>Field-free way from the magnet's exit to the detector, metres, not negative.</summary>
    public required double Drift { get; init; }

    /// <summary>Width of the beam along y at the entrance, metres; null for the aperture's.</summary>
    public double? SlitWidth { get; init; }

    /// <summary>Height of the beam along z at the entrance, metres; null for the aperture's.</summary>
    public double? SlitHeight { get; init; }

    /// <summary>L (L/2 + D), m²: a uniform gradient G moves the beam by μ G L (L/2 + D)/(m v²).</summary>
    public double Lever => Length * ((0.5 * Length) + Drift);
}

/// <summary>One state's central particle.</summary>
/// <param name="Name">Name of the state.</param>
/// <param name="Share">Share of the beam.</param>
/// <param name="Moment">Effective moment at the beam's field, J/T.</param>
/// <param name="AtMostProbable">Deflection at the most probable speed, metres; null when the particle is lost.</param>
/// <param name="AtMean">Deflection at the mean speed, metres; null when the particle is lost.</param>
public sealed record StateDeflection(string Name, double Share, double Moment, double? AtMostProbable, double? AtMean);

/// <summary>One place of the pattern at the detector.</summary>
/// <param name="Z">Height above the beam's centre, metres.</param>
/// <param name="Intensity">Share of the beam per metre of height.</param>
/// <param name="WithoutField">The same with the magnet off.</param>
public readonly record struct PatternPoint(double Z, double Intensity, double WithoutField);

/// <summary>What a beam does in the computed field.</summary>
public sealed record FlightReport
{
    /// <summary>What was flown.</summary>
    public required FlightSetup Setup { get; init; }

    /// <summary>Each state's central particle.</summary>
    public required IReadOnlyList<StateDeflection> States { get; init; }

    /// <summary>
    /// The state whose central particle speaks for the beam: one that arrives at the most probable speed, of the largest
    /// moment, rather pulled towards stronger field than pushed away.
    /// </summary>
    public StateDeflection Strongest => States
        .OrderByDescending(s => s.AtMostProbable is not null)
        .ThenByDescending(s => Math.Round(Math.Abs(s.Moment / PhysicalConstants.BohrMagneton), 6))
        .ThenByDescending(s => s.Moment)
        .First();

    /// <summary>Distance between the peaks of what is pulled and what is pushed, metres; null when there is only one.</summary>
    public required double? Splitting { get; init; }

    /// <summary>Share of the beam that leaves the room inside the magnet and never arrives.</summary>
    public required double ClippedShare { get; init; }

    /// <summary>Intensity at the detector along z, summed over y.</summary>
    public required IReadOnlyList<PatternPoint> Pattern { get; init; }

    /// <summary>Lower left corner of the room in which particles are followed, metres.</summary>
    public required Geometry.Point RoomFrom { get; init; }

    /// <summary>Upper right corner of it, metres.</summary>
    public required Geometry.Point RoomTo { get; init; }

    /// <summary>Distance kept between the room and everything that is not air, metres.</summary>
    public required double Margin { get; init; }

    /// <summary>Doubts.</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }
}
