using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>A connected stretch of a part's outline that faces air, travelled with the part on the left.</summary>
public sealed class Face
{
    private const int TablePieces = 256; // of the arc length of a curve that is neither straight nor circular

    private readonly List<FaceEdge> _edges;

    private Face(int part, string layer, List<FaceEdge> edges, bool closed)
    {
        Part = part;
        Layer = layer;
        _edges = edges;
        IsClosed = closed;
        Length = edges.Sum(e => e.Length);
    }

    /// <summary>Index of the part.</summary>
    public int Part { get; }

    /// <summary>Its layer.</summary>
    public string Layer { get; }

    /// <summary>Arc length, metres.</summary>
    public double Length { get; }

    /// <summary>True when the stretch is a whole outline.</summary>
    public bool IsClosed { get; }

    internal IReadOnlyList<FaceEdge> Edges => _edges;

    /// <summary>The faces of all parts of iron, in the order of the section's edges.</summary>
    public static IReadOnlyList<Face> Of(Magnet magnet)
    {
        CrossSection section = magnet.Section;
        var open = new List<(int Edge, bool Forward, int Part)>();
        for (int e = 0; e < section.Edges.Count; e++)
        {
            SectionEdge edge = section.Edges[e];
            (bool left, bool right) = (IsIron(magnet, edge.Left), IsIron(magnet, edge.Right));
            if (left != right && edge.Left >= 0 && edge.Right >= 0)
            {
                open.Add((e, left, section.Regions[left ? edge.Left : edge.Right].Part));
            }
        }

        var faces = new List<Face>();
        while (open.Count > 0)
        {
            faces.Add(Chain(section, open));
        }

        return faces;
    }

    /// <summary>Arc length from the face's start of a parameter on one of its section edges; null when the edge is not of this face.</summary>
    public double? ArcLengthAt(int sectionEdge, double parameter)
    {
        foreach (FaceEdge edge in _edges)
        {
            if (edge.SectionEdge == sectionEdge)
            {
                return edge.ArcLengthAt(parameter);
            }
        }

        return null;
    }

    /// <summary>Place and unit normal out of the iron at an arc length.</summary>
    public (Point At, Point Outward) At(double arcLength)
    {
        FaceEdge edge = _edges[^1];
        foreach (FaceEdge e in _edges)
        {
            if (arcLength <= e.Start + e.Length)
            {
                edge = e;
                break;
            }
        }

        double parameter = edge.ParameterAt(arcLength);
        return (edge.Edge.Curve.At(parameter), edge.OutwardAt(parameter));
    }

    private static bool IsIron(Magnet magnet, int region) =>
        region > CrossSection.Air && magnet.Roles[magnet.Section.Regions[region].Part].Kind == "iron";

    private static Face Chain(CrossSection section, List<(int Edge, bool Forward, int Part)> open)
    {
        (int Edge, bool Forward, int Part) first = open[0];
        open.RemoveAt(0);
        var chain = new LinkedList<(int Edge, bool Forward, int Part)>([first]);
        while (Take(o => Tail(o) == Head(chain.Last!.Value)) is { } next)
        {
            chain.AddLast(next);
        }

        while (Take(o => Head(o) == Tail(chain.First!.Value)) is { } previous)
        {
            chain.AddFirst(previous);
        }

        var edges = new List<FaceEdge>();
        double start = 0;
        foreach ((int edge, bool forward, _) in chain)
        {
            edges.Add(new FaceEdge(edge, section.Edges[edge], forward, start));
            start += edges[^1].Length;
        }

        return new Face(first.Part, section.Parts[first.Part], edges, Tail(chain.First!.Value) == Head(chain.Last!.Value));

        int Tail((int Edge, bool Forward, int Part) o) => o.Forward ? section.Edges[o.Edge].Start : section.Edges[o.Edge].End;
        int Head((int Edge, bool Forward, int Part) o) => o.Forward ? section.Edges[o.Edge].End : section.Edges[o.Edge].Start;
        (int Edge, bool Forward, int Part)? Take(Predicate<(int Edge, bool Forward, int Part)> fits)
        {
            int at = open.FindIndex(o => o.Part == first.Part && fits(o));
            if (at < 0)
            {
                return null;
            }

            (int Edge, bool Forward, int Part) found = open[at];
            open.RemoveAt(at);
            return found;
        }
    }

    /// <summary>One section edge of a face.</summary>
    internal sealed class FaceEdge
    {
        private readonly double[] _lengths; // from the curve's start at k/TablePieces

        public FaceEdge(int sectionEdge, SectionEdge edge, bool forward, double start)
        {
            SectionEdge = sectionEdge;
            Edge = edge;
            IsForward = forward;
            Start = start;
            _lengths = new double[TablePieces + 1];
            for (int k = 1; k <= TablePieces; k++)
            {
                double from = (k - 1.0) / TablePieces, to = (double)k / TablePieces;
                _lengths[k] = _lengths[k - 1] + ((to - from) / 6 * (Speed(from) + (4 * Speed(0.5 * (from + to))) + Speed(to)));
            }
        }

        public int SectionEdge { get; }

        public SectionEdge Edge { get; }

        /// <summary>True when the face travels along the curve.</summary>
        public bool IsForward { get; }

        /// <summary>Arc length of the face where this edge begins.</summary>
        public double Start { get; }

        public double Length => _lengths[^1];

        public double ArcLengthAt(double parameter)
        {
            double at = Math.Clamp(parameter, 0, 1) * TablePieces;
            int k = Math.Min((int)at, TablePieces - 1);
            double along = _lengths[k] + ((at - k) * (_lengths[k + 1] - _lengths[k]));
            return Start + (IsForward ? along : Length - along);
        }

        public double ParameterAt(double arcLength)
        {
            double along = Math.Clamp(IsForward ? arcLength - Start : Start + Length - arcLength, 0, Length);
            int k = Array.BinarySearch(_lengths, along);
            k = Math.Clamp(k < 0 ? ~k - 1 : k, 0, TablePieces - 1);
            return (k + ((along - _lengths[k]) / (_lengths[k + 1] - _lengths[k]))) / TablePieces;
        }

        /// <summary>Unit normal out of the iron.</summary>
        public Point OutwardAt(double parameter)
        {
            Point left = Edge.Curve.Derivative(parameter).Unit().Perpendicular;
            return IsForward ? -left : left;
        }

        private double Speed(double t) => Edge.Curve.Derivative(t).Length;
    }
}
