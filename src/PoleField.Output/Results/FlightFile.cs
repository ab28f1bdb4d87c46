using System.ComponentModel;
using System.Text.Json.Serialization;
using PoleField.Beam;
using static PoleField.Output.Results.JsonText;

namespace PoleField.Output.Results;

internal sealed class FlightFile(AnalysisHead head, FlightReport flight) : AnalysisFile(Name, head)
{
    public const string Name = "polefield-flight/1";

    [JsonPropertyName("flight"), Description("The beam and what becomes of it. Heights count from the beam's centre.")]
    public FlightSection Flight { get; } = new(flight);
}

internal sealed class FlightSection(FlightReport f)
{
    [JsonPropertyName("species"), Description("Name of the particles.")]
    public string Species { get; } = f.Setup.Species.Name;

    [JsonPropertyName("mass_u"), Description("Mass, unified atomic mass units.")]
    public double? Mass { get; } = Finite(f.Setup.Species.Mass / PhysicalConstants.AtomicMass);

    [JsonPropertyName("moment_muB"), Description("Effective moment at the beam's field of the state that speaks for the beam, Bohr magnetons; positive towards stronger field.")]
    public double? Moment { get; } = Magnetons(f.Strongest.Moment);

    [JsonPropertyName("lever_m2"), Description("L (L/2 + D).")]
    public double? Lever { get; } = Finite(f.Setup.Lever);

    [JsonPropertyName("speed_m_per_s"), Description("Speeds of the flux.")]
    public SpeedSection Speed { get; } = new(f.Setup.Speeds);

    [JsonPropertyName("deflection_mm"), Description("Deflection of that state's central particle.")]
    public DeflectionSection Deflection { get; } = new(f.Strongest);

    [JsonPropertyName("splitting_mm"), Description("Distance of the peaks of what is pulled and what is pushed; null when there is only one.")]
    public double? Splitting { get; } = Millimetres(f.Splitting);

    [JsonPropertyName("states"), Description("Central particle of each state.")]
    public IReadOnlyList<StateSection> States { get; } = [.. f.States.Select(s => new StateSection(s))];

    [JsonPropertyName("pattern"), Description("Intensity along z at the detector, summed over y.")]
    public IReadOnlyList<PatternSection> Pattern { get; } = [.. f.Pattern.Select(p => new PatternSection(p))];

    [JsonPropertyName("clipped_share"), Description("Share of the beam that leaves the room inside the magnet.")]
    public double? ClippedShare { get; } = Finite(f.ClippedShare);

    [JsonPropertyName("room_mm"), Description("Lower left and upper right corner of the rectangle in which particles are followed: [[y, z], [y, z]].")]
    public IReadOnlyList<IReadOnlyList<double>?> Room { get; } = [Pair(f.RoomFrom, 1e3), Pair(f.RoomTo, 1e3)];

    [JsonPropertyName("doubts"), Description("What the numbers do not hold.")]
    public IReadOnlyList<string> Doubts { get; } = [.. f.Findings.Select(x => $"{x.Text} {x.Fix}")];

    public static double? Magnetons(double moment) => Finite(moment / PhysicalConstants.BohrMagneton);
}

internal sealed class SpeedSection(SpeedDistribution speeds)
{
    [JsonPropertyName("most_probable"), Description("Most probable speed.")]
    public double? MostProbable { get; } = Finite(speeds.MostProbable);

    [JsonPropertyName("mean"), Description("Mean speed.")]
    public double? Mean { get; } = Finite(speeds.Mean);
}

internal sealed class DeflectionSection(StateDeflection s)
{
    [JsonPropertyName("most_probable"), Description("At the most probable speed; null when the particle is lost.")]
    public double? MostProbable { get; } = Millimetres(s.AtMostProbable);

    [JsonPropertyName("mean_speed"), Description("At the mean speed; null when the particle is lost.")]
    public double? MeanSpeed { get; } = Millimetres(s.AtMean);
}

internal sealed class StateSection(StateDeflection s)
{
    [JsonPropertyName("name"), Description("Name of the state.")]
    public string Name { get; } = s.Name;

    [JsonPropertyName("share"), Description("Share of the beam.")]
    public double Share { get; } = s.Share;

    [JsonPropertyName("moment_muB"), Description("Effective moment at the beam's field, Bohr magnetons.")]
    public double? Moment { get; } = FlightSection.Magnetons(s.Moment);

    [JsonPropertyName("deflection_mm"), Description("Deflection.")]
    public DeflectionSection Deflection { get; } = new(s);
}

internal sealed class PatternSection(PatternPoint p)
{
    [JsonPropertyName("z_mm"), Description("Height above the beam's centre.")]
    public double? Z { get; } = Millimetres(p.Z);

    [JsonPropertyName("intensity"), Description("Share of the beam per mm.")]
    public double? Intensity { get; } = Finite(1e-3 * p.Intensity);

    [JsonPropertyName("without_field"), Description("The same with the magnet off.")]
    public double? WithoutField { get; } = Finite(1e-3 * p.WithoutField);
}
