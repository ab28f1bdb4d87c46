using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;

namespace PoleField.Benchmarks;

/// <summary>The model magnet of all timings: the two-wire family's default pair, 3000 ampere-turns, low-carbon steel.</summary>
internal static class ModelMagnet
{
    private const double AmpereTurns = 3000;

    public static Aperture Aperture { get; } = Aperture.Rectangle(new Point(0, 3.6e-3), 3e-3, 0.3e-3);

    public static Magnet Create()
    {
        StartingSketch start = new TwoWirePair().Draw();
        SectionReading reading = Sectioning.Read(start.Sketch, new SectionRequest
        {
            PartLayers = [.. start.Parts.Select(p => p.Layer)],
            MaterialKeys = [.. start.Parts.Select(p => p.Layer)],
        });
        Material steel = MaterialLibrary.Get("steel-1008");
        return new Magnet
        {
            Section = reading.Section ?? throw new InvalidOperationException("The family's own drawing has faults."),
            Roles = [.. start.Parts.Select(p => new PartRole(p.Layer, p.Share == 0 ? steel : Material.Air)
            {
                AmpereTurns = p.Share * AmpereTurns,
            })],
        };
    }
}
