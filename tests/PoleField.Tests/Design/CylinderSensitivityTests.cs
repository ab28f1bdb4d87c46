// Truth: a cylinder in a uniform field outside which the field is the background plus a dipole of strength k R² B0 (any
// textbook of electromagnetism), k = B/B0 − 1 from B + μ0 H(B) = 2 B0 for one material, the coated cylinder's closed form for
// two. On the axis B = B0 (1 + k R²/z²), so every derivative is known in closed form.
using PoleField.Design;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Design;

public class CylinderSensitivityTests
{
    private const double Radius = 10e-3;
    private const double Height = 15e-3;

    [Theory]
    [InlineData(4)]
    [InlineData(1000)]
    public void GrowingALinearCylinderChangesFieldAndGradientAsTheClosedFormSays(double permeability)
    {
        double k = (permeability - 1) / (permeability + 1);
        (double field, double gradient, _) = Grown(Linear(permeability), 1.0);

        Assert.Equal(1.0, field / (2 * k * Radius / (Height * Height)), 2e-4);
        Assert.Equal(1.0, gradient / (-4 * k * Radius / Math.Pow(Height, 3)), 2e-4);
    }

    [Theory]
    [InlineData(0.8)]
    [InlineData(1.0)]
    [InlineData(1.5)]
    public void GrowingASaturatedCylinderToo(double background)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        double k = (Inside(steel.Law, background) / background) - 1;
        (double field, double gradient, _) = Grown(steel, background);

        Assert.Equal(1.0, field / (2 * k * Radius * background / (Height * Height)), 2e-4);
        Assert.Equal(1.0, gradient / (-4 * k * Radius * background / Math.Pow(Height, 3)), 2e-4);
    }

    [Theory]
    [InlineData(0.8)]
    [InlineData(1.2)]
    public void MorePolarisationChangesTheFieldAsTheScaledLawSays(double background)
    {
        const double step = 1e-4;
        Material steel = MaterialLibrary.Get("mild-steel");
        double more = Inside(steel.Law.WithPolarisationScaled(1 + step), background);
        double less = Inside(steel.Law.WithPolarisationScaled(1 - step), background);
        double expected = (more - less) / (2 * step) * Radius * Radius / (Height * Height);

        (_, _, QuantityDerivatives field) = Grown(steel, background);

        Assert.Equal(1.0, field.Parts[0].Saturation / expected, 2e-4);
    }

    [Fact]
    public void TheJointOfTwoMaterialsFollowsTheCoatedCylinder()
    {
        const double core = 5, shell = 50, inner = 6e-3;
        Magnet magnet = new Drawn().Circle("ROOM", 0, 0, 30).Circle("SHELL", 0, 0, 10).Circle("CORE", 0, 0, 6)
            .Linear("SHELL", shell).Linear("CORE", core).Part("ROOM", Material.Air).Magnet(new Point(0, 1));
        Sensitivity s = Solve(magnet);
        QuantityDerivatives field = s.Derivatives([DesignQuantity.Field])[0];
        double byJoint = 0;
        for (int i = 0; i < s.Points.Count; i++)
        {
            FacePoint p = s.Points[i];
            byJoint += Math.Abs(p.At.Length - inner) < 1e-3 ? field.Density[i] * p.Length * Math.Sign(p.Outward.Dot(p.At)) : 0;
        }

        double Coated(double a)
        {
            double f = a * a / (Radius * Radius);
            return (((shell - 1) * (core + shell)) + (f * (core - shell) * (shell + 1)))
                / (((shell + 1) * (core + shell)) + (f * (core - shell) * (shell - 1)));
        }

        const double step = 1e-7;
        double expected = (Coated(inner + step) - Coated(inner - step)) / (2 * step) * Radius * Radius / (Height * Height);
        Assert.Equal(1.0, byJoint / expected, 2e-4);
    }

    [Fact]
    public void AMagnetFollowsItsRemanenceAndItsTurn()
    {
        // A magnetised cylinder in a background along z: inside B = 2 μ B0/(μ + 1) + Br/(μ + 1), so the dipole is
        // R² (k B0 + Br/(μ + 1)); Br at an angle t from z.
        const double background = 0.2, remanence = 1.2, permeability = 1.05, angle = 0.5;
        var role = new PartRole("MAGNET", Linear(permeability))
        {
            Remanence = remanence * new Point(Math.Sin(angle), Math.Cos(angle)),
        };
        Magnet drawn = new Drawn().Circle("ROOM", 0, 0, 30).Circle("MAGNET", 0, 0, 10).Part("MAGNET", Material.Air).Part("ROOM", Material.Air).Magnet(new Point(0, background));
        QuantityDerivatives field = Solve(drawn with { Roles = [role, drawn.Roles[1]] }).Derivatives([DesignQuantity.Field])[0];

        double share = Radius * Radius / (Height * Height);
        double Field(double br, double t)
        {
            // On the axis a dipole along z gives +share along z, one along y gives −share along y.
            double dipoleZ = share * ((background * (permeability - 1)) + (br * Math.Cos(t))) / (permeability + 1);
            double dipoleY = -share * br * Math.Sin(t) / (permeability + 1);
            return Math.Sqrt(Math.Pow(background + dipoleZ, 2) + Math.Pow(dipoleY, 2));
        }

        const double step = 1e-5;
        double byRemanence = (Field(remanence * (1 + step), angle) - Field(remanence * (1 - step), angle)) / (2 * step);
        double byTurn = (Field(remanence, angle - step) - Field(remanence, angle + step)) / (2 * step);
        Assert.Equal(1.0, field.Value / Field(remanence, angle), 1e-6);
        Assert.Equal(1.0, field.Parts[0].Remanence / byRemanence, 1e-5);
        Assert.Equal(1.0, field.Parts[0].Turn / byTurn, 1e-5);
    }

    private static Material Linear(double permeability) => new("linear", new LinearLaw(permeability), "", "", "");

    private static (double Field, double Gradient, QuantityDerivatives Derivatives) Grown(Material material, double background)
    {
        Sensitivity s = Solve(new Drawn().Circle("ROOM", 0, 0, 30).Circle("IRON", 0, 0, 10).Part("IRON", material).Part("ROOM", Material.Air).Magnet(new Point(0, background)));
        IReadOnlyList<QuantityDerivatives> all = s.Derivatives([DesignQuantity.Field, DesignQuantity.Gradient]);
        double Total(QuantityDerivatives q) => s.Points.Select((p, i) => p.Length * q.Density[i]).Sum();
        return (Total(all[0]), Total(all[1]), all[0]);
    }

    private static Sensitivity Solve(Magnet magnet) => Sensitivity.Of(
        FixedMeshSolve.Of(magnet, new FixedMeshOptions(Drawn.Beam(0, 15, 3, 1), 1) { Order = 4, Fineness = 0.5 }));

    private static double Inside(MagneticLaw law, double background)
    {
        double low = 0, high = 2 * background;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            (low, high) = b + (PhysicalConstants.Mu0 * law.At(b).FieldStrength) > 2 * background ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }
}
