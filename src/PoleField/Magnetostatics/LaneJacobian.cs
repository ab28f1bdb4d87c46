using System.Numerics;
using System.Runtime.CompilerServices;

namespace PoleField.Magnetostatics;

/// <summary>Jacobians of a few elements at one reference place, each in a lane.</summary>
/// <param name="YXi">∂y/∂ξ, metres.</param>
/// <param name="ZXi">∂z/∂ξ, metres.</param>
/// <param name="YEta">∂y/∂η, metres.</param>
/// <param name="ZEta">∂z/∂η, metres.</param>
internal readonly record struct LaneJacobian(Vector<double> YXi, Vector<double> ZXi, Vector<double> YEta, Vector<double> ZEta)
{
    /// <summary>Determinant, m²; positive in a valid element.</summary>
    public Vector<double> Determinant => (YXi * ZEta) - (ZXi * YEta);

    /// <summary>Gradient in the plane from the derivatives by the reference coordinates.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public (Vector<double> Y, Vector<double> Z) Gradient(Vector<double> byXi, Vector<double> byEta)
    {
        Vector<double> inverse = Vector<double>.One / Determinant;
        return (inverse * ((byXi * ZEta) - (byEta * ZXi)), inverse * ((byEta * YXi) - (byXi * YEta)));
    }

    /// <summary>det·J⁻¹ h: weights of the derivatives by ξ and η in h·∇N times the determinant.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public (Vector<double> Xi, Vector<double> Eta) Pull(Vector<double> hY, Vector<double> hZ) =>
        ((ZEta * hY) - (YEta * hZ), (YXi * hZ) - (ZXi * hY));

    /// <summary>det·J⁻¹ D J⁻ᵀ for D = ν I.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public (Vector<double> XX, Vector<double> XE, Vector<double> EE) Pull(Vector<double> nu)
    {
        Vector<double> scale = nu / Determinant;
        return (
            scale * ((YEta * YEta) + (ZEta * ZEta)),
            -scale * ((YEta * YXi) + (ZEta * ZXi)),
            scale * ((YXi * YXi) + (ZXi * ZXi)));
    }

    /// <summary>det·J⁻¹ D J⁻ᵀ for D = ν I + e g gᵀ.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public (Vector<double> XX, Vector<double> XE, Vector<double> EE) Pull(
        Vector<double> nu, Vector<double> excess, Vector<double> gY, Vector<double> gZ)
    {
        (Vector<double> xx, Vector<double> xe, Vector<double> ee) = Pull(nu);
        (Vector<double> xi, Vector<double> eta) = Pull(gY, gZ);
        Vector<double> scale = excess / Determinant;
        return (xx + (scale * xi * xi), xe + (scale * xi * eta), ee + (scale * eta * eta));
    }
}
