using PoleField.Geometry;

namespace PoleField.Magnetostatics;

/// <summary>The field at a place, from the finite elements.</summary>
/// <param name="Potential">A along the beam, T·m.</param>
/// <param name="By">Flux density along y, T.</param>
/// <param name="Bz">Flux density along z, T.</param>
/// <param name="FieldStrength">|H|, A/m (inside magnets: of B less remanence).</param>
/// <param name="Region">Index into the section's regions.</param>
public readonly record struct FieldSample(double Potential, double By, double Bz, double FieldStrength, int Region)
{
    /// <summary>|B|, T.</summary>
    public double Magnitude => Math.Sqrt((By * By) + (Bz * Bz));
}

/// <summary>Derivatives of B at a place, T/m, from the finite element there: of lower order than the field and with jumps between elements.</summary>
/// <param name="DByDy">∂By/∂y.</param>
/// <param name="DByDz">∂By/∂z.</param>
/// <param name="DBzDy">∂Bz/∂y.</param>
/// <param name="DBzDz">∂Bz/∂z.</param>
public readonly record struct FieldSlopes(double DByDy, double DByDz, double DBzDy, double DBzDz);

/// <summary>A small straight triangle of the solution for drawing: three places and the field there (one-sided: of this triangle's region).</summary>
public readonly record struct FieldTriangle(
    Point P0, Point P1, Point P2, FieldSample S0, FieldSample S1, FieldSample S2, int Region);
