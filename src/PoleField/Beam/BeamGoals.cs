using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>The quantities that drive refinement, each linearised and scaled to its own size: field and gradient at the centre, gradient at the aperture's rim.</summary>
internal static class BeamGoals
{
    /// <summary>Index of the goal of the field at the centre.</summary>
    public const int CentreField = 0;

    /// <summary>Index of the goal of the gradient at the centre; those at the rim follow.</summary>
    public const int CentreGradient = 1;

    private const int RimPoints = 4;

    /// <summary>Derivatives of the relative goals by the nodes' potentials.</summary>
    public static IReadOnlyList<double[]> Derivatives(IBeamExtraction extraction, BeamField field, ApertureShape shape)
    {
        BeamValues centre = field.At(field.Aperture.Centre);
        double reach = shape.Corners.Max(p => p.DistanceTo(field.Aperture.Centre));
        double gradientScale = Math.Max(new Point(centre.DByDz, centre.DBzDz).Length, BeamMeasures.LeastGradient(centre.Field, reach));
        var goals = new List<double[]>
        {
            FieldDerivative(extraction, centre, 1.0 / centre.Field),
            GradientDerivative(extraction, centre, 1.0 / gradientScale),
        };
        Point[] rim = [.. shape.EdgePoints(perSide: 1)];
        int stride = Math.Max(1, rim.Length / RimPoints);
        for (int i = 0; i < rim.Length && goals.Count < RimPoints + 2; i += stride)
        {
            goals.Add(GradientDerivative(extraction, field.At(rim[i]), 1.0 / gradientScale));
        }

        return goals;
    }

    /// <summary>Derivative of |B| at a place, times a factor.</summary>
    public static double[] FieldDerivative(IBeamExtraction extraction, BeamValues v, double factor) =>
        extraction.Functional([FieldTerm(v, factor)]);

    /// <summary>Derivative of d|B|/dz at a place, times a factor.</summary>
    public static double[] GradientDerivative(IBeamExtraction extraction, BeamValues v, double factor) =>
        extraction.Functional([GradientTerm(v, factor)]);

    /// <summary>|B| at a place to first order, times a factor.</summary>
    public static BeamTerm FieldTerm(BeamValues v, double factor)
    {
        // dB = (By dBy + Bz dBz)/B with By = −Im F′ = Re(i F′), Bz = −Re F′.
        return new BeamTerm(v.At, new Complex(-v.Bz, v.By) * (factor / v.Field), 0);
    }

    /// <summary>d|B|/dz at a place to first order, times a factor.</summary>
    public static BeamTerm GradientTerm(BeamValues v, double factor)
    {
        // G = (By ∂zBy + Bz ∂zBz)/B with ∂zBy = −Re F″, ∂zBz = Im F″ = Re(−i F″).
        double byField = v.DByDz - (v.Gradient * v.By / v.Field);
        double bzField = v.DBzDz - (v.Gradient * v.Bz / v.Field);
        var first = new Complex(-bzField, byField) * (factor / v.Field);
        var second = new Complex(-v.By, -v.Bz) * (factor / v.Field);
        return new BeamTerm(v.At, first, second);
    }
}
