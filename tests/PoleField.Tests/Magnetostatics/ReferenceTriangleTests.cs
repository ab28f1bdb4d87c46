// Truth: Lagrange functions are 1 at their own node and 0 at the others, sum to 1, and reproduce all polynomials of their
// order; their derivatives equal central difference quotients at those quotients' own order; ∫ξᵃηᵇ = a! b!/(a + b + 2)!.
using PoleField.Magnetostatics;
using Xunit;

namespace PoleField.Tests.Magnetostatics;

public class ReferenceTriangleTests
{
    public static TheoryData<int> Orders => [1, 2, 3, 4, 5, 6];

    [Theory]
    [MemberData(nameof(Orders))]
    public void EachFunctionIsOneAtItsOwnNodeOnly(int order)
    {
        var element = new ReferenceTriangle(order);
        var values = new double[element.NodeCount];

        for (int i = 0; i < element.NodeCount; i++)
        {
            (double xi, double eta) = element.Node(i);
            element.Values(xi, eta, values);
            for (int j = 0; j < element.NodeCount; j++)
            {
                Assert.Equal(i == j ? 1.0 : 0.0, values[j], 1e-12);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Orders))]
    public void PolynomialsOfTheOrderAreReproduced(int order)
    {
        var element = new ReferenceTriangle(order);
        var values = new double[element.NodeCount];
        element.Values(0.23, 0.31, values);

        for (int a = 0; a <= order; a++)
        {
            for (int b = 0; a + b <= order; b++)
            {
                double sum = 0;
                for (int i = 0; i < element.NodeCount; i++)
                {
                    (double xi, double eta) = element.Node(i);
                    sum += values[i] * Math.Pow(xi, a) * Math.Pow(eta, b);
                }

                Assert.Equal(Math.Pow(0.23, a) * Math.Pow(0.31, b), sum, 1e-13);
            }
        }
    }

    [Theory]
    [MemberData(nameof(Orders))]
    public void GradientsAreTheLimitOfDifferenceQuotients(int order)
    {
        var element = new ReferenceTriangle(order);
        int n = element.NodeCount;
        double[] byXi = new double[n], byEta = new double[n], plus = new double[n], minus = new double[n];
        element.Gradients(0.2, 0.5, byXi, byEta);
        const double step = 1e-5;

        element.Values(0.2 + step, 0.5, plus);
        element.Values(0.2 - step, 0.5, minus);
        for (int i = 0; i < n; i++)
        {
            // Central difference: step² times third derivatives of at most order³.
            Assert.Equal((plus[i] - minus[i]) / (2 * step), byXi[i], 1e-7);
        }

        element.Values(0.2, 0.5 + step, plus);
        element.Values(0.2, 0.5 - step, minus);
        for (int i = 0; i < n; i++)
        {
            Assert.Equal((plus[i] - minus[i]) / (2 * step), byEta[i], 1e-7);
        }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(5)]
    [InlineData(9)]
    public void QuadratureIntegratesAllMonomialsUpToItsDegree(int n)
    {
        TriangleQuadrature rule = TriangleQuadrature.Collapsed(n);

        for (int a = 0; a <= (2 * n) - 1; a++)
        {
            for (int b = 0; a + b <= (2 * n) - 1; b++)
            {
                double sum = 0;
                for (int q = 0; q < rule.Count; q++)
                {
                    sum += rule.Weights[q] * Math.Pow(rule.Xi[q], a) * Math.Pow(rule.Eta[q], b);
                }

                Assert.Equal(Factorial(a) * Factorial(b) / Factorial(a + b + 2), sum, 1e-14);
            }
        }
    }

    private static double Factorial(int k) => k < 2 ? 1 : k * Factorial(k - 1);
}
