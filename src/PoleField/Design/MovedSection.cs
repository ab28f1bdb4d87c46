using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>A section with its curves moved. Corners go where both their faces want them, joints follow.</summary>
internal static class MovedSection
{
    private const double Turn = 6 * Math.PI / 180; // largest turn between points of a moved curve
    private const int MostPoints = 600;
    private const double TangentStep = 1e-6;

    /// <summary>Outward move at a place of a face, metres.</summary>
    public delegate double Move(FacePlace place);

    /// <summary>The section with its faces moved along their normals.</summary>
    /// <param name="section">Section.</param>
    /// <param name="faces">Its faces.</param>
    /// <param name="move">Outward moves; zero where a face stays.</param>
    /// <param name="spacing">Distance between points in which the move may be taken as a cubic, metres.</param>
    public static CrossSection Of(CrossSection section, IReadOnlyList<Face> faces, Move move, double spacing) =>
        Of(section, MotionOf(section, faces, move), spacing);

    /// <summary>How a section's curves move when its faces move along their normals.</summary>
    public static BoundaryMotion MotionOf(CrossSection section, IReadOnlyList<Face> faces, Move move)
    {
        var edges = new (Face Face, Face.FaceEdge Edge)?[section.Edges.Count];
        foreach (Face face in faces)
        {
            foreach (Face.FaceEdge e in face.Edges)
            {
                edges[e.SectionEdge] = (face, e);
            }
        }

        return BoundaryMotion.Of(section, (e, t) =>
        {
            if (edges[e] is not { } own)
            {
                return null;
            }

            var place = new FacePlace(own.Face, own.Edge.ArcLengthAt(t), section.Edges[e].Curve.At(t), own.Edge.OutwardAt(t));
            return move(place) * place.Outward;
        });
    }

    private static CrossSection Of(CrossSection section, BoundaryMotion motion, double spacing)
    {
        Point[] vertices = [.. section.Vertices.Select((v, i) => v + motion.OfVertex(i))];
        var moved = new List<SectionEdge>();
        for (int i = 0; i < section.Edges.Count; i++)
        {
            SectionEdge edge = section.Edges[i];
            moved.Add(motion.IsAtRest(i) ? edge : edge with { Curve = Fit(edge.Curve, (motion, i), (vertices[edge.Start], vertices[edge.End]), spacing) });
        }

        return new CrossSection(vertices, moved, Regions(section, moved), section.Parts, section.HasRim);
    }

    private static Curve Fit(Curve curve, (BoundaryMotion Motion, int Edge) by, (Point Start, Point End) ends, double spacing)
    {
        if (curve is Line && by.Motion.IsUnwished(by.Edge))
        {
            return new Line(ends.Start, ends.End);
        }

        double turn = 0;
        for (int k = 0; k < 32; k++)
        {
            turn += Math.Abs(Angle(curve.Derivative(k / 32.0), curve.Derivative((k + 1) / 32.0)));
        }

        int pieces = (int)Math.Clamp(Math.Ceiling(Math.Max(curve.Length / spacing, turn / Turn)), 4, MostPoints);
        Point[] points = [.. Enumerable.Range(0, pieces + 1).Select(k => k == 0 ? ends.Start : k == pieces ? ends.End : At((double)k / pieces))];
        return NurbsInterpolation.Through(points, At(TangentStep) - At(0), At(1) - At(1 - TangentStep));

        Point At(double t) => curve.At(t) + by.Motion.At(by.Edge, t);
    }

    private static List<Region> Regions(CrossSection section, List<SectionEdge> edges)
    {
        var regions = new List<Region>();
        for (int r = 0; r < section.Regions.Count; r++)
        {
            double area = 0;
            Box box = Box.Empty;
            Point origin = section.Regions[r].Bounds.IsEmpty ? default : section.Regions[r].Bounds.Centre;
            foreach (SectionEdge e in edges.Where(e => e.Left == r || e.Right == r))
            {
                box = box.Including(e.Curve.Bounds);
                area += (e.Left == r ? 1 : 0) * e.Curve.AreaTerm(origin);
                area -= (e.Right == r ? 1 : 0) * e.Curve.AreaTerm(origin);
            }

            Region old = section.Regions[r];
            regions.Add(double.IsFinite(old.Area) ? old with { Area = area, Bounds = box } : old);
        }

        return regions;
    }

    private static double Angle(Point a, Point b) => Math.Atan2(a.Cross(b), a.Dot(b));
}

/// <summary>A place on a face, seen from one of its curves: at a corner the normal is that of the curve asked.</summary>
/// <param name="Face">Face.</param>
/// <param name="ArcLength">Length along the face, metres.</param>
/// <param name="At">Place, metres.</param>
/// <param name="Outward">Unit normal out of the iron.</param>
internal readonly record struct FacePlace(Face Face, double ArcLength, Point At, Point Outward);
