using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

/// <summary>A sketch in millimetres under construction, and the magnet made of it.</summary>
internal sealed class Drawn
{
    private readonly List<SketchCurve> _curves = [];
    private readonly List<PartRole> _roles = [];

    public Drawn Circle(string layer, double y, double z, double radius)
    {
        Add(layer, new CircularArc(new Point(y, z), radius, 0, Math.Tau));
        return this;
    }

    public Drawn Rectangle(string layer, double y, double z, double width, double height)
    {
        foreach (Curve c in Outline.Rectangle(new Point(y, z), width, height).Curves)
        {
            Add(layer, c);
        }

        return this;
    }

    public Drawn Closed(string layer, params Curve[] curves)
    {
        foreach (Curve c in curves)
        {
            Add(layer, c);
        }

        return this;
    }

    public Drawn Part(string layer, Material material, double ampereTurns = 0)
    {
        _roles.Add(new PartRole(layer, material) { AmpereTurns = ampereTurns });
        return this;
    }

    public Drawn Linear(string layer, double permeability) =>
        Part(layer, new Material("linear", new LinearLaw(permeability), "linear", "test", "exact"));

    /// <summary>A permanent magnet of recoil permeability 1.</summary>
    public Drawn Remanent(string layer, Point remanence)
    {
        _roles.Add(new PartRole(layer, Material.Air) { Remanence = remanence });
        return this;
    }

    /// <summary>Closed polygon through corners in millimetres.</summary>
    public Drawn Polygon(string layer, params Point[] corners) =>
        Closed(layer, [.. corners.Select((c, i) => new Line(c, corners[(i + 1) % corners.Length]))]);

    public Sketch Sketch() => new("test.dxf", LengthUnit.Millimetre, UnitOrigin.InsertUnits, _curves, [], []);

    public Magnet Magnet(Point appliedField = default, string? rim = null, bool mirror = false) =>
        MagnetOf(Sketch(), appliedField, rim, mirror);

    public Magnet MagnetOf(Sketch sketch, Point appliedField = default, string? rim = null, bool mirror = false)
    {
        SectionReading reading = Sectioning.Read(sketch, new SectionRequest
        {
            PartLayers = [.. _roles.Select(r => r.Layer)],
            MaterialKeys = [.. _roles.Select(r => r.Layer + r.Material.Name)],
            RimLayer = rim,
            MirrorLeftRight = mirror,
        });
        Assert.True(reading.IsSound, string.Join("\n", reading.Findings.Select(f => f.Text)));
        return new Magnet { Section = reading.Section!, Roles = _roles, AppliedField = appliedField };
    }

    /// <summary>Aperture in millimetres.</summary>
    public static Aperture Beam(double y, double z, double width, double height) =>
        Aperture.Rectangle(new Point(y / 1000, z / 1000), width / 1000, height / 1000);

    private void Add(string layer, Curve curve) => _curves.Add(new SketchCurve(curve, layer, "TEST", null, 0));
}
