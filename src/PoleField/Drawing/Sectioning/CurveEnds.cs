using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Moves the ends of curves by distances far below their size.</summary>
internal static class CurveEnds
{
    // Relative size of a move that is rounding and needs no new shape.
    private const double Rounding = 1e-12;

    /// <summary>The curve with new ends: lines turn, arcs keep their radius, others are turned and stretched as a whole.</summary>
    public static Curve Move(Curve curve, Point start, Point end)
    {
        if (curve.Start == start && curve.End == end)
        {
            return curve;
        }

        if (curve is Line)
        {
            return new Line(start, end);
        }

        double move = Math.Max(curve.Start.DistanceTo(start), curve.End.DistanceTo(end));
        if (move > Rounding * (curve.Length + start.Length))
        {
            curve = curve is CircularArc arc ? Bend(arc, start, end) : Stretch(curve, start, end);
        }

        return Pin(curve, start, end);
    }

    /// <summary>The curve in metres. Divides where the unit is a whole fraction of a metre, so that 4.5 mm is the double nearest 0.0045.</summary>
    public static Curve ToMetres(Curve curve, double metres)
    {
        if (metres == 1.0)
        {
            return curve;
        }

        double perMetre = Math.Round(1 / metres);
        bool divides = perMetre >= 1 && Math.Abs((perMetre * metres) - 1) < 1e-15;
        double Scaled(double x) => divides ? x / perMetre : x * metres;
        Point start = new(Scaled(curve.Start.Y), Scaled(curve.Start.Z));
        Point end = new(Scaled(curve.End.Y), Scaled(curve.End.Z));
        return curve switch
        {
            Line => new Line(start, end),
            CircularArc a => new CircularArc(
                new Point(Scaled(a.Centre.Y), Scaled(a.Centre.Z)), Scaled(a.Radius), a.StartAngle, a.Sweep, start, end),
            _ => Pin(curve.Transformed(Affine.Scaling(divides ? 1 / perMetre : metres)), start, end),
        };
    }

    /// <summary>The mirror image in the z axis; its ends are the exact images of the ends.</summary>
    public static Curve Mirrored(Curve curve) => curve switch
    {
        Line l => new Line(Mirrored(l.Start), Mirrored(l.End)),
        CircularArc a => new CircularArc(
            Mirrored(a.Centre), a.Radius, Math.PI - a.StartAngle, -a.Sweep, Mirrored(a.Start), Mirrored(a.End)),
        _ => Pin(curve.Transformed(Affine.MirrorInZAxis), Mirrored(curve.Start), Mirrored(curve.End)),
    };

    /// <summary>The mirror image in the z axis. Zero stays plain zero.</summary>
    public static Point Mirrored(Point p) => new(0 - p.Y, p.Z);

    private static Curve Pin(Curve curve, Point start, Point end) => curve switch
    {
        CircularArc a => a.WithEnds(start, end),
        EllipticArc e => e.WithEnds(start, end),
        Nurbs n => n.WithEnds(start, end),
        _ => new Line(start, end),
    };

    private static CircularArc Bend(CircularArc arc, Point start, Point end)
    {
        if (arc.IsFullCircle || start == end)
        {
            // A circle drawn not quite closed becomes a whole one; a whole one moves as it is.
            Point centre = arc.IsFullCircle ? arc.Centre + (start - arc.Start) : arc.Centre;
            Point first = start - centre;
            return new CircularArc(centre, arc.Radius, Math.Atan2(first.Z, first.Y), Math.CopySign(Math.Tau, arc.Sweep));
        }

        double extent = Math.Abs(arc.Sweep);
        double half = 0.5 * start.DistanceTo(end);
        double sweep = 2 * Math.Asin(Math.Min(1, half / arc.Radius));
        sweep = extent > Math.PI ? Math.Tau - sweep : sweep;

        // Near half a circle a longer chord may have no arc of this radius: there the sweep is kept and the radius gives way.
        const double likely = 0.1;
        bool keepsRadius = half <= arc.Radius && Math.Abs(sweep - extent) < likely * extent;
        sweep = keepsRadius ? sweep : extent;
        CircularArc bent = CircularArc.FromBulge(start, end, Math.CopySign(Math.Tan(0.25 * sweep), arc.Sweep));
        return keepsRadius ? new CircularArc(bent.Centre, arc.Radius, bent.StartAngle, bent.Sweep) : bent;
    }

    private static Curve Stretch(Curve curve, Point start, Point end)
    {
        Point before = curve.End - curve.Start, after = end - start;
        Point shift = start - curve.Start;
        const double closed = 1e-3; // of the length: too short a chord to turn the curve by
        if (before.Length < closed * curve.Length)
        {
            return curve.Transformed(Affine.Shift(shift));
        }

        // Complex quotient after/before: the turn and stretch that carry one chord into the other.
        double re = before.Dot(after) / before.SquaredLength, im = before.Cross(after) / before.SquaredLength;
        Affine turn = new(re, -im, im, re, 0, 0);
        Point moved = start - turn.ApplyToDisplacement(curve.Start);
        return curve.Transformed(turn with { Y0 = moved.Y, Z0 = moved.Z });
    }
}
