using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Turns a sketch into the cross-section a case asks for.</summary>
public static class Sectioning
{
    /// <summary>
    /// Reads the parts, the rim and the beam. Never throws for what is drawn: everything healed, doubtful or wrong is in the
    /// findings, all of it at once, and a fault leaves the section out.
    /// </summary>
    /// <param name="sketch">The drawing, in its own unit.</param>
    /// <param name="request">Which layers are what.</param>
    public static SectionReading Read(Sketch sketch, SectionRequest request)
    {
        SectionLog log = new(sketch);
        UsedLayers layers = new(sketch, request);
        SectionRemarks.OnLayers(sketch, request, layers, log);
        BeamReader beam = new(layers, request, log);
        Outline? outline = beam.Read();
        PartReader parts = new(layers, request, log);
        CrossSection? section = parts.Read(out IReadOnlyList<PartShape> shapes);
        return new SectionReading
        {
            Section = log.HasFaults ? null : section,
            Beam = outline,
            Parts = shapes,
            IgnoredLayers = layers.Ignored,
            Findings = log.Findings,
        };
    }
}
