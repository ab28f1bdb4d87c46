using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Output.Results;

namespace PoleField.Tests.Output;

/// <summary>A result with numbers that are easy to check by eye; none of them comes from a solve.</summary>
internal static class SampleResult
{
    public static SolveResult Make()
    {
        BeamValues beam = new(new Point(0, 3.6e-3), 0.0, 1.25, -300.5, -310.25);
        return new SolveResult
        {
            Title = "Ridge and groove <µ & \"quotes\">",
            CaseSha256 = new string('a', 64),
            SketchSha256 = new string('0', 64),
            ProgramVersion = "0.1.0",
            Report = Report(beam),
            Record = new SolveRecord(1200, 5431, 3, 26.5, 7, 3, 4e-5, 1e-4),
            Seconds = new RunSeconds(0.1, 0.2, 0.75, 0.05, 1.125),
            PeakMemoryMB = 96.5,
            Requirements =
            [
                new RequirementResult("gradient_min", "T/m", 300, 310.25, true),
                new RequirementResult("spread_max", "1", 0.02, double.NaN, false),
            ],
            Cautions = ["A plane model knows nothing of the field at the magnet's ends."],
            Warnings = [new ResultWarning("RIDGE", "The iron is saturated at the tip.")],
        };
    }

    public static BeamReport Report(BeamValues beam) => new()
    {
        Beam = beam,
        FieldError = 2e-6,
        GradientError = 1.5e-3,
        ApertureArea = 0.9e-6,
        Clearance = 0.45e-3,
        Field = new ApertureStatistics(1.25, 1.2, 1.3, 0.0125),
        Gradient = new ApertureStatistics(-310, -316.2, -303.8, 0.008),
        GradientMeanError = 2e-3,
        FieldTimesGradient = new ApertureStatistics(-387.5, -400, -375, 0.02),
        ProfileY = [beam with { At = new Point(-1.5e-3, 3.6e-3) }, beam, beam with { At = new Point(1.5e-3, 3.6e-3) }],
        ProfileZ = [beam with { At = new Point(0, 3.45e-3) }, beam],
        Parts =
        [
            new PartReport
            {
                Layer = "RIDGE",
                Kind = "iron",
                Material = "pure-iron",
                Area = 12.5e-6,
                Outlines = 1,
                FieldMax = 1.9,
                FieldMaxAt = new Point(0.5e-3, 2.75e-3),
                FieldP99 = 1.75,
                SaturatedShare = 0.04,
                MmfDrop = 55,
                ForcePerMetre = new Point(0, 1250),
            },
            new PartReport
            {
                Layer = "COIL LEFT",
                Kind = "coil",
                Material = "copper",
                Area = 100e-6,
                Outlines = 1,
                AmpereTurns = 2500,
                CurrentDensity = 41.5e6,
            },
        ],
        Circuit = new CircuitReport(2500, 2400, 100, 12.5, 4e-6),
        Findings = [],
    };
}
