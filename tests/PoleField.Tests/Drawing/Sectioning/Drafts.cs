using PoleField.Drawing;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Drawing.Sectioning;

/// <summary>Small sketches in millimetres.</summary>
internal static class Drafts
{
    public static SketchCurve Line(string layer, double y0, double z0, double y1, double z1) =>
        new(new Line(new Point(y0, z0), new Point(y1, z1)), layer, "LINE", null, 0);

    public static SketchCurve Arc(string layer, Point centre, double radius, double fromDegrees, double sweepDegrees) =>
        new(new CircularArc(centre, radius, fromDegrees * Math.PI / 180, sweepDegrees * Math.PI / 180), layer, "ARC", null, 0);

    public static SketchCurve Circle(string layer, double y, double z, double radius) =>
        new(new CircularArc(new Point(y, z), radius, 0, Math.Tau), layer, "CIRCLE", null, 0);

    public static IEnumerable<SketchCurve> Polygon(string layer, params (double Y, double Z)[] corners) =>
        corners.Select((c, i) => Line(layer, c.Y, c.Z, corners[(i + 1) % corners.Length].Y, corners[(i + 1) % corners.Length].Z));

    public static IEnumerable<SketchCurve> Rectangle(string layer, double y0, double z0, double y1, double z1) =>
        Polygon(layer, (y0, z0), (y1, z0), (y1, z1), (y0, z1));

    public static Sketch Sketch(params IEnumerable<SketchCurve>[] curves) =>
        new("test.dxf", LengthUnit.Millimetre, UnitOrigin.InsertUnits, [.. curves.SelectMany(c => c)], [], []);

    public static SectionRequest Parts(params string[] layers) =>
        new() { PartLayers = layers, MaterialKeys = layers };

    /// <summary>Reads a sketch that must be sound and checks every promise of the section.</summary>
    public static CrossSection Sound(Sketch sketch, SectionRequest request)
    {
        SectionReading reading = PoleField.Drawing.Sectioning.Read(sketch, request);
        Assert.DoesNotContain(reading.Findings, f => f.Severity == Severity.Fault);
        Assert.NotNull(reading.Section);
        Assert.Empty(CrossSectionCheck.Faults(reading.Section));
        return reading.Section;
    }

    /// <summary>Areas of the regions of a part, mm², largest first.</summary>
    public static double[] Areas(CrossSection section, string part) =>
        [.. section.Regions.Where(r => r.Part >= 0 && section.Parts[r.Part] == part).Select(r => r.Area * 1e6).OrderDescending()];

    public static string[] Faults(SectionReading reading) =>
        [.. reading.Findings.Where(f => f.Severity == Severity.Fault).Select(f => f.What)];
}
