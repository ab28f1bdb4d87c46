using System.Text.Json.Serialization;
using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>Writes <c>polefield-flight/1</c>: deflection and pattern at the detector. Lengths in mm, else SI.</summary>
public static class FlightJson
{
    /// <summary>Name and version of the format.</summary>
    public const string Format = "polefield-flight/1";

    /// <summary>Writes a flight.</summary>
    public static void Write(AnalysisHead head, FlightReport flight, Stream stream) => AnalysisJson.Write(
        new FlightFile(
            Format,
            head.Title,
            head.CaseSha256,
            head.SketchSha256,
            head.ProgramVersion,
            ResultJson.Beam(head.Report),
            Section(flight)),
        stream);

    private static FlightSection Section(FlightReport f)
    {
        FlightSetup setup = f.Setup;
        StateDeflection strongest = f.Strongest;
        return new FlightSection(
            setup.Species.Name,
            ResultJson.Finite(setup.Species.Mass / PhysicalConstants.AtomicMass),
            Magnetons(strongest.Moment),
            ResultJson.Finite(setup.Lever),
            new Speeds(ResultJson.Finite(setup.Speeds.MostProbable), ResultJson.Finite(setup.Speeds.Mean)),
            Deflection(strongest),
            Height(f.Splitting),
            [.. f.States.Select(s => new StateSection(s.Name, s.Share, Magnetons(s.Moment), Deflection(s)))],
            [.. f.Pattern.Select(p => new PatternSection(
                ResultJson.Millimetres(p.Z), ResultJson.Finite(1e-3 * p.Intensity), ResultJson.Finite(1e-3 * p.WithoutField)))],
            ResultJson.Finite(f.ClippedShare),
            [ResultJson.Pair(1e3 * f.RoomFrom), ResultJson.Pair(1e3 * f.RoomTo)]);
    }

    private static double? Magnetons(double moment) => ResultJson.Finite(moment / PhysicalConstants.BohrMagneton);

    private static DeflectionSection Deflection(StateDeflection s) => new(Height(s.AtMostProbable), Height(s.AtMean));

    private static double? Height(double? metres) => metres is { } z ? ResultJson.Millimetres(z) : null;

    private sealed record FlightFile(
        [property: JsonPropertyName("format")] string Format,
        [property: JsonPropertyName("title")] string Title,
        [property: JsonPropertyName("case_sha256")] string CaseSha256,
        [property: JsonPropertyName("sketch_sha256")] string SketchSha256,
        [property: JsonPropertyName("program_version")] string ProgramVersion,
        [property: JsonPropertyName("beam")] BeamSection Beam,
        [property: JsonPropertyName("flight")] FlightSection Flight);

    // Deflections and the pattern's heights count from the beam's centre; intensity is the share of the beam per mm.
    private sealed record FlightSection(
        [property: JsonPropertyName("species")] string Species,
        [property: JsonPropertyName("mass_u")] double? Mass,
        [property: JsonPropertyName("moment_muB")] double? Moment,
        [property: JsonPropertyName("lever_m2")] double? Lever,
        [property: JsonPropertyName("speed_m_per_s")] Speeds Speed,
        [property: JsonPropertyName("deflection_mm")] DeflectionSection Deflection,
        [property: JsonPropertyName("splitting_mm")] double? Splitting,
        [property: JsonPropertyName("states")] IReadOnlyList<StateSection> States,
        [property: JsonPropertyName("pattern")] IReadOnlyList<PatternSection> Pattern,
        [property: JsonPropertyName("clipped_share")] double? ClippedShare,
        [property: JsonPropertyName("room_mm")] IReadOnlyList<IReadOnlyList<double>?> Room);

    private sealed record Speeds(
        [property: JsonPropertyName("most_probable")] double? MostProbable, [property: JsonPropertyName("mean")] double? Mean);

    private sealed record DeflectionSection(
        [property: JsonPropertyName("most_probable")] double? MostProbable, [property: JsonPropertyName("mean_speed")] double? MeanSpeed);

    private sealed record StateSection(
        [property: JsonPropertyName("name")] string Name,
        [property: JsonPropertyName("share")] double Share,
        [property: JsonPropertyName("moment_muB")] double? Moment,
        [property: JsonPropertyName("deflection_mm")] DeflectionSection Deflection);

    private sealed record PatternSection(
        [property: JsonPropertyName("z_mm")] double? Z,
        [property: JsonPropertyName("intensity")] double? Intensity,
        [property: JsonPropertyName("without_field")] double? WithoutField);
}
