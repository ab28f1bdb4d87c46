// Truth: Ampère's law round a straight conductor, H = I/(2πr) whatever the ring's BH curve (closed form).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

public class RingTests
{
    // Published values for the same steel joined piecewise linearly: B at 10, 15 and 20 mm and the flux per metre.
    [Theory]
    [InlineData(100, 1.4285916, 1.2982677, 1.1753219, 0.012988758)]
    [InlineData(1000, 1.9001490, 1.8087988, 1.7562806, 0.018145121)]
    [InlineData(3000, 2.1132802, 2.0419014, 1.9766658, 0.020430366)]
    public void FluxDensityAndFluxFollowAmperesLaw(double current, double at10, double at15, double at20, double flux)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        Magnet magnet = new Drawn()
            .Circle("RING", 0, 0, 20).Circle("RING", 0, 0, 10).Circle("WIRE", 0, 0, 2)
            .Part("RING", steel).Part("WIRE", Material.Air, current)
            .Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 30, 4, 2), new SolveOptions { Accuracy = 1e-5 });

        foreach (double r in new[] { 0.0101, 0.0125, 0.015, 0.0199 })
        {
            FieldSample sample = Assert.NotNull(solved.Solution.At(Point.Polar(r, 0.7)));

            // The mesh is made for the beam; in the ring the elements' own field is of their order, and H in steel is up to
            // ten times as sensitive as B.
            Assert.Equal(1.0, sample.FieldStrength / (current / (Math.Tau * r)), 2e-3);
            Assert.Equal(1.0, sample.Magnitude / Invert(steel.Law, current / (Math.Tau * r)), 2e-4);
        }

        Assert.Equal(1.0, Near(solved, 0.010005) / at10, 5e-3);
        Assert.Equal(1.0, Near(solved, 0.015) / at15, 5e-3);
        Assert.Equal(1.0, Near(solved, 0.019995) / at20, 5e-3);
        double through = Math.Abs(solved.Solution.At(new Point(0.010005, 0))!.Value.Potential
            - solved.Solution.At(new Point(0.019995, 0))!.Value.Potential);
        Assert.Equal(1.0, through / flux, 2e-3);
        Assert.Equal(1.0, solved.Report.Beam.Field / (PhysicalConstants.Mu0 * current / (Math.Tau * 0.030)), 1e-5);
    }

    private static double Near(SolvedMagnet solved, double r) =>
        Assert.NotNull(solved.Solution.At(Point.Polar(r, 2.1))).Magnitude;

    private static double Invert(MagneticLaw law, double fieldStrength)
    {
        double low = 0, high = 10;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            (low, high) = law.At(b).FieldStrength > fieldStrength ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }
}
