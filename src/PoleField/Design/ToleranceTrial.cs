using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>A budget tried on full solves of magnets with random errors.</summary>
/// <param name="Draws">Number of magnets.</param>
/// <param name="Predicted">Standard deviation of each quantity by the budget, of the errors that were drawn.</param>
/// <param name="Found">Standard deviation over the solves.</param>
/// <param name="Residual">Root mean square of solve less linear prediction, draw by draw: what the linear model leaves out.</param>
public sealed record ToleranceTrial(
    int Draws, IReadOnlyList<double> Predicted, IReadOnlyList<double> Found, IReadOnlyList<double> Residual)
{
    private const double TooFar = 0.2; // of the deviation found

    /// <summary>Relative sampling error of a standard deviation found from so many draws, one sigma.</summary>
    public double SamplingError => 1 / Math.Sqrt(2.0 * (Draws - 1));

    /// <summary>True when the linear budget of a quantity is not enough: what it leaves out is a good part of what was found.</summary>
    /// <param name="quantity">Index into <see cref="ToleranceBudget.Quantities"/>.</param>
    public bool IsBeyondLinear(int quantity) => Residual[quantity] > TooFar * Found[quantity];

    /// <summary>True when budget and solves differ by more than three sampling errors.</summary>
    /// <param name="quantity">Index into <see cref="ToleranceBudget.Quantities"/>.</param>
    public bool Disagrees(int quantity) =>
        Math.Abs(Found[quantity] - Predicted[quantity]) > 3 * SamplingError * Math.Max(Found[quantity], Predicted[quantity]);

    /// <summary>
    /// Draws errors of form, place, current, material and beam, and solves each magnet anew. Faces and places without a share in
    /// any quantity (1e-5 of the variance) are left as drawn.
    /// </summary>
    /// <param name="budget">Budget.</param>
    /// <param name="aperture">Where the beam flies.</param>
    /// <param name="options">Number of draws, seed, threads.</param>
    /// <param name="progress">Called with the number of magnets solved.</param>
    /// <param name="cancellation">Stops between solves.</param>
    public static ToleranceTrial Run(
        ToleranceBudget budget, Aperture aperture, TrialOptions options, Action<int>? progress = null, CancellationToken cancellation = default)
    {
        var random = new Random(options.Seed);
        Magnet magnet = budget.Magnet;
        FixedMeshSolve nominal = FixedMeshSolve.Of(
            magnet, new FixedMeshOptions(aperture, options.Threads) { Fineness = options.Fineness, Cancellation = cancellation });
        int quantities = ToleranceBudget.Quantities.Count;
        var found = new double[options.Draws][];
        var linear = new double[options.Draws][];
        for (int k = 0; k < options.Draws; k++)
        {
            var draw = TrialDraw.Of(budget, random);
            Point by = draw.Beam;
            var moved = new Aperture(Outline.FromCurves([.. aperture.Outline.Curves.Select(c => c.Transformed(Affine.Shift(by)))]));
            FixedMeshSolve solve = FixedMeshSolve.Of(
                draw.Of(magnet, budget),
                new FixedMeshOptions(moved, options.Threads) { Fineness = options.Fineness, Cancellation = cancellation },
                nominal.Solution);
            found[k] = [.. ToleranceBudget.Quantities.Select(q => q.Value(solve.Measures) - q.Value(nominal.Measures))];
            linear[k] = draw.Linear(budget);
            progress?.Invoke(k + 1);
        }

        double Deviation(Func<int, double> value)
        {
            double mean = Enumerable.Range(0, options.Draws).Average(value);
            return Math.Sqrt(Enumerable.Range(0, options.Draws).Sum(k => Math.Pow(value(k) - mean, 2)) / Math.Max(1, options.Draws - 1));
        }

        return new ToleranceTrial(
            options.Draws,
            budget.Total,
            [.. Enumerable.Range(0, quantities).Select(q => Deviation(k => found[k][q]))],
            [.. Enumerable.Range(0, quantities).Select(q => Math.Sqrt(Enumerable.Range(0, options.Draws).Average(k => Math.Pow(found[k][q] - linear[k][q], 2))))]);
    }
}

/// <summary>How a budget is tried.</summary>
/// <param name="Draws">Number of magnets, at least 2.</param>
/// <param name="Threads">Threads, at least 1.</param>
public sealed record TrialOptions(int Draws, int Threads)
{
    /// <summary>Seed of the random numbers: the same seed, the same magnets.</summary>
    public int Seed { get; init; } = 1;

