// Truth: a permeable cylinder in a uniform field (any textbook of electromagnetism): inside uniform, B + μ0 H = 2 B0; outside
// the background plus a dipole of strength k R² B0, k = B/B0 − 1. With a BH curve the inside is still uniform.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

public class CylinderTests
{
    private const double Radius = 10; // mm

    [Theory]
    [InlineData(2, 1.3333333)]
    [InlineData(10, 1.8181818)]
    [InlineData(1000, 1.9980020)]
    public void LinearCylinderHasTheTextbookFieldInside(double permeability, double inside)
    {
        SolvedMagnet solved = Solve(new Material("linear", new LinearLaw(permeability), "", "", ""), 1.0);

        FieldSample centre = Assert.NotNull(solved.Solution.At(new Point(0.001, 0.002)));
        Assert.Equal(inside, centre.Bz, 1e-5);
        Assert.Equal(0, centre.By, 1e-5);
    }

    [Theory]
    [InlineData(0.1)]
    [InlineData(0.5)]
    [InlineData(0.8)]
    [InlineData(1.0)]
    [InlineData(1.2)]
    [InlineData(1.5)]
    public void SaturatingCylinderIsUniformInsideAndADipoleOutside(double background)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        SolvedMagnet solved = Solve(steel, background);
        double inside = InsideField(steel.Law, background);
        double k = (inside / background) - 1;

        FieldSample centre = Assert.NotNull(solved.Solution.At(new Point(0.0033, -0.0021)));
        Assert.Equal(1.0, centre.Bz / inside, 1e-5);
        BeamValues beam = solved.Report.Beam; // on the axis along the field at 1.5 R
        double r = beam.At.Z / (Radius / 1000);
        Assert.Equal(1.0, beam.Field / (background * (1 + (k / (r * r)))), 1e-5);
        Assert.Equal(1.0, beam.Gradient / (-2 * background * k / (r * r * beam.At.Z)), 1e-4);
        Assert.InRange(solved.Solution.History.Count, 1, 16);
    }

    // Published table: same steel, joined piecewise linearly with slope μ0 beyond the last row.
    [Theory]
    [InlineData(0.5, 0.99930331)]
    [InlineData(0.8, 1.5957142)]
    [InlineData(1.0, 1.9707705)]
    [InlineData(1.2, 2.2572283)]
    public void SaturatingCylinderAgreesWithThePublishedValues(double background, double inside)
    {
        SolvedMagnet solved = Solve(MaterialLibrary.Get("mild-steel"), background);

        FieldSample centre = Assert.NotNull(solved.Solution.At(default));
        Assert.Equal(1.0, centre.Bz / inside, 2e-3);
    }

    internal static double InsideField(MagneticLaw law, double background)
    {
        double low = 0, high = 2 * background;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            (low, high) = b + (PhysicalConstants.Mu0 * law.At(b).FieldStrength) > 2 * background ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }

    private static SolvedMagnet Solve(Material material, double background) => MagnetSolver.Solve(
        new Drawn().Circle("IRON", 0, 0, Radius).Part("IRON", material).Magnet(new Point(0, background)),
        Drawn.Beam(0, 1.5 * Radius, 3, 1),
        new SolveOptions { Accuracy = 1e-5 });
}
