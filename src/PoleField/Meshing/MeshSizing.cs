using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Where a pole's mesh must be fine, from its geometry alone: around the beam, on noses and grooves, at lips, corners and
/// pole roots. Everything else grows coarse.
/// </summary>
/// <remarks>
/// Lengths are measured in two scales: the gap, from the aperture to the nearest part, and the reach a, twice the distance
/// from the aperture's middle to the nearest magnetic part (the size of the pole gap). The factors come from a study of
/// third-order elements with saturated iron: field and gradient right to about 1e-5 with some 20,000 unknowns.
/// </remarks>
public sealed class MeshSizing
{
    /// <summary>
    /// An aperture nearer than this to a part, in its own diagonal, counts as touching it: filling the gap with three layers of
    /// elements would cost more than a tenth of a million unknowns.
    /// </summary>
    internal const double LeastGap = 0.05;

    private const double Growth = 0.35;
    private const double LayersInGap = 3;
    private const double GapShareOnCurves = 1 / 2.5; // of the distance to the aperture
    private const double NoseShare = 0.15; // of the radius of curvature
    private const double LipSize = 0.04; // in a, as all sizes below
    private const double TipCornerSize = 0.06;
    private const double RootSize = 0.12;
    private const double PoleIronSize = 0.27; // at the sources; 0.3 between them
    private const double PoleIronDepth = 2;
    private const double LipReach = 3; // lips are convex corners so near to the aperture, in a
    private const double TipReach = 12;
    private const double CoilShare = 0.25; // of a coil's shorter side
    private const double FrameShare = 1.0 / 20; // of the diagonal of all parts
    private const double CeilingShare = 1.0 / 12; // of the section's diagonal

    // The error of a corner falls like its element size to the power 1.3, that of a smooth field like the sixth power
    // (third-order elements; both measured): corners follow the fineness with the power 6/1.3, so that neither is wasted.
    private const double CornerPower = 4.6;

    private readonly CrossSection _section;
    private readonly Outline _aperture;
    private readonly IReadOnlyCollection<int> _magneticParts;
    private readonly double _fineness;
    private readonly List<(Point At, double Size)> _sources = [];
    private readonly double _partsDiagonal;

    private MeshSizing(CrossSection section, Outline aperture, IReadOnlyCollection<int> magneticParts, double fineness)
    {
        _section = section;
        _aperture = aperture;
        _magneticParts = magneticParts;
        _fineness = fineness;
        Box parts = Box.Empty;
        foreach (SectionEdge e in section.Edges.Where(e => !IsRim(e)))
        {
            parts = parts.Including(e.Curve.Bounds);
        }

        _partsDiagonal = parts.IsEmpty ? section.Bounds.Diagonal : parts.Diagonal;
        Gap = DistanceFromAperture(e => IsPart(e.Left) || IsPart(e.Right));
        Reach = Math.Max(2 * Gap, 2 * DistanceFromMiddle());
    }

    /// <summary>From the aperture to the nearest part, metres; the aperture's own size when nothing is near.</summary>
    public double Gap { get; }

    /// <summary>Twice the distance from the aperture's middle to the nearest magnetic part, metres: the scale of the tip.</summary>
    public double Reach { get; }

    /// <summary>The size field for a section and the aperture in which its field is wanted.</summary>
    /// <param name="section">Section.</param>
    /// <param name="aperture">Aperture, metres.</param>
    /// <param name="magneticParts">Indices of the parts that are not like air magnetically: iron, magnets.</param>
    /// <param name="fineness">Factor on every size; 1 is the rule, less is finer.</param>
    /// <exception cref="ArgumentOutOfRangeException">The fineness is not positive and finite.</exception>
    public static SizeField For(
        CrossSection section, Outline aperture, IReadOnlyCollection<int> magneticParts, double fineness = 1)
    {
        if (!(fineness > 0.0) || !double.IsFinite(fineness))
        {
            throw new ArgumentOutOfRangeException(
                nameof(fineness), FormattableString.Invariant($"The fineness must be positive and finite; got {fineness}."));
        }

        return Measure(section, aperture, magneticParts, fineness).ToField();
    }

    /// <summary>The scales the rules work in, without the field.</summary>
    internal static MeshSizing Measure(
        CrossSection section, Outline aperture, IReadOnlyCollection<int> magneticParts, double fineness = 1) =>
        new(section, aperture, magneticParts, fineness);

    private SizeField ToField()
    {
        AddAperture();
        foreach (SectionEdge e in _section.Edges.Where(e => !IsRim(e)))
        {
            AddCurve(e);
        }

        AddCorners();
        double ceiling = CeilingShare * Math.Max(_section.Bounds.Diagonal, _partsDiagonal);
        return SizeField.FromSources(_fineness * ceiling, Growth, _sources);
    }

    private void Add(Point at, double size) => _sources.Add((at, _fineness * size));

    private void AddCorner(Point at, double size) => _sources.Add((at, Math.Pow(_fineness, CornerPower) * size));

