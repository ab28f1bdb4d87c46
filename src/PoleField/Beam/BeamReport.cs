using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>Statistics of a quantity over the aperture, area-weighted.</summary>
/// <param name="Mean">Mean.</param>
/// <param name="Min">Smallest value.</param>
/// <param name="Max">Largest value.</param>
/// <param name="Rms">Standard deviation over |mean|, no unit.</param>
public sealed record ApertureStatistics(double Mean, double Min, double Max, double Rms)
{
    /// <summary>(max − min) / (2 |mean|), no unit.</summary>
    public double Spread => (Max - Min) / (2 * Math.Abs(Mean));

    /// <summary>Largest size, without sign.</summary>
    public double Largest => Math.Max(Math.Abs(Min), Math.Abs(Max));
}

/// <summary>What became of one part.</summary>
public sealed record PartReport
{
    /// <summary>Layer.</summary>
    public required string Layer { get; init; }

    /// <summary>"iron", "coil", "magnet" or "air".</summary>
    public required string Kind { get; init; }

    /// <summary>Material name.</summary>
    public required string Material { get; init; }

    /// <summary>Area, m².</summary>
    public required double Area { get; init; }

    /// <summary>Number of closed outlines.</summary>
    public required int Outlines { get; init; }

    /// <summary>Ampere-turns of each outline, A; null where none.</summary>
    public double? AmpereTurns { get; init; }

    /// <summary>Current density in the copper (outline's share by fill), A/m²; null where none.</summary>
    public double? CurrentDensity { get; init; }

    /// <summary>Largest flux density, T; null for air and coils.</summary>
    public double? FieldMax { get; init; }

    /// <summary>Where it is, metres.</summary>
    public Point? FieldMaxAt { get; init; }

    /// <summary>Flux density that 99 % of the area stays below, T.</summary>
    public double? FieldP99 { get; init; }

    /// <summary>Share of the area whose polarisation is above 90 % of saturation, 0 to 1.</summary>
    public double? SaturatedShare { get; init; }

    /// <summary>
    /// Ampere-turns spent in the part, A: its share of ∫ H·B dS over all space times the driving ampere-turns. The shares of
    /// all parts and of the air sum to the whole; in a flux tube without leakage the share is ∫ H·dl. Null for air and coils,
    /// and where magnets or a background field drive flux too.
    /// </summary>
    public double? MmfDrop { get; init; }

    /// <summary>
    /// Magnetic force per metre of length on the part (y, z), N/m: J × B on conductors, Maxwell's stress in the surrounding
    /// air on iron and magnets. See <see cref="ForceOnFreeFacesOnly"/>. Null for air.
    /// </summary>
    public Point? ForcePerMetre { get; init; }

    /// <summary>
    /// The same force by another law, N/m: Maxwell's stress around conductors, its integral along a closed path one layer of
    /// elements away for iron and magnets. Null where the part is joined to others or no path fits.
    /// </summary>
    public Point? ForceOtherWay { get; init; }

    /// <summary>
    /// True when the part is joined to other iron or magnets and <see cref="ForcePerMetre"/> is the pull on its faces in air
    /// alone; what the joint carries besides is not in it.
    /// </summary>
    public bool ForceOnFreeFacesOnly { get; init; }
}

/// <summary>The magnetic circuit's balance.</summary>
/// <param name="AmpereTurns">Ampere-turns that drive the gap: sum of the positive ones, A.</param>
/// <param name="GapAmpereTurns">∫H·dl across the air gap through the beam, A.</param>
/// <param name="IronAmpereTurns">The rest, spent in iron and leakage return, A.</param>
/// <param name="EnergyPerMetre">Stored field energy per metre of length, J/m.</param>
/// <param name="InductancePerMetre">Inductance per metre and turn², H/m; null without currents.</param>
public sealed record CircuitReport(
    double AmpereTurns, double GapAmpereTurns, double IronAmpereTurns, double EnergyPerMetre, double? InductancePerMetre)
{
    /// <summary>
    /// Pull per metre of length across the horizontal line through the beam, N/m: ∫ (Bz² − By²)/(2 μ0) dy from iron to iron
    /// (to infinity where there is none); positive when the poles attract each other. Spacers and frame must carry it.
    /// </summary>
    public double GapPullPerMetre { get; init; }

    /// <summary>Gap share of the ampere-turns; null without currents.</summary>
    public double? Efficiency => AmpereTurns > 0 ? GapAmpereTurns / AmpereTurns : null;
}

