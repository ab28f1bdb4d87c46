namespace PoleField.Geometry;

/// <summary>
/// A smooth piece of a non-uniform rational B-spline, parameter 0 to 1 over its knot range. Its end knots are repeated
/// degree + 1 times, so it starts and ends at its first and last control points.
/// </summary>
/// <remarks>
/// Inside, no knot is repeated as often as the degree: the curve has a continuous tangent. <see cref="SmoothPieces"/>
/// cuts splines with kinks into such curves. Algorithms: L. Piegl and W. Tiller, The NURBS Book, 2nd ed., Springer 1997,
/// chapters 2 to 5 (from memory).
/// </remarks>
public sealed record Nurbs : Curve
{
    /// <summary>Highest degree that is read (the exchange format's range is 1 to 25).</summary>
    public const int HighestDegree = 25;

    // Knots nearer than this part of the range to a cut count as cut through: a sliver of a span has no digits.
    private const double KnotResolution = 1e-13;

    private readonly NurbsKnots _data;
    private readonly NurbsSpan[] _spans;

    /// <summary>Curve from degree, knots, control points and weights.</summary>
    /// <param name="degree">Polynomial degree, 1 to <see cref="HighestDegree"/>.</param>
    /// <param name="knots">Knots, not decreasing; number of control points + degree + 1 of them.</param>
    /// <param name="controls">Control points.</param>
    /// <param name="weights">Weights, &gt; 0, one per control point; null for all 1.</param>
    /// <exception cref="ArgumentException">The numbers do not fit together, or the curve has a kink inside or no length.</exception>
    public Nurbs(
        int degree, IReadOnlyList<double> knots, IReadOnlyList<Point> controls, IReadOnlyList<double>? weights = null)
        : this(NurbsKnots.Of(degree, knots, controls, weights), cut: true)
    {
    }

