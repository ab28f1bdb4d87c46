using PoleField.Beam;
using PoleField.Cli.Files;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Materials;

namespace PoleField.Cli.Tests.Doubles;

/// <summary>Stand-ins for the library's steps, so that the tool can be tested apart from drawing and solver.</summary>
internal static class Steps
{
    /// <summary>A pipeline whose sketch is sound and whose solve returns <see cref="Report"/>.</summary>
    public static Pipeline Sound => new()
    {
        ReadSketch = (_, name, unit) => Sketch(name, unit),
        Cut = (_, request) => Reading(request),
        Materials = MaterialShelf.Of(Material.Air, new Material("pure-iron", new LinearLaw(5000), "Invented iron", "invented", "invented")),
        ReadMaterial = (_, name) => new Material(name, new LinearLaw(1000), "Table", "table", "as given"),
        Solve = (_, _, options, _, _) => Solved(options),
        FieldOf = _ => place => 1e-3 / (place.SquaredLength * 100),
        Page = solved => ReportOutput.PageOf(ResultOutput.FileOf(solved)),
    };

    public static Sketch Sketch(string name, LengthUnit? unit) =>
        new(name, unit ?? LengthUnit.Millimetre, unit is null ? UnitOrigin.Assumed : UnitOrigin.CaseFile, [], [], []);

    public static SectionReading Reading(SectionRequest request, params Finding[] findings)
    {
        var box = new Box(new Point(-0.01, 0), new Point(0.01, 0.02));
        Outline outline = Outline.Rectangle(box.Centre, box.Width, box.Height);
        SectionEdge[] edges = [.. outline.Curves.Select((c, i) => new SectionEdge(i, (i + 1) % 4, c, 1, 0))];
        bool sound = findings.All(f => f.Severity != Severity.Fault);
        return new SectionReading
        {
            Section = sound
                ? new CrossSection([.. outline.Curves.Select(c => c.Start)], edges, [new Region(-1, double.PositiveInfinity, box), new Region(0, 4e-4, box), new Region(1, 6e-4, box)], request.PartLayers, false)
                : null,
            Parts = [.. request.PartLayers.Select(l => new PartShape(l, 1, 4e-4, box))],
            IgnoredLayers = [("NOTES", 3)],
            Findings = findings,
        };
    }

    public static SolvedMagnet Solved(SolveOptions options) =>
        new(null!, null!, Report, new SolveRecord(1200, 5600, 3, 24.5, 18, 4, 0.5 * options.Accuracy, options.Accuracy));

    /// <summary>A report with invented numbers.</summary>
    public static BeamReport Report => new()
    {
        Beam = new BeamValues(new Point(0, 3.6e-3), 0.8, 0.0, -312.4, 1.5),
        FieldError = 0.00012,
        GradientError = 0.031,
        ApertureArea = 0.9e-6,
        Clearance = 0.35e-3,
        Field = new ApertureStatistics(0.801, 0.75, 0.85, 0.02),
        Gradient = new ApertureStatistics(-310.0, -318.0, -304.0, 0.008),
        GradientMeanError = 0.03,
        FieldTimesGradient = new ApertureStatistics(-248.3, -260.0, -230.0, 0.03),
        ProfileY = [],
        ProfileZ = [],
        Parts =
        [
            new PartReport
            {
                Layer = "RIDGE", Kind = "iron", Material = "pure-iron", Area = 4e-4, Outlines = 1, FieldMax = 1.73,
                FieldMaxAt = new Point(0, 1e-3), FieldP99 = 1.6, SaturatedShare = 0.021, MmfDrop = 120, ForcePerMetre = new Point(0, 1200),
            },
            new PartReport
            {
                Layer = "COIL", Kind = "coil", Material = "copper", Area = 6e-4, Outlines = 1, AmpereTurns = 2500, CurrentDensity = 6.94e6,
            },
        ],
        Circuit = new CircuitReport(2500, 2300, 200, 14.2, 4.5e-6) { GapPullPerMetre = 1150 },
        Findings = [],
    };
}
