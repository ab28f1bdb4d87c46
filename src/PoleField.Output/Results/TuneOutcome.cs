using PoleField.Beam;
using PoleField.Design;

namespace PoleField.Output.Results;

/// <summary>What came out of tuning.</summary>
/// <param name="Before">Report as drawn.</param>
/// <param name="After">Report of the tuned magnet, solved to full accuracy; null when it was stopped before that.</param>
/// <param name="Tuned">Shape and history.</param>
/// <param name="TradeOff">Gradient against uniformity, the largest gradient first; empty when it was not looked for.</param>
public sealed record TuneOutcome(BeamReport Before, BeamReport? After, TuneResult Tuned, IReadOnlyList<TradeOffPoint> TradeOff)
{
    /// <summary>|B|·G was made uniform instead of G.</summary>
    public bool OfProduct { get; init; }

    /// <summary>Rms of what was made uniform.</summary>
    public double RmsOf(BeamReport report) => OfProduct ? report.FieldTimesGradient.Rms : report.Gradient.Rms;
}

/// <summary>A shape on the way between a large and a uniform gradient.</summary>
/// <param name="LeastGradient">Gradient that had to hold, T/m.</param>
/// <param name="Report">Report of the shape, solved to full accuracy.</param>
/// <param name="Limits">What kept it from becoming better, in words.</param>
public sealed record TradeOffPoint(double LeastGradient, BeamReport Report, IReadOnlyList<string> Limits);
