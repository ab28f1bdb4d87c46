using PoleField.Beam;

namespace PoleField.Cli.Case;

/// <summary>A value with its error bar (zero where there is none).</summary>
internal readonly record struct Measured(double Value, double Error);

/// <summary>A result that a case may demand a bound on: "gradient", "spread", ...</summary>
/// <param name="Name">Name in the case file, less <c>_min</c> or <c>_max</c>.</param>
/// <param name="Dimension">Its kind.</param>
/// <param name="Meaning">What it is, in words.</param>
/// <param name="Of">Takes it from a report; null when the magnet has no such value.</param>
internal sealed record BeamQuantity(string Name, Dimension Dimension, string Meaning, Func<BeamReport, Measured?> Of)
{
    public static IReadOnlyList<BeamQuantity> All { get; } =
    [
        new("field", Dimension.Field, "field at the beam's centre", r => new(r.Beam.Field, r.FieldError)),
        new("gradient", Dimension.Gradient, "size of the gradient at the beam's centre", r => new(Math.Abs(r.Beam.Gradient), r.GradientError)),
        new("transverse_gradient", Dimension.Gradient, "size of d|B|/dy at the beam's centre", r => new(Math.Abs(r.Beam.TransverseGradient), r.GradientError)),
        new("spread", Dimension.Ratio, "spread of the gradient over the aperture", r => new(r.Gradient.Spread, 0)),
        new("rms", Dimension.Ratio, "rms of the gradient over the aperture", r => new(r.Gradient.Rms, 0)),
        new("field_spread", Dimension.Ratio, "spread of the field over the aperture", r => new(r.Field.Spread, 0)),
        new("field_times_gradient_spread", Dimension.Ratio, "spread of field times gradient over the aperture", r => new(r.FieldTimesGradient.Spread, 0)),
        new("clearance", Dimension.Length, "smallest distance from the aperture to a part", r => new(r.Clearance, 0)),
        new("iron_field", Dimension.Field, "largest flux density in iron", r => Largest(r.Parts.Where(p => p.Kind == "iron").Select(p => p.FieldMax))),
        new("saturated_share", Dimension.Ratio, "largest saturated share of an iron part", r => Largest(r.Parts.Select(p => p.SaturatedShare))),
        new("current_density", Dimension.CurrentDensity, "largest current density in copper", r => Largest(r.Parts.Select(p => p.CurrentDensity))),
        new("efficiency", Dimension.Ratio, "gap share of the ampere-turns", r => r.Circuit.Efficiency is { } e ? new(e, 0) : null),
    ];

    private static Measured? Largest(IEnumerable<double?> values) => values.Max() is { } most ? new(Math.Abs(most), 0) : null;
}

/// <summary>A bound on a result.</summary>
/// <param name="Quantity">What is bounded.</param>
/// <param name="AtLeast">True for a lower bound.</param>
/// <param name="Bound">The bound, SI.</param>
internal sealed record Limit(BeamQuantity Quantity, bool AtLeast, double Bound)
{
    /// <summary>Name as in <c>[require]</c>: <c>gradient_min</c>.</summary>
    public string Name => Quantity.Name + (AtLeast ? "_min" : "_max");

    /// <summary>Compares a report with the bound.</summary>
    public Verdict Judge(BeamReport report)
    {
        Measured? found = Quantity.Of(report);
        bool met = found is { } m && (AtLeast ? m.Value >= Bound : m.Value <= Bound);
        return new Verdict(this, found, met);
    }
}

/// <summary>Whether a bound was kept.</summary>
/// <param name="Limit">The bound.</param>
/// <param name="Found">What came out; null when the magnet has no such value, which never counts as met.</param>
/// <param name="Met">Kept.</param>
internal sealed record Verdict(Limit Limit, Measured? Found, bool Met)
{
    /// <summary>True when the error bar reaches over the bound, so that the solve cannot decide.</summary>
    public bool IsWithinError => Found is { } m && Math.Abs(m.Value - Limit.Bound) < m.Error;
}
