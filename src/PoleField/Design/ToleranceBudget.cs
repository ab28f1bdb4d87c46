using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>What the errors of shape, place, current and material cost, to first order.</summary>
public sealed class ToleranceBudget
{
    private const double LeastShare = 3e-3; // of the total: 1e-5 of the variance

    private readonly Magnet _magnet;
    private readonly Sensitivity _sensitivity;
    private readonly int[][] _points;      // of each face, in rising arc length
    private readonly double[][] _arc;      // their arc lengths

    private ToleranceBudget(Magnet magnet, Sensitivity sensitivity, Tolerances tolerances)
    {
        _magnet = magnet;
        _sensitivity = sensitivity;
        Tolerances = tolerances;
        Faces = Face.Of(magnet);
        Derivatives = sensitivity.Derivatives(Quantities);
        (_points, _arc) = PointsOfFaces();
        Contributions =
        [
            .. Form().Concat(Places()).Concat(Others())
                .Where(c => c.OneSigma.Any(x => x > 0))
                .OrderByDescending(c => c.OneSigma[1]).ThenBy(c => c.Name, StringComparer.Ordinal),
        ];
    }

    /// <summary>
    /// The quantities of every list of effects: field and gradient at the beam, spread, mean and rms of the gradient over the aperture.
    /// </summary>
    public static IReadOnlyList<DesignQuantity> Quantities { get; } =
    [
        DesignQuantity.Field, DesignQuantity.Gradient, DesignQuantity.GradientSpread, DesignQuantity.GradientMean, DesignQuantity.GradientRms,
    ];

    /// <summary>The magnet.</summary>
    public Magnet Magnet => _magnet;

    /// <summary>Middle of the aperture, metres.</summary>
    public Point BeamPlace => _sensitivity.Measures.Centre.At;

    /// <summary>What was assumed.</summary>
    public Tolerances Tolerances { get; }

    /// <summary>Faces of the iron.</summary>
    public IReadOnlyList<Face> Faces { get; }

    /// <summary>Derivatives of each quantity.</summary>
    public IReadOnlyList<QuantityDerivatives> Derivatives { get; }

    /// <summary>Contributions, the greatest effect on the gradient first.</summary>
    public IReadOnlyList<ToleranceContribution> Contributions { get; }

    /// <summary>One sigma of each quantity: the root of the sum of squares.</summary>
    public IReadOnlyList<double> Total =>
        [.. Quantities.Select((_, q) => Math.Sqrt(Contributions.Sum(c => c.OneSigma[q] * c.OneSigma[q])))];

    /// <summary>Change of each quantity with every error at its one sigma and the worst sign.</summary>
    public IReadOnlyList<double> Worst => [.. Quantities.Select((_, q) => Contributions.Sum(c => c.Worst[q]))];

    /// <summary>Works out the budget of a solved magnet.</summary>
    public static ToleranceBudget Of(Sensitivity sensitivity, Tolerances tolerances) =>
        new(sensitivity.Magnet, sensitivity, tolerances);

    /// <summary>Points of a face in rising arc length: place, arc length and derivative densities of the quantities.</summary>
    public IEnumerable<FaceSensitivity> Along(int face)
    {
        for (int k = 0; k < _points[face].Length; k++)
        {
            int i = _points[face][k];
            yield return new FaceSensitivity(
                _arc[face][k], _sensitivity.Points[i].At, [.. Derivatives.Select(d => d.Density[i])]);
        }
    }

