using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>How far a quantity is from the two-wire field's over the aperture, relative to the latter's mean; no unit.</summary>
/// <param name="AtBeam">Signed deviation at the beam's centre.</param>
/// <param name="Max">Largest size.</param>
/// <param name="Rms">Root of the area-weighted mean square.</param>
public readonly record struct TwoWireDeviation(double AtBeam, double Max, double Rms);

/// <summary>A computed field beside the two-wire field nearest to it over the aperture.</summary>
public sealed record TwoWireComparison
{
    private TwoWireComparison(TwoWireField wires, BeamMeasures computed, BeamMeasures model, double[] weights)
    {
        Wires = wires;
        Beam = computed.Centre;
        ShapeFactor = TwoWireField.ShapeFactor(computed.Centre, wires.HalfSpacing);
        TwoWireShapeFactor = TwoWireField.ShapeFactor(model.Centre, wires.HalfSpacing);
        Field = Deviation(computed, model, weights, v => v.Field);
        Gradient = Deviation(computed, model, weights, v => v.Gradient);
        ProfileY = [.. computed.ProfileY.Select(v => wires.At(v.At))];
        ProfileZ = [.. computed.ProfileZ.Select(v => wires.At(v.At))];
    }

    /// <summary>The wires.</summary>
    public TwoWireField Wires { get; }

    /// <summary>Computed values at the beam's centre.</summary>
    public BeamValues Beam { get; }

    /// <summary>k = a |G| / B of the computed field at the beam, with the wires' a; no unit.</summary>
    public double ShapeFactor { get; }

    /// <summary>k of the two-wire field at the same place.</summary>
    public double TwoWireShapeFactor { get; }

    /// <summary>Deviation of |B|.</summary>
    public TwoWireDeviation Field { get; }

    /// <summary>Deviation of G = d|B|/dz.</summary>
    public TwoWireDeviation Gradient { get; }

    /// <summary>The two-wire field along y through the centre, at the places of the report's profile.</summary>
    public IReadOnlyList<BeamValues> ProfileY { get; }

    /// <summary>The two-wire field along z through the centre.</summary>
    public IReadOnlyList<BeamValues> ProfileZ { get; }

    /// <summary>What was stated about the wires.</summary>
    public required StatedWires Stated { get; init; }

    /// <summary>Fits the wires to a beam's field and compares.</summary>
    /// <param name="field">The computed field.</param>
    /// <param name="stated">What is known of the wires; the rest is fitted.</param>
    /// <exception cref="InputException">No two-wire field is near, or the stated wires stand in the aperture.</exception>
    public static TwoWireComparison Of(BeamField field, StatedWires? stated = null) =>
        Of(field.Aperture, field.At, stated ?? new StatedWires());

    internal static TwoWireComparison Of(Aperture aperture, Func<Point, BeamValues> field, StatedWires stated)
    {
        CheckStated(aperture, stated);
        var samples = ApertureSamples.Of(aperture, new ApertureShape(aperture));
        BeamMeasures computed = BeamMeasures.Of(field, samples);
        TwoWireField wires = TwoWireFit.Of(computed.Inside, samples.Weights, computed.Centre, stated)
            ?? throw new InputException([new Finding(
                Severity.Fault,
                "no-two-wire-field",
                "No field of two wires side by side along y is near the computed field over the aperture.",
                "Compare poles of the two-wire kind, or state half_spacing and midpoint in [two_wire].") { At = aperture.Centre }]);
        return new TwoWireComparison(wires, computed, BeamMeasures.Of(wires.At, samples), samples.Weights) { Stated = stated };
    }

    private static void CheckStated(Aperture aperture, StatedWires stated)
    {
        if (stated is not { HalfSpacing: { } a, Midpoint: { } m })
        {
            return;
        }

        foreach (Point wire in new[] { m + new Point(a, 0), m - new Point(a, 0) })
        {
            if (aperture.Outline.Contains(wire))
            {
                throw new InputException([new Finding(
                    Severity.Fault,
                    "wire-in-beam",
                    FormattableString.Invariant($"The stated wire at ({1e3 * wire.Y:g6}, {1e3 * wire.Z:g6}) mm lies in the aperture."),
                    "Correct half_spacing or midpoint in [two_wire].") { At = wire }]);
            }
        }
    }

    private static TwoWireDeviation Deviation(
        BeamMeasures computed, BeamMeasures model, double[] weights, Func<BeamValues, double> quantity)
    {
        double scale = 0;
        double square = 0;
        double max = 0;
        for (int i = 0; i < weights.Length; i++)
        {
            double d = quantity(computed.Inside[i]) - quantity(model.Inside[i]);
            scale += weights[i] * Math.Abs(quantity(model.Inside[i]));
            square += weights[i] * d * d;
            max = Math.Max(max, Math.Abs(d));
        }

        for (int i = 0; i < computed.Edge.Length; i++)
        {
            max = Math.Max(max, Math.Abs(quantity(computed.Edge[i]) - quantity(model.Edge[i])));
        }

        double atBeam = quantity(computed.Centre) - quantity(model.Centre);
        double sign = Math.Sign(quantity(model.Centre));
        return new TwoWireDeviation(sign * atBeam / scale, max / scale, Math.Sqrt(square) / scale);
    }
}
