// Truth: in air By and Bz are parts of one analytic function, so that ln|B| is harmonic, |B| Δ|B| = |grad |B||², and B is free
// of divergence and curl, whatever the finite elements did (Cauchy and Riemann).
using PoleField.Beam;
using PoleField.Geometry;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class HarmonicTests(VerificationRecord record)
{
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

        record.Absolute("extracted field: |B| lap |B| against |grad |B||², relative", 0, worst, 1e-7);
        record.Absolute("extracted field: difference quotient of |B| against the gradient, relative", 0, worstSlope, 1e-9);
    }

    private static double Size(BeamField field, Point p) => field.At(p).Field;

    private static double Second(Func<double, double> f, double h) =>
        ((2 * (f(3 * h) + f(-3 * h))) - (27 * (f(2 * h) + f(-2 * h))) + (270 * (f(h) + f(-h))) - (490 * f(0))) / (180 * h * h);

    private static double First(Func<double, double> f, double h) =>
        ((f(3 * h) - f(-3 * h)) - (9 * (f(2 * h) - f(-2 * h))) + (45 * (f(h) - f(-h)))) / (60 * h);
}