    /// <summary>
    /// The loosest form tolerances that together keep the one sigma of a quantity's form part: each stretch gets an equal share
    /// of the allowed variance.
    /// </summary>
    /// <param name="quantity">Index into <see cref="Quantities"/>.</param>
    /// <param name="allowed">Allowed one sigma, SI.</param>
    /// <param name="loosest">No stretch is given more, metres.</param>
    public IReadOnlyList<FormAllowance> Allowances(int quantity, double allowed, double loosest)
    {
        var stretches = new List<(int Face, double From, double To, double Variance)>();
        for (int f = 0; f < Faces.Count; f++)
        {
            int pieces = Math.Max(1, (int)Math.Ceiling(Faces[f].Length / StretchLength(f)));
            for (int k = 0; k < pieces; k++)
            {
                double from = k * Faces[f].Length / pieces, to = (k + 1) * Faces[f].Length / pieces;
                stretches.Add((f, from, to, FormError.Variance(Faces[f], Weighted(f, quantity, from, to), Tolerances.FormLength)));
            }
        }

        return [.. Shares(stretches, allowed * allowed, loosest)];
    }

    /// <summary>True when a face's form error has a share in some quantity that a trial could see.</summary>
    internal bool FormMatters(int face)
    {
        IReadOnlyList<double> total = Total;
        return Enumerable.Range(0, Quantities.Count).Any(q => Tolerances.FormSize
            * Math.Sqrt(FormError.Variance(Faces[face], Weighted(face, q, 0, Faces[face].Length), Tolerances.FormLength)) > LeastShare * total[q]);
    }

    /// <summary>True when a part's place has a share in some quantity that a trial could see.</summary>
    internal bool PlaceMatters(int part)
    {
        IReadOnlyList<double> total = Total;
        return Derivatives.Select((d, q) => (d.Parts[part], total[q])).Any(x =>
            Math.Max(
                Math.Max(Math.Abs(x.Item1.Shift.Y) * Tolerances.PlaceY, Math.Abs(x.Item1.Shift.Z) * Tolerances.PlaceZ),
                Math.Abs(x.Item1.Turn) * Tolerances.Turn) > LeastShare * x.Item2);
    }

    internal double StretchLength(int face) => Math.Max(Tolerances.FormLength, Faces[face].Length / 400);

    // Stretches that would get more than the loosest are given that; what they leave goes to the others.
    private static IEnumerable<FormAllowance> Shares(
        List<(int Face, double From, double To, double Variance)> stretches, double variance, double loosest)
    {
        var sorted = stretches.OrderBy(s => s.Variance).ToList();
        double left = variance;
        var sizes = new Dictionary<(int, double), double>();
        for (int k = 0; k < sorted.Count; k++)
        {
            double share = Math.Max(left, 0) / (sorted.Count - k);
            double size = sorted[k].Variance > 0 ? Math.Min(loosest, Math.Sqrt(share / sorted[k].Variance)) : loosest;
            sizes[(sorted[k].Face, sorted[k].From)] = size;
            left -= size * size * sorted[k].Variance;
        }

        return stretches.Select(s => new FormAllowance(s.Face, s.From, s.To, sizes[(s.Face, s.From)]));
    }

    private (int[][] Points, double[][] Arc) PointsOfFaces()
    {
        var lists = Faces.Select(_ => new List<(double At, int Point)>()).ToArray();
        var faceOf = new Dictionary<int, int>();
        for (int f = 0; f < Faces.Count; f++)
        {
            foreach (Face.FaceEdge e in Faces[f].Edges)
            {
                faceOf[e.SectionEdge] = f;
            }
        }

        for (int i = 0; i < _sensitivity.Points.Count; i++)
        {
            FacePoint p = _sensitivity.Points[i];
            if (faceOf.TryGetValue(p.SectionEdge, out int f))
            {
                lists[f].Add((Faces[f].ArcLengthAt(p.SectionEdge, p.Parameter)!.Value, i));
            }
        }

        (double At, int Point)[][] sorted = [.. lists.Select(l => l.OrderBy(x => x.At).ToArray())];
        return ([.. sorted.Select(l => l.Select(x => x.Point).ToArray())], [.. sorted.Select(l => l.Select(x => x.At).ToArray())]);
    }

    internal List<(double At, double Weight)> Weighted(int face, int quantity, double from, double to)
    {
        var points = new List<(double, double)>();
        for (int k = 0; k < _arc[face].Length; k++)
        {
            if (_arc[face][k] >= from && _arc[face][k] <= to)
            {
                int i = _points[face][k];
                points.Add((_arc[face][k], Derivatives[quantity].Density[i] * _sensitivity.Points[i].Length));
            }
        }

        return points;
    }

