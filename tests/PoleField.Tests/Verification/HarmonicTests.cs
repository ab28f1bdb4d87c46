// Truth: in air By and Bz are parts of one analytic function, so that ln|B| is harmonic, |B| Δ|B| = |grad |B||², and B is free
// of divergence and curl, whatever the finite elements did (Cauchy and Riemann).
using PoleField.Beam;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class HarmonicTests(VerificationRecord record)
{
    private static readonly VerificationCase Case = new(
        "The extracted field is harmonic, coarsest mesh", "Cauchy and Riemann: ln|B| is harmonic, |B| Δ|B| = |grad |B||².");

    [Fact]
    public void LogarithmOfTheFieldIsHarmonicOnTheCoarsestMesh()
    {
        Aperture beam = Drawn.Beam(0, 1.2 * 3, 1.5, 0.3);
        BeamField field = MagnetSolver.Solve(PolePairTests.Poles(), beam, new SolveOptions { Accuracy = 1e-2, MostAdaptiveSteps = 1 }).Field;
        const double h = 1e-5; // metres; the difference formulas are of sixth order, so that h⁶ is below rounding over h²
        double worst = 0, worstSlope = 0;
        foreach (Point p in new[] { new Point(0.0002, 0.0036), new Point(-0.0005, 0.0035), new Point(0.0006, 0.0037) })
        {
            double laplacian = Second(t => Size(field, p + new Point(t, 0)), h) + Second(t => Size(field, p + new Point(0, t)), h);
            BeamValues v = field.At(p);
            double gradient = (v.Gradient * v.Gradient) + (v.TransverseGradient * v.TransverseGradient);
            worst = Math.Max(worst, Math.Abs((v.Field * laplacian) - gradient) / gradient);
            worstSlope = Math.Max(worstSlope, Math.Abs(First(t => Size(field, p + new Point(0, t)), h) - v.Gradient) / Math.Sqrt(gradient));
        }

        // |B| is a sum over thousands of places and loses some three digits; the quotients divide by h² and h what stands against
        // |grad B|² and |grad B| of order |B|/a, a = 3 mm.
        const double rounding = 1e-13;
        record.Check(Case, "|B| Δ|B| over |grad |B||² less 1", 0, worst, Allowed.Absolute(rounding * 9e-6 / (h * h), "rounding in the difference quotient"));
        record.Check(Case, "difference quotient of |B| over the gradient less 1", 0, worstSlope, Allowed.Absolute(rounding * 3e-3 / h, "rounding in the difference quotient"));
    }

    private static double Size(BeamField field, Point p) => field.At(p).Field;

    private static double Second(Func<double, double> f, double h) =>
        ((2 * (f(3 * h) + f(-3 * h))) - (27 * (f(2 * h) + f(-2 * h))) + (270 * (f(h) + f(-h))) - (490 * f(0))) / (180 * h * h);

    private static double First(Func<double, double> f, double h) =>
        ((f(3 * h) - f(-3 * h)) - (9 * (f(2 * h) - f(-2 * h))) + (45 * (f(h) - f(-h)))) / (60 * h);
}
