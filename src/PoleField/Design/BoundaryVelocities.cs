using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>How the curves of a section move with each of several parameters.</summary>
internal abstract class BoundaryVelocities
{
    /// <summary>Number of parameters.</summary>
    public abstract int Count { get; }

    /// <summary>True when no parameter moves a curve.</summary>
    public abstract bool IsAtRest(int edge);

    /// <summary>Velocity of a place on a curve by each parameter, metres per unit.</summary>
    /// <param name="edge">Index of the section's edge.</param>
    /// <param name="parameter">Parameter on its curve.</param>
    /// <param name="place">The place itself, metres.</param>
    /// <param name="velocities">Written: one for each parameter.</param>
    public abstract void At(int edge, double parameter, Point place, Span<Point> velocities);
}

/// <summary>Shift along y and z and turn about a pivot of each of several parts, three parameters for each in this order.</summary>
internal sealed class PartVelocities : BoundaryVelocities
{
    private readonly BoundaryMotion[] _motions;

    /// <param name="section">Section.</param>
    /// <param name="parts">Parts, each with its pivot.</param>
    /// <param name="differ">True when an edge has different materials on its two sides.</param>
    public PartVelocities(CrossSection section, IReadOnlyList<(int Part, Point Pivot)> parts, Predicate<SectionEdge> differ)
    {
        _motions =
        [
            .. parts.SelectMany(p => new[]
            {
                BoundaryMotion.OfPart(section, p.Part, _ => new Point(1, 0), differ),
                BoundaryMotion.OfPart(section, p.Part, _ => new Point(0, 1), differ),
                BoundaryMotion.OfPart(section, p.Part, at => (at - p.Pivot).Perpendicular, differ),
            }),
        ];
    }

    public override int Count => _motions.Length;

    public override bool IsAtRest(int edge) => Array.TrueForAll(_motions, m => m.IsAtRest(edge));

    public override void At(int edge, double parameter, Point place, Span<Point> velocities)
    {
        for (int k = 0; k < _motions.Length; k++)
        {
            velocities[k] = _motions[k].At(edge, parameter);
        }
    }
}
