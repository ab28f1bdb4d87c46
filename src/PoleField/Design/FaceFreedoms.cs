using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>Faces that move along their normals in smooth modes; the values are moves in metres.</summary>
internal sealed class FaceFreedoms : ShapeFreedoms
{
    private const int PlacesOnStretch = 200;
    private const int CurvatureSamples = 64;

    private readonly CrossSection _section;
    private readonly IReadOnlyList<Face> _faces;
    private readonly FaceModes[] _modes;
    private readonly int[] _first; // first value of each stretch's modes
    private readonly double _smallestRadius;

    /// <param name="section">Section as drawn.</param>
    /// <param name="faces">All its faces.</param>
    /// <param name="modes">Modes of the stretches that may move.</param>
    /// <param name="settings">Reach and tool.</param>
    public FaceFreedoms(CrossSection section, IReadOnlyList<Face> faces, FaceModes[] modes, TuneSettings settings)
    {
        (_section, _faces, _modes, _smallestRadius) = (section, faces, modes, settings.SmallestRadius);
        _first = [.. modes.Select((_, k) => modes.Take(k).Sum(m => m.Count))];
        Names = [.. modes.SelectMany(m => Enumerable.Range(1, m.Count).Select(k => FormattableString.Invariant($"{m.Face.Layer} {k}")))];
        Ranges = [.. Names.Select(_ => (-settings.Reach, settings.Reach))];
    }

    public override IReadOnlyList<string> Names { get; }

    public override IReadOnlyList<(double Low, double High)> Ranges { get; }

    public override double[] AsDrawn => new double[Count];

    public override CrossSection SectionAt(double[] values) =>
        MovedSection.Of(_section, _faces, p => MoveAt(p.Face, p.ArcLength, values), _modes.Min(m => m.Spacing) / 2);

    public override BoundaryVelocities VelocitiesAt(double[] values, CrossSection section) => new FaceVelocities(
        _section,
        MovedSection.MotionOf(_section, _faces, p => MoveAt(p.Face, p.ArcLength, values)),
        [.. Enumerable.Range(0, Count).Select(k =>
        {
            var unit = new double[Count];
            unit[k] = 1;
            return MovedSection.MotionOf(_section, _faces, p => MoveAt(p.Face, p.ArcLength, unit));
        })]);

    public override bool NeedsSmallerTool(CrossSection section)
    {
        foreach (Face.FaceEdge e in _modes.SelectMany(m => m.Face.Edges))
        {
            Curve now = section.Edges[e.SectionEdge].Curve;
            for (int k = 1; k < CurvatureSamples && _smallestRadius > 0 && !ReferenceEquals(now, e.Edge.Curve); k++)
            {
                // Iron on the left: a concave face turns to the right.
                double at = (double)k / CurvatureSamples;
                double hollow = (e.IsForward ? -1 : 1) * now.CurvatureAt(at);
                double was = (e.IsForward ? -1 : 1) * e.Edge.Curve.CurvatureAt(at);
                if (hollow > 1 / _smallestRadius && hollow > was * 1.02)
                {
                    return true;
                }
            }
        }

        return false;
    }

    public override IReadOnlyList<FaceMoves> MovesOf(double[] values, CrossSection section) =>
    [
        .. _modes.Select((m, k) => new FaceMoves(m.Face.Layer,
        [
            .. Enumerable.Range(0, PlacesOnStretch + 1).Select(i =>
            {
                double s = m.From + (i * (m.To - m.From) / PlacesOnStretch);
                (Point at, Point outward) = m.Face.At(s);
                return new FaceMove(s, at, outward, m.Move(values.AsSpan(_first[k], m.Count), s));
            }),
        ])),
    ];

    private double MoveAt(Face face, double s, double[] values)
    {
        double sum = 0;
        for (int k = 0; k < _modes.Length; k++)
        {
            sum += ReferenceEquals(_modes[k].Face, face) ? _modes[k].Move(values.AsSpan(_first[k], _modes[k].Count), s) : 0;
        }

        return sum;
    }

    /// <summary>Velocities on the moved section: every place is where its old place went.</summary>
    private sealed class FaceVelocities(CrossSection drawn, BoundaryMotion moved, BoundaryMotion[] units) : BoundaryVelocities
    {
        private const int MostSearches = 20;
        private const double Found = 1e-12;

        private readonly bool[] _atRest = [.. Enumerable.Range(0, drawn.Edges.Count).Select(e => Array.TrueForAll(units, u => u.IsAtRest(e)))];
        private readonly bool[] _unmoved = [.. Enumerable.Range(0, drawn.Edges.Count).Select(moved.IsAtRest)];

        public override int Count => units.Length;

        public override bool IsAtRest(int edge) => _atRest[edge];

        public override void At(int edge, double parameter, Point place, Span<Point> velocities)
        {
            double old = parameter is 0 or 1 || _unmoved[edge] ? parameter : OldParameter(edge, place);
            for (int k = 0; k < units.Length; k++)
            {
                velocities[k] = units[k].At(edge, old);
            }
        }

        private double OldParameter(int edge, Point place)
        {
            Curve curve = drawn.Edges[edge].Curve;
            double t = curve.ClosestParameter(place);
            for (int k = 0; k < MostSearches; k++)
            {
                double next = curve.ClosestParameter(place - moved.At(edge, t));
                bool found = Math.Abs(next - t) < Found;
                t = next;
                if (found)
                {
                    break;
                }
            }

            return t;
        }
    }
}
