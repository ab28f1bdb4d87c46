using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// Ridge and groove along two circles through the places of two imagined wires at y = ±a, z = 0: equipotentials of the field of two
/// opposite line currents (Rabi, Kellogg, Millman 1934; N. F. Ramsey, Molecular Beams, 1956: both recalled from memory), so between uncut
/// faces of infinite permeability B = μ0 I a/(π (z² + a²)) on y = 0. Lengths in mm; the defaults have a = 3 mm.
/// </summary>
public sealed record TwoWirePair : PoleFamily
{
    /// <inheritdoc/>
    public override string Name => "two-wire";

    /// <inheritdoc/>
    public override string Description => "ridge and groove on circles through two imagined wires; for thin, tall beams at 1.2 a";

    /// <summary>Half the distance a of the wires.</summary>
    public double HalfSpacing { get; init; } = 3;

    /// <summary>Radius of the ridge's face, ≥ a; its centre lies on or below the wires.</summary>
    public double RidgeRadius { get; init; } = 3;

    /// <summary>
    /// |y| where the ridge's face ends and its flanks begin. Common practice derived from the strip picture below: 0.7 a is enough.
    /// </summary>
    public double RidgeReach { get; init; } = 3 / Math.Sqrt(2);

    /// <summary>Radius of the groove's face, ≥ a; its centre lies above the wires.</summary>
    public double GrooveRadius { get; init; } = 3.6;

    /// <summary>
    /// Angle from the groove's apex to the end of its face, seen from its centre, degrees. The full half circle (90) or more
    /// leaves the field nearly uncut: see <see cref="FieldErrorOfCut"/>.
    /// </summary>
    public double GrooveHalfAngle { get; init; } = 60;

    /// <summary>|y| to which a flat land continues the end of the groove's face.</summary>
    public double LandEdge { get; init; } = 4.5;

    /// <summary>Height of the beam centre above the wires in units of a.</summary>
    public double BeamPlace { get; init; } = 1.2;

    /// <summary>The beam's rectangle.</summary>
    public BeamExtent Beam { get; init; } = new();

    /// <summary>Poles, yoke and coils.</summary>
    public YokeFrame Frame { get; init; } = new();

    /// <summary>z of the ridge's apex.</summary>
    public double RidgeApex => RidgeRadius - Depth(RidgeRadius);

    /// <summary>z of the groove's apex.</summary>
    public double GrooveApex => GrooveRadius + Depth(GrooveRadius);

    /// <summary>
    /// Rough relative error of the field at the beam because the groove's face is cut: 0.3 exp(−π τ/Δσ), where between
    /// the uncut circles the bipolar coordinates make a strip of uniform width Δσ = 2 (atan(a/z1) − atan(a/z2)) and
    /// τ = ½ ln(((y + a)² + z²)/((y − a)² + z²)) is where it is cut. The gradient suffers 3.5 to 5 times that. The decay is exact,
    /// the factors were fitted to boundary-element solutions for square cuts: a rule of thumb.
    /// </summary>
    public double FieldErrorOfCut
    {
        get
        {
            Point edge = GrooveEdge;
            double a = HalfSpacing;
            double cut = 0.5 * Math.Log(
                new Point(edge.Y + a, edge.Z).SquaredLength / new Point(edge.Y - a, edge.Z).SquaredLength);
            return 0.3 * Math.Exp(-Math.PI * cut / (2 * PotentialAngle));
        }
    }

    // Half the angle Δσ between the two equipotentials.
    private double PotentialAngle => Math.Atan(HalfSpacing / RidgeApex) - Math.Atan(HalfSpacing / GrooveApex);

    private Point GrooveEdge => GrooveCentre + Point.Polar(GrooveRadius, (Math.PI / 2) - GrooveSweep);

    private Point GrooveCentre => new(0, Depth(GrooveRadius));

    private double GrooveSweep => GrooveHalfAngle * Math.PI / 180;

    /// <inheritdoc/>
    public override StartingSketch Draw()
    {
        DimensionCheck check = new(Name);
        CheckNumbers(check);
        check.ThrowIfFaulty();
        Point beam = new(0, BeamPlace * HalfSpacing);
        PolePairDrawing drawing = new(Frame, Ridge(), Groove(), LandEdge);
        drawing.Check(check, Beam, beam);
        check.ThrowIfFaulty();

        double z = beam.Z;
        double shape = HalfSpacing / ((z * z) + (HalfSpacing * HalfSpacing));
        return new StartingSketch(
            drawing.Draw(Name, Beam.At(beam)),
            PolePairDrawing.Parts,
            beam,
            PhysicalConstants.Mu0 * shape / (1e-3 * PotentialAngle),
            -2 * z / (1e-3 * ((z * z) + (HalfSpacing * HalfSpacing))));
    }

    // Distance of a circle's centre from the line of the wires.
    private double Depth(double radius) => Math.Sqrt((radius * radius) - (HalfSpacing * HalfSpacing));

    private void CheckNumbers(DimensionCheck check)
    {
        bool sized = check.Positive("The half spacing a", HalfSpacing)
            & check.Positive("The ridge radius", RidgeRadius)
            & check.Positive("The ridge's reach", RidgeReach)
            & check.Positive("The groove radius", GrooveRadius)
            & check.Positive("The beam's place", BeamPlace, "a");
        if (sized)
        {
            const string through = "A circle through both wires has at least the radius a.";
            _ = RidgeRadius >= HalfSpacing || check.Less(("The half spacing a", HalfSpacing), ("the ridge radius", RidgeRadius), through);
            _ = GrooveRadius >= HalfSpacing || check.Less(("The half spacing a", HalfSpacing), ("the groove radius", GrooveRadius), through);
            check.Less(("The ridge's reach", RidgeReach), ("the half spacing a", HalfSpacing), "End the ridge's face before the wires' places.");

            // The circle meets the wire's place at this angle from its apex.
            double whole = 180 - (Math.Asin(Math.Min(1, HalfSpacing / GrooveRadius)) * 180 / Math.PI);
            if (!(GrooveHalfAngle >= 1 && GrooveHalfAngle < whole))
            {
                check.Fault(
                    FormattableString.Invariant($"The groove's half angle is {GrooveHalfAngle:g6} degrees; it must be 1 to less than {whole:g4}, where the circle meets the wires' places."),
                    "Correct the angle; 90 is the full half circle.");
            }
            else if (LandEdge < GrooveEdge.Y)
            {
                check.Less(("The end of the groove's face", GrooveEdge.Y), ("the land's edge", LandEdge), "Move the land's edge outwards.");
            }
        }

        Beam.Check(check);
        Frame.Check(check);
    }

    private HalfFace Ridge()
    {
        double depth = Depth(RidgeRadius);
        return Face(new Point(0, -depth), RidgeRadius, Math.Asin(RidgeReach / RidgeRadius));
    }

    private HalfFace Groove() => Face(GrooveCentre, GrooveRadius, GrooveSweep);

    private static HalfFace Face(Point centre, double radius, double sweep) =>
        new([new CircularArc(centre, radius, Math.PI / 2, -sweep).WithEnds(
            new Point(0, centre.Z + radius),
            new Point(radius * Math.Sin(sweep), centre.Z + (radius * Math.Cos(sweep))))]);
}
