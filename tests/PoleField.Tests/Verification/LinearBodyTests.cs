// Truth: closed forms. A permeable pipe in a uniform field shields its bore by 4μr/((μr+1)² − (μr−1)²(a/b)²); two wires in
// a closed circle with A = 0 have opposite images at D²/a (inversion of the plane), and the open model has none.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class LinearBodyTests(VerificationRecord record)
{
    private static readonly SolveOptions Fine = new() { Accuracy = 1e-5 };

    [Theory]
    [InlineData(1000, 40, 50, 0.01101078)]
    [InlineData(10, 10, 20, 0.39702233)]
    public void PipeShieldsItsBore(double permeability, double inner, double outer, double share)
    {
        Magnet magnet = new Drawn().Circle("PIPE", 0, 0, inner).Circle("PIPE", 0, 0, outer)
            .Linear("PIPE", permeability).Magnet(new Point(0, 1));

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0.1 * inner, 0, 0.2 * inner, 0.1 * inner), Fine);

        record.Relative(
            FormattableString.Invariant($"pipe {inner}/{outer} mm, μr {permeability}: field in the bore over outside"),
            share, solved.Report.Beam.Bz, 1e-5);
    }

    [Theory]
    [InlineData(15)]
    [InlineData(60)]
    public void ClosedCircleAddsItsImages(double rim)
    {
        const double a = 3;
        const double current = 10_000;
        Drawn drawn = new Drawn().Circle("RIM", 0, 0, rim).Circle("RIGHT", a, 0, 1).Circle("LEFT", -a, 0, 1)
            .Part("RIGHT", Material.Air, current).Part("LEFT", Material.Air, -current);
        Aperture beam = Drawn.Beam(0, 3.6, 2, 0.5);
        var wires = new TwoWires(a / 1000, current);
        var images = new TwoWires(rim * rim / a / 1000, -current);
        double truth = (wires.Field(beam.Centre) + images.Field(beam.Centre)).Z;

        SolvedMagnet closed = MagnetSolver.Solve(drawn.Magnet(rim: "RIM"), beam, Fine);

        record.Relative(FormattableString.Invariant($"two wires in a closed circle of {rim} mm: Bz, T"), truth, closed.Report.Beam.Bz, 1e-5);
        Assert.True(Math.Abs((truth / wires.Field(beam.Centre).Z) - 1) > 1e-3); // the images matter
    }
}
