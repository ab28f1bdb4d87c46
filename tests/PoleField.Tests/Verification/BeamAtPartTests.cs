// Truth: closed forms beside which no band of air fits — a permeable cylinder in a uniform field and two round conductors, with an
// aperture that touches them or comes within a fiftieth of their radius.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class BeamAtPartTests(VerificationRecord record)
{
    private static readonly VerificationCase Case = new(
        "Aperture at a part", "Closed forms: permeable cylinder in a uniform field, two round conductors; fitted place by place.");

    private const double Radius = 10; // mm
    private const double Background = 1;
    private const double Permeability = 1000;

    [Theory]
    [InlineData(0, 1e-3)]
    [InlineData(0, 1e-5)]
    [InlineData(0.2, 1e-5)] // 0.02 of the radius
    public void FieldBesideAPermeableCylinderIsWithinItsLongerBars(double gap, double accuracy)
    {
        Magnet magnet = new Drawn().Circle("IRON", 0, 0, Radius).Linear("IRON", Permeability).Magnet(new Point(0, Background));
        double strength = Background * (Permeability - 1) / (Permeability + 1) * Radius * Radius * 1e-6;

        Judge("cylinder", magnet, 0, (gap, accuracy), p => ErrorBarTests.Dipole(p, Background, strength));
    }

    [Theory]
    [InlineData(0, 1e-3)]
    [InlineData(0, 1e-5)]
    [InlineData(0.2, 1e-5)]
    public void FieldBesideAConductorIsWithinItsLongerBars(double gap, double accuracy)
    {
        var wires = new TwoWires(0.020, 10_000);
        Magnet magnet = new Drawn().Circle("RIGHT", 20, 0, Radius).Circle("LEFT", -20, 0, Radius)
            .Part("RIGHT", Material.Air, 10_000).Part("LEFT", Material.Air, -10_000).Magnet();

        Judge("conductor", magnet, 20, (gap, accuracy), p => (wires.Magnitude(p), wires.Gradient(p)));
    }

    private void Judge(
        string what, Magnet magnet, double y, (double Gap, double Accuracy) asked, Func<Point, (double Field, double Gradient)> exact)
    {
        Aperture aperture = Drawn.Beam(y, Radius + asked.Gap + 1, 6, 2);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, aperture, new SolveOptions { Accuracy = asked.Accuracy });

        Assert.Equal(BeamFieldMethod.LocalFits, solved.Field.Method);
        Assert.Contains(solved.Report.Findings, f => f.What == "beam-at-part");
        Assert.True(solved.Record.AccuracyMet);
        (double field, double gradient) = exact(aperture.Centre);
        string at = FormattableString.Invariant($"{asked.Gap} mm from a {what}, at {asked.Accuracy:g1}: ");
        record.Check(Case, at + "B at the centre, T", field, solved.FieldEstimate());
        record.Check(Case, at + "gradient at the centre, T/m", gradient, solved.GradientEstimate());

        var samples = ApertureSamples.Of(aperture, new ApertureShape(aperture));
        Point[] places = [.. samples.Inside, .. samples.Edge];
        double largest = places.Max(p => Math.Abs(exact(p).Gradient));
        double worstField = places.Max(p => Math.Abs((solved.Field.At(p).Field / exact(p).Field) - 1));
        double worstGradient = places.Max(p => Math.Abs(solved.Field.At(p).Gradient - exact(p).Gradient)) / largest;
        record.Check(Case, at + "worst B over the aperture, relative", 0, worstField, Allowed.Absolute(asked.Accuracy, "accuracy asked"));
        record.Check(Case, at + "worst gradient over the aperture, over the largest", 0, worstGradient, Allowed.Absolute(asked.Accuracy, "accuracy asked"));
    }

    [Theory]
    [InlineData(0, 10.99, 2, "reaches into the part on layer IRON")]
    [InlineData(0, 0, 2, "lies inside the part on layer IRON")]
    [InlineData(0, 30, 30, "encloses a part")]
    public void AnApertureThatReachesIntoAPartIsRefused(double y, double z, double size, string problem)
    {
        Magnet magnet = new Drawn().Circle("IRON", 0, 0, Radius).Circle("PIN", 3.1, 33.3, 0.1).Linear("IRON", 10).Linear("PIN", 10).Magnet();

        InputException fault = Assert.Throws<InputException>(() => MagnetSolver.Solve(magnet, Drawn.Beam(y, z, size, size)));

        Assert.Contains(problem, fault.Message, StringComparison.Ordinal);
    }
}
