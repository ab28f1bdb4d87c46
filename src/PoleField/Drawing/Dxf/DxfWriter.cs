using System.Globalization;
using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Writes sketches as DXF R2000 (AC1015) text.</summary>
/// <remarks>
/// <para>Lines become LINE, arcs ARC, whole circles CIRCLE, elliptic arcs ELLIPSE and splines SPLINE, on their layers and
/// in the sketch's unit. Arcs so shallow that their angles would lose digits become an LWPOLYLINE of one bulged piece; arcs
/// that lack less than 2e-9 radians to a full turn become circles.</para>
/// <para>An ARC runs counter-clockwise by definition: arcs travelled clockwise, and all circles, come back travelled
/// counter-clockwise. Coordinates are written with all digits; angles are rounded to 1e-12 degrees so that reading and
/// writing again gives the same bytes.</para>
/// </remarks>
public static class DxfWriter
{
    // Angles are kept above the rounding of degrees to radians and back: 360 degrees have a spacing of 6e-14.
    private const int DegreeDecimals = 12;
    private const int RadianDecimals = 14;

    // Below this sweep, radians, two angles say less than a bulge.
    private const double ShallowSweep = 0.01;

    // What lacks less than this to a full turn, radians, is read as a whole circle.
    private const double NearlyWhole = 2e-9;

    /// <summary>Writes a sketch.</summary>
    /// <param name="sketch">What to write; layers and curves count, the origin of each curve does not.</param>
    /// <param name="stream">Where to; left open.</param>
    /// <exception cref="ArgumentException">The unit has no code in the format, or a layer's name has control characters.</exception>
    public static void Write(Sketch sketch, Stream stream)
    {
        int unit = DxfUnits.CodeOf(sketch.Unit);
        if (unit == 0)
        {
            throw new ArgumentException($"The format has no code for the unit \"{sketch.Unit.Name}\"; use mm, cm, m, um or in.", nameof(sketch));
        }

        string[] layers = [.. sketch.Curves.Select(c => c.Layer).Append("0").Distinct(StringComparer.OrdinalIgnoreCase).Order(StringComparer.Ordinal)];
        if (layers.FirstOrDefault(l => l.Length == 0 || l.Any(char.IsControl)) is { } bad)
        {
            throw new ArgumentException($"The layer name \"{DxfReport.Shown(bad)}\" is empty or has control characters.", nameof(sketch));
        }

        using var pairs = new DxfPairWriter(stream);
        var frame = new DxfSkeleton(pairs, layers, unit);
        frame.WriteBefore(sketch.Curves.Count);
        int handle = frame.FirstEntityHandle;
        foreach (SketchCurve curve in sketch.Curves)
        {
            Write(pairs, curve, handle++);
        }

        frame.WriteAfter();
    }

    private static void Write(DxfPairWriter pairs, SketchCurve drawn, int handle)
    {
        var head = new EntityHead(pairs, handle, drawn.Layer);
        switch (drawn.Curve)
        {
            case Line line:
                head.Write("LINE", "AcDbLine").Place(10, line.Start).Place(11, line.End);
                break;
            case CircularArc circle when Math.Tau - Math.Abs(circle.Sweep) < NearlyWhole:
                head.Write("CIRCLE", "AcDbCircle").Place(10, circle.Centre).Real(40, circle.Radius);
                break;
            case CircularArc arc when Math.Abs(arc.Sweep) < ShallowSweep:
                Bulged(head, arc);
                break;
            case CircularArc arc:
                Arc(head, arc);
                break;
            case EllipticArc arc when Ratio(arc) == 1.0:
                // It is read as part of a circle, so it is written as one.
                double start = Math.Atan2(arc.Major.Z, arc.Major.Y) + arc.StartAngle;
                Write(pairs, drawn with { Curve = new CircularArc(arc.Centre, arc.Major.Length, start, arc.Sweep) }, handle);
                break;
            case EllipticArc arc:
                Ellipse(head, arc);
                break;
            case Nurbs spline:
                Spline(head, spline);
                break;
            default:
                throw new ArgumentException($"A {drawn.Curve.GetType().Name} cannot be written.", nameof(drawn));
        }
    }

