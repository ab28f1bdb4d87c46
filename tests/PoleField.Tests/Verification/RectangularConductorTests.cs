// Truth: closed form of the field of a rectangular conductor with even current density (Biot and Savart integrated; check
// values to seven digits for 20 mm × 10 mm, 1000 A).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

public class RectangularConductorTests
{
    [Fact]
    public void FieldInsideAndOutsideFollowsTheClosedForm()
    {
        Magnet magnet = new Drawn().Rectangle("BAR", 0, 0, 20, 10).Part("BAR", Material.Air, 1000).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(30, 0, 4, 2), new SolveOptions { Accuracy = 1e-6 });

        (double Y, double Z, double By, double Bz)[] truth =
        [
            (10, 0, 0, 0.02396521),
            (0, 5, -0.02263944, 0),
            (15, 20, -0.006502673, 0.004498457),
            (5, 2.5, -0.01028851, 0.009358012),
        ];
        foreach ((double y, double z, double by, double bz) in truth)
        {
            FieldSample sample = Assert.NotNull(solved.Solution.At(new Point(y / 1000, z / 1000)));
            Assert.Equal(by, sample.By, 2e-5);
            Assert.Equal(bz, sample.Bz, 2e-5);
        }

        Assert.Equal(0.006855123, solved.Report.Beam.Bz, 7e-9);
        Assert.InRange(Math.Abs(0.006855123 - solved.Report.Beam.Field), 0, solved.Report.FieldError + 5e-10);
    }
}
