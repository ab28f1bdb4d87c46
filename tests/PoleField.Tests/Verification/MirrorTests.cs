// Truth: symmetry. A half drawing completed by its mirror image is the full drawing.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

public class MirrorTests
{
    [Fact]
    public void HalfDrawingGivesTheFullDrawingsField()
    {
        Magnet full = new Drawn()
            .Rectangle("IRON", 0, -15, 20, 20).Rectangle("COIL RIGHT", 18, -10, 6, 8).Rectangle("COIL LEFT", -18, -10, 6, 8)
            .Linear("IRON", 500).Part("COIL RIGHT", Material.Air, -2000).Part("COIL LEFT", Material.Air, 2000)
            .Magnet();
        Magnet half = new Drawn()
            .Closed("IRON", new Line(new Point(0, -25), new Point(10, -25)), new Line(new Point(10, -25), new Point(10, -5)),
                new Line(new Point(10, -5), new Point(0, -5)))
            .Rectangle("COIL RIGHT", 18, -10, 6, 8)
            .Linear("IRON", 500).Part("COIL RIGHT", Material.Air, -2000)
            .Magnet(mirror: true);
        Aperture aperture = Drawn.Beam(0, 0, 4, 1);
        var options = new SolveOptions { Accuracy = 1e-5 };

        BeamReport whole = MagnetSolver.Solve(full, aperture, options).Report;
        BeamReport completed = MagnetSolver.Solve(half, aperture, options).Report;

        Assert.Equal(1.0, completed.Beam.Field / whole.Beam.Field, 2e-5);
        Assert.Equal(1.0, completed.Beam.Gradient / whole.Beam.Gradient, 4e-5);
        Assert.Equal(0.0, completed.Beam.By / completed.Beam.Bz, 1e-6);
    }
}
