// Truth: the field of two opposite line currents, exact outside round conductors, differentiated in closed form; the divergence
// of a curl.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Tests.Verification;
using Xunit;

namespace PoleField.Tests.Magnetostatics;

public sealed class FieldSlopesTests
{
    private static readonly SolvedMagnet Solved = MagnetSolver.Solve(
        new Drawn()
            .Circle("WIRE RIGHT", 3, 0, 1.0)
            .Circle("WIRE LEFT", -3, 0, 1.0)
            .Part("WIRE RIGHT", Material.Air, 10_000)
            .Part("WIRE LEFT", Material.Air, -10_000)
            .Magnet(),
        Drawn.Beam(0, 3.6, 1, 0.1),
        new SolveOptions { Accuracy = 1e-5, Threads = 2 });

    [Theory]
    [InlineData(0.0, 5.0)]     // beside the aperture
    [InlineData(1.5, 2.5)]     // near a conductor
    [InlineData(-4.5, -2.0)]
    [InlineData(60.0, 80.0)]   // outside the meshed circle
    public void SlopesOfTheElementsAreThoseOfTheClosedForm(double yMillimetres, double zMillimetres)
    {
        Point p = new(1e-3 * yMillimetres, 1e-3 * zMillimetres);
        BeamValues exact = new TwoWireField(3e-3, default, 10_000).At(p);

        FieldSlopes found = Solved.Solution.SlopesAt(p)!.Value;

        // The second derivative of a third-order potential is of first order in the element's size: a few per cent on this mesh.
        double allowed = 0.05 * Math.Sqrt((exact.DByDz * exact.DByDz) + (exact.DBzDz * exact.DBzDz));
        Assert.Equal(exact.DByDz, found.DByDz, allowed);
        Assert.Equal(exact.DByDz, found.DBzDy, allowed);
        Assert.Equal(exact.DBzDz, found.DBzDz, allowed);
        Assert.Equal(-exact.DBzDz, found.DByDy, allowed);
    }

    [Fact]
    public void TheDivergenceVanishesInStraightElements()
    {
        // B is the curl of A, so its divergence is zero whatever the element; a wrong derivative or Jacobian breaks it.
        var random = new Random(11);
        for (int k = 0; k < 200; k++)
        {
            Point p = new(8e-3 * ((2 * random.NextDouble()) - 1), 5e-3 + (3e-3 * random.NextDouble()));
            FieldSlopes s = Solved.Solution.SlopesAt(p)!.Value;
            Assert.Equal(0, s.DByDy + s.DBzDz, 1e-6 * (Math.Abs(s.DByDy) + Math.Abs(s.DBzDz) + Math.Abs(s.DByDz) + 1e-3));
        }
    }
}
