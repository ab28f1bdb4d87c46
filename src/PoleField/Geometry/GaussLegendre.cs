using PoleField.Numerics;

namespace PoleField.Geometry;

/// <summary>Gauss-Legendre rules on [0, 1], made once: n points integrate polynomials up to degree 2n − 1 exactly.</summary>
internal static class GaussLegendre
{
    /// <summary>Most points of a rule.</summary>
    public const int MostPoints = 32;

    private static readonly (double Node, double Weight)[][] Rules = [.. Enumerable.Range(1, MostPoints).Select(Make)];

    /// <summary>Nodes and weights of the rule with 1 to <see cref="MostPoints"/> points.</summary>
    public static ReadOnlySpan<(double Node, double Weight)> Rule(int points) => Rules[points - 1];

    private static (double Node, double Weight)[] Make(int points)
    {
        GaussRule rule = GaussRule.Legendre(points);
        return [.. rule.Nodes.Zip(rule.Weights)];
    }
}
