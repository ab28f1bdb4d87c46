// Truth: closed form of two opposite line currents. Round conductors with even current density have exactly that field
// outside themselves (Ampère's law and superposition).
using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

public class TwoWireTests
{
    private const double A = 3.0; // mm
    private const double Current = 10_000;

    private static readonly TwoWires Exact = new(A / 1000, Current);

    [Fact]
    public void GradientAtTheBeamIsRightToTheAskedAccuracyAndInsideItsErrorBar()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        BeamReport report = solved.Report;
        double truth = Exact.Gradient(report.Beam.At);
        Assert.Equal(-179.16331, truth, 5e-6); // REFERENCES of two line currents ±10 kA at ±3 mm, 1.2 a
        Assert.InRange(Math.Abs((report.Beam.Gradient - truth) / truth), 0, 1e-4);
        Assert.InRange(Math.Abs(report.Beam.Gradient - truth), 0, report.GradientError);
        Assert.InRange(Math.Abs(report.Beam.Field - Exact.Magnitude(report.Beam.At)), 0, report.FieldError);
        Assert.True(solved.Record.AccuracyMet);
    }

    [Fact]
    public void TheWholeChainFromADrawingFileKeepsTheAccuracy()
    {
        Drawn drawn = Conductors();
        using var file = new MemoryStream();
        DxfWriter.Write(drawn.Sketch(), file);
        file.Position = 0;

        Sketch read = DxfReader.Read(file, "wires.dxf");
        BeamReport report = MagnetSolver.Solve(drawn.MagnetOf(read), Drawn.Beam(0, 1.2 * A, 3, 0.3)).Report;

        Assert.InRange(Math.Abs((report.Beam.Gradient / Exact.Gradient(report.Beam.At)) - 1), 0, 1e-4);
    }

    [Fact]
    public void FieldAndGradientAreRightAllOverTheAperture()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        foreach (BeamValues v in solved.Report.ProfileY.Concat(solved.Report.ProfileZ))
        {
            Assert.Equal(1.0, v.Field / Exact.Magnitude(v.At), 1e-4);
            Assert.Equal(1.0, v.Gradient / Exact.Gradient(v.At), 1e-4);
        }
    }

    [Fact]
    public void FieldIsRightInsideAndOutsideTheOpenCircle()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Wires(), Drawn.Beam(0, 1.2 * A, 3, 0.3));

        foreach (Point p in new[] { new Point(0, -0.004), new Point(0.009, 0.002), new Point(0.1, 0.03), new Point(-2, 1) })
        {
            FieldSample sample = Assert.NotNull(solved.Solution.At(p));
            Point truth = Exact.Field(p);
            double size = truth.Length;
            Assert.InRange(Math.Abs(sample.By - truth.Y) / size, 0, 2e-3);
            Assert.InRange(Math.Abs(sample.Bz - truth.Z) / size, 0, 2e-3);
        }
    }

    private static Magnet Wires() => Conductors().Magnet();

    private static Drawn Conductors() => new Drawn()
        .Circle("WIRE RIGHT", A, 0, 1.0)
        .Circle("WIRE LEFT", -A, 0, 1.0)
        .Part("WIRE RIGHT", Material.Air, Current)
        .Part("WIRE LEFT", Material.Air, -Current);
}
