using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Tests.Output;

/// <summary>An excitation curve with numbers that are easy to check by eye; none of them comes from a solve.</summary>
internal static class SampleRamp
{
    /// <summary>Steps at 1, 2 and 3 kA of a magnet whose case has 2 kA; the onset is at 2.4 kA.</summary>
    public static RampReport Make() => new()
    {
        Start = Step(0.001, 0.0005, 0.1),
        Steps = [Step(0.5, 0.5, 100), Step(1, 0.99, 195), Step(1.5, 1.3, 250)],
        Onset = 0.02,
        OnsetFactor = 1.2,
        FirstSaturated = ("RIDGE", 1.5),
        HalfSpacing = 3e-3,
        HasOtherSources = false,
        AccuracyMet = true,
    };

    private static RampStep Step(double factor, double field, double gradient)
    {
        BeamReport report = SampleResult.Report(new BeamValues(new Point(0, 3.6e-3), 0, field, 0, gradient));
        return new RampStep
        {
            Factor = factor,
            Report = report with { Circuit = report.Circuit with { AmpereTurns = 2000 * factor, GapAmpereTurns = 1900 * factor } },
            Accuracy = 1e-5,
            NewtonSteps = 5,
            OwnMesh = false,
            ShapeFactor = 3e-3 * gradient / field,
        };
    }
}
