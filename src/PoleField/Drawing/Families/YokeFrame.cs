using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// Pole bodies, closed yoke and coil windows around a pair of faces, mm: two poles of equal width stand on the inner edges of
/// a rectangular frame, four coil windows fill the corners beside them. Symmetric about y = 0.
/// </summary>
public sealed record YokeFrame
{
    /// <summary>Half the width of both pole bodies along y.</summary>
    public double PoleHalfWidth { get; init; } = 15;

    /// <summary>Inclination of the flanks between faces and pole bodies against the y axis, degrees, 0 to 85.</summary>
    public double FlankAngle { get; init; } = 45;

    /// <summary>Half the inner width of the frame.</summary>
    public double InnerHalfWidth { get; init; } = 50;

    /// <summary>z of the frame's inner edge below, where the ridge pole stands.</summary>
    public double InnerBottom { get; init; } = -41;

    /// <summary>z of the frame's inner edge above, where the groove pole stands.</summary>
    public double InnerTop { get; init; } = 49;

    /// <summary>Thickness of the frame.</summary>
    public double Thickness { get; init; } = 25;

    /// <summary>|y| of the coil windows' inner edges.</summary>
    public double CoilInner { get; init; } = 18;

    /// <summary>|y| of the coil windows' outer edges.</summary>
    public double CoilOuter { get; init; } = 44;

    /// <summary>z from and to of the lower coil windows.</summary>
    public (double From, double To) LowerCoil { get; init; } = (-38, -14);

    /// <summary>z from and to of the upper coil windows.</summary>
    public (double From, double To) UpperCoil { get; init; } = (22, 46);

    /// <summary>The frame with all lengths multiplied.</summary>
    public YokeFrame Scaled(double factor) => this with
    {
        PoleHalfWidth = factor * PoleHalfWidth,
        InnerHalfWidth = factor * InnerHalfWidth,
        InnerBottom = factor * InnerBottom,
        InnerTop = factor * InnerTop,
        Thickness = factor * Thickness,
        CoilInner = factor * CoilInner,
        CoilOuter = factor * CoilOuter,
        LowerCoil = (factor * LowerCoil.From, factor * LowerCoil.To),
        UpperCoil = (factor * UpperCoil.From, factor * UpperCoil.To),
    };

    /// <summary>Drop of a flank over a width along y.</summary>
    internal double FlankRise(double width) => FlankAngle == 45 ? width : width * Math.Tan(FlankAngle * Math.PI / 180);

    internal void Check(DimensionCheck check)
    {
        check.Positive("Pole half width", PoleHalfWidth);
        check.Positive("Frame thickness", Thickness);
        if (!(FlankAngle >= 0 && FlankAngle <= 85))
        {
            check.Fault(FormattableString.Invariant($"The flank angle is {FlankAngle:g6} degrees; it must be 0 to 85."), "Correct the angle.");
        }

        const string widen = "Widen the frame or narrow what stands in it.";
        check.Less(("The pole half width", PoleHalfWidth), ("the coils' inner |y|", CoilInner), widen);
        check.Less(("The coils' inner |y|", CoilInner), ("the coils' outer |y|", CoilOuter), widen);
        check.Less(("The coils' outer |y|", CoilOuter), ("the frame's inner half width", InnerHalfWidth), widen);
        const string heighten = "Move the coils or heighten the frame.";
        check.Less(("The frame's inner bottom", InnerBottom), ("the lower coils' bottom", LowerCoil.From), heighten);
        check.Less(("The lower coils' bottom", LowerCoil.From), ("their top", LowerCoil.To), heighten);
        check.Less(("The lower coils' top", LowerCoil.To), ("the upper coils' bottom", UpperCoil.From), heighten);
        check.Less(("The upper coils' bottom", UpperCoil.From), ("their top", UpperCoil.To), heighten);
        check.Less(("The upper coils' top", UpperCoil.To), ("the frame's inner top", InnerTop), heighten);
    }

    /// <summary>Frame: outer outline, and inner outline with corners where the poles stand, so that the common edges coincide.</summary>
    internal IEnumerable<Outline> Yoke()
    {
        double y = InnerHalfWidth;
        double w = PoleHalfWidth;
        yield return Polygon(
            (-y - Thickness, InnerBottom - Thickness),
            (y + Thickness, InnerBottom - Thickness),
            (y + Thickness, InnerTop + Thickness),
            (-y - Thickness, InnerTop + Thickness));
        yield return Polygon(
            (-y, InnerBottom), (-w, InnerBottom), (w, InnerBottom), (y, InnerBottom),
            (y, InnerTop), (w, InnerTop), (-w, InnerTop), (-y, InnerTop));
    }

    /// <summary>Lower and upper coil window on one side.</summary>
    /// <param name="side">−1 left, +1 right.</param>
    internal IEnumerable<Outline> Coils(int side)
    {
        double inner = side * CoilInner;
        double outer = side * CoilOuter;
        foreach ((double from, double to) in new[] { LowerCoil, UpperCoil })
        {
            yield return Polygon((inner, from), (outer, from), (outer, to), (inner, to));
        }
    }

    private static Outline Polygon(params ReadOnlySpan<(double Y, double Z)> corners)
    {
        List<Curve> sides = [];
        for (int i = 0; i < corners.Length; i++)
        {
            (double y, double z) = corners[i];
            (double nextY, double nextZ) = corners[(i + 1) % corners.Length];
            sides.Add(new Line(new Point(y, z), new Point(nextY, nextZ)));
        }

        return Outline.FromCurves(sides);
    }
}
