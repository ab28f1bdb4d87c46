using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>The air-facing right half of a pole face: curves from the apex on y = 0 outwards, mm.</summary>
internal sealed record HalfFace(IReadOnlyList<Curve> Curves)
{
    public Point Apex => Curves[0].Start;

    public Point Edge => Curves[^1].End;

    /// <summary>The whole face, travelled from its right edge to its left edge; mirror images are exact.</summary>
    public IEnumerable<Curve> RightToLeft()
    {
        if (Curves is [CircularArc { Centre.Y: 0 } arc])
        {
            CircularArc whole = new(arc.Centre, arc.Radius, arc.StartAngle + arc.Sweep, -2 * arc.Sweep);
            yield return whole.WithEnds(Edge, new Point(-Edge.Y, Edge.Z));
            yield break;
        }

        foreach (Curve c in Curves.Reverse())
        {
            yield return c.Reversed();
        }

        foreach (Curve c in Curves)
        {
            yield return c.Transformed(Affine.MirrorInZAxis);
        }
    }
}

/// <summary>Puts a pair of faces on the poles of a frame and draws everything on its layers.</summary>
internal sealed class PolePairDrawing
{
    private const string PoleMaterial = "pure-iron";
    private const string YokeMaterial = "steel-1008";
    private const string CoilMaterial = "copper";

    private readonly YokeFrame _frame;
    private readonly HalfFace _ridge;
    private readonly HalfFace _groove;
    private readonly double _landEdge;

    /// <param name="frame">Checked frame.</param>
    /// <param name="ridge">Face of the lower, convex pole.</param>
    /// <param name="groove">Face of the upper, concave pole.</param>
    /// <param name="landEdge">|y| to which a flat land continues the groove's edge; the edge itself for none.</param>
    public PolePairDrawing(YokeFrame frame, HalfFace ridge, HalfFace groove, double landEdge)
    {
        _frame = frame;
        _ridge = ridge;
        _groove = groove;
        _landEdge = landEdge;
    }

    /// <summary>Layers that are parts; each coil layer has two outlines of half the ampere-turns each.</summary>
    public static IReadOnlyList<SuggestedPart> Parts { get; } =
    [
        new("RIDGE", PoleMaterial, 0),
        new("GROOVE", PoleMaterial, 0),
        new("YOKE", YokeMaterial, 0),
        new("COIL LEFT", CoilMaterial, 0.5),
        new("COIL RIGHT", CoilMaterial, -0.5),
    ];

    /// <summary>Faults of the faces against each other, the frame and the beam.</summary>
    public void Check(DimensionCheck check, BeamExtent beam, Point at)
    {
        const string move = "Move the beam, or change the faces.";
        check.Less(("The ridge's apex", _ridge.Apex.Z), ("the beam's lower edge", at.Z - (beam.Height / 2)), move);
        if (check.Less(("Half the beam's width", beam.Width / 2), ("the reach of the groove's face", _groove.Edge.Y), move))
        {
            check.Less(("The beam's upper edge", at.Z + (beam.Height / 2)), ("the groove's face above the beam's corner", FaceAt(_groove, beam.Width / 2)), move);
        }

        const string fit = "Shorten the faces or widen the poles.";
        double w = _frame.PoleHalfWidth;
        check.Less(("The reach of the ridge's face", _ridge.Edge.Y), ("the pole half width", w), fit);
        check.Less(("The land beside the groove", _landEdge), ("the pole half width", w), fit);
        check.Less(("The frame's inner bottom", _frame.InnerBottom), ("the foot of the ridge's flank", RidgeFoot), "Lower the frame's inner bottom or flatten the flanks.");
        check.Less(("The head of the groove's flank", GrooveHead), ("the frame's inner top", _frame.InnerTop), "Raise the frame's inner top.");
        JudgeGap(check);
    }

    /// <summary>All curves on their layers.</summary>
    public Sketch Draw(string name, Outline beam)
    {
        List<SketchCurve> curves = [];
        SketchOutlines.Add(curves, "RIDGE", Ridge());
        SketchOutlines.Add(curves, "GROOVE", Groove());
        foreach (Outline outline in _frame.Yoke())
        {
            SketchOutlines.Add(curves, "YOKE", outline);
        }

        foreach ((string layer, int side) in new[] { ("COIL LEFT", -1), ("COIL RIGHT", 1) })
        {
            foreach (Outline outline in _frame.Coils(side))
            {
                SketchOutlines.Add(curves, layer, outline);
            }
        }

        SketchOutlines.Add(curves, StartingSketch.BeamLayer, beam);
        return SketchOutlines.Sketch(name, curves);
    }

