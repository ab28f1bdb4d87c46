using PoleField.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// Quadrature over the reference triangle (0,0), (1,0), (0,1): Gauss points on the collapsed square (conical product rule,
/// Stroud 1971, recalled from memory), n² points, positive weights, exact for polynomials of total degree 2n − 1.
/// </summary>
internal sealed class TriangleQuadrature
{
    private TriangleQuadrature(double[] xi, double[] eta, double[] weights)
    {
        Xi = xi;
        Eta = eta;
        Weights = weights;
    }

    /// <summary>First reference coordinate of each point.</summary>
    public double[] Xi { get; }

    /// <summary>Second reference coordinate of each point.</summary>
    public double[] Eta { get; }

    /// <summary>Weights; they sum to ½.</summary>
    public double[] Weights { get; }

    /// <summary>Number of points.</summary>
    public int Count => Weights.Length;

    /// <summary>Rule with n points per direction.</summary>
    public static TriangleQuadrature Collapsed(int n)
    {
        GaussRule across = GaussRule.LinearWeight(n);
        GaussRule along = GaussRule.Legendre(n);
        var xi = new double[n * n];
        var eta = new double[n * n];
        var weights = new double[n * n];
        for (int i = 0; i < n; i++)
        {
            for (int j = 0; j < n; j++)
            {
                int q = (i * n) + j;
                xi[q] = across.Nodes[i];
                eta[q] = (1 - across.Nodes[i]) * along.Nodes[j];
                weights[q] = across.Weights[i] * along.Weights[j];
            }
        }

        return new TriangleQuadrature(xi, eta, weights);
    }
}
