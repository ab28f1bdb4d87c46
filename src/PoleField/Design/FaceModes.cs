using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>
/// Smooth outward moves of a stretch of a face: uniform cubic B-splines that vanish with slope and curvature at its ends
/// (C. de Boor, A Practical Guide to Splines, 1978, from memory). Their sum never exceeds the largest coefficient.
/// </summary>
internal sealed class FaceModes
{
    private const double Mirrored = 1e-6; // of the stretch: how far two halves may differ and still be each other's image
    private readonly double _from;
    private readonly double _step;
    private readonly int _splines;

    private FaceModes(Face face, double from, double to, int count, bool symmetric)
    {
        Face = face;
        From = from;
        To = to;
        Count = count;
        IsSymmetric = symmetric;
        _splines = symmetric ? 2 * count : count;
        _from = from;
        _step = (to - from) / (_splines + 3);
    }

    public Face Face { get; }

    public double From { get; }

    public double To { get; }

    /// <summary>Number of modes.</summary>
    public int Count { get; }

    /// <summary>True when the stretch is its own mirror image in y = 0 and its modes are even.</summary>
    public bool IsSymmetric { get; }

    /// <summary>Distance between knots, metres.</summary>
    public double Spacing => _step;

    /// <summary>Modes on a stretch; even ones when it is its own mirror image and the beam is, too.</summary>
    public static FaceModes On(Face face, double from, double to, int count, bool evenWanted)
    {
        bool symmetric = evenWanted;
        for (int k = 0; k <= 16 && symmetric; k++)
        {
            double share = k / 32.0;
            Point left = face.At(from + (share * (to - from))).At;
            Point right = face.At(to - (share * (to - from))).At;
            symmetric = left.DistanceTo(new Point(-right.Y, right.Z)) < Mirrored * (to - from);
        }

        return new FaceModes(face, from, to, count, symmetric);
    }

    /// <summary>Value of a mode at an arc length.</summary>
    public double Value(int mode, double arcLength)
    {
        double own = Spline((arcLength - _from - (mode * _step)) / _step);
        return IsSymmetric ? own + Spline((arcLength - _from - ((_splines - 1 - mode) * _step)) / _step) : own;
    }

    /// <summary>Outward move for coefficients, metres.</summary>
    public double Move(ReadOnlySpan<double> coefficients, double arcLength)
    {
        if (arcLength <= From || arcLength >= To)
        {
            return 0;
        }

        double sum = 0;
        for (int k = 0; k < Count; k++)
        {
            sum += coefficients[k] * Value(k, arcLength);
        }

        return sum;
    }

    // Cardinal cubic B-spline on [0, 4].
    private static double Spline(double x)
    {
        double d = Math.Abs(x - 2);
        return d >= 2 ? 0 : d >= 1 ? Math.Pow(2 - d, 3) / 6 : (2.0 / 3) - (d * d) + (d * d * d / 2);
    }
}
