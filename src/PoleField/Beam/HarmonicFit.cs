using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// Least-squares fit of A = Re Σ cₖ ζᵏ to values at places in the unit circle, as weights of the values: orthogonal basis by
/// Gram and Schmidt, twice for rounding's sake.
/// </summary>
internal sealed class HarmonicFit
{
    private readonly double[][] _basis;     // orthonormal column j, by place
    private readonly double[,] _triangle;   // monomial column k = Σⱼ triangle[j, k] · basis j

    private HarmonicFit(double[][] basis, double[,] triangle)
    {
        _basis = basis;
        _triangle = triangle;
    }

    /// <summary>Prepares the fit of a degree to the given places.</summary>
    public static HarmonicFit To(Point[] places, int degree)
    {
        double[][] columns = Monomials(places, degree);
        var triangle = new double[columns.Length, columns.Length];
        for (int k = 0; k < columns.Length; k++)
        {
            for (int pass = 0; pass < 2; pass++)
            {
                for (int j = 0; j < k; j++)
                {
                    double share = Dot(columns[j], columns[k]);
                    triangle[j, k] += share;
                    AddTo(columns[k], -share, columns[j]);
                }
            }

            triangle[k, k] = Math.Sqrt(Dot(columns[k], columns[k]));
            for (int i = 0; i < places.Length; i++)
            {
                columns[k][i] /= triangle[k, k];
            }
        }

        return new HarmonicFit(columns, triangle);
    }

    /// <summary>Weight of each place's value in cₖ.</summary>
    public Complex[] WeightsOf(int power)
    {
        // Columns 2k − 1 and 2k hold Re ζᵏ and Im ζᵏ, and Re(c ζᵏ) = Re c Re ζᵏ − Im c Im ζᵏ.
        double[] real = CoefficientWeights((2 * power) - 1);
        double[] imaginary = CoefficientWeights(2 * power);
        return [.. real.Zip(imaginary, (r, i) => new Complex(r, -i))];
    }

    // Row of R⁻¹ Qᵀ: Q R⁻ᵀ e.
    private double[] CoefficientWeights(int column)
    {
        var y = new double[_basis.Length];
        var weights = new double[_basis[0].Length];
        for (int j = column; j < y.Length; j++)
        {
            double sum = j == column ? 1.0 : 0.0;
            for (int i = column; i < j; i++)
            {
                sum -= _triangle[i, j] * y[i];
            }

            y[j] = sum / _triangle[j, j];
            AddTo(weights, y[j], _basis[j]);
        }

        return weights;
    }

    private static double[][] Monomials(Point[] places, int degree)
    {
        var columns = new double[(2 * degree) + 1][];
        for (int k = 0; k < columns.Length; k++)
        {
            columns[k] = new double[places.Length];
        }

        for (int i = 0; i < places.Length; i++)
        {
            var zeta = new Complex(places[i].Y, places[i].Z);
            Complex power = 1;
            columns[0][i] = 1;
            for (int k = 1; k <= degree; k++)
            {
                power *= zeta;
                (columns[(2 * k) - 1][i], columns[2 * k][i]) = (power.Real, power.Imaginary);
            }
        }

        return columns;
    }

    private static double Dot(double[] a, double[] b)
    {
        double sum = 0;
        for (int i = 0; i < a.Length; i++)
        {
            sum += a[i] * b[i];
        }

        return sum;
    }

    private static void AddTo(double[] target, double factor, double[] source)
    {
        for (int i = 0; i < target.Length; i++)
        {
            target[i] += factor * source[i];
        }
    }
}
