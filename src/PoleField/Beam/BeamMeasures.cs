namespace PoleField.Beam;

/// <summary>The beam's numbers of one extracted field; comparing two of them gives the errors of all numbers at once.</summary>
internal sealed record BeamMeasures
{
    private const double GradientOfNote = 0.1; // change of the field over the aperture, relative

    public required BeamValues Centre { get; init; }

    public required ApertureStatistics Field { get; init; }

    public required ApertureStatistics Gradient { get; init; }

    public required ApertureStatistics FieldTimesGradient { get; init; }

    public required BeamValues[] Inside { get; init; }

    public required BeamValues[] Edge { get; init; }

    public required BeamValues[] ProfileY { get; init; }

    public required BeamValues[] ProfileZ { get; init; }

    public static BeamMeasures Of(BeamField field, ApertureSamples samples)
    {
        BeamValues[] inside = [.. samples.Inside.Select(field.At)];
        BeamValues[] edge = [.. samples.Edge.Select(field.At)];
        return new BeamMeasures
        {
            Centre = field.At(samples.Centre),
            Field = Statistics(inside, edge, samples.Weights, v => v.Field),
            Gradient = Statistics(inside, edge, samples.Weights, v => v.Gradient),
            FieldTimesGradient = Statistics(inside, edge, samples.Weights, v => v.Field * v.Gradient),
            Inside = inside,
            Edge = edge,
            ProfileY = [.. samples.ProfileY.Select(field.At)],
            ProfileZ = [.. samples.ProfileZ.Select(field.At)],
        };
    }

    /// <summary>Largest difference of |B| between two fields at all sample points, over the largest |B|.</summary>
    public double FieldDifference(BeamMeasures other) =>
        Largest(other, v => v.Field) / Math.Max(Math.Abs(Field.Max), Math.Abs(Field.Min));

    /// <summary>Largest difference of G between two fields at all sample points, over the largest |G| (see <see cref="LeastGradient"/>).</summary>
    public double GradientDifference(BeamMeasures other) =>
        LargestGradientDifference(other) / Math.Max(
            Math.Max(Math.Abs(Gradient.Max), Math.Abs(Gradient.Min)),
            LeastGradient(Math.Max(Math.Abs(Field.Max), Math.Abs(Field.Min)), Edge.Max(v => v.At.DistanceTo(Centre.At))));

    /// <summary>Largest difference of G between two fields at all sample points, T/m.</summary>
    public double LargestGradientDifference(BeamMeasures other) => Largest(other, v => v.Gradient);

    /// <summary>
    /// Gradient that counts as none, T/m: it changes the field by a tenth over the aperture's greatest reach from its centre.
    /// In a uniform field the accuracy asked for is relative to this.
    /// </summary>
    public static double LeastGradient(double field, double reach) => GradientOfNote * field / reach;

    private double Largest(BeamMeasures other, Func<BeamValues, double> quantity)
    {
        double worst = Math.Abs(quantity(Centre) - quantity(other.Centre));
        for (int i = 0; i < Inside.Length; i++)
        {
            worst = Math.Max(worst, Math.Abs(quantity(Inside[i]) - quantity(other.Inside[i])));
        }

        for (int i = 0; i < Edge.Length; i++)
        {
            worst = Math.Max(worst, Math.Abs(quantity(Edge[i]) - quantity(other.Edge[i])));
        }

        return worst;
    }

    private static ApertureStatistics Statistics(
        BeamValues[] inside, BeamValues[] edge, double[] weights, Func<BeamValues, double> quantity)
    {
        double mean = 0;
        double min = double.PositiveInfinity;
        double max = double.NegativeInfinity;
        for (int i = 0; i < inside.Length; i++)
        {
            double q = quantity(inside[i]);
            mean += weights[i] * q;
            min = Math.Min(min, q);
            max = Math.Max(max, q);
        }

        double variance = 0;
        for (int i = 0; i < inside.Length; i++)
        {
            double d = quantity(inside[i]) - mean;
            variance += weights[i] * d * d;
        }

        foreach (BeamValues v in edge)
        {
            double q = quantity(v);
            min = Math.Min(min, q);
            max = Math.Max(max, q);
        }

        return new ApertureStatistics(mean, min, max, Math.Sqrt(variance) / Math.Abs(mean));
    }
}
