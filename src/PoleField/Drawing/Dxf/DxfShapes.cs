using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Curves of LINE, ARC, CIRCLE, ELLIPSE, LWPOLYLINE and SPLINE.</summary>
/// <remarks>
/// ARC, CIRCLE and LWPOLYLINE are given in coordinates of the object, whose x axis turns round when the extrusion
/// direction is (0, 0, −1); LINE, ELLIPSE and SPLINE are given in those of the drawing.
/// </remarks>
internal static class DxfShapes
{
    // A full turn that was rounded when it was written, radians; far below any join tolerance.
    private const double FullTurnRounding = 1e-9;

    /// <summary>The shape of an entity.</summary>
    public static DxfShape Make(DxfRecord record, DxfLimits limits)
    {
        DxfFrame frame = DxfFrame.Of(record);
        if (record.Kind is not "LINE" && frame.Problem(record) is { } tilted)
        {
            return With(record, []) with { Problem = tilted };
        }

        try
        {
            DxfShape shape = record.Kind switch
            {
                "LINE" => Line(record),
                "ARC" => Arc(record, frame),
                "CIRCLE" => Circle(record, frame),
                "ELLIPSE" => Ellipse(record, frame),
                "LWPOLYLINE" => DxfPolyline.Light(record, frame),
                _ => DxfSplines.Make(record, limits),
            };
            return frame.IsMirrored && shape.Height != 0.0 ? shape with { Height = -shape.Height } : shape;
        }
        catch (ArgumentException e)
        {
            return With(record, []) with
            {
                Problem = record.IsIncomplete ? null : ("bad-curve", $"{record.Kind} on layer {DxfReport.Shown(record.Layer)}: {e.Message.TrimEnd('.')}.", "Draw it anew."),
            };
        }
    }

    /// <summary>A shape of an entity with its layer, marks and place.</summary>
    public static DxfShape With(DxfRecord record, IReadOnlyList<Curve> curves, double height = 0) => new(record.Kind, record.Place, curves)
    {
        Height = height,
        LineType = record.LineType,
        IsInvisible = record.IsInvisible,
        IsOnPaper = record.IsOnPaper,
    };

    /// <summary>The problem of an entity that climbs from one height to another.</summary>
    public static (string What, string Text, string Fix) Climbs(DxfRecord record, double low, double high) => (
        "not-flat",
        FormattableString.Invariant(
            $"{record.Kind} on layer {DxfReport.Shown(record.Layer)} is not parallel to the drawing plane: its z runs from {low} to {high}."),
        "Flatten the drawing to z = 0 and export it again.");

    /// <summary>True when two heights of an entity of the given size differ by more than rounding.</summary>
    public static bool Differ(double low, double high, double size)
    {
        const double relative = 1e-6, absolute = 1e-9;
        return Math.Abs(high - low) > (relative * size) + absolute;
    }

    private static DxfShape Line(DxfRecord record)
    {
        Point start = record.RequiredPoint(10);
        Point end = record.RequiredPoint(11);
        double low = record.Real(30, 0), high = record.Real(31, 0);
        if (Differ(low, high, start.DistanceTo(end)))
        {
            return With(record, []) with { Problem = Climbs(record, low, high) };
        }

        return start == end ? Dropped(record) : With(record, [new Line(start, end)], low);
    }

    private static DxfShape Circle(DxfRecord record, DxfFrame frame)
    {
        Point centre = record.RequiredPoint(10);
        double radius = RequiredPositive(record, 40);
        return radius == 0.0
            ? Dropped(record)
            : With(record, [frame.Place(new CircularArc(centre, radius, 0, Math.Tau))], record.Real(30, 0));
    }

    private static DxfShape Arc(DxfRecord record, DxfFrame frame)
    {
        Point centre = record.RequiredPoint(10);
        double radius = RequiredPositive(record, 40);
        double from = record.Required(50) % 360.0;
        double to = record.Required(51);
        double turn = to - record.Real(50, 0);
        if (radius == 0.0 || turn == 0.0)
        {
            return Dropped(record);
        }

        double sweep = FullTurn(turn * (Math.PI / 180)) ? Math.Tau : Positive(turn, 360) * (Math.PI / 180);
        Point start = OnCircle(centre, radius, from);
        Point end = sweep == Math.Tau ? start : OnCircle(centre, radius, to);
        var arc = new CircularArc(centre, radius, from * (Math.PI / 180), sweep, start, end);
        return With(record, [frame.Place(arc)], record.Real(30, 0));
    }

    private static DxfShape Ellipse(DxfRecord record, DxfFrame frame)
    {
        Point centre = record.RequiredPoint(10);
        Point major = record.RequiredPoint(11);
        double ratio = RequiredPositive(record, 40);
        double from = record.Real(41, 0);
        double turn = record.Real(42, Math.Tau) - from;
        if (Differ(0, record.Real(31, 0), major.Length))
        {
            return With(record, []) with { Problem = Climbs(record, 0, record.Real(31, 0)) };
        }

        if (major == default || turn == 0.0)
        {
            return Dropped(record);
        }

        // Seen from below, the parameter runs clockwise.
        double sense = frame.IsMirrored ? -1 : 1;
        double sweep = sense * (FullTurn(turn) ? Math.Tau : Positive(turn, Math.Tau));
        Curve curve = ratio == 1.0
            ? new CircularArc(centre, major.Length, Math.Atan2(major.Z, major.Y) + (sense * from), sweep)
            : new EllipticArc(centre, major, ratio * major.Length, sense * from, sweep);

        // Centres of ellipses are given in drawing coordinates already, heights too.
        return With(record, [curve], sense * record.Real(30, 0));
    }

    // Zero passes: it is a piece without length, or flat.
    private static double RequiredPositive(DxfRecord record, int code)
    {
        double value = record.Required(code);
        return value < 0.0
            ? throw new ArgumentException(FormattableString.Invariant($"its {DxfWords.Meaning(record.Kind, code)} is {value}; it must be positive"))
            : value;
    }

    private static DxfShape Dropped(DxfRecord record) => With(record, []) with { Dropped = 1 };

    private static bool FullTurn(double turn) =>
        turn != 0.0 && Math.Abs(Math.IEEERemainder(turn, Math.Tau)) < FullTurnRounding && Math.Abs(turn) > 1.0;

    private static double Positive(double turn, double full)
    {
        double rest = turn % full;
        return rest > 0.0 ? rest : rest + full;
    }

    private static Point OnCircle(Point centre, double radius, double degrees)
    {
        // Exact at the quarters, where most arcs end.
        (double s, double c) = double.SinCosPi(degrees % 360.0 / 180.0);
        return centre + new Point(radius * c, radius * s);
    }
}