/// <summary>Field and gradient over the beam with error bars: the answer. SI units.</summary>
public sealed record BeamReport
{
    /// <summary>Values at the beam's centre.</summary>
    public required BeamValues Beam { get; init; }

    /// <summary>How the beam's field was obtained.</summary>
    public BeamFieldMethod Method { get; init; }

    /// <summary>Error bar of |B| at the centre, T.</summary>
    public required double FieldError { get; init; }

    /// <summary>Error bar of G at the centre, T/m.</summary>
    public required double GradientError { get; init; }

    /// <summary>Aperture area, m².</summary>
    public required double ApertureArea { get; init; }

    /// <summary>Smallest distance from the aperture to anything that is not air, metres.</summary>
    public required double Clearance { get; init; }

    /// <summary>|B| over the aperture, T.</summary>
    public required ApertureStatistics Field { get; init; }

    /// <summary>G over the aperture, T/m.</summary>
    public required ApertureStatistics Gradient { get; init; }

    /// <summary>Error bar of the gradient's mean, T/m.</summary>
    public required double GradientMeanError { get; init; }

    /// <summary>|B|·G over the aperture, T²/m.</summary>
    public required ApertureStatistics FieldTimesGradient { get; init; }

    /// <summary>Values along y through the centre, edge to edge of the aperture.</summary>
    public required IReadOnlyList<BeamValues> ProfileY { get; init; }

    /// <summary>Values along z through the centre, edge to edge of the aperture.</summary>
    public required IReadOnlyList<BeamValues> ProfileZ { get; init; }

    /// <summary>The parts, in the order of the case.</summary>
    public required IReadOnlyList<PartReport> Parts { get; init; }

    /// <summary>The circuit.</summary>
    public required CircuitReport Circuit { get; init; }

    /// <summary>Doubts the user must see (aperture too close to iron, accuracy not reached, ...).</summary>
    public required IReadOnlyList<Finding> Findings { get; init; }
}

/// <summary>One mesh of an adaptive run.</summary>
/// <param name="Triangles">Its triangles.</param>
/// <param name="Unknowns">Its unknowns.</param>
/// <param name="Accuracy">Largest relative error bar of field and gradient over the aperture.</param>
/// <param name="History">Newton's steps on it.</param>
public sealed record MeshRound(int Triangles, int Unknowns, double Accuracy, IReadOnlyList<NewtonStep> History)
{
    /// <summary>Newton steps that made a tangent; those that kept one cost little.</summary>
    public int NewtonSteps => History.Count(s => !s.TangentKept);
}

/// <summary>How the answer was reached.</summary>
/// <param name="Triangles">Triangles of the last mesh.</param>
/// <param name="Unknowns">Unknowns of the last solve.</param>
/// <param name="Order">Order of the elements.</param>
/// <param name="SmallestAngleDegrees">Smallest angle of the last mesh, degrees.</param>
/// <param name="NewtonSteps">Newton steps of all solves, those with a kept tangent not counted.</param>
/// <param name="AdaptiveSteps">Meshes refined.</param>
/// <param name="AccuracyReached">Largest relative error bar of field and gradient over the aperture.</param>
/// <param name="AccuracyAsked">The accuracy asked for.</param>
public sealed record SolveRecord(
    int Triangles,
    int Unknowns,
    int Order,
    double SmallestAngleDegrees,
    int NewtonSteps,
    int AdaptiveSteps,
    double AccuracyReached,
    double AccuracyAsked)
{
    /// <summary>Mesh by mesh, how the accuracy was reached.</summary>
    public IReadOnlyList<MeshRound> Rounds { get; init; } = [];

    /// <summary>Seconds spent meshing.</summary>
    public double MeshSeconds { get; init; }

    /// <summary>Seconds spent assembling and solving.</summary>
    public double SolveSeconds { get; init; }

    /// <summary>Seconds spent on beam values, errors and reports.</summary>
    public double EvaluateSeconds { get; init; }

    /// <summary>True when the asked accuracy was reached.</summary>
    public bool AccuracyMet => AccuracyReached <= AccuracyAsked;
}