    private Nurbs(NurbsKnots data, bool cut)
    {
        if (data.Kinks().Count > 0)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"The spline may have a kink at knot {data.Kinks()[0]}; cut it into smooth pieces."));
        }

        _data = cut ? data.Restricted(data.From, data.To) : data;
        Start = _data.Controls[0].Place;
        End = _data.Controls[^1].Place;
        if (Array.TrueForAll(_data.Controls, c => c.Place == Start))
        {
            throw new ArgumentException("All control points of the spline coincide.");
        }

        var spans = new List<NurbsSpan>();
        for (int j = data.Degree; j < _data.Controls.Length; j++)
        {
            if (_data.Knots[j] < _data.Knots[j + 1])
            {
                spans.Add(new NurbsSpan(_data.Knots[j], _data.Knots[j + 1], _data.Bezier(j), Start));
            }
        }

        _spans = [.. spans];
    }

    /// <summary>Polynomial degree.</summary>
    public int Degree => _data.Degree;

    /// <summary>Knots; the end knots are there degree + 1 times.</summary>
    public IReadOnlyList<double> Knots => _data.Knots;

    /// <summary>Control points.</summary>
    public IReadOnlyList<Point> Controls => [.. _data.Controls.Select(c => c.Place)];

    /// <summary>Weights of the control points, &gt; 0.</summary>
    public IReadOnlyList<double> Weights => [.. _data.Controls.Select(c => c.Weight)];

    /// <summary>True when the weights differ.</summary>
    public bool IsRational => Array.Exists(_data.Controls, c => c.Weight != _data.Controls[0].Weight);

    /// <inheritdoc/>
    public override Point Start { get; }

    /// <inheritdoc/>
    public override Point End { get; }

    /// <inheritdoc/>
    public override double Length => ArcLength.Of(this, Breaks());

    /// <inheritdoc/>
    public override Box Bounds
    {
        get
        {
            Box ends = Box.Around(Start, End);
            foreach (NurbsSpan span in _spans)
            {
                ends = ends.Including(Start + span.Evaluate(1).Place);
            }

            return new Box(
                new Point(
                    Start.Y - Reach(new Point(-1, 0), Start.Y - ends.Min.Y),
                    Start.Z - Reach(new Point(0, -1), Start.Z - ends.Min.Z)),
                new Point(
                    Start.Y + Reach(new Point(1, 0), ends.Max.Y - Start.Y),
                    Start.Z + Reach(new Point(0, 1), ends.Max.Z - Start.Z)));
        }
    }

    /// <summary>Box around the control points, which holds the curve.</summary>
    internal Box Hull => _data.Controls.Aggregate(Box.Empty, (box, c) => box.Including(c.Place));

    /// <summary>Ranges between different knots, as parameters from 0 to 1: between neighbours the curve is one polynomial or rational piece.</summary>
    internal double[] Breaks() => [.. _spans.Select(s => Parameter(s.From)), 1.0];

    /// <summary>
    /// Cuts a spline, which may have kinks, any end knots and any degree, into curves that are smooth. Straight ones come
    /// back as lines; pieces of no length are left out.
    /// </summary>
    /// <exception cref="ArgumentException">The numbers do not fit together.</exception>
    public static IReadOnlyList<Curve> SmoothPieces(
        int degree, IReadOnlyList<double> knots, IReadOnlyList<Point> controls, IReadOnlyList<double>? weights = null)
    {
        NurbsKnots data = NurbsKnots.Of(degree, knots, controls, weights);
        double[] cuts = [data.From, .. data.Kinks(), data.To];
        var pieces = new List<Curve>();
        for (int i = 1; i < cuts.Length; i++)
        {
            NurbsKnots piece = data.Restricted(cuts[i - 1], cuts[i]);
            Point start = piece.Controls[0].Place;
            if (Array.TrueForAll(piece.Controls, c => c.Place == start))
            {
                continue;
            }

            pieces.Add(degree == 1 ? new Line(start, piece.Controls[^1].Place) : new Nurbs(piece, cut: false));
        }

        return pieces;
    }

    /// <summary>The curve with its ends moved to points that lie on it to rounding (so that neighbours meet exactly).</summary>
    public Nurbs WithEnds(Point start, Point end)
    {
        NurbsControl[] controls = [.. _data.Controls];
        controls[0] = controls[0] with { Place = start };
        controls[^1] = controls[^1] with { Place = end };
        return new Nurbs(_data with { Controls = controls }, cut: false);
    }

    /// <inheritdoc/>
    public override double AreaTerm(Point origin)
    {
        // Chord triangle about the origin plus the area between chord and curve, counted from the start.
        double between = 0;
        double chord = (End - Start).Length;
        foreach (NurbsSpan span in _spans)
        {
            double Integrand(double s)
            {
                (Point place, Point first, _) = span.Evaluate(s);
                return 0.5 * place.Cross(first);
            }

            if (span.IsPolynomial)
            {
                foreach ((double node, double weight) in GaussLegendre.Rule(span.Degree))
                {
                    between += weight * Integrand(node);
                }
            }
            else
            {
                double size = chord + span.Hull.Diagonal;
                between += ArcLength.Adaptive(Integrand, (0, 1), 1e-15 * size * size);
            }
        }

        return (0.5 * (Start - origin).Cross(End - origin)) + between;
    }

    /// <inheritdoc/>
    public override Point At(double t)
    {
        if (t <= 0.0)
        {
            return Start;
        }

        return t >= 1.0 ? End : Start + Evaluate(t).Place;
    }

    /// <inheritdoc/>
    public override Point Derivative(double t) => Evaluate(t).First;

    /// <inheritdoc/>
    public override Point SecondDerivative(double t) => Evaluate(t).Second;

    /// <inheritdoc/>
    public override Curve Reversed() => new Nurbs(
        new NurbsKnots(Degree, [.. _data.Knots.Reverse().Select(k => -k)], [.. _data.Controls.Reverse()]), cut: false);

    /// <inheritdoc/>
    public override Curve Part(double from, double to)
    {
        if (!(from >= 0.0) || !(from < to) || !(to <= 1.0))
        {
            throw new ArgumentException(FormattableString.Invariant($"A part needs 0 <= from < to <= 1; got {from} and {to}."));
        }

        NurbsKnots piece = _data.Restricted(Knot(from), Knot(to));
        return new Nurbs(piece, cut: false).WithEnds(At(from), At(to));
    }

    /// <inheritdoc/>
    public override Curve Transformed(Affine map)
    {
        NurbsControl[] controls = [.. _data.Controls.Select(c => c with { Place = map.Apply(c.Place) })];
        return new Nurbs(_data with { Controls = controls }, cut: false);
    }

    /// <inheritdoc/>
    public override double ClosestParameter(Point p)
    {
        double best = p.DistanceTo(End) < p.DistanceTo(Start) ? 1.0 : 0.0;
        double least = p.DistanceTo(At(best));
        foreach (NurbsSpan span in _spans)
        {
            double t = Parameter(span.From);
            double distance = p.DistanceTo(At(t));
            (least, best) = distance < least ? (distance, t) : (least, best);
        }

        // Two samples per possible extremum and one more; pieces whose control points are all farther away are left out.
        foreach (NurbsSpan span in _spans)
        {
            if (span.Hull.DistanceTo(p) <= least)
            {
                best = NearestPoint.Improve(this, p, best, (Parameter(span.From), Parameter(span.To)), (4 * Degree) + 1);
                least = Math.Min(least, p.DistanceTo(At(best)));
            }
        }

        return best;
    }

    /// <summary>True when both are the same curve, number for number.</summary>
    public bool Equals(Nurbs? other) =>
        other is not null && Degree == other.Degree
        && _data.Knots.AsSpan().SequenceEqual(other._data.Knots)
        && _data.Controls.AsSpan().SequenceEqual(other._data.Controls);

    /// <inheritdoc/>
    public override int GetHashCode() => HashCode.Combine(Degree, Start, End, _data.Knots.Length);

    private double Reach(Point direction, double known)
    {
        foreach (NurbsSpan span in _spans)
        {
            known = span.Reach(direction, known);
        }

        return known;
    }

    private double Parameter(double knot) => (knot - _data.From) / (_data.To - _data.From);

    private double Knot(double t)
    {
        double range = _data.To - _data.From;
        double knot = t >= 1.0 ? _data.To : _data.From + (t * range);
        NurbsSpan span = SpanAt(knot);
        double near = knot - span.From < span.To - knot ? span.From : span.To;
        return Math.Abs(knot - near) <= KnotResolution * range ? near : knot;
    }

    private NurbsSpan SpanAt(double knot)
    {
        int low = 0, high = _spans.Length - 1;
        while (low < high)
        {
            int middle = (low + high + 1) / 2;
            (low, high) = _spans[middle].From <= knot ? (middle, high) : (low, middle - 1);
        }

        return _spans[low];
    }

    private (Point Place, Point First, Point Second) Evaluate(double t)
    {
        double range = _data.To - _data.From;
        double knot = _data.From + (t * range);
        NurbsSpan span = SpanAt(knot);
        double width = span.To - span.From;
        (Point place, Point first, Point second) = span.Evaluate(Math.Clamp((knot - span.From) / width, 0.0, 1.0));
        double scale = range / width;
        return (place, scale * first, scale * scale * second);
    }
}
