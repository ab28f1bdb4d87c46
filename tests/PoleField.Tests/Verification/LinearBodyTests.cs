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

    private static readonly VerificationCase Pipe = new(
        "Permeable pipe in a uniform field", "Published: field in the bore over that outside, 4μr/((μr + 1)² − (μr − 1)² (a/b)²).");

    private static readonly VerificationCase Single = new(
        "Conductor without return, 1000 A", "Ampère's law at any distance; the return current flows at infinity.");

    private static readonly VerificationCase Circle = new(
        "Two conductors in a closed circle", "Images of opposite sign at D²/a (inversion of the plane).");

    [Theory]
    [InlineData(1000, 40, 50, 0.01101078)]
    [InlineData(100, 10, 20, 0.051607909)]
    [InlineData(10, 10, 20, 0.39702233)]
    public void PipeShieldsItsBore(double permeability, double inner, double outer, double share)
    {
        Magnet magnet = new Drawn().Circle("PIPE", 0, 0, inner).Circle("PIPE", 0, 0, outer)
            .Linear("PIPE", permeability).Magnet(new Point(0, 1));

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0.1 * inner, 0, 0.2 * inner, 0.1 * inner), Fine);

        record.Check(
            Pipe, FormattableString.Invariant($"{inner}/{outer} mm, μr {permeability}: B in the bore at 1 T outside, T"),
            share, solved.FieldEstimate(), 5e-9);
    }

    [Fact]
    public void CurrentWithoutReturnHasItsFieldNearAndFar()
    {
        Magnet magnet = new Drawn().Circle("WIRE", 4, 1, 2).Part("WIRE", Material.Air, 1000).Magnet();
        var wire = new Point(0.004, 0.001);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(4, 11, 2, 1), new SolveOptions { Accuracy = 1e-6 });

        double at10 = PhysicalConstants.Mu0 * 1000 / (Math.Tau * 0.010);
        record.Check(Single, "B 10 mm away, the beam, T", at10, solved.FieldEstimate());
        record.Check(Single, "dB/dz 10 mm away, T/m", -at10 / 0.010, solved.GradientEstimate());
        var local = new OneOrderUp(solved);
        foreach (double distance in new[] { 0.1, 3.0 })
        {
            record.Check(
                Single, FormattableString.Invariant($"B {distance} m away, T"),
                PhysicalConstants.Mu0 * 1000 / (Math.Tau * distance), local.Magnitude(wire + Point.Polar(distance, 0.3)));
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

        record.Check(Circle, FormattableString.Invariant($"rim of {rim} mm: B, T"), Math.Abs(truth), closed.FieldEstimate());
        Assert.True(Math.Abs((truth / wires.Field(beam.Centre).Z) - 1) > 1e-3); // the images matter
    }
}