    private double RidgeFoot => _ridge.Edge.Z - _frame.FlankRise(_frame.PoleHalfWidth - _ridge.Edge.Y);

    private double GrooveHead => _groove.Edge.Z + _frame.FlankRise(_frame.PoleHalfWidth - _landEdge);

    private Outline Ridge()
    {
        double w = _frame.PoleHalfWidth;
        Point edge = _ridge.Edge;
        Point mirrored = new(-edge.Y, edge.Z);
        return Outline.FromCurves(
        [
            new Line(new Point(-w, _frame.InnerBottom), new Point(w, _frame.InnerBottom)),
            new Line(new Point(w, _frame.InnerBottom), new Point(w, RidgeFoot)),
            new Line(new Point(w, RidgeFoot), edge),
            .. _ridge.RightToLeft(),
            new Line(mirrored, new Point(-w, RidgeFoot)),
            new Line(new Point(-w, RidgeFoot), new Point(-w, _frame.InnerBottom)),
        ]);
    }

    private Outline Groove()
    {
        double w = _frame.PoleHalfWidth;
        double z = _groove.Edge.Z;
        List<Point> right = [new(w, _frame.InnerTop), new(w, GrooveHead), new(_landEdge, z)];
        if (_landEdge > _groove.Edge.Y)
        {
            right.Add(_groove.Edge);
        }

        List<Curve> curves = [];
        for (int i = 1; i < right.Count; i++)
        {
            curves.Add(new Line(right[i - 1], right[i]));
        }

        curves.AddRange(_groove.RightToLeft());
        for (int i = right.Count - 1; i > 0; i--)
        {
            curves.Add(new Line(Mirrored(right[i]), Mirrored(right[i - 1])));
        }

        curves.Add(new Line(Mirrored(right[0]), right[0]));
        return Outline.FromCurves(curves);
    }

    private static Point Mirrored(Point p) => new(-p.Y, p.Z);

    // z of a face above a |y|, from its curves; the highest where it overhangs.
    private static double FaceAt(HalfFace face, double y)
    {
        double best = double.NegativeInfinity;
        foreach (Curve c in face.Curves)
        {
            const int samples = 64;
            for (int i = 0; i < samples; i++)
            {
                Point a = c.At((double)i / samples);
                Point b = c.At((i + 1.0) / samples);
                if (Math.Min(a.Y, b.Y) <= y && y <= Math.Max(a.Y, b.Y))
                {
                    best = Math.Max(best, Math.Min(a.Z, b.Z));
                }
            }
        }

        return best;
    }

    // The poles must not meet: every corner of the groove's side stays above the ridge's flank and face.
    private void JudgeGap(DimensionCheck check)
    {
        if (!check.IsClean)
        {
            return;
        }

        Outline ridge = Ridge();
        List<Point> grooveSide = [new(_landEdge, _groove.Edge.Z), new(_frame.PoleHalfWidth, GrooveHead)];
        grooveSide.AddRange(_groove.Curves.SelectMany(c => Enumerable.Range(0, 33).Select(i => c.At(i / 32.0))));
        if (grooveSide.Exists(ridge.Contains))
        {
            check.Fault("The groove's side runs into the ridge.", "Shorten the groove's face, narrow its land or lower the ridge.");
        }
    }
}

/// <summary>Turns outlines into the curves of a sketch.</summary>
internal static class SketchOutlines
{
    public static void Add(List<SketchCurve> curves, string layer, Outline outline)
    {
        foreach (Curve curve in outline.Curves)
        {
            string kind = curve switch
            {
                CircularArc { IsFullCircle: true } => "CIRCLE",
                CircularArc => "ARC",
                _ => "LINE",
            };
            curves.Add(new SketchCurve(curve, layer, kind, null, 0));
        }
    }

    public static Sketch Sketch(string name, IReadOnlyList<SketchCurve> curves) =>
        new(name + ".dxf", LengthUnit.Millimetre, UnitOrigin.InsertUnits, curves, [], []);
}
