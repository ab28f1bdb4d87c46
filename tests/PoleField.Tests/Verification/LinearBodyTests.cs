// Truth: closed forms. A permeable pipe in a uniform field shields its bore by 4μr/((μr+1)² − (μr−1)²(a/b)²); two wires in
// a closed circle with A = 0 have opposite images at D²/a (inversion of the plane), and the open model has none; a single
// conductor has B = μ0 I/(2πr) at any distance (Ampère).
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

    [Fact]
    public void CurrentWithoutReturnHasItsFieldNearAndFar()
    {
        Magnet magnet = new Drawn().Circle("WIRE", 4, 1, 2).Part("WIRE", Material.Air, 1000).Magnet();
        var wire = new Point(0.004, 0.001);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(4, 11, 2, 1), new SolveOptions { Accuracy = 1e-6 });

        record.Relative("one conductor without return: B 10 mm away, T", 0.02, solved.Report.Beam.Field, 1e-6);
        record.Relative("one conductor without return: dB/dz 10 mm away, T/m", -2, solved.Report.Beam.Gradient, 1e-6);
        foreach (double distance in new[] { 0.1, 3.0 })
        {
            FieldSample far = solved.Solution.At(wire + Point.Polar(distance, 0.3))!.Value;
            record.Relative(
                FormattableString.Invariant($"one conductor without return: B {distance} m away, T"),
                PhysicalConstants.Mu0 * 1000 / (Math.Tau * distance), far.Magnitude, 1e-5);
        }

        Assert.True(double.IsNaN(solved.Report.Circuit.EnergyPerMetre)); // infinite
        Assert.Null(solved.Report.Circuit.InductancePerMetre);
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
