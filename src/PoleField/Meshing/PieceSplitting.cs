using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Where along a curve a piece is split.</summary>
internal static class PieceSplitting
{
    /// <summary>Parameter whose place is equally far from both ends (the middle of lines and arcs).</summary>
    public static double Middle(Curve curve, double from, double to)
    {
        double middle = 0.5 * (from + to);
        if (curve is Line or CircularArc)
        {
            return middle;
        }

        Point a = curve.At(from), b = curve.At(to);
        double t = Bisect(from, to, s => curve.At(s).DistanceTo(a) - curve.At(s).DistanceTo(b));

        // A curve that winds may hold such a place near an end; halves must stay comparable.
        double quarter = 0.25 * (to - from);
        return Math.Clamp(t, from + quarter, to - quarter);
    }

    /// <summary>Parameter whose place is the given distance from one end of the piece.</summary>
    public static double AtDistance(Curve curve, double from, double to, bool fromStart, double distance)
    {
        Point corner = curve.At(fromStart ? from : to);
        return Bisect(from, to, t => fromStart
            ? curve.At(t).DistanceTo(corner) - distance
            : distance - curve.At(t).DistanceTo(corner));
    }

    /// <summary>
    /// Distance from a sharp corner at which a piece of the given length is split: a power of two between a third and two
    /// thirds of it, so that neighbours at the corner are split alike (Ruppert 1995, concentric shells).
    /// </summary>
    public static double ShellDistance(double length)
    {
        double shell = Math.ScaleB(1, Math.ILogB(length));
        while (shell > length * 2 / 3)
        {
            shell /= 2;
        }

        return shell;
    }

    // Root of a function that rises through zero; 60 halvings exhaust a double.
    private static double Bisect(double low, double high, Func<double, double> f)
    {
        for (int i = 0; i < 60; i++)
        {
            double middle = 0.5 * (low + high);
            if (f(middle) < 0)
            {
                low = middle;
            }
            else
            {
                high = middle;
            }
        }

        return 0.5 * (low + high);
    }
}
