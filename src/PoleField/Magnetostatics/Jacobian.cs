using PoleField.Geometry;

namespace PoleField.Magnetostatics;

/// <summary>Derivative of the place by the reference coordinates at one point of an element.</summary>
/// <param name="ByXi">∂(y, z)/∂ξ, metres.</param>
/// <param name="ByEta">∂(y, z)/∂η, metres.</param>
internal readonly record struct Jacobian(Point ByXi, Point ByEta)
{
    /// <summary>Determinant, m²; positive in a valid element.</summary>
    public double Determinant => ByXi.Cross(ByEta);

    /// <summary>Gradient in the plane from the derivatives by the reference coordinates.</summary>
    public Point Gradient(double byXi, double byEta)
    {
        double inverse = 1.0 / Determinant;
        return new Point(
            inverse * ((byXi * ByEta.Z) - (byEta * ByXi.Z)),
            inverse * ((byEta * ByXi.Y) - (byXi * ByEta.Y)));
    }

    /// <summary>det·J⁻¹ h: weights of the derivatives by ξ and η in h·∇N times the determinant.</summary>
    public (double Xi, double Eta) Pull(Point h) =>
        ((ByEta.Z * h.Y) - (ByEta.Y * h.Z), (ByXi.Y * h.Z) - (ByXi.Z * h.Y));
}
