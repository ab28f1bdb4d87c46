namespace PoleField.Drawing;

/// <summary>
/// Hyperbolic faces of a quadrupole whose null lies a distance R above the beam: |B| = G r with r the distance from the null, so
/// the gradient of |B| has the same size everywhere and turns with the direction to the null. Lengths in mm.
/// </summary>
public sealed record ShiftedQuadrupolePair : EquipotentialPair
{
    /// <inheritdoc/>
    public override string Name => "shifted-quadrupole";

    /// <inheritdoc/>
    public override string Description => "hyperbolic faces, field null a distance B/G above the beam; constant gradient along the deflection";

    private protected override double HighestGroove => FieldOverGradient;

    private protected override double LongestReach => 10 * FieldOverGradient;

    private protected override WantedField Field() => new ShiftedQuadrupoleField(FieldOverGradient);
}

/// <summary>B_z = (R − z)/R, B_y = y/R: equipotentials are (R − z)² − y² = constant.</summary>
internal sealed class ShiftedQuadrupoleField(double scale) : WantedField
{
    public override double PotentialOnAxis(double z) => z * (1 - (z / (2 * scale)));

    public override Func<double, FacePoint> Equipotential(double apex, double reach)
    {
        double half = scale - apex;
        return y =>
        {
            double below = Math.Sqrt((half * half) + (y * y));
            return FacePoint.Above(y, scale - below, -y / below);
        };
    }
}
