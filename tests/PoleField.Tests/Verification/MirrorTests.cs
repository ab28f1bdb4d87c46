// Truth: symmetry. A half drawing completed by its mirror image is the full drawing.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class MirrorTests(VerificationRecord record)
{
    private static readonly VerificationCase Case = new(
        "Half drawing and its mirror image", "Symmetry: it is the full drawing. Both are meshed apart, each with its own error bar.");

    [Fact]
    public void HalfDrawingGivesTheFullDrawingsFieldToEightDigits()
    {
        // Round iron and round conductors: no corner keeps the error of either mesh above some 1e-9.
        Magnet full = new Drawn()
            .Circle("IRON", 0, -15, 10).Circle("COIL RIGHT", 20, 5, 4).Circle("COIL LEFT", -20, 5, 4)
            .Linear("IRON", 500).Part("COIL RIGHT", Material.Air, -2000).Part("COIL LEFT", Material.Air, 2000)
            .Magnet();
        Magnet half = new Drawn()
            .Closed("IRON", new CircularArc(new Point(0, -15), 10, -0.5 * Math.PI, Math.PI), new Line(new Point(0, -5), new Point(0, -25)))
            .Circle("COIL RIGHT", 20, 5, 4)
            .Linear("IRON", 500).Part("COIL RIGHT", Material.Air, -2000)
            .Magnet(mirror: true);
        Aperture aperture = Drawn.Beam(0, 0, 4, 1);
        var options = new SolveOptions { Accuracy = 5e-9, Order = 4 };

        BeamReport whole = MagnetSolver.Solve(full, aperture, options).Report;
        BeamReport completed = MagnetSolver.Solve(half, aperture, options).Report;

        Allowed eight = Allowed.Relative(1e-8, "stated agreement");
        record.Check(Case, "round iron: B, T", whole.Beam.Field, completed.Beam.Field, eight);
        record.Check(Case, "round iron: d|B|/dz, T/m", whole.Beam.Gradient, completed.Beam.Gradient, eight);
        record.Check(Case, "round iron: By on the mirror's plane over Bz", 0, completed.Beam.By / completed.Beam.Bz, Allowed.Absolute(1e-8, "stated agreement"));
    }

    [Fact]
    public void HalfDrawingOfIronWithCornersGivesTheFullDrawingsFieldWithinTheBars()
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

        record.Check(Case, "B, T", whole.Beam.Field, completed.Beam.Field, Allowed.Bar(whole.FieldError + completed.FieldError));
        record.Check(Case, "d|B|/dz, T/m", whole.Beam.Gradient, completed.Beam.Gradient, Allowed.Bar(whole.GradientError + completed.GradientError));
        record.Check(Case, "By on the mirror's plane, T", 0, completed.Beam.By, Allowed.Bar(completed.FieldError));
    }
}
