using PoleField.Geometry;

namespace PoleField.Tests.Meshing;

/// <summary>A curve that is no line and no arc: start + (2t, amplitude·sin 4πt). The mesher must rest on Curve alone.</summary>
internal sealed record SineCurve(Point From, double Amplitude) : Curve
{
    private const double Wave = 4 * Math.PI;

    public override Point Start => From;

    public override Point End => From + new Point(2, 0);

    public override double Length => Integral(t => Derivative(t).Length);

    public override Box Bounds => new(From - new Point(0, Amplitude), From + new Point(2, Amplitude));

    public override double AreaTerm(Point origin) => Integral(t => 0.5 * (At(t) - origin).Cross(Derivative(t)));

    public override Point At(double t) => t <= 0 ? Start : t >= 1 ? End : From + new Point(2 * t, Amplitude * Math.Sin(Wave * t));

    public override Point Derivative(double t) => new(2, Amplitude * Wave * Math.Cos(Wave * t));

    public override Point SecondDerivative(double t) => new(0, -Amplitude * Wave * Wave * Math.Sin(Wave * t));

    public override Curve Reversed() => throw new NotSupportedException();

    public override Curve Part(double from, double to) => throw new NotSupportedException();

    public override Curve Transformed(Affine map) => throw new NotSupportedException();

    public override double ClosestParameter(Point p) =>
        Enumerable.Range(0, 2001).Select(i => i / 2000.0).MinBy(t => At(t).DistanceTo(p));

    public override string ToString() => "sine";

    // Simpson's rule; the integrands are entire, 2000 steps reach rounding.
    private static double Integral(Func<double, double> f)
    {
        const int steps = 2000;
        double sum = f(0) + f(1);
        for (int i = 1; i < steps; i++)
        {
            sum += (i % 2 == 0 ? 2 : 4) * f((double)i / steps);
        }

        return sum / (3 * steps);
    }
}
