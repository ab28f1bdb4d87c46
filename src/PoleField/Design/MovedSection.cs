using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>A section with its iron faces moved along their normals. Corners go where both their faces want them, joints follow.</summary>
internal static class MovedSection
{
    private const double SmoothCross = 0.05; // sine of the turn below which a joint counts as smooth
    private const double FarthestCorner = 4; // a sharp corner moves at most so many times the move of its faces
    private const double Turn = 6 * Math.PI / 180; // largest turn between points of a moved curve
    private const int MostPoints = 600;
    private const double TangentStep = 1e-6;

    /// <summary>Outward move of a face at an arc length, metres.</summary>
    public delegate double Move(Face face, double arcLength);

    /// <summary>The section moved.</summary>
    /// <param name="section">Section.</param>
    /// <param name="faces">Its faces.</param>
    /// <param name="move">Outward moves; zero where a face stays.</param>
    /// <param name="spacing">Distance between points in which the move may be taken as a cubic, metres.</param>
    public static CrossSection Of(CrossSection section, IReadOnlyList<Face> faces, Move move, double spacing)
    {
        var edges = new (Face Face, Face.FaceEdge Edge)?[section.Edges.Count];
        foreach (Face face in faces)
        {
            foreach (Face.FaceEdge e in face.Edges)
            {
                edges[e.SectionEdge] = (face, e);
            }
        }

        Point[] corners = CornerMoves(section, edges, move);
        Point[] vertices = [.. section.Vertices.Select((v, i) => v + corners[i])];
        var moved = new List<SectionEdge>();
        for (int i = 0; i < section.Edges.Count; i++)
        {
            SectionEdge edge = section.Edges[i];
            var path = new MovedCurve(edge.Curve, (corners[edge.Start], corners[edge.End]), edges[i], move);
            moved.Add(path.IsAtRest ? edge : edge with { Curve = path.Fit(vertices[edge.Start], vertices[edge.End], spacing) });
        }

        return new CrossSection(vertices, moved, Regions(section, moved), section.Parts, section.HasRim);
    }

    private static Point[] CornerMoves(
        CrossSection section, (Face Face, Face.FaceEdge Edge)?[] edges, Move move)
    {
        var wishes = new List<(Point Normal, double By)>[section.Vertices.Count];
        for (int i = 0; i < section.Edges.Count; i++)
        {
            if (edges[i] is not { } own)
            {
                continue;
            }

            SectionEdge edge = section.Edges[i];
            (wishes[edge.Start] ??= []).Add((own.Edge.OutwardAt(0), move(own.Face, own.Edge.ArcLengthAt(0))));
            (wishes[edge.End] ??= []).Add((own.Edge.OutwardAt(1), move(own.Face, own.Edge.ArcLengthAt(1))));
        }

        return [.. wishes.Select(w => w is null || w.TrueForAll(x => x.By == 0) ? default : Corner(w))];
    }

    private static Point Corner(List<(Point Normal, double By)> wishes)
    {
        (Point n, double d) = wishes[0];
        (Point m, double e) = wishes.MaxBy(w => Math.Abs(w.Normal.Cross(wishes[0].Normal)));
        double cross = n.Cross(m);
        if (Math.Abs(cross) < SmoothCross)
        {
            return wishes.Average(w => w.By) * n;
        }

        // x·n = d and x·m = e.
        var x = new Point(((d * m.Z) - (e * n.Z)) / cross, ((e * n.Y) - (d * m.Y)) / cross);
        double farthest = FarthestCorner * Math.Max(Math.Abs(d), Math.Abs(e));
        return x.Length > farthest ? (farthest / x.Length) * x : x;
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

    /// <summary>One curve on its way.</summary>
    private sealed class MovedCurve
    {
        private readonly Curve _curve;
        private readonly (Face Face, Face.FaceEdge Edge)? _own;
        private readonly Move _move;
        private readonly (Point Start, Point End) _rest; // what the corners ask for beyond the normal move, in tangent and normal

        public MovedCurve(Curve curve, (Point Start, Point End) corners, (Face Face, Face.FaceEdge Edge)? own, Move move)
        {
            (_curve, _own, _move) = (curve, own, move);
            _rest = (Local(0, corners.Start - NormalMove(0)), Local(1, corners.End - NormalMove(1)));
            IsAtRest = corners == default && Enumerable.Range(0, 65).All(k => NormalMove(k / 64.0) == default);
        }

        public bool IsAtRest { get; }

        public Curve Fit(Point start, Point end, double spacing)
        {
            if (_curve is Line && Enumerable.Range(0, 65).All(k => NormalMove(k / 64.0) == default))
            {
                return new Line(start, end);
            }

            double turn = 0;
            for (int k = 0; k < 32; k++)
            {
                turn += Math.Abs(Angle(_curve.Derivative(k / 32.0), _curve.Derivative((k + 1) / 32.0)));
            }

            int pieces = (int)Math.Clamp(Math.Ceiling(Math.Max(_curve.Length / spacing, turn / Turn)), 4, MostPoints);
            Point[] points = [.. Enumerable.Range(0, pieces + 1).Select(k => k == 0 ? start : k == pieces ? end : At((double)k / pieces))];
            return NurbsInterpolation.Through(points, At(TangentStep) - At(0), At(1) - At(1 - TangentStep));
        }

        private Point At(double t)
        {
            Point tangent = _curve.Derivative(t).Unit();
            Point rest = Point.Between(_rest.Start, _rest.End, t);
            return _curve.At(t) + NormalMove(t) + (rest.Y * tangent) + (rest.Z * tangent.Perpendicular);
        }

        private Point NormalMove(double t)
        {
            if (_own is not { } own)
            {
                return default;
            }

            double by = _move(own.Face, own.Edge.ArcLengthAt(t));
            return by == 0 ? default : by * own.Edge.OutwardAt(t);
        }

        private Point Local(double t, Point v)
        {
            Point tangent = _curve.Derivative(t).Unit();
            return new Point(v.Dot(tangent), v.Dot(tangent.Perpendicular));
        }

        private static double Angle(Point a, Point b) => Math.Atan2(a.Cross(b), a.Dot(b));
    }
}
