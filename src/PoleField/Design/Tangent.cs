using PoleField.Geometry;
using PoleField.Materials;

namespace PoleField.Design;

/// <summary>A law at a point: Dh = ν I + excess g gᵀ, and its inverse across a face.</summary>
internal static class Tangent
{
    private const double SmallField = 1e-9; // T; below it the law's initial reluctivity stands

    /// <summary>H/B and (dH/dB − H/B)/B² at a flux density.</summary>
    public static (double Reluctivity, double Excess) Of(MagneticLaw law, double b)
    {
        if (b <= SmallField)
        {
            return (law.InitialReluctivity, 0);
        }

        MagneticState state = law.At(b);
        double reluctivity = state.FieldStrength / b;
        return (reluctivity, (state.Slope - reluctivity) / (b * b));
    }

    /// <summary>The normal part g of ∇A − gᵣ for which ν(|(g, tangential)|)·g is the given normal part of h.</summary>
    public static double NormalPart(MagneticLaw law, double across, double tangential)
    {
        const int mostSteps = 200;
        if (law.IsLinear)
        {
            return across / law.InitialReluctivity;
        }

        // ν·g rises with g because the law's energy is convex, and ν is at most 1/μ0.
        double wanted = Math.Abs(across);
        double low = PhysicalConstants.Mu0 * wanted;
        double high = Math.Max(2 * low, SmallField);
        while (Excess(high) < 0)
        {
            high *= 2;
        }

        for (int step = 0; step < mostSteps && high - low > 1e-15 * high; step++)
        {
            double middle = 0.5 * (low + high);
            (low, high) = Excess(middle) < 0 ? (middle, high) : (low, middle);
        }

        return Math.Sign(across) * 0.5 * (low + high);

        double Excess(double normal) => (Of(law, new Point(normal, tangential).Length).Reluctivity * normal) - wanted;
    }
}
