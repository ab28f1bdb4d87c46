// Truth: a line current over a permeable half space by images: on the air's side the current and k times it mirrored,
// k = (μr − 1)/(μr + 1); on the iron's side (1 + k) times it in place; pull μ0 I² k/(4π d). A circular rim with A = 0 about
// the point below the current leaves the plane in place and adds every image's inverse R²/d with opposite sign, exactly.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class HalfSpaceTests(VerificationRecord record)
{
    private const double Current = 1000;
    private const double Height = 0.010;
    private const double Rim = 0.500;

    private static readonly VerificationCase Case = new(
        "Line current 1000 A, 10 mm above a permeable half space",
        "Closed form by images, within a rim of 0.5 m whose images are added exactly; \"open\" compares with the published values for an open half space, which the rim's images change by (d/R)².");

    [Theory]
    [InlineData(5, 0.0066666667, 0.016666667, 6.6666667)]
    [InlineData(1000, 3.996004e-5, 0.01998002, 9.98002)]
    public void FieldAndPullFollowTheImages(double permeability, double below, double across, double pull)
    {
        double k = (permeability - 1) / (permeability + 1);
        var left = new Point(-1000 * Rim, 0);
        var right = new Point(1000 * Rim, 0);
        Magnet magnet = new Drawn()
            .Closed("RIM", Arc(0, left, right).Reversed(), Arc(Math.PI, left, right))
            .Closed("IRON", new Line(left, right), Arc(Math.PI, left, right))
            .Circle("WIRE", 0, 1000 * Height, 2)
            .Linear("IRON", permeability).Part("WIRE", Material.Air, Current)
            .Magnet(rim: "RIM");

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(10, 4, 3, 2), new SolveOptions { Accuracy = 1e-6 });

        var local = new OneOrderUp(solved);
        string at = FormattableString.Invariant($"μr {permeability}: ");
        Point beam = solved.Report.Beam.At;
        var under = new Point(0, 1e-7);
        var beside = new Point(0.010, 1e-7);
        var deep = new Point(0.004, -0.005);
        record.Check(Case, at + "B at (10, 4) mm in air, T", InAir(beam, k).Length, solved.FieldEstimate());
        record.Check(Case, at + "By below the current, T", InAir(under, k).Y, local.By(under));
        record.Check(Case, at + "Bz at (10, 0) mm, T", InAir(beside, k).Z, local.Bz(beside));
        record.Check(Case, at + "Bz at (4, -5) mm in iron, T", InIron(deep, k).Z, local.Bz(deep));
        record.Check(Case, at + "By at (4, -5) mm in iron, T", InIron(deep, k).Y, local.By(deep));

        // The rim's images: the field along the surface from −(1 ∓ k) I at R²/d, the pull of −I and −kI there.
        double far = Height * Height / (Rim * Rim);
        record.Check(Case, at + "open, By below the current, T", below, local.By(under).Value, Allowed.Bar(local.By(under).Bar, (below * far) + 5e-11));
        record.Check(Case, at + "open, Bz at (10, 0) mm, T", across, local.Bz(beside).Value, Allowed.Bar(local.Bz(beside).Bar, (2 * across * far) + 5e-9));
        Estimate force = local.Of(s => PartReports.Of(s)[1].ForcePerMetre!.Value.Z);
        record.Check(Case, at + "open, pull on the current, N/m", -pull, force.Value, Allowed.Bar(force.Bar, (4 * pull * far) + 5e-8));
    }

    private static CircularArc Arc(double from, Point left, Point right) => from == 0
        ? new CircularArc(default, 1000 * Rim, 0, Math.PI).WithEnds(right, left)
        : new CircularArc(default, 1000 * Rim, Math.PI, Math.PI).WithEnds(left, right);

    private static Point InAir(Point p, double k) =>
        Line(p, Height, 1) + Line(p, -Height, k) + Line(p, Rim * Rim / Height, -1) + Line(p, -Rim * Rim / Height, -k);

    private static Point InIron(Point p, double k) => Line(p, Height, 1 + k) + Line(p, Rim * Rim / Height, -1 - k);

    private static Point Line(Point p, double z, double share)
    {
        Point d = p - new Point(0, z);
        return share * PhysicalConstants.Mu0 * Current / (Math.Tau * d.SquaredLength) * d.Perpendicular;
    }
}
