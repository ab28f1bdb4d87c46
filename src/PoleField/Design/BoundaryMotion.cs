using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>
/// How the places on a section's curves move: each curve as it wishes, corners where both their curves want them, joints
/// without a wish of their own in between.
/// </summary>
internal sealed class BoundaryMotion
{
    private const double SmoothCross = 0.05; // sine of the turn below which a joint counts as smooth
    private const double FarthestCorner = 4; // a sharp corner moves at most so many times the move of its curves
    private const int Samples = 64;

    private readonly CrossSection _section;
    private readonly Wish _wish;
    private readonly Point[] _corners;
    private readonly (Point Start, Point End)[] _rest; // what the corners ask for beyond the wish, in tangent and normal

    private BoundaryMotion(CrossSection section, Wish wish)
    {
        (_section, _wish) = (section, wish);
        _corners = Corners(section, wish);
        _rest = [.. section.Edges.Select((e, i) => (
            Local(e.Curve, 0, _corners[e.Start] - (wish(i, 0) ?? default)), Local(e.Curve, 1, _corners[e.End] - (wish(i, 1) ?? default))))];
    }

    /// <summary>Move a curve wants at a parameter, metres; null for a joint that follows its ends.</summary>
    public delegate Point? Wish(int edge, double parameter);

    public static BoundaryMotion Of(CrossSection section, Wish wish) => new(section, wish);

    /// <summary>
    /// The rigid motion of a part. Its joints to parts of the same law follow, whatever else it touches stays.
    /// </summary>
    /// <param name="section">Section.</param>
    /// <param name="part">Part.</param>
    /// <param name="velocity">Velocity of its places.</param>
    /// <param name="differ">True when an edge has different materials on its two sides.</param>
    public static BoundaryMotion OfPart(CrossSection section, int part, Func<Point, Point> velocity, Predicate<SectionEdge> differ)
    {
        bool Own(int region) => region >= 0 && section.Regions[region].Part == part;
        return new BoundaryMotion(section, (e, t) =>
        {
            SectionEdge edge = section.Edges[e];
            return !differ(edge) ? null : Own(edge.Left) != Own(edge.Right) ? velocity(edge.Curve.At(t)) : default(Point);
        });
    }

    /// <summary>Move of a vertex, metres.</summary>
    public Point OfVertex(int vertex) => _corners[vertex];

    /// <summary>Move of a place on a curve, metres.</summary>
    public Point At(int edge, double parameter)
    {
        Point tangent = _section.Edges[edge].Curve.Derivative(parameter).Unit();
        Point rest = Point.Between(_rest[edge].Start, _rest[edge].End, parameter);
        return (_wish(edge, parameter) ?? default) + (rest.Y * tangent) + (rest.Z * tangent.Perpendicular);
    }

    /// <summary>True when neither the curve nor its ends move.</summary>
    public bool IsAtRest(int edge) => _rest[edge] == default && IsUnwished(edge);

    /// <summary>True when the curve itself has no wish to move.</summary>
    public bool IsUnwished(int edge) => Enumerable.Range(0, Samples + 1).All(k => (_wish(edge, (double)k / Samples) ?? default) == default);

    private static Point[] Corners(CrossSection section, Wish wish)
    {
        var wishes = new List<(Point Normal, Point By)>[section.Vertices.Count];
        for (int i = 0; i < section.Edges.Count; i++)
        {
            SectionEdge edge = section.Edges[i];
            if (wish(i, 0) is { } start && wish(i, 1) is { } end)
            {
                (wishes[edge.Start] ??= []).Add((edge.Curve.Derivative(0).Unit().Perpendicular, start));
                (wishes[edge.End] ??= []).Add((edge.Curve.Derivative(1).Unit().Perpendicular, end));
            }
        }

        return [.. wishes.Select(w => w is null || w.TrueForAll(x => x.By == default) ? default : Corner(w))];
    }

    private static Point Corner(List<(Point Normal, Point By)> wishes)
    {
        (Point n, Point a) = wishes[0];
        (Point m, Point b) = wishes.MaxBy(w => Math.Abs(w.Normal.Cross(wishes[0].Normal)));
        double cross = n.Cross(m);
        if (Math.Abs(cross) < SmoothCross)
        {
            return (1.0 / wishes.Count) * wishes.Aggregate(default(Point), (sum, w) => sum + w.By);
        }

        // x·n = d and x·m = e.
        (double d, double e) = (a.Dot(n), b.Dot(m));
        var x = new Point(((d * m.Z) - (e * n.Z)) / cross, ((e * n.Y) - (d * m.Y)) / cross);
        double farthest = FarthestCorner * Math.Max(a.Length, b.Length);
        return x.Length > farthest ? (farthest / x.Length) * x : x;
    }

    private static Point Local(Curve curve, double t, Point v)
    {
        Point tangent = curve.Derivative(t).Unit();
        return new Point(v.Dot(tangent), v.Dot(tangent.Perpendicular));
    }
}
