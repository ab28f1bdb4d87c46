namespace PoleField.Geometry;

/// <summary>A straight piece between two different points.</summary>
public sealed record Line : Curve
{
    /// <summary>Joins two points.</summary>
    /// <exception cref="ArgumentException">The points coincide or are not finite.</exception>
    public Line(Point start, Point end)
    {
        if (!start.IsFinite || !end.IsFinite || start == end)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"A line needs two different finite points; got ({start.Y}, {start.Z}) and ({end.Y}, {end.Z})."));
        }

        Start = start;
        End = end;
    }

    /// <inheritdoc/>
    public override Point Start { get; }

    /// <inheritdoc/>
    public override Point End { get; }

    /// <inheritdoc/>
    public override double Length => Start.DistanceTo(End);

    /// <inheritdoc/>
    public override Box Bounds => new Box(Start, Start).Including(End);

    /// <inheritdoc/>
    public override double AreaTerm(Point origin) => 0.5 * (Start - origin).Cross(End - origin);

    /// <inheritdoc/>
    public override Point At(double t) => t >= 1.0 ? End : Point.Between(Start, End, t);

    /// <inheritdoc/>
    public override Point Derivative(double t) => End - Start;

    /// <inheritdoc/>
    public override Point SecondDerivative(double t) => default;

    /// <inheritdoc/>
    public override Curve Reversed() => new Line(End, Start);

    /// <inheritdoc/>
    public override Curve Part(double from, double to) => new Line(At(from), At(to));

    /// <inheritdoc/>
    public override Curve Transformed(Affine map) => new Line(map.Apply(Start), map.Apply(End));

    /// <inheritdoc/>
    public override double ClosestParameter(Point p)
    {
        Point d = End - Start;
        return Math.Clamp((p - Start).Dot(d) / d.SquaredLength, 0.0, 1.0);
    }
}