    private static void Arc(EntityHead head, CircularArc arc)
    {
        double from = arc.Sweep > 0 ? arc.StartAngle : arc.StartAngle + arc.Sweep;
        head.Write("ARC", "AcDbCircle").Place(10, arc.Centre).Real(40, arc.Radius).Text(100, "AcDbArc")
            .Real(50, Degrees(from)).Real(51, Degrees(from + Math.Abs(arc.Sweep)));
    }

    private static void Bulged(EntityHead head, CircularArc arc) =>
        head.Write("LWPOLYLINE", "AcDbPolyline").Whole(90, 2).Whole(70, 0)
            .Flat(10, arc.Start).Real(42, Digits(Math.Tan(0.25 * arc.Sweep)))
            .Flat(10, arc.End);

    private static void Ellipse(EntityHead head, EllipticArc arc)
    {
        // The format wants the longer half axis first.
        bool swapped = arc.MinorLength > arc.Major.Length;
        Point major = swapped ? arc.Minor : arc.Major;
        double angle = swapped ? arc.StartAngle - (Math.PI / 2) : arc.StartAngle;
        double from = Math.Round(Turned(arc.Sweep > 0 ? angle : angle + arc.Sweep, Math.Tau), RadianDecimals);
        from = from >= Math.Tau ? 0 : from;
        double to = Math.Round(from + Math.Abs(arc.Sweep), RadianDecimals);
        head.Write("ELLIPSE", "AcDbEllipse").Place(10, arc.Centre).Place(11, major)
            .Real(210, 0).Real(220, 0).Real(230, 1)
            .Real(40, Ratio(arc)).Real(41, from).Real(42, to);
    }

    private static double Ratio(EllipticArc arc) => Digits(
        Math.Min(arc.MinorLength, arc.Major.Length) / Math.Max(arc.MinorLength, arc.Major.Length));

    private static void Spline(EntityHead head, Nurbs spline)
    {
        const int planar = 8, rational = 4;
        DxfPairWriter pairs = head.Write("SPLINE", "AcDbSpline")
            .Real(210, 0).Real(220, 0).Real(230, 1)
            .Whole(70, spline.IsRational ? planar | rational : planar)
            .Whole(71, spline.Degree).Whole(72, spline.Knots.Count).Whole(73, spline.Controls.Count).Whole(74, 0)
            .Real(42, 1e-9).Real(43, 1e-9);
        foreach (double knot in spline.Knots)
        {
            pairs.Real(40, knot);
        }

        if (spline.IsRational)
        {
            foreach (double weight in spline.Weights)
            {
                pairs.Real(41, weight);
            }
        }

        foreach (Point control in spline.Controls)
        {
            pairs.Place(10, control);
        }
    }

    private static double Degrees(double angle)
    {
        double degrees = Math.Round(Turned(angle * (180 / Math.PI), 360), DegreeDecimals);
        return degrees >= 360 ? 0 : degrees;
    }

    private static double Turned(double angle, double full)
    {
        double rest = angle % full;
        return rest < 0 ? rest + full : rest;
    }

    // Fifteen digits survive being computed forth and back.
    private static double Digits(double value) => double.Parse(
        value.ToString("E14", CultureInfo.InvariantCulture), NumberStyles.Float, CultureInfo.InvariantCulture);

    private readonly record struct EntityHead(DxfPairWriter Pairs, int Handle, string Layer)
    {
        public DxfPairWriter Write(string kind, string subclass) => Pairs
            .Text(0, kind).Handle(5, Handle).Handle(330, DxfSkeleton.ModelSpace)
            .Text(100, "AcDbEntity").Text(8, Layer).Text(100, subclass);
    }
}
