using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>One shape that tuning has looked at.</summary>
/// <param name="Values">Of the freedoms.</param>
/// <param name="Section">The section they make.</param>
/// <param name="Solve">Its field.</param>
/// <param name="Clearance">Metres.</param>
internal sealed record TunePoint(double[] Values, CrossSection Section, FixedMeshSolve Solve, double Clearance);

/// <summary>What tuning makes small: the deviation of the gradient over the aperture, and what is beyond the holds.</summary>
internal sealed class TuneGoal
{
    private const double HoldWeight = 5.0;    // of a relative violation against the relative deviation
    private const double HoldMargin = 1e-3;   // holds are aimed at a little inside
    private const double AtBound = 5e-3;      // relative distance from a bound at which it counts as reached
    private const int MostPeaks = 6;          // places of greatest field in iron that steer at once

    private readonly Aperture _aperture;
    private readonly TuneSettings _settings;
    private readonly Point[] _places;
    private readonly double[] _weights;

    /// <param name="aperture">Where the beam flies.</param>
    /// <param name="settings">Goal and holds.</param>
    /// <param name="mirrored">The field is its own mirror image in y = 0, and shall stay so.</param>
    public TuneGoal(Aperture aperture, TuneSettings settings, bool mirrored)
    {
        (_aperture, _settings) = (aperture, settings);
        (_places, _weights) = TuneReach.Places(aperture, mirrored);
    }

    /// <summary>Rms of what is tuned.</summary>
    public double Rms(TunePoint point)
    {
        double[] values = [.. _places.Select(p => ValueOf(point.Solve.Field.At(p)))];
        double mean = values.Select((v, k) => _weights[k] * v).Sum();
        return Math.Sqrt(values.Select((v, k) => _weights[k] * (v - mean) * (v - mean)).Sum()) / Math.Abs(mean);
    }

    /// <summary>The sum of squares that steps make smaller.</summary>
    public double Merit(TunePoint point)
    {
        double rms = Rms(point);
        return (rms * rms) + _settings.Holds.Sum(h => Math.Pow(HoldWeight * Math.Max(0, Beyond(h, ValueOf(h, point))), 2));
    }

    /// <summary>Holds whose bound is reached.</summary>
    public IEnumerable<TuneHold> Reached(TunePoint point) => _settings.Holds.Where(h => Beyond(h, ValueOf(h, point)) > -AtBound);

    /// <summary>
    /// Residuals √w (q − m)/|m| at each place, q the gradient or its product with the field, then the holds; each with its derivatives by
    /// the freedoms.
    /// </summary>
    /// <param name="point">Shape and field.</param>
    /// <param name="velocities">How its curves move.</param>
    /// <param name="threads">Threads.</param>
    public List<StepRow> Rows(TunePoint point, BoundaryVelocities velocities, int threads)
    {
        var linear = LinearisedField.Of(point.Solve);
        var motion = MeshMotion.Of(linear.Solution.Problem.Space, linear.Chi, velocities);
        MotionResponse[] responses = MotionResponses.Of(linear, motion, threads);
        BeamValues[] values = [.. _places.Append(_aperture.Centre).Select(point.Solve.Field.At)];
        var changes = new BeamValues[responses.Length][];
        Parallel.For(0, responses.Length, new ParallelOptions { MaxDegreeOfParallelism = threads }, k =>
            changes[k] = [.. values.Select(v => responses[k].Field.At(v.At))]);
        double mean = _weights.Select((w, k) => w * ValueOf(values[k])).Sum();
        double[] byMean = [.. changes.Select(c => _weights.Select((w, k) => w * ChangeOf(values[k], c[k])).Sum())];
        var rows = new List<StepRow>();
        for (int k = 0; k < _places.Length; k++)
        {
            double root = Math.Sqrt(_weights[k]) / Math.Abs(mean);
            double share = ValueOf(values[k]) / mean;
            rows.Add(new StepRow(root * (ValueOf(values[k]) - mean), [.. changes.Select((c, i) => root * (ChangeOf(values[k], c[k]) - (share * byMean[i])))]));
        }

        foreach (TuneHold hold in _settings.Holds)
        {
            AddHold(rows, hold, point, (velocities, motion, responses, [.. changes.Select(c => c[^1])]));
        }

        return rows;
    }

