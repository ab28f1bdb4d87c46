using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Copies of blocks from INSERT.</summary>
internal static class DxfInserts
{
    /// <summary>The copies an INSERT asks for.</summary>
    public static DxfInsert Make(DxfRecord record)
    {
        DxfFrame frame = DxfFrame.Of(record);
        Point at = record.RequiredPoint(10);
        double degrees = record.Real(50, 0) % 360.0;
        (double s, double c) = double.SinCosPi(degrees / 180.0);
        double scaleX = record.Real(41, 1), scaleY = record.Real(42, 1);
        var placed = new Affine(c * scaleX, -s * scaleY, s * scaleX, c * scaleY, at.Y, at.Z);

        // Spacing turns with the block and is not scaled; counts of 0 mean 1.
        double columnStep = record.Real(44, 0), rowStep = record.Real(45, 0);
        Point Shift(Point step) => frame.ToDrawing.ApplyToDisplacement(step);
        return new DxfInsert(
            record.Place,
            record.Name ?? string.Empty,
            frame.ToDrawing.After(placed),
            (Math.Max(1, record.Integer(70)), Shift(new Point(c * columnStep, s * columnStep))),
            (Math.Max(1, record.Integer(71)), Shift(new Point(-s * rowStep, c * rowStep))))
        {
            LineType = record.LineType,
            IsInvisible = record.IsInvisible,
            IsOnPaper = record.IsOnPaper,
            Problem = frame.Problem(record) ?? Collapse(record, scaleX, scaleY),
        };
    }

    private static (string What, string Text, string Fix)? Collapse(DxfRecord record, double scaleX, double scaleY) =>
        scaleX != 0.0 && scaleY != 0.0 ? null : (
            "block-scale",
            FormattableString.Invariant(
                $"INSERT of block {DxfReport.Shown(record.Name ?? string.Empty)} on layer {DxfReport.Shown(record.Layer)} has the scale {scaleX} by {scaleY}; zero flattens it to nothing."),
            "Give it a scale, or delete it.");
}
