using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>Dimensions of a drawing that is made anew for each of their values.</summary>
internal sealed class DimensionFreedoms : ShapeFreedoms
{
    private const double Step = 1e-4;      // of a range, for differences of the drawing (never of the field)
    private const double SameCurve = 1e-3; // of the section's diagonal: farther apart, two drawings list their curves differently
    private const int PlacesOnEdge = 60;
    private const double LeastMove = 1e-9; // metres; less counts as none

    private readonly DrawnDimensions _drawn;
    private readonly CrossSection _first;
    private readonly Face[] _faces;

    /// <exception cref="InputException">The dimensions as they are make no drawing.</exception>
    public DimensionFreedoms(Magnet magnet, DrawnDimensions drawn)
    {
        _drawn = drawn;
        Names = [.. drawn.Each.Select(d => d.Name)];
        Ranges = [.. drawn.Each.Select(d => (d.Low, d.High))];
        AsDrawn = [.. drawn.Each.Select(d => d.Value)];
        _first = drawn.Draw(AsDrawn);
        _faces = [.. Face.Of(magnet with { Section = _first })];
    }

    public override IReadOnlyList<string> Names { get; }

    public override IReadOnlyList<(double Low, double High)> Ranges { get; }

    public override double[] AsDrawn { get; }

    public override CrossSection SectionAt(double[] values)
    {
        try
        {
            return _drawn.Draw(values);
        }
        catch (InputException e)
        {
            throw new ArgumentException(e.Message, nameof(values), e);
        }
    }

    public override BoundaryVelocities VelocitiesAt(double[] values, CrossSection section) => new DrawnVelocities(
        section.Edges.Count,
        [.. values.Select((_, k) =>
        {
            TuneDimension d = _drawn.Each[k];
            double step = Step * (d.High - d.Low);
            (double more, double less) = (Math.Min(values[k] + step, d.High), Math.Max(values[k] - step, d.Low));
            return (Near(k, more), Near(k, less), more - less);

            CrossSection Near(int own, double value)
            {
                double[] near = [.. values];
                near[own] = value;
                CrossSection drawn = _drawn.Draw(near);
                bool same = drawn.Edges.Count == section.Edges.Count && drawn.Edges.Zip(section.Edges).All(pair =>
                    pair.First.Curve.At(0.5).DistanceTo(pair.Second.Curve.At(0.5)) < SameCurve * section.Bounds.Diagonal);
                return same
                    ? drawn
                    : throw new InputException([new Finding(
                        Severity.Fault, "other-curves", $"A small change of {Names[own]} draws other curves.", $"Leave {Names[own]} out, or tune faces.")]);
            }
        })]);

    public override IReadOnlyList<FaceMoves> MovesOf(double[] values, CrossSection section)
    {
        var all = new List<FaceMoves>();
        foreach (Face face in _faces.Where(_ => section.Edges.Count == _first.Edges.Count))
        {
            List<FaceMove> moves = [.. face.Edges.SelectMany(e => Enumerable.Range(0, PlacesOnEdge + 1).Select(k =>
            {
                double t = (double)(e.IsForward ? k : PlacesOnEdge - k) / PlacesOnEdge;
                Point at = e.Edge.Curve.At(t);
                Point outward = e.OutwardAt(t);
                return new FaceMove(e.ArcLengthAt(t), at, outward, (section.Edges[e.SectionEdge].Curve.At(t) - at).Dot(outward));
            }))];
            int from = moves.FindIndex(m => Math.Abs(m.Move) > LeastMove);
            int to = moves.FindLastIndex(m => Math.Abs(m.Move) > LeastMove);
            if (from >= 0)
            {
                all.Add(new FaceMoves(face.Layer, moves[from..(to + 1)]));
            }
        }

        return all;
    }

    /// <summary>Velocities from drawings made a little larger and a little smaller, at equal parameters of their curves.</summary>
    private sealed class DrawnVelocities(int edges, (CrossSection More, CrossSection Less, double Apart)[] pairs) : BoundaryVelocities
    {
        private const int Samples = 16;

        private readonly bool[] _atRest =
        [
            .. Enumerable.Range(0, edges).Select(e => Array.TrueForAll(pairs, p => Enumerable.Range(0, Samples + 1).All(k =>
                p.More.Edges[e].Curve.At((double)k / Samples) == p.Less.Edges[e].Curve.At((double)k / Samples)))),
        ];

        public override int Count => pairs.Length;

        public override bool IsAtRest(int edge) => _atRest[edge];

        public override void At(int edge, double parameter, Point place, Span<Point> velocities)
        {
            for (int k = 0; k < pairs.Length; k++)
            {
                (CrossSection more, CrossSection less, double apart) = pairs[k];
                velocities[k] = (1 / apart) * (more.Edges[edge].Curve.At(parameter) - less.Edges[edge].Curve.At(parameter));
            }
        }
    }
}
