// Truth: an ellipse in a uniform field along an axis is uniform inside whatever its BH curve: H + N (B/μ0 − H) = B0/μ0 with
// N = b/(a + b), a the half axis along the field (any textbook of electromagnetism).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class EllipseTests(VerificationRecord record)
{
    [Theory]
    [InlineData(0.5, 1.4947548, 3e-3)]
    [InlineData(0.7, 2.0254559, 3e-3)]
    [InlineData(1.0, 2.4202360, 1e-2)] // beyond the table's last row, where the program's tail bends on and the published one is straight
    public void SaturatingEllipseIsUniformInside(double background, double published, double tolerance)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        Magnet magnet = new Drawn().Closed("IRON", new EllipticArc(default, new Point(0, 20), 10, 0, Math.Tau))
            .Part("IRON", steel).Magnet(new Point(0, background));
        double truth = Inside(steel.Law, background, 1.0 / 3);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(15, 0, 2, 4), new SolveOptions { Accuracy = 1e-5 });

        record.Relative(FormattableString.Invariant($"ellipse 2:1 in {background} T: B in the middle, T"), truth, solved.Solution.At(new Point(0.001, 0.002))!.Value.Bz, 2e-5);

        // The mesh is made for the beam; far from it the elements' own field is of their order.
        record.Relative(FormattableString.Invariant($"ellipse 2:1 in {background} T: B near its tip, T"), truth, solved.Solution.At(new Point(0, 0.0199))!.Value.Bz, 2e-3);
        record.Relative(FormattableString.Invariant($"ellipse 2:1 in {background} T: B, published for a piecewise linear curve, T"), published, solved.Solution.At(default)!.Value.Bz, tolerance);
    }

    private static double Inside(MagneticLaw law, double background, double n)
    {
        double low = 0, high = 5 * background;
        for (int k = 0; k < 200; k++)
        {
            double b = 0.5 * (low + high);
            double h = law.At(b).FieldStrength;
            (low, high) = PhysicalConstants.Mu0 * h * (1 - n) + (n * b) > background ? (low, b) : (b, high);
        }

        return 0.5 * (low + high);
    }
}
