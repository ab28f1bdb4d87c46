// Truth: integrals of monomials, ∫₀¹ xᵏ dx = 1/(k + 1) and ∫₀¹ (1 − x) xᵏ dx = 1/((k + 1)(k + 2)).
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Numerics;

public class GaussRuleTests
{
    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(5)]
    [InlineData(8)]
    [InlineData(12)]
    public void LegendreIntegratesAllMonomialsUpToTwiceItsPointsLessOne(int n)
    {
        GaussRule rule = GaussRule.Legendre(n);

        for (int k = 0; k < 2 * n; k++)
        {
            Assert.Equal(1.0 / (k + 1), Sum(rule, k), 1e-14);
        }

        Assert.NotEqual(1.0 / ((2 * n) + 1), Sum(rule, 2 * n), 1e-15);
    }

    [Theory]
    [InlineData(1)]
    [InlineData(3)]
    [InlineData(7)]
    [InlineData(10)]
    public void LinearWeightIntegratesAllMonomialsUpToTwiceItsPointsLessOne(int n)
    {
        GaussRule rule = GaussRule.LinearWeight(n);

        for (int k = 0; k < 2 * n; k++)
        {
            Assert.Equal(1.0 / ((k + 1) * (k + 2)), Sum(rule, k), 1e-14);
        }
    }

    [Theory]
    [InlineData(4)]
    [InlineData(9)]
    public void PointsLieInsideInOrderWithPositiveWeights(int n)
    {
        foreach (GaussRule rule in new[] { GaussRule.Legendre(n), GaussRule.LinearWeight(n) })
        {
            Assert.All(rule.Nodes, x => Assert.InRange(x, 0.0, 1.0));
            Assert.Equal(rule.Nodes.Order(), rule.Nodes);
            Assert.All(rule.Weights, w => Assert.True(w > 0));
        }
    }

    private static double Sum(GaussRule rule, int power) =>
        rule.Nodes.Zip(rule.Weights, (x, w) => w * Math.Pow(x, power)).Sum();
}
