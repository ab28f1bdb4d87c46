// Truth: two pole faces along circles through both wire positions are equipotentials of the two-wire field, so for iron of
// infinite permeability B·a/(μ0 NI) = (a²/(z² + a²)) / [atan(a/z1) − atan(a/z2)] and G·a²/(μ0 NI) likewise (closed form).
// Faces: the ridge is a whole half cylinder; the groove runs 20 degrees beyond its half circle, to tau = 1.79 in bipolar
// coordinates, where cutting it costs 0.3 exp(−π tau/0.6435) = 5e-5 of B and about five times that of G.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class PolePairTests(VerificationRecord record)
{
    private const double A = 3.0;       // mm
    private const double Turns = 3000;  // A

    private static readonly VerificationCase Pair = new(
        "Pole pair on circles through both wires, R2 = 1.25 a, a = 3 mm, μr 1e5",
        "Published: B a/(μ0 NI) and G a²/(μ0 NI) for infinite permeability, NI the ampere-turns across the gap. Cutting the groove at tau = 1.79 takes 0.3 exp(−π tau/0.6435) = 5e-5 of B and five times that of G.");

    private static readonly VerificationCase Cut = new(
        "Truncated groove, R2 = 1.25 a",
        "Rule from boundary elements: cutting the groove at tau costs 0.3 exp(−π tau/0.6435) of B and 3.5 to 5 times that of G. A rule of thumb, good to a factor of 2.");

    [Theory]
    [InlineData(1.2, 1.273770, 1.252888)]
    [InlineData(1.3, 1.155389, 1.116733)]
    public void FieldAndGradientPerAmpereTurnFollowTheClosedForm(double height, double fieldNumber, double gradientNumber)
    {
        SolvedMagnet solved = MagnetSolver.Solve(Poles(permeability: 1e5), Drawn.Beam(0, height * A, 1.5, 0.3));

        BeamReport report = solved.Report;
        double unit = PhysicalConstants.Mu0 * report.Circuit.GapAmpereTurns / (A / 1000);
        string at = FormattableString.Invariant($"at {height} a: ");
        record.Check(Pair, at + "B a/(μ0 NI)", fieldNumber, report.Beam.Field / unit, Allowed.Absolute((report.FieldError / unit) + (1e-4 * fieldNumber) + 5e-7, "own error bar, twice the cut's rule"));
        record.Check(Pair, at + "G a²/(μ0 NI)", gradientNumber, Math.Abs(report.Beam.Gradient) * A / 1000 / unit, Allowed.Absolute((report.GradientError * A / 1000 / unit) + (5e-4 * gradientNumber) + 5e-7, "own error bar, twice the cut's rule"));
        Assert.InRange(report.Circuit.Efficiency!.Value, 0.998, 1.0001); // iron at 1e5 takes its share
    }

    // Rule for poles of infinite permeability (derived with boundary elements): cutting the groove at tau in bipolar
    // coordinates costs 0.3 exp(−π tau/0.6435) of B at the beam and 3.5 to 5 times that of G. A rule of thumb: a factor of 2.
    [Theory]
    [InlineData(0)]
    [InlineData(-15)]
    public void CuttingTheGrooveCostsWhatTheRuleSays(double beyondHalfCircle)
    {
        double angle = -beyondHalfCircle * Math.PI / 180;
        double y = 1.25 * Math.Cos(angle);
        double z = 0.75 + (1.25 * Math.Sin(angle));
        double tau = 0.5 * Math.Log((((y + 1) * (y + 1)) + (z * z)) / (((y - 1) * (y - 1)) + (z * z)));
        double rule = 0.3 * Math.Exp(-Math.PI * tau / (2 * (Math.Atan(1) - Math.Atan(0.5))));

        BeamReport report = MagnetSolver.Solve(Poles(beyondHalfCircle), Drawn.Beam(0, 1.2 * A, 1.5, 0.3)).Report;

        double unit = PhysicalConstants.Mu0 * Turns / (A / 1000);
        double ofField = 1 - (report.Beam.Field / (1.273770 * unit));
        double ofGradient = 1 - (Math.Abs(report.Beam.Gradient) / (1.252888 * unit / (A / 1000)));
        string at = FormattableString.Invariant($"cut {beyondHalfCircle}° beyond its half circle: ");
        record.Check(Cut, at + "log2 of the cost in B over the rule's", 0, Math.Log2(Math.Abs(ofField) / rule), Allowed.Absolute(1, "rule of thumb, a factor of 2"));
        record.Check(Cut, at + "log2 of the cost in G over 4.25 times that in B", 0, Math.Log2(ofGradient / ofField / 4.25), Allowed.Absolute(1, "rule of thumb, a factor of 2"));
    }

    internal static Magnet Poles(double beyondHalfCircle = 20, double permeability = 1e6)
    {
        const double r = 1.25 * A;
        double cut = beyondHalfCircle * Math.PI / 180;
        var centre = new Point(0, 0.75 * A);
        var groove = new CircularArc(centre, r, -cut, Math.PI + (2 * cut));
        Point lip = groove.Start;
        var mirrored = new Point(-lip.Y, lip.Z);
        groove = groove.WithEnds(lip, mirrored);
        var ridge = new CircularArc(default, A, 0, Math.PI).WithEnds(new Point(A, 0), new Point(-A, 0));
        Point[] right = [new(A, 0), new(A, -30), new(30, -30), new(30, 30), new(12, 30), new(12, lip.Z), lip];
        Point[] left = [mirrored, new(-12, lip.Z), new(-12, 30), new(-30, 30), new(-30, -30), new(-A, -30), new(-A, 0)];
        Curve[] window =
        [
            .. right.Zip(right.Skip(1), (p, q) => (Curve)new Line(p, q)),
            groove,
            .. left.Zip(left.Skip(1), (p, q) => (Curve)new Line(p, q)),
            ridge.Reversed(),
        ];
        return new Drawn()
            .Rectangle("IRON", 0, 0, 80, 80)
            .Closed("IRON", window)
            .Rectangle("COIL LEFT", -18, -15, 12, 20)
            .Rectangle("COIL RIGHT", 18, -15, 12, 20)
            .Linear("IRON", permeability)
            .Part("COIL LEFT", Material.Air, Turns)
            .Part("COIL RIGHT", Material.Air, -Turns)
            .Magnet();
    }
}
