using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// Two round copper conductors along the beam with opposite currents, no iron: outside round conductors the field is exactly
/// that of line currents in their axes, B = μ0 I a/(π (z² + a²)) on y = 0. Lengths in mm.
/// </summary>
public sealed record RoundWirePair : PoleFamily
{
    /// <inheritdoc/>
    public override string Name => "round-wires";

    /// <inheritdoc/>
    public override string Description => "two round conductors with opposite currents, no iron; the exact two-wire field";

    /// <summary>Half the distance a of the conductors' axes.</summary>
    public double HalfSpacing { get; init; } = 3;

    /// <summary>Radius of the conductors, less than a.</summary>
    public double WireRadius { get; init; } = 2;

    /// <summary>Height of the beam centre above the axes in units of a.</summary>
    public double BeamPlace { get; init; } = 1.2;

    /// <summary>The beam's rectangle.</summary>
    public BeamExtent Beam { get; init; } = new();

    /// <inheritdoc/>
    public override StartingSketch Draw()
    {
        Point beam = new(0, BeamPlace * HalfSpacing);
        DimensionCheck check = new(Name);
        Check(check, beam);
        check.ThrowIfFaulty();

        List<SketchCurve> curves = [];
        SketchOutlines.Add(curves, "WIRE LEFT", Wire(-HalfSpacing));
        SketchOutlines.Add(curves, "WIRE RIGHT", Wire(HalfSpacing));
        SketchOutlines.Add(curves, StartingSketch.BeamLayer, Beam.At(beam));
        double spread = (beam.Z * beam.Z) + (HalfSpacing * HalfSpacing);
        return new StartingSketch(
            SketchOutlines.Sketch(Name, curves),
            [new SuggestedPart("WIRE LEFT", "copper", 1), new SuggestedPart("WIRE RIGHT", "copper", -1)],
            beam,
            PhysicalConstants.Mu0 * HalfSpacing / (1e-3 * Math.PI * spread),
            -2 * beam.Z / (1e-3 * spread));
    }

    private Outline Wire(double y) =>
        Outline.FromCurves([new CircularArc(new Point(y, 0), WireRadius, 0, Math.Tau)]);

    private void Check(DimensionCheck check, Point beam)
    {
        Beam.Check(check);
        bool sized = check.Positive("The half spacing a", HalfSpacing)
            & check.Positive("The wire radius", WireRadius)
            & check.Finite("The beam's place", BeamPlace);
        if (!sized)
        {
            return;
        }

        check.Less(("The wire radius", WireRadius), ("the half spacing a", HalfSpacing), "Part the wires or make them thinner.");
        if (check.IsClean)
        {
            // Nearest point of the beam's rectangle to the right wire's axis.
            Point nearest = new(
                Math.Clamp(HalfSpacing, -Beam.Width / 2, Beam.Width / 2),
                Math.Clamp(0, beam.Z - (Beam.Height / 2), beam.Z + (Beam.Height / 2)));
            check.Less(
                ("The wire radius", WireRadius),
                ("the distance of the beam from the wires' axes", nearest.DistanceTo(new Point(HalfSpacing, 0))),
                "Move the beam or make the wires thinner.");
        }
    }
}
