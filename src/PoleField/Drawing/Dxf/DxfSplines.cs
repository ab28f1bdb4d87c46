using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Curves of SPLINE: over [knot(degree), knot(n)] by control points, or through fit points when it has no others.</summary>
internal static class DxfSplines
{
    private const long Closed = 1;

    /// <summary>The shape of a SPLINE.</summary>
    /// <exception cref="ArgumentException">The numbers do not fit together.</exception>
    public static DxfShape Make(DxfRecord record, DxfLimits limits)
    {
        Point[] controls = Points(record, 10, limits);
        Point[] fit = Points(record, 11, limits);
        DxfShape shape = DxfShapes.With(record, []);
        (double low, double high) = Heights(record);
        Box box = Box.Around([.. controls, .. fit]);
        if (DxfShapes.Differ(low, high, box.IsEmpty ? 0 : box.Diagonal))
        {
            return shape with { Problem = DxfShapes.Climbs(record, low, high) };
        }

        shape = shape with { Height = low };
        return controls.Length > 0 ? ByControls(record, shape, controls) : ByFit(record, shape, fit);
    }

    private static DxfShape ByControls(DxfRecord record, DxfShape shape, Point[] controls)
    {
        double degree = record.Real(71, double.NaN);
        if (!(degree >= 1) || !(degree <= Nurbs.HighestDegree))
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"its degree is {(double.IsNaN(degree) ? "missing" : degree)}; 1 to {Nurbs.HighestDegree} is allowed"));
        }

        double[] weights = Values(record, 41);
        IReadOnlyList<Curve> pieces = Nurbs.SmoothPieces(
            (int)degree, Values(record, 40), controls, weights.Length == 0 ? null : weights);
        return shape with { Curves = pieces, Dropped = pieces.Count == 0 ? 1 : 0 };
    }

    private static DxfShape ByFit(DxfRecord record, DxfShape shape, Point[] fit)
    {
        var points = new List<Point>();
        foreach (Point p in fit)
        {
            if (points.Count == 0 || points[^1] != p)
            {
                points.Add(p);
            }
        }

        if (points.Count < 2)
        {
            return shape with { Dropped = 1 };
        }

        bool isClosed = (record.Integer(70) & Closed) != 0 && points.Distinct().Count() > 2;
        Curve curve = isClosed
            ? NurbsInterpolation.ThroughClosed(points)
            : NurbsInterpolation.Through(points, Tangent(record, 12), Tangent(record, 13));
        return shape with { Curves = [curve], IsFitted = true };
    }

    private static Point? Tangent(DxfRecord record, int code)
    {
        var tangent = new Point(record.Real(code, 0), record.Real(code + 10, 0));
        return tangent == default ? null : tangent;
    }

    private static Point[] Points(DxfRecord record, int code, DxfLimits limits)
    {
        double[] ys = Values(record, code);
        double[] zs = Values(record, code + 10);
        if (ys.Length != zs.Length)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"it has {ys.Length} x and {zs.Length} y of {(code == 10 ? "control" : "fit")} points; the entity is damaged"));
        }

        if (ys.Length > limits.SplinePoints)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"it has {ys.Length} points; the limit is {limits.SplinePoints}"));
        }

        return [.. ys.Select((y, i) => new Point(y, zs[i]))];
    }

    private static (double Low, double High) Heights(DxfRecord record)
    {
        double[] heights = [.. Values(record, 30), .. Values(record, 31)];
        return heights.Length == 0 ? (0, 0) : (heights.Min(), heights.Max());
    }

    private static double[] Values(DxfRecord record, int code) =>
        [.. record.Numbers.Where(n => n.Code == code).Select(n => n.Value)];
}