    // The aperture itself, its edge and a ring half-way to the nearest part, so that the layers hold across the gap.
    private void AddAperture()
    {
        const int most = 200; // sources across the aperture at most
        double size = Gap / LayersInGap;
        Box box = _aperture.Bounds;
        double step = Math.Max(size, Math.Max(box.Width, box.Height) / most);
        foreach (Curve c in _aperture.Curves)
        {
            foreach ((double t, Point p) in Along(c, step))
            {
                Add(p, size);
                Add(p - ((0.5 * Gap) * c.Derivative(t).Unit().Perpendicular), size);
            }
        }

        for (double y = box.Min.Y + (0.5 * step); y < box.Max.Y; y += step)
        {
            for (double z = box.Min.Z + (0.5 * step); z < box.Max.Z; z += step)
            {
                if (_aperture.Contains(new Point(y, z)))
                {
                    Add(new Point(y, z), size);
                }
            }
        }
    }

    private void AddCurve(SectionEdge e)
    {
        bool boundsIron = IsMagnetic(e.Left) != IsMagnetic(e.Right);
        double coarse = Math.Min(CoarseSize(e.Left), CoarseSize(e.Right));
        int inside = IsMagnetic(e.Left) ? 1 : -1;
        double t = 0;
        while (true)
        {
            Point p = e.Curve.At(t);
            double distance = DistanceToAperture(p);
            double size = SizeOnCurve(e, t, distance, coarse, boundsIron);
            Add(p, size);
            if (boundsIron && distance <= PoleIronDepth * Reach)
            {
                AddPoleIron(p, inside * e.Curve.Derivative(t).Unit().Perpendicular);
            }

            if (t >= 1)
            {
                return;
            }

            t = Math.Min(1, t + (size / e.Curve.Derivative(t).Length));
        }
    }

    private double SizeOnCurve(SectionEdge e, double t, double distance, double coarse, bool boundsIron)
    {
        double size = coarse;
        if (distance <= 2 * Gap)
        {
            size = Math.Min(size, Math.Max(distance, Gap) * GapShareOnCurves);
        }

        if (boundsIron && distance <= PoleIronDepth * Reach)
        {
            size = Math.Min(size, PoleIronSize * Reach);
            double curvature = e.Curve is Line ? 0 : Math.Abs(e.Curve.CurvatureAt(t));

            // Small roundings of edges are left to the largest turn per edge.
            size = curvature > 0 ? Math.Min(size, Math.Max(NoseShare / curvature, LipSize * Reach)) : size;
        }

        return size;
    }

    private void AddPoleIron(Point p, Point inwards)
    {
        const double step = 0.25;
        for (double depth = step; depth <= PoleIronDepth; depth += step)
        {
            Add(p + ((depth * Reach) * inwards), PoleIronSize * Reach);
        }
    }

    private void AddCorners()
    {
        foreach ((int vertex, double ironAngle) in IronCorners.Of(_section, _magneticParts))
        {
            Point p = _section.Vertices[vertex];
            double distance = DistanceToAperture(p) / Reach;
            if (ironAngle > Math.PI)
            {
                AddCorner(p, RootSize * Reach);
            }
            else if (distance <= TipReach)
            {
                AddCorner(p, (distance <= LipReach ? LipSize : TipCornerSize) * Reach);
            }
        }
    }

    private static bool IsRim(SectionEdge e) => e.Left == CrossSection.Outside || e.Right == CrossSection.Outside;

    private bool IsPart(int region) => region >= 0 && _section.Regions[region].Part >= 0;

    private bool IsMagnetic(int region) => IsPart(region) && _magneticParts.Contains(_section.Regions[region].Part);

    private double CoarseSize(int region)
    {
        double frame = FrameShare * _partsDiagonal;
        if (!IsPart(region) || IsMagnetic(region))
        {
            return frame;
        }

        Box box = _section.Regions[region].Bounds;
        return Math.Min(frame, CoilShare * Math.Min(box.Width, box.Height));
    }

    private double DistanceToAperture(Point p) => _aperture.Contains(p) ? 0 : _aperture.DistanceToEdge(p);

    private double DistanceFromAperture(Func<SectionEdge, bool> counts)
    {
        const int samples = 48;
        double size = _aperture.Bounds.Diagonal;
        double best = double.PositiveInfinity;
        foreach (SectionEdge e in _section.Edges.Where(counts))
        {
            foreach (Curve c in _aperture.Curves)
            {
                for (int i = 0; i <= samples; i++)
                {
                    double t = (double)i / samples;
                    best = Math.Min(best, Math.Min(e.Curve.DistanceTo(c.At(t)), c.DistanceTo(e.Curve.At(t))));
                }
            }
        }

        // An aperture that touches a part leaves no gap to fill; one that is far from all is its own scale.
        const double touching = 0.1, farthest = 10;
        return best > farthest * size ? size : best < LeastGap * size ? touching * size : best;
    }

    private double DistanceFromMiddle()
    {
        Point middle = _aperture.Centroid;
        double best = double.PositiveInfinity;
        foreach (SectionEdge e in _section.Edges.Where(e => IsMagnetic(e.Left) != IsMagnetic(e.Right)))
        {
            best = Math.Min(best, e.Curve.DistanceTo(middle));
        }

        double size = _aperture.Bounds.Diagonal;
        const double farthest = 20;
        return Math.Min(best, farthest * size);
    }

    private static IEnumerable<(double T, Point At)> Along(Curve curve, double step)
    {
        int pieces = (int)Math.Ceiling(curve.Length / step);
        for (int i = 0; i <= pieces; i++)
        {
            double t = (double)i / pieces;
            yield return (t, curve.At(t));
        }
    }
}
