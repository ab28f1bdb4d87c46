using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// A beam's field over a rectangle as a Chebyshev series in both directions: a thousand times faster than the sums it is made
/// from, and as exact, since the field is analytic there.
/// </summary>
internal sealed class FlightField
{
    private const int FirstOrder = 12;
    private const int LargestOrder = 96;
    private const int Channels = 4;          // By, Bz, ∂By/∂z, ∂Bz/∂z
    private const double Wanted = 1e-9;      // of the largest coefficient
    private const double Dropped = 1e-11;

    private readonly int _ny;
    private readonly int _nz;
    private readonly double[] _coefficients; // channel c of T_i(y) T_j(z) at [((c·nz) + j)·ny + i]

    private FlightField(Box room, int ny, int nz, double[] coefficients)
    {
        Room = room;
        _ny = ny;
        _nz = nz;
        _coefficients = coefficients;
    }

    /// <summary>Where it holds.</summary>
    public Box Room { get; }

    /// <summary>Largest coefficient of the highest orders over the largest of all: how well the series has settled.</summary>
    public double Unsettled { get; private init; }

    public static FlightField Over(Box room, Func<Point, BeamValues> field)
    {
        for (int n = FirstOrder; ; n *= 2)
        {
            double[] coefficients = Transform(room, n, field);
            double unsettled = Tail(coefficients, n);
            if (unsettled < Wanted || 2 * n > LargestOrder)
            {
                return Trimmed(room, n, coefficients, unsettled);
            }
        }
    }

    /// <summary>Values at a place inside the rectangle.</summary>
    public BeamValues At(Point p)
    {
        Span<double> ty = stackalloc double[_ny];
        Span<double> tz = stackalloc double[_nz];
        Polynomials(((2 * (p.Y - Room.Min.Y)) / Room.Width) - 1, ty);
        Polynomials(((2 * (p.Z - Room.Min.Z)) / Room.Height) - 1, tz);
        Span<double> sums = stackalloc double[Channels];
        for (int c = 0; c < Channels; c++)
        {
            double sum = 0;
            for (int j = 0; j < _nz; j++)
            {
                sum += tz[j] * Dot(_coefficients.AsSpan(((c * _nz) + j) * _ny, _ny), ty);
            }

            sums[c] = sum;
        }

        return new BeamValues(p, sums[0], sums[1], sums[2], sums[3]);
    }

    private static double Dot(ReadOnlySpan<double> a, ReadOnlySpan<double> b)
    {
        int width = Vector<double>.Count;
        Vector<double> sum = Vector<double>.Zero;
        int i = 0;
        for (; i + width <= a.Length; i += width)
        {
            sum += new Vector<double>(a[i..]) * new Vector<double>(b[i..]);
        }

        double total = Vector.Sum(sum);
        for (; i < a.Length; i++)
        {
            total += a[i] * b[i];
        }

        return total;
    }

    private static void Polynomials(double x, Span<double> t)
    {
        t[0] = 1;
        if (t.Length > 1)
        {
            t[1] = x;
        }

        for (int k = 2; k < t.Length; k++)
        {
            t[k] = (2 * x * t[k - 1]) - t[k - 2];
        }
    }

    // Values at Chebyshev's points, turned into coefficients by the discrete cosine sums, first along y, then along z.
    private static double[] Transform(Box room, int n, Func<Point, BeamValues> field)
    {
        double[] cosines = Cosines(n);
        var values = new double[Channels * n * n];
        for (int j = 0; j < n; j++)
        {
            for (int i = 0; i < n; i++)
            {
                BeamValues v = field(new Point(Node(room.Min.Y, room.Width, i, n), Node(room.Min.Z, room.Height, j, n)));
                int at = (j * n) + i;
                values[at] = v.By;
                values[at + (n * n)] = v.Bz;
                values[at + (2 * n * n)] = v.DByDz;
                values[at + (3 * n * n)] = v.DBzDz;
            }
        }

        for (int line = 0; line < Channels * n; line++)
        {
            CosineSums(values, line * n, 1, cosines);
        }

        for (int c = 0; c < Channels; c++)
        {
            for (int i = 0; i < n; i++)
            {
                CosineSums(values, (c * n * n) + i, n, cosines);
            }
        }

        return values;
    }

    private static double Node(double from, double size, int i, int n) =>
        from + (0.5 * size * (1 + Math.Cos(Math.PI * (i + 0.5) / n)));

    private static double[] Cosines(int n)
    {
        var cosines = new double[n * n];
        for (int k = 0; k < n; k++)
        {
            for (int i = 0; i < n; i++)
            {
                cosines[(k * n) + i] = (k == 0 ? 1.0 : 2.0) / n * Math.Cos(Math.PI * k * (i + 0.5) / n);
            }
        }

        return cosines;
    }

    private static void CosineSums(double[] values, int start, int stride, double[] cosines)
    {
        int n = (int)Math.Round(Math.Sqrt(cosines.Length));
        Span<double> sums = stackalloc double[n];
        for (int k = 0; k < n; k++)
        {
            double sum = 0;
            for (int i = 0; i < n; i++)
            {
                sum += cosines[(k * n) + i] * values[start + (i * stride)];
            }

            sums[k] = sum;
        }

        for (int k = 0; k < n; k++)
        {
            values[start + (k * stride)] = sums[k];
        }
    }

    private static double Tail(double[] coefficients, int n)
    {
        double worst = 0;
        for (int c = 0; c < Channels; c += 2)
        {
            (double largest, double tail) = (0, 0);
            for (int k = c * n * n; k < (c + 2) * n * n; k++)
            {
                double size = Math.Abs(coefficients[k]);
                int i = k % n;
                int j = k / n % n;
                largest = Math.Max(largest, size);
                tail = Math.Max(tail, 4 * Math.Max(i, j) >= 3 * n ? size : 0);
            }

            worst = Math.Max(worst, largest > 0 ? tail / largest : 0);
        }

        return worst;
    }

    private static FlightField Trimmed(Box room, int n, double[] coefficients, double unsettled)
    {
        (int ny, int nz) = (1, 1);
        for (int c = 0; c < Channels; c += 2)
        {
            ReadOnlySpan<double> pair = coefficients.AsSpan(c * n * n, 2 * n * n);
            double floor = 0;
            foreach (double v in pair)
            {
                floor = Math.Max(floor, Dropped * Math.Abs(v));
            }

            for (int k = 0; k < pair.Length; k++)
            {
                if (Math.Abs(pair[k]) > floor)
                {
                    ny = Math.Max(ny, (k % n) + 1);
                    nz = Math.Max(nz, (k / n % n) + 1);
                }
            }
        }

        var kept = new double[Channels * ny * nz];
        for (int c = 0; c < Channels; c++)
        {
            for (int j = 0; j < nz; j++)
            {
                coefficients.AsSpan(((c * n) + j) * n, ny).CopyTo(kept.AsSpan(((c * nz) + j) * ny));
            }
        }

        return new FlightField(room, ny, nz, kept) { Unsettled = unsettled };
    }
}
