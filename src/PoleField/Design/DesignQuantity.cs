using PoleField.Beam;

namespace PoleField.Design;

/// <summary>A number of the beam that a design is judged by.</summary>
public enum DesignQuantity
{
    /// <summary>|B| at the beam's centre, T.</summary>
    Field,

    /// <summary>G = d|B|/dz at the beam's centre, T/m.</summary>
    Gradient,

    /// <summary>Mean of G over the aperture, T/m.</summary>
    GradientMean,

    /// <summary>Standard deviation of G over the aperture by |mean|.</summary>
    GradientRms,

    /// <summary>(max − min)/(2|mean|) of G over the aperture.</summary>
    GradientSpread,

    /// <summary>Mean of |B|·G over the aperture, T²/m.</summary>
    ProductMean,

    /// <summary>Standard deviation of |B|·G over the aperture by |mean|.</summary>
    ProductRms,

    /// <summary>(max − min)/(2|mean|) of |B|·G over the aperture.</summary>
    ProductSpread,
}

/// <summary>Value and chain rule of each <see cref="DesignQuantity"/>.</summary>
internal static class DesignQuantities
{
    /// <summary>Its value.</summary>
    public static double Value(this DesignQuantity quantity, BeamMeasures m) => quantity switch
    {
        DesignQuantity.Field => m.Centre.Field,
        DesignQuantity.Gradient => m.Centre.Gradient,
        DesignQuantity.GradientMean => m.Gradient.Mean,
        DesignQuantity.GradientRms => m.Gradient.Rms,
        DesignQuantity.GradientSpread => m.Gradient.Spread,
        DesignQuantity.ProductMean => m.FieldTimesGradient.Mean,
        DesignQuantity.ProductRms => m.FieldTimesGradient.Rms,
        DesignQuantity.ProductSpread => m.FieldTimesGradient.Spread,
        _ => throw new ArgumentOutOfRangeException(nameof(quantity)),
    };

    /// <summary>The quantity to first order, as terms at the places it is made of.</summary>
    public static IReadOnlyList<BeamTerm> Terms(this DesignQuantity quantity, BeamMeasures m, double[] weights) => quantity switch
    {
        DesignQuantity.Field => [BeamGoals.FieldTerm(m.Centre, 1)],
        DesignQuantity.Gradient => [BeamGoals.GradientTerm(m.Centre, 1)],
        DesignQuantity.GradientMean => Mean(m, weights, GradientAt),
        DesignQuantity.GradientRms => Rms(m, weights, m.Gradient, GradientAt),
        DesignQuantity.GradientSpread => Spread(m, weights, m.Gradient, GradientAt),
        DesignQuantity.ProductMean => Mean(m, weights, ProductAt),
        DesignQuantity.ProductRms => Rms(m, weights, m.FieldTimesGradient, ProductAt),
        DesignQuantity.ProductSpread => Spread(m, weights, m.FieldTimesGradient, ProductAt),
        _ => throw new ArgumentOutOfRangeException(nameof(quantity)),
    };

    /// <summary>G at a place, times a factor.</summary>
    public static (double Value, Func<double, IEnumerable<BeamTerm>> Terms) GradientAt(BeamValues v) =>
        (v.Gradient, factor => [BeamGoals.GradientTerm(v, factor)]);

    /// <summary>|B|·G at a place, times a factor.</summary>
    public static (double Value, Func<double, IEnumerable<BeamTerm>> Terms) ProductAt(BeamValues v) =>
        (v.Field * v.Gradient, factor => [BeamGoals.FieldTerm(v, factor * v.Gradient), BeamGoals.GradientTerm(v, factor * v.Field)]);

    private static List<BeamTerm> Mean(BeamMeasures m, double[] weights, PointQuantity at, double factor = 1)
    {
        var terms = new List<BeamTerm>();
        for (int k = 0; k < weights.Length; k++)
        {
            terms.AddRange(at(m.Inside[k]).Terms(factor * weights[k]));
        }

        return terms;
    }

    // r = s/|m|: dr = Σ w (q − m) dq/(s |m|) − r dm/m.
    private static List<BeamTerm> Rms(BeamMeasures m, double[] weights, ApertureStatistics s, PointQuantity at)
    {
        List<BeamTerm> terms = Mean(m, weights, at, -s.Rms / s.Mean);
        for (int k = 0; k < weights.Length && s.Rms > 0.0; k++)
        {
            (double value, Func<double, IEnumerable<BeamTerm>> own) = at(m.Inside[k]);
            terms.AddRange(own(weights[k] * (value - s.Mean) / (s.Rms * s.Mean * s.Mean)));
        }

        return terms;
    }

    private static List<BeamTerm> Spread(BeamMeasures m, double[] weights, ApertureStatistics s, PointQuantity at)
    {
        List<BeamTerm> terms = Mean(m, weights, at, -s.Spread / s.Mean);
        BeamValues[] all = [.. m.Inside, .. m.Edge];
        terms.AddRange(at(all.MaxBy(v => at(v).Value)).Terms(0.5 / Math.Abs(s.Mean)));
        terms.AddRange(at(all.MinBy(v => at(v).Value)).Terms(-0.5 / Math.Abs(s.Mean)));
        return terms;
    }

    private delegate (double Value, Func<double, IEnumerable<BeamTerm>> Terms) PointQuantity(BeamValues v);
}
