using PoleField.Beam;

namespace PoleField.Output.Results;

/// <summary>Writes the files of the analyses; each format is one of <see cref="FileFormat.All"/>.</summary>
public static class AnalysisJson
{
    /// <summary>Writes an excitation curve, <c>polefield-ramp/1</c>.</summary>
    public static void Write(AnalysisHead head, RampReport ramp, Stream stream) => JsonText.Write(new RampFile(head, ramp), stream);

    /// <summary>Writes a comparison with two wires, <c>polefield-two-wire/1</c>.</summary>
    public static void Write(AnalysisHead head, TwoWireComparison comparison, Stream stream) => JsonText.Write(new TwoWireFile(head, comparison), stream);

    /// <summary>Writes a flight, <c>polefield-flight/1</c>.</summary>
    public static void Write(AnalysisHead head, FlightReport flight, Stream stream) => JsonText.Write(new FlightFile(head, flight), stream);

    /// <summary>Writes what came out of tuning, <c>polefield-tune/1</c>.</summary>
    public static void Write(AnalysisHead head, TuneOutcome outcome, Stream stream) => JsonText.Write(new TuneFile(head, outcome), stream);

    /// <summary>Writes a tolerance budget, <c>polefield-tolerance/1</c>.</summary>
    public static void Write(AnalysisHead head, ToleranceAnswer answer, Stream stream) => JsonText.Write(new ToleranceFile(head, answer), stream);
}
