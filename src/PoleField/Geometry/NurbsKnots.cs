namespace PoleField.Geometry;

/// <summary>A control point and its weight.</summary>
internal readonly record struct NurbsControl(Point Place, double Weight)
{
    /// <summary>The control point <paramref name="s"/> of the way between two, in homogeneous coordinates.</summary>
    public static NurbsControl Blend(NurbsControl a, NurbsControl b, double s)
    {
        if (s == 1.0)
        {
            return b;
        }

        double before = (1 - s) * a.Weight;
        double after = s * b.Weight;
        double weight = before + after;
        return new NurbsControl(Point.Between(a.Place, b.Place, after / weight), weight);
    }
}

/// <summary>Knots and control points before they are known to form one smooth curve.</summary>
internal sealed record NurbsKnots(int Degree, double[] Knots, NurbsControl[] Controls)
{
    // Beyond, products of weights and places lose all digits; drawings have weights from 0.1 to 10.
    private const double LargestWeight = 1e12;

    /// <summary>Knots, control points and weights (all 1 when null) that fit together.</summary>
    /// <exception cref="ArgumentException">They do not.</exception>
    public static NurbsKnots Of(int degree, IReadOnlyList<double> knots, IReadOnlyList<Point> controls, IReadOnlyList<double>? weights)
    {
        if (weights is not null && weights.Count != controls.Count)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"it has {weights.Count} weights for {controls.Count} control points"));
        }

        NurbsKnots data = new(degree, [.. knots], [.. controls.Select((c, i) => new NurbsControl(c, weights?[i] ?? 1.0))]);
        return data.Fault() is { } fault ? throw new ArgumentException(fault) : data;
    }

    /// <summary>Start of the curve's parameter range: knot [degree].</summary>
    public double From => Knots[Degree];

    /// <summary>End of the curve's parameter range: knot [number of control points].</summary>
    public double To => Knots[Controls.Length];

    /// <summary>Says what is wrong with the numbers, or null.</summary>
    public string? Fault()
    {
        if (Degree is < 1 or > Nurbs.HighestDegree)
        {
            return FormattableString.Invariant($"the degree is {Degree}; 1 to {Nurbs.HighestDegree} is allowed");
        }

        if (Controls.Length < Degree + 1)
        {
            return FormattableString.Invariant(
                $"it has {Controls.Length} control points; degree {Degree} needs at least {Degree + 1}");
        }

        if (Knots.Length != Controls.Length + Degree + 1)
        {
            return FormattableString.Invariant(
                $"it has {Knots.Length} knots; {Controls.Length} control points of degree {Degree} need {Controls.Length + Degree + 1}");
        }

        if (!Array.TrueForAll(Controls, c => c.Place.IsFinite))
        {
            return "a control point is not finite";
        }

        if (Controls.FirstOrDefault(c => !(c.Weight >= 1 / LargestWeight) || !(c.Weight <= LargestWeight), new(default, 1)) is { Weight: not 1.0 and double weight })
        {
            return FormattableString.Invariant($"a weight is {weight}; {1 / LargestWeight:g3} to {LargestWeight:g3} is allowed");
        }

        for (int i = 0; i < Knots.Length; i++)
        {
            if (!double.IsFinite(Knots[i]) || (i > 0 && !(Knots[i] >= Knots[i - 1])))
            {
                return FormattableString.Invariant($"knot {i + 1} is {Knots[i]}; knots must not decrease");
            }
        }

        return From < To && double.IsFinite(To - From) ? null : "its first and last knots leave no range between them";
    }

    /// <summary>Interior knots at which the curve may have a kink: those as often repeated as the degree.</summary>
    public IReadOnlyList<double> Kinks()
    {
        var kinks = new List<double>();
        int run = 1;
        for (int i = 1; i < Knots.Length; i++)
        {
            run = Knots[i] == Knots[i - 1] ? run + 1 : 1;
            if (run == Degree && Knots[i] > From && Knots[i] < To)
            {
                kinks.Add(Knots[i]);
            }
        }

        return kinks;
    }

    /// <summary>
    /// The same curve over a part of its range, with end knots repeated degree + 1 times. Control points that need not
    /// change are kept to the bit.
    /// </summary>
    public NurbsKnots Restricted(double from, double to)
    {
        int first = Array.FindLastIndex(Knots, k => k <= from);
        int last = Array.FindIndex(Knots, first + 1, k => k >= to);

        // Only these control points and knots have a say between the two parameters.
        int lowest = first - Degree;
        var knots = new List<double>(Knots[lowest..(last + Degree + 1)]);
        var controls = new List<NurbsControl>(Controls[lowest..last]);
        Repeat(knots, controls, from, atStart: true);
        Repeat(knots, controls, to, atStart: false);
        first = knots.FindLastIndex(k => k == from);
        last = knots.FindIndex(k => k == to);
        double[] inner = [.. knots[(first - Degree + 1)..(last + Degree)]];
        return new NurbsKnots(Degree, [from, .. inner, to], [.. controls[(first - Degree)..last]]);
    }

    /// <summary>Control points of the Bézier form between two neighbouring different knots [j] and [j + 1].</summary>
    public NurbsControl[] Bezier(int j)
    {
        int p = Degree;
        double a = Knots[j], b = Knots[j + 1];

        // De Boor's triangle at b leaves the control points up to b, the second one at a those from a on.
        NurbsControl[] work = Controls[(j - p)..(j + 1)];
        double[] knots = Knots[(j - p + 1)..(j + p + 1)];
        for (int level = 1; level <= p; level++)
        {
            for (int i = p; i >= level; i--)
            {
                work[i] = NurbsControl.Blend(work[i - 1], work[i], Share(b, knots[i - 1], knots[i + p - level]));
            }
        }

        // In-place blending from the back keeps work[level] at its value of that level: the polygon up to b, in order.
        NurbsControl[] upToB = work;
        knots.AsSpan(p).Fill(b);
        for (int level = 1; level <= p; level++)
        {
            for (int i = 0; i <= p - level; i++)
            {
                // Index of the classical triangle: control i + level of this level, stored at i.
                upToB[i] = NurbsControl.Blend(upToB[i], upToB[i + 1], Share(a, knots[i + level - 1], knots[i + p]));
            }
        }

        return upToB;
    }

    private static double Share(double u, double low, double high) => (u - low) / (high - low);

    // Boehm's knot insertion until the knot is there degree times.
    private void Repeat(List<double> knots, List<NurbsControl> controls, double u, bool atStart)
    {
        int p = Degree;
        for (int count = knots.Count(k => k == u); count < p; count++)
        {
            int j = atStart ? knots.FindLastIndex(k => k <= u) : knots.FindIndex(k => k >= u) - 1;
            var blended = new NurbsControl[p];
            for (int i = j - p + 1; i <= j; i++)
            {
                double share = Share(u, knots[i], knots[i + p]);
                blended[i - (j - p + 1)] = NurbsControl.Blend(controls[i - 1], controls[i], share);
            }

            controls.RemoveRange(j - p + 1, p - 1);
            controls.InsertRange(j - p + 1, blended);
            knots.Insert(j + 1, u);
        }
    }
}
