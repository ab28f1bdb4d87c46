namespace PoleField.Beam;

/// <summary>What an excitation curve is asked for.</summary>
/// <param name="Factors">Factors of the magnet's ampere-turns, positive, rising.</param>
/// <param name="Onset">Fall of gradient per ampere-turn that counts as saturation, 0 to 1.</param>
/// <param name="Wires">What is known of the two wires the poles follow, for k = aG/B.</param>
public sealed record RampSettings(IReadOnlyList<double> Factors, double Onset = 0.02, StatedWires? Wires = null);

/// <summary>The magnet at one excitation.</summary>
public sealed record RampStep
{
    /// <summary>Factor of the magnet's ampere-turns.</summary>
    public required double Factor { get; init; }

    /// <summary>Beam, aperture, parts and circuit at this excitation.</summary>
    public required BeamReport Report { get; init; }

    /// <summary>Relative error bar of field and gradient over the aperture.</summary>
    public required double Accuracy { get; init; }

    /// <summary>Newton steps on its mesh.</summary>
    public required int NewtonSteps { get; init; }

    /// <summary>True when the common mesh was not fine enough here and another one was made.</summary>
    public required bool OwnMesh { get; init; }

    /// <summary>k = a |G| / B at the beam; null where no two wires describe the field.</summary>
    public double? ShapeFactor { get; init; }

    /// <summary>Ampere-turns that drive the gap, A.</summary>
    public double AmpereTurns => Report.Circuit.AmpereTurns;

    /// <summary>|G| per ampere-turn at the beam, T/m/A.</summary>
    public double GradientPerAmpereTurn => Math.Abs(Report.Beam.Gradient) / AmpereTurns;

    /// <summary>Largest flux density in iron, T; null without iron.</summary>
    public double? IronFieldMax => Iron.Max(p => p.FieldMax);

    /// <summary>The iron part with the largest saturated share of its area, if any is saturated.</summary>
    public PartReport? MostSaturated => Iron.Where(p => p.SaturatedShare > 0).MaxBy(p => p.SaturatedShare);

    private IEnumerable<PartReport> Iron => Report.Parts.Where(p => p is { Kind: "iron", FieldMax: not null });
}

/// <summary>An excitation curve.</summary>
public sealed record RampReport
{
    /// <summary>The steps, by rising factor.</summary>
    public required IReadOnlyList<RampStep> Steps { get; init; }

    /// <summary>The straight start: the magnet at a thousandth of its ampere-turns.</summary>
    public required RampStep Start { get; init; }

    /// <summary>Fall of gradient per ampere-turn that counts as saturation.</summary>
    public required double Onset { get; init; }

    /// <summary>
    /// Factor at which gradient per ampere-turn has fallen that far below its best value on the way there; null when it does
    /// not within the steps, or when other sources than the currents make the field.
    /// </summary>
    public required double? OnsetFactor { get; init; }

    /// <summary>The iron part that first has a saturated share worth naming, and the step's factor; null when none has.</summary>
    public required (string Layer, double Factor)? FirstSaturated { get; init; }

    /// <summary>Half-spacing of the wires behind k, metres; null where no two wires describe the field.</summary>
    public required double? HalfSpacing { get; init; }

    /// <summary>True when permanent magnets or a background also make field, so that nothing is proportional to the currents.</summary>
    public required bool HasOtherSources { get; init; }

    /// <summary>True when every step reached the asked accuracy.</summary>
    public required bool AccuracyMet { get; init; }
}
