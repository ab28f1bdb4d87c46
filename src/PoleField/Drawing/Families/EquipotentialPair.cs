using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>
/// A pole pair whose faces are traced along equipotentials of a wanted field, above and below a beam at the origin. Common
/// dimensions of such pairs, mm.
/// </summary>
public abstract record EquipotentialPair : PoleFamily
{
    private protected EquipotentialPair()
    {
    }

    /// <summary>R = B/|G| at the beam: the field falls by 1/e of itself over it.</summary>
    public double FieldOverGradient { get; init; } = 3;

    /// <summary>Distance of the ridge's apex below the beam centre.</summary>
    public double RidgeDistance { get; init; } = 0.8;

    /// <summary>Distance of the groove's apex above the beam centre.</summary>
    public double GrooveDistance { get; init; } = 1.8;

    /// <summary>|y| where the ridge's face ends and its flanks begin.</summary>
    public double RidgeReach { get; init; } = 3;

    /// <summary>|y| where the groove's face ends.</summary>
    public double GrooveReach { get; init; } = 3.5;

    /// <summary>|y| to which a flat land continues the end of the groove's face.</summary>
    public double LandEdge { get; init; } = 4.5;

    /// <summary>Largest distance of the drawn arcs from the equipotentials.</summary>
    public double Tolerance { get; init; } = 1e-3;

    /// <summary>The beam's rectangle.</summary>
    public BeamExtent Beam { get; init; } = new();

    /// <summary>Poles, yoke and coils.</summary>
    public YokeFrame Frame { get; init; } = new();

    /// <summary>Where the groove may start at most, mm above the beam; infinity when the field has no null.</summary>
    private protected virtual double HighestGroove => double.PositiveInfinity;

    /// <summary>Largest |y| to which the faces can be traced, mm.</summary>
    private protected abstract double LongestReach { get; }

    /// <summary>The field, scaled to 1 at the beam.</summary>
    private protected abstract WantedField Field();

    /// <inheritdoc/>
    public sealed override StartingSketch Draw()
    {
        DimensionCheck check = new(Name);
        CheckNumbers(check);
        check.ThrowIfFaulty();

        WantedField field = Field();
        HalfFace ridge = BiarcFit.Fit(field.Equipotential(-RidgeDistance, RidgeReach), RidgeReach, Tolerance);
        HalfFace groove = BiarcFit.Fit(field.Equipotential(GrooveDistance, GrooveReach), GrooveReach, Tolerance);
        Point beam = new(0, 0);
        PolePairDrawing drawing = new(Frame, ridge, groove, LandEdge);
        drawing.Check(check, Beam, beam);
        check.ThrowIfFaulty();

        double drop = field.PotentialOnAxis(GrooveDistance) - field.PotentialOnAxis(-RidgeDistance);
        return new StartingSketch(
            drawing.Draw(Name, Beam.At(beam)),
            PolePairDrawing.Parts,
            beam,
            PhysicalConstants.Mu0 / (1e-3 * drop),
            -1e3 / FieldOverGradient);
    }

    private void CheckNumbers(DimensionCheck check)
    {
        bool sized = check.Positive("B/G", FieldOverGradient)
            & check.Positive("The ridge's distance", RidgeDistance)
            & check.Positive("The groove's distance", GrooveDistance)
            & check.Positive("The ridge's reach", RidgeReach)
            & check.Positive("The groove's reach", GrooveReach)
            & check.Positive("The tolerance", Tolerance);
        if (sized)
        {
            const string nearer = "Bring the faces nearer to the beam, or ask for a larger B/G.";
            check.Less(("The ridge's distance", RidgeDistance), ("B/G", FieldOverGradient), nearer);
            check.Less(("The groove's distance", GrooveDistance), ("its limit", HighestGroove), nearer);
            check.Less(("The ridge's reach", RidgeReach), ("the farthest an equipotential is followed", LongestReach), "Shorten the face.");
            check.Less(("The groove's reach", GrooveReach), ("the farthest an equipotential is followed", LongestReach), "Shorten the face.");
            _ = LandEdge >= GrooveReach || check.Less(("The groove's reach", GrooveReach), ("the land's edge", LandEdge), "Move the land's edge outwards.");
            if (!(Tolerance >= 1e-6 && Tolerance <= 0.1 * FieldOverGradient))
            {
                check.Fault(FormattableString.Invariant($"The tolerance is {Tolerance:g6} mm; it must be 1e-6 mm to a tenth of B/G."), "Use 0.001 mm.");
            }
        }

        Beam.Check(check);
        Frame.Check(check);
    }
}

/// <summary>A current-free field symmetric about y = 0, 1 at the origin and pointing along +z there.</summary>
internal abstract class WantedField
{
    /// <summary>∫ B_z dz from the origin to z on the axis, mm.</summary>
    public abstract double PotentialOnAxis(double z);

    /// <summary>The equipotential through (0, apex) as a function of y from 0 to a reach, mm.</summary>
    public abstract Func<double, FacePoint> Equipotential(double apex, double reach);
}