    private void AddHold(
        List<StepRow> rows,
        TuneHold hold,
        TunePoint point,
        (BoundaryVelocities Velocities, MeshMotion Motion, MotionResponse[] Responses, BeamValues[] AtCentre) of)
    {
        BeamValues centre = point.Solve.Measures.Centre;
        switch (hold.Of)
        {
            case HeldQuantity.Field:
                Add(centre.Field, [.. of.AtCentre.Select(c => BeamChange.OfField(centre, c))]);
                break;
            case HeldQuantity.Gradient:
                Add(Math.Abs(centre.Gradient), [.. of.AtCentre.Select(c => Math.Sign(centre.Gradient) * BeamChange.OfGradient(centre, c))]);
                break;
            case HeldQuantity.Clearance:
                Add(point.Clearance, ClearanceChanges(point.Section, of.Velocities));
                break;
            default:
                var peaks = IronPeaks.Of(point.Solve.Solution, MostPeaks);
                for (int p = 0; p < peaks.Highest.Count; p++)
                {
                    Add(peaks.Highest[p].Field, [.. of.Responses.Select((r, k) => peaks.Change(p, r, of.Motion.Of(k)))]);
                }

                break;
        }

        void Add(double value, double[] changes)
        {
            double scale = (hold.AtLeast ? -1 : 1) * HoldWeight / hold.Bound;
            rows.Add(new StepRow(HoldWeight * Beyond(hold, value), [.. changes.Select(c => scale * c)], OneSided: true));
        }
    }

    // The clearance follows the place of a face that is nearest to the aperture along its normal.
    private double[] ClearanceChanges(CrossSection section, BoundaryVelocities velocities)
    {
        const int samples = 64;
        var shape = new ApertureShape(_aperture);
        (int Edge, double T) nearest = Enumerable.Range(0, section.Edges.Count)
            .Where(e => !velocities.IsAtRest(e))
            .SelectMany(e => Enumerable.Range(0, samples + 1).Select(k => (Edge: e, T: (double)k / samples)))
            .MinBy(p => shape.DistanceTo(section.Edges[p.Edge].Curve.At(p.T)));
        Curve curve = section.Edges[nearest.Edge].Curve;
        Point place = curve.At(nearest.T);
        Point away = (place - shape.NearestTo(place)).Unit();
        var own = new Point[velocities.Count];
        velocities.At(nearest.Edge, nearest.T, place, own);
        return [.. own.Select(v => v.Dot(away))];
    }

    private static double ValueOf(TuneHold hold, TunePoint point) => hold.Of switch
    {
        HeldQuantity.Field => point.Solve.Measures.Centre.Field,
        HeldQuantity.Gradient => Math.Abs(point.Solve.Measures.Centre.Gradient),
        HeldQuantity.Clearance => point.Clearance,
        _ => IronPeaks.Of(point.Solve.Solution, 1).Highest is [var peak, ..] ? peak.Field : 0,
    };

    // Relative distance beyond the bound, counted from a little inside; negative where the hold is kept.
    private static double Beyond(TuneHold hold, double value) =>
        ((hold.AtLeast ? hold.Bound - value : value - hold.Bound) / hold.Bound) + HoldMargin;

    private double ValueOf(in BeamValues v) => _settings.OfProduct ? v.Field * v.Gradient : v.Gradient;

    private double ChangeOf(in BeamValues at, in BeamValues change) => _settings.OfProduct
        ? (BeamChange.OfField(at, change) * at.Gradient) + (at.Field * BeamChange.OfGradient(at, change))
        : BeamChange.OfGradient(at, change);
}
