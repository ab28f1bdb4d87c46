using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Tests.Verification;

/// <summary>A number with its own error bar.</summary>
internal readonly record struct Estimate(double Value, double Bar);

/// <summary>
/// A solution beside the same one after a Newton step in the next order: their difference is the error of any number that is
/// taken from the elements, near the beam or far from it.
/// </summary>
internal sealed class OneOrderUp
{
    private const double Factor = 3.0;    // no adjoint tells the corners' part, of which the next order removes about half
    private const double Rounding = 1e-9; // relative; the equations of iron of high permeability lose so many digits
    private const int Lattice = 5;        // places along an element's side

    private readonly FieldSolution _low;
    private readonly FieldSolution _high;
    private readonly ElementLocator _locator;

    public OneOrderUp(SolvedMagnet solved)
    {
        _low = solved.Solution;
        HigherOrderStep step = HigherOrderStep.From(_low, 1, CancellationToken.None);
        _high = new FieldSolution(step.Problem, step.Potential, _low.History);
        _locator = new ElementLocator(_low.Problem.Space, exterior: false);
    }

    /// <summary>A number that is an integral over the field.</summary>
    public Estimate Of(Func<FieldSolution, double> value) => Bounded(value(_low), Math.Abs(value(_high) - value(_low)));

    /// <summary>A number at a place; its bar is the largest over the place's element (outside the mesh: at the same distance).</summary>
    public Estimate At(Point place, Func<FieldSample, double> value)
    {
        double here = value(_low.At(place)!.Value);
        double largest = 0;
        if (_locator.Find(place) is (int element, _, _))
        {
            for (int i = 0; i <= Lattice; i++)
            {
                for (int j = 0; j <= Lattice - i; j++)
                {
                    double xi = (double)i / Lattice, eta = (double)j / Lattice;
                    largest = Math.Max(largest, Math.Abs(value(_high.Sample(element, xi, eta)) - value(_low.Sample(element, xi, eta))));
                }
            }

            return Bounded(here, largest);
        }

        OpenCircle circle = _low.Mesh.Circle!;
        Point arm = place - circle.Centre;
        for (int k = 0; k < 8; k++)
        {
            Point turned = circle.Centre + Point.Polar(arm.Length, k * Math.Tau / 8);
            largest = Math.Max(largest, Math.Abs(value(_high.At(turned)!.Value) - value(_low.At(turned)!.Value)));
        }

        return Bounded(here, Math.Max(largest, Math.Abs(value(_high.At(place)!.Value) - here)));
    }

    public Estimate Magnitude(Point place) => At(place, s => s.Magnitude);

    public Estimate By(Point place) => At(place, s => s.By);

    public Estimate Bz(Point place) => At(place, s => s.Bz);

    public Estimate FieldStrength(Point place) => At(place, s => s.FieldStrength);

    private static Estimate Bounded(double value, double difference) => new(value, (Factor * difference) + (Rounding * Math.Abs(value)));
}

/// <summary>Field and gradient at the beam with the bars that are reported.</summary>
internal static class ReportedBars
{
    public static Estimate FieldEstimate(this SolvedMagnet solved) => new(solved.Report.Beam.Field, solved.Report.FieldError);

    public static Estimate GradientEstimate(this SolvedMagnet solved) => new(solved.Report.Beam.Gradient, solved.Report.GradientError);
}
