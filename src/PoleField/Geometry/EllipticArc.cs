namespace PoleField.Geometry;

/// <summary>
/// A piece of an ellipse: centre + cos(u)·major + sin(u)·minor, the eccentric angle u running from
/// <see cref="StartAngle"/> over <see cref="Sweep"/>.
/// </summary>
public sealed record EllipticArc : Curve
{
    // Brackets of the nearest-point search per full turn; the distance to an ellipse has at most two minima.
    private const int SamplesPerTurn = 32;

    private readonly Point _start;
    private readonly Point _end;

    /// <summary>Arc of an ellipse.</summary>
    /// <param name="centre">Centre.</param>
    /// <param name="major">Half axis vector at eccentric angle 0.</param>
    /// <param name="minorLength">Length of the other half axis, perpendicular to <paramref name="major"/>, counter-clockwise of it.</param>
    /// <param name="startAngle">Eccentric angle of the start, radians.</param>
    /// <param name="sweep">Signed eccentric angle travelled, radians, 0 &lt; |sweep| ≤ 2π.</param>
    /// <exception cref="ArgumentException">A value is out of range or not finite.</exception>
    public EllipticArc(Point centre, Point major, double minorLength, double startAngle, double sweep)
        : this(centre, major, minorLength, startAngle, sweep, null, null)
    {
    }

    private EllipticArc(
        Point centre, Point major, double minorLength, double startAngle, double sweep, Point? start, Point? end)
    {
        if (!centre.IsFinite || !major.IsFinite || !(major.Length > 0.0) || !(minorLength > 0.0)
            || !double.IsFinite(minorLength) || !double.IsFinite(startAngle)
            || !(Math.Abs(sweep) > 0.0) || !(Math.Abs(sweep) <= Math.Tau * (1 + 1e-14)))
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"An elliptic arc needs two half axes > 0 and 0 < |sweep| <= 2π; got centre ({centre.Y}, {centre.Z}), half axes ({major.Y}, {major.Z}) and {minorLength}, start {startAngle}, sweep {sweep}."));
        }

        Centre = centre;
        Major = major;
        MinorLength = minorLength;
        StartAngle = startAngle;
        Sweep = sweep;
        _start = start ?? OnEllipse(startAngle);
        _end = end ?? (IsFullEllipse ? _start : OnEllipse(startAngle + sweep));
    }

    /// <summary>Centre of the ellipse.</summary>
    public Point Centre { get; }

    /// <summary>Half axis vector at eccentric angle 0.</summary>
    public Point Major { get; }

    /// <summary>Length of the half axis perpendicular to <see cref="Major"/>.</summary>
    public double MinorLength { get; }

    /// <summary>Eccentric angle of the start, radians.</summary>
    public double StartAngle { get; }

    /// <summary>Signed eccentric angle travelled, radians.</summary>
    public double Sweep { get; }

    /// <summary>Half axis vector at eccentric angle π/2.</summary>
    public Point Minor => (MinorLength / Major.Length) * Major.Perpendicular;

    /// <summary>True for a whole ellipse.</summary>
    public bool IsFullEllipse => Math.Abs(Sweep) >= Math.Tau * (1 - 1e-14);

    /// <inheritdoc/>
    public override Point Start => _start;

    /// <inheritdoc/>
    public override Point End => _end;

    /// <inheritdoc/>
    public override double Length => ArcLength.Of(this, [0.0, 0.25, 0.5, 0.75, 1.0]);

    /// <inheritdoc/>
    public override Box Bounds
    {
        get
        {
            Point minor = Minor;
            double highestY = Math.Atan2(minor.Y, Major.Y);
            double highestZ = Math.Atan2(minor.Z, Major.Z);
            Box box = Box.Around(_start, _end);
            foreach (double angle in (ReadOnlySpan<double>)[highestY, highestY + Math.PI, highestZ, highestZ + Math.PI])
            {
                double along = Sweep > 0 ? angle - StartAngle : StartAngle - angle;
                along -= Math.Tau * Math.Floor(along / Math.Tau);
                if (along <= Math.Abs(Sweep))
                {
                    box = box.Including(OnEllipse(angle));
                }
            }

            return box;
        }
    }

    /// <summary>The arc with its ends replaced by points that lie on it to rounding (so that neighbours meet exactly).</summary>
    public EllipticArc WithEnds(Point start, Point end) =>
        new(Centre, Major, MinorLength, StartAngle, Sweep, start, end);

    /// <inheritdoc/>
    public override double AreaTerm(Point origin)
    {
        // Affine image of the circle's chord triangle and segment.
        double segment = 0.5 * Major.Length * MinorLength * CircularArc.SweepMinusSine(Sweep);
        return (0.5 * (_start - origin).Cross(_end - origin)) + segment;
    }

    /// <inheritdoc/>
    public override Point At(double t)
    {
        if (t <= 0.0)
        {
            return _start;
        }

        return t >= 1.0 ? _end : OnEllipse(StartAngle + (t * Sweep));
    }

    /// <inheritdoc/>
    public override Point Derivative(double t)
    {
        (double s, double c) = Math.SinCos(StartAngle + (t * Sweep));
        return (-Sweep * s * Major) + (Sweep * c * Minor);
    }

    /// <inheritdoc/>
    public override Point SecondDerivative(double t)
    {
        (double s, double c) = Math.SinCos(StartAngle + (t * Sweep));
        double square = Sweep * Sweep;
        return (-square * c * Major) - (square * s * Minor);
    }

    /// <inheritdoc/>
    public override Curve Reversed() => new EllipticArc(
        Centre, Major, MinorLength, StartAngle + Sweep, -Sweep, _end, _start);

    /// <inheritdoc/>
    public override Curve Part(double from, double to) => new EllipticArc(
        Centre, Major, MinorLength, StartAngle + (from * Sweep), (to - from) * Sweep, At(from), At(to));

    /// <inheritdoc/>
    public override Curve Transformed(Affine map)
    {
        // The images of the half axes are conjugate half diameters; turning them by φ makes them perpendicular
        // (one step of a one-sided Jacobi iteration, exact for two vectors).
        Point a = map.ApplyToDisplacement(Major);
        Point b = map.ApplyToDisplacement(Minor);
        double phi = 0.5 * Math.Atan2(2 * a.Dot(b), a.SquaredLength - b.SquaredLength);
        (double s, double c) = Math.SinCos(phi);
        Point major = (c * a) + (s * b);
        double cross = a.Cross(b);
        double turn = Math.Sign(cross);
        return new EllipticArc(
            map.Apply(Centre),
            major,
            Math.Abs(cross) / major.Length,
            turn * (StartAngle - phi),
            turn * Sweep,
            map.Apply(_start),
            map.Apply(_end));
    }

    /// <inheritdoc/>
    public override double ClosestParameter(Point p)
    {
        int samples = Math.Max(4, (int)Math.Ceiling(SamplesPerTurn * Math.Abs(Sweep) / Math.Tau));
        double best = p.DistanceTo(_end) < p.DistanceTo(_start) ? 1.0 : 0.0;
        return NearestPoint.Improve(this, p, best, (0.0, 1.0), samples);
    }

    private Point OnEllipse(double angle)
    {
        (double s, double c) = Math.SinCos(angle);
        return Centre + (c * Major) + (s * Minor);
    }
}
