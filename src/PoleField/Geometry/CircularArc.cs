namespace PoleField.Geometry;

/// <summary>A piece of a circle, or a whole one, travelled either way at constant speed.</summary>
public sealed record CircularArc : Curve
{
    // Below this sweep, radians, the chord says more about the arc than the centre does.
    private const double ShallowSweep = 0.5;

    private readonly Point _start;
    private readonly Point _end;

    /// <summary>Arc from centre, radius, start angle and sweep.</summary>
    /// <param name="centre">Centre.</param>
    /// <param name="radius">Radius, &gt; 0.</param>
    /// <param name="startAngle">Angle of the start, radians from +y towards +z.</param>
    /// <param name="sweep">Signed angle travelled, radians, 0 &lt; |sweep| ≤ 2π; positive is counter-clockwise.</param>
    /// <exception cref="ArgumentException">A value is out of range or not finite.</exception>
    public CircularArc(Point centre, double radius, double startAngle, double sweep)
        : this(centre, radius, startAngle, sweep, null, null)
    {
    }

    /// <summary>Arc with ends that lie on it to rounding; null ends are computed.</summary>
    internal CircularArc(Point centre, double radius, double startAngle, double sweep, Point? start, Point? end)
    {
        if (!centre.IsFinite || !(radius > 0.0) || !double.IsFinite(radius) || !double.IsFinite(startAngle)
            || !(Math.Abs(sweep) > 0.0) || !(Math.Abs(sweep) <= Math.Tau * (1 + 1e-14)))
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"An arc needs radius > 0 and 0 < |sweep| <= 2π; got centre ({centre.Y}, {centre.Z}), radius {radius}, start {startAngle}, sweep {sweep}."));
        }

        Centre = centre;
        Radius = radius;
        StartAngle = startAngle;
        Sweep = sweep;
        _start = start ?? (centre + Point.Polar(radius, startAngle));
        _end = end ?? (IsFullCircle ? _start : centre + Point.Polar(radius, startAngle + sweep));
    }

    /// <summary>Centre of the circle.</summary>
    public Point Centre { get; }

    /// <summary>Radius, &gt; 0.</summary>
    public double Radius { get; }

    /// <summary>Angle of the start, radians from +y towards +z.</summary>
    public double StartAngle { get; }

    /// <summary>Signed angle travelled, radians; positive is counter-clockwise.</summary>
    public double Sweep { get; }

    /// <summary>True for a whole circle.</summary>
    public bool IsFullCircle => Math.Abs(Sweep) >= Math.Tau * (1 - 1e-14);

    /// <inheritdoc/>
    public override Point Start => _start;

    /// <inheritdoc/>
    public override Point End => _end;

    /// <inheritdoc/>
    public override double Length => Radius * Math.Abs(Sweep);

    /// <inheritdoc/>
    public override Box Bounds
    {
        get
        {
            Box box = Box.Around(_start, _end);
            double low = Math.Min(StartAngle, StartAngle + Sweep);
            double high = Math.Max(StartAngle, StartAngle + Sweep);
            const double quarter = Math.PI / 2;
            for (double k = Math.Ceiling(low / quarter); k * quarter <= high; k++)
            {
                int turn = (int)(((k % 4) + 4) % 4);
                Point direction = turn switch { 0 => new(1, 0), 1 => new(0, 1), 2 => new(-1, 0), _ => new(0, -1) };
                box = box.Including(Centre + (Radius * direction));
            }

            return box;
        }
    }

    /// <summary>Arc between two points with the given bulge: tangent of a quarter of the sweep, positive to the left.</summary>
    /// <exception cref="ArgumentException">The points coincide or the bulge is zero or not finite.</exception>
    public static CircularArc FromBulge(Point start, Point end, double bulge)
    {
        Point chord = end - start;
        double half = 0.5 * chord.Length;
        double sweep = 4 * Math.Atan(bulge);
        double radius = half * (1 + (bulge * bulge)) / (2 * Math.Abs(bulge));
        double apothem = half * (1 - (bulge * bulge)) / (2 * bulge);
        Point centre = Point.Between(start, end, 0.5) + ((apothem / (2 * half)) * chord.Perpendicular);
        Point fromCentre = start - centre;
        return new CircularArc(centre, radius, Math.Atan2(fromCentre.Z, fromCentre.Y), sweep, start, end);
    }

    /// <summary>The arc with its ends replaced by points that lie on it to rounding (so that neighbours meet exactly).</summary>
    public CircularArc WithEnds(Point start, Point end) => new(Centre, Radius, StartAngle, Sweep, start, end);

    /// <inheritdoc/>
    public override double AreaTerm(Point origin)
    {
        // Chord triangle about the origin plus the circular segment; the segment is exact for any sweep.
        double segment = 0.5 * Radius * Radius * SweepMinusSine(Sweep);
        return (0.5 * (_start - origin).Cross(_end - origin)) + segment;
    }

    /// <summary>x − sin x without cancellation: shallow arcs keep the digits of their segment.</summary>
    internal static double SweepMinusSine(double x)
    {
        if (Math.Abs(x) > 1.0)
        {
            return x - Math.Sin(x);
        }

        double term = x * x * x / 6;
        double sum = 0;
        for (int k = 4; Math.Abs(term) > 1e-18 * Math.Abs(sum); k += 2)
        {
            sum += term;
            term *= -x * x / (k * (k + 1));
        }

        return sum;
    }

    /// <inheritdoc/>
    public override Point At(double t)
    {
        if (t <= 0.0)
        {
            return _start;
        }

        if (t >= 1.0)
        {
            return _end;
        }

        if (Math.Abs(Sweep) > ShallowSweep)
        {
            return Centre + Point.Polar(Radius, StartAngle + (t * Sweep));
        }

        // Inscribed angles from the start: the far centre of a shallow arc would cost digits.
        double half = 0.5 * Sweep;
        Point chord = (Math.Sin(t * half) / Math.Sin(half)) * (_end - _start);
        (double s, double c) = Math.SinCos((t - 1) * half);
        return _start + (c * chord) + (s * chord.Perpendicular);
    }

    /// <inheritdoc/>
    public override Point Derivative(double t) => Sweep * Point.Polar(Radius, StartAngle + (t * Sweep)).Perpendicular;

    /// <inheritdoc/>
    public override Point SecondDerivative(double t) => -(Sweep * Sweep) * Point.Polar(Radius, StartAngle + (t * Sweep));

    /// <inheritdoc/>
    public override Curve Reversed() => new CircularArc(Centre, Radius, StartAngle + Sweep, -Sweep, _end, _start);

    /// <inheritdoc/>
    public override Curve Part(double from, double to) => new CircularArc(
        Centre, Radius, StartAngle + (from * Sweep), (to - from) * Sweep, At(from), At(to));

    /// <inheritdoc/>
    public override Curve Transformed(Affine map)
    {
        if (!map.IsSimilarity)
        {
            return new EllipticArc(Centre, new Point(Radius, 0), Radius, StartAngle, Sweep).Transformed(map);
        }

        Point centre = map.Apply(Centre);
        double scale = Math.Sqrt(Math.Abs(map.Determinant));
        Point toStart = map.ApplyToDisplacement(Point.Polar(1, StartAngle));
        double sweep = map.Determinant > 0 ? Sweep : -Sweep;
        return new CircularArc(
            centre, scale * Radius, Math.Atan2(toStart.Z, toStart.Y), sweep, map.Apply(_start), map.Apply(_end));
    }

    /// <inheritdoc/>
    public override double ClosestParameter(Point p)
    {
        Point d = p - Centre;
        double angle = Math.Atan2(d.Z, d.Y) - StartAngle;
        double along = Sweep > 0 ? angle : -angle;
        along -= Math.Tau * Math.Floor(along / Math.Tau);
        double extent = Math.Abs(Sweep);
        if (along <= extent)
        {
            return along / extent;
        }

        return p.DistanceTo(_start) < p.DistanceTo(_end) ? 0.0 : 1.0;
    }
}
