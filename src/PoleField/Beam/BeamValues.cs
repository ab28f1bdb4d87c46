using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// Field and derivatives at one place of the beam. By and Bz are parts of one analytic function, so two numbers give the
/// whole gradient tensor: ∂By/∂y = −∂Bz/∂z and ∂By/∂z = ∂Bz/∂y.
/// </summary>
/// <param name="At">Place, metres.</param>
/// <param name="By">Flux density along y, T.</param>
/// <param name="Bz">Flux density along z, T.</param>
/// <param name="DByDz">∂By/∂z, T/m.</param>
/// <param name="DBzDz">∂Bz/∂z, T/m.</param>
public readonly record struct BeamValues(Point At, double By, double Bz, double DByDz, double DBzDz)
{
    /// <summary>|B|, T.</summary>
    public double Field => Math.Sqrt((By * By) + (Bz * Bz));

    /// <summary>G = d|B|/dz, T/m, signed: the gradient a moment feels that follows the field.</summary>
    public double Gradient => ((By * DByDz) + (Bz * DBzDz)) / Field;

    /// <summary>d|B|/dy, T/m, signed.</summary>
    public double TransverseGradient => ((-By * DBzDz) + (Bz * DByDz)) / Field;
}