    private IEnumerable<ToleranceContribution> Form()
    {
        if (Tolerances.FormSize == 0)
        {
            yield break;
        }

        string assumed = FormattableString.Invariant($"{1e6 * Tolerances.FormSize:g4} um over {1e3 * Tolerances.FormLength:g4} mm");
        foreach (IGrouping<string, int> layer in Enumerable.Range(0, Faces.Count).GroupBy(f => Faces[f].Layer))
        {
            double[] sigma = new double[Quantities.Count], worst = new double[Quantities.Count];
            for (int q = 0; q < sigma.Length; q++)
            {
                double variance = 0;
                foreach (int f in layer)
                {
                    List<(double At, double Weight)> points = Weighted(f, q, 0, Faces[f].Length);
                    variance += FormError.Variance(Faces[f], points, Tolerances.FormLength);
                    worst[q] += Tolerances.FormSize * points.Sum(p => Math.Abs(p.Weight));
                }

                sigma[q] = Tolerances.FormSize * Math.Sqrt(variance);
            }

            yield return new ToleranceContribution("form of " + layer.Key, assumed, sigma, worst);
        }
    }

    private IEnumerable<ToleranceContribution> Places()
    {
        for (int part = 0; part < _magnet.Roles.Count; part++)
        {
            if (_magnet.Roles[part].Kind != "iron")
            {
                continue;
            }

            int p = part;
            string layer = _magnet.Roles[part].Layer;
            yield return Simple($"place of {layer} along y", Micrometres(Tolerances.PlaceY), d => d.Parts[p].Shift.Y * Tolerances.PlaceY);
            yield return Simple($"place of {layer} along z", Micrometres(Tolerances.PlaceZ), d => d.Parts[p].Shift.Z * Tolerances.PlaceZ);
            yield return Simple(
                $"turn of {layer}", FormattableString.Invariant($"{1e3 * Tolerances.Turn:g4} mrad"), d => d.Parts[p].Turn * Tolerances.Turn);
        }
    }

    private IEnumerable<ToleranceContribution> Others()
    {
        yield return Simple("ampere-turns", Percent(Tolerances.AmpereTurns), d => d.Parts.Sum(p => p.AmpereTurns) * Tolerances.AmpereTurns);
        foreach (IGrouping<string, int> material in Enumerable.Range(0, _magnet.Roles.Count)
            .Where(p => _magnet.Roles[p].Kind == "iron").GroupBy(p => _magnet.Roles[p].Material.Name))
        {
            int[] parts = [.. material];
            yield return Simple(
                "saturation of " + material.Key, Percent(Tolerances.Saturation), d => parts.Sum(p => d.Parts[p].Saturation) * Tolerances.Saturation);
        }

        yield return Simple("place of the beam along y", Micrometres(Tolerances.BeamY), d => d.BeamPlace.Y * Tolerances.BeamY);
        yield return Simple("place of the beam along z", Micrometres(Tolerances.BeamZ), d => d.BeamPlace.Z * Tolerances.BeamZ);
    }

    private ToleranceContribution Simple(string name, string assumed, Func<QuantityDerivatives, double> effect)
    {
        double[] effects = [.. Derivatives.Select(d => Math.Abs(effect(d)))];
        return new ToleranceContribution(name, assumed, effects, effects);
    }

    private static string Micrometres(double metres) => FormattableString.Invariant($"{1e6 * metres:g4} um");

    private static string Percent(double share) => FormattableString.Invariant($"{100 * share:g4} %");
}

/// <summary>Derivative densities at a place of a face.</summary>
/// <param name="ArcLength">From the face's start, metres.</param>
/// <param name="At">Place, metres.</param>
/// <param name="Density">Of each quantity, per metre of outward move and metre of face.</param>
public sealed record FaceSensitivity(double ArcLength, Point At, IReadOnlyList<double> Density);