    /// <summary>Factor on the rules' element sizes.</summary>
    public double Fineness { get; init; } = 1.0;
}

/// <summary>One set of random errors.</summary>
internal sealed class TrialDraw
{
    private readonly Func<double, double>[] _form; // of each face, metres
    private readonly (Point Shift, double Turn)[] _places; // of each part
    private readonly double[] _saturation; // of each part, relative
    private readonly double _current;

    private TrialDraw(Func<double, double>[] form, (Point Shift, double Turn)[] places, double[] saturation, double current, Point beam)
    {
        (_form, _places, _saturation, _current, Beam) = (form, places, saturation, current, beam);
    }

    /// <summary>Shift of the beam, metres.</summary>
    public Point Beam { get; }

    public static TrialDraw Of(ToleranceBudget budget, Random random)
    {
        Tolerances t = budget.Tolerances;
        Func<double, double>[] form =
        [
            .. budget.Faces.Select((f, k) =>
            {
                Func<double, double> unit = FormError.Draw(f, t.FormLength, random);
                return budget.FormMatters(k) ? s => t.FormSize * unit(s) : (Func<double, double>)(_ => 0);
            }),
        ];
        var materials = new Dictionary<string, double>();
        var places = new (Point, double)[budget.Magnet.Roles.Count];
        var saturation = new double[places.Length];
        for (int part = 0; part < places.Length; part++)
        {
            PartRole role = budget.Magnet.Roles[part];
            if (role.Kind == "iron" && budget.PlaceMatters(part))
            {
                places[part] = (
                    new Point(t.PlaceY * FormError.Normal(random), t.PlaceZ * FormError.Normal(random)), t.Turn * FormError.Normal(random));
            }

            if (role.Kind == "iron")
            {
                materials.TryAdd(role.Material.Name, t.Saturation * FormError.Normal(random));
                saturation[part] = materials[role.Material.Name];
            }
        }

        return new TrialDraw(
            form,
            places,
            saturation,
            t.AmpereTurns * FormError.Normal(random),
            new Point(t.BeamY * FormError.Normal(random), t.BeamZ * FormError.Normal(random)));
    }

    /// <summary>The magnet with these errors; parts move with their joints closed.</summary>
    public Magnet Of(Magnet magnet, ToleranceBudget budget)
    {
        double Move(FacePlace place)
        {
            int part = place.Face.Part;
            (Point shift, double turn) = _places[part];
            Point pivot = budget.Derivatives[0].Parts[part].Pivot;
            return _form[IndexOf(budget, place.Face)](place.ArcLength) + (shift + (turn * (place.At - pivot).Perpendicular)).Dot(place.Outward);
        }

        double spacing = budget.Tolerances.FormSize > 0 ? budget.Tolerances.FormLength / 3 : double.PositiveInfinity;
        return magnet.WithCurrentsScaled(1 + _current) with
        {
            Section = MovedSection.Of(magnet.Section, budget.Faces, Move, spacing),
            Roles =
            [
                .. magnet.Roles.Select((r, p) => r with
                {
                    AmpereTurns = (1 + _current) * r.AmpereTurns,
                    Material = _saturation[p] == 0 ? r.Material : r.Material.WithSaturationScaled(1 + _saturation[p]),
                }),
            ],
        };
    }

    /// <summary>What the derivatives say.</summary>
    public double[] Linear(ToleranceBudget budget)
    {
        var sums = new double[ToleranceBudget.Quantities.Count];
        for (int q = 0; q < sums.Length; q++)
        {
            QuantityDerivatives d = budget.Derivatives[q];
            sums[q] = Beam.Dot(d.BeamPlace);
            for (int part = 0; part < _places.Length; part++)
            {
                sums[q] += _places[part].Shift.Dot(d.Parts[part].Shift) + (_places[part].Turn * d.Parts[part].Turn)
                    + (_current * d.Parts[part].AmpereTurns) + (_saturation[part] * d.Parts[part].Saturation);
            }

            for (int f = 0; f < budget.Faces.Count; f++)
            {
                sums[q] += budget.Weighted(f, q, 0, budget.Faces[f].Length).Sum(p => p.Weight * _form[f](p.At));
            }
        }

        return sums;
    }

    private static int IndexOf(ToleranceBudget budget, Face face)
    {
        for (int f = 0; f < budget.Faces.Count; f++)
        {
            if (ReferenceEquals(budget.Faces[f], face))
            {
                return f;
            }
        }

        throw new ArgumentException("The face is not of this budget.");
    }
}
