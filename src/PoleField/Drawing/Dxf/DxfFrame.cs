using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The plane an entity is drawn in, by its extrusion direction.</summary>
/// <param name="IsMirrored">True when the direction points down: x counts to the left.</param>
/// <param name="Tilt">Sine of the angle between the entity's plane and the drawing plane.</param>
internal readonly record struct DxfFrame(bool IsMirrored, double Tilt)
{
    private const double TiltRounding = 1e-6;

    /// <summary>Map from the entity's coordinates to those of the drawing (arbitrary axis rule of the format).</summary>
    public Affine ToDrawing => IsMirrored ? Affine.MirrorInZAxis : Affine.Identity;

    /// <summary>Plane of an entity.</summary>
    public static DxfFrame Of(DxfRecord record)
    {
        double x = record.Real(210, 0), y = record.Real(220, 0), z = record.Real(230, 1);
        double length = Math.Sqrt((x * x) + (y * y) + (z * z));
        return length > 0.0 ? new DxfFrame(z < 0.0, new Point(x / length, y / length).Length) : default;
    }

    /// <summary>What is wrong with the plane, or null.</summary>
    public (string What, string Text, string Fix)? Problem(DxfRecord record) => Tilt <= TiltRounding ? null : (
        "not-flat",
        FormattableString.Invariant(
            $"{record.Kind} on layer {DxfReport.Shown(record.Layer)} lies in a plane tilted by {Math.Asin(Math.Min(1, Tilt)) * 180 / Math.PI:0.####} degrees (extrusion direction {record.Real(210, 0)}, {record.Real(220, 0)}, {record.Real(230, 1)})."),
        "Draw the cross-section in the XY plane and export it again.");

    /// <summary>The curve in drawing coordinates.</summary>
    public Curve Place(Curve curve) => IsMirrored ? curve.Transformed(Affine.MirrorInZAxis) : curve;
}
