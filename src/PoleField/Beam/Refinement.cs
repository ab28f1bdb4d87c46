using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>Turns the elements' shares in the error into a finer size field.</summary>
internal static class Refinement
{
    private const double StrongestReduction = 0.25; // of an element's size in one go
    private const double WeakestReduction = 0.8;    // smaller reductions are not worth a new mesh
    private const double Order = 4.0;               // assumed decay of a share: cautious for smooth fields, bold at corners
    private const double OpenDiscShare = 0.1;       // of the tolerance for the second disc, which is cheap
    private const double StrongestOpenReduction = 0.4;
    private const double Safety = 0.5;              // of the tolerance, since the shares' signs are not counted on

    /// <summary>The size field for the next mesh.</summary>
    /// <param name="size">The last one.</param>
    /// <param name="space">Space of the last solution.</param>
    /// <param name="indicators">Share of element e in relative goal g at [g][e].</param>
    /// <param name="tolerance">Relative error that each goal may have.</param>
    public static SizeField Next(SizeField size, FiniteElementSpace space, double[][] indicators, double tolerance)
    {
        double[] share = Shares(space, indicators);
        double total = share.Sum();
        double allowed = Allowed(share, Safety * Math.Min(tolerance, total));
        var sources = new List<(Point At, double Size)>();
        for (int e = 0; e < share.Length; e++)
        {
            double reduction = Math.Pow(allowed / share[e], 1 / Order);
            if (space.Mesh.Regions[e] == Mesh.Exterior || !(reduction < WeakestReduction))
            {
                continue;
            }

            ReadOnlySpan<int> nodes = space.NodesOf(e);
            Point a = space.Places[nodes[0]];
            Point b = space.Places[nodes[1]];
            Point c = space.Places[nodes[2]];
            double edge = Math.Sqrt((b - a).Cross(c - a) * 2 / Math.Sqrt(3.0));
            Point middle = (1.0 / 3) * (a + b + c);
            sources.Add((middle, Math.Max(reduction, StrongestReduction) * Math.Min(edge, size.At(middle))));
        }

        return size.With(sources);
    }

    /// <summary>Factor on the element size of the second disc, 1 or less.</summary>
    /// <param name="space">Space of the last solution.</param>
    /// <param name="indicators">Share of element e in relative goal g at [g][e].</param>
    /// <param name="tolerance">Relative error that each goal may have.</param>
    public static double OfOpenDisc(FiniteElementSpace space, double[][] indicators, double tolerance)
    {
        double[] share = Shares(space, indicators);
        double outside = 0;
        for (int e = 0; e < share.Length; e++)
        {
            outside += space.Mesh.Regions[e] == Mesh.Exterior ? share[e] : 0.0;
        }

        double reduction = Math.Pow(OpenDiscShare * tolerance / outside, 1.0 / (2 * space.Order));
        return reduction < 1 ? Math.Clamp(reduction, StrongestOpenReduction, WeakestReduction) : 1.0;
    }

    private static double[] Shares(FiniteElementSpace space, double[][] indicators)
    {
        var share = new double[space.ElementCount];
        foreach (double[] goal in indicators)
        {
            for (int e = 0; e < share.Length; e++)
            {
                share[e] = Math.Max(share[e], Math.Abs(goal[e]));
            }
        }

        return share;
    }

    // The share that every element may keep so that the sum is the tolerance: elements below it keep theirs.
    private static double Allowed(double[] share, double tolerance)
    {
        double[] sorted = [.. share.Order()];
        double below = 0;
        for (int i = 0; i < sorted.Length; i++)
        {
            double level = (tolerance - below) / (sorted.Length - i);
            if (level <= sorted[i])
            {
                return Math.Max(level, 0.01 * tolerance / sorted.Length);
            }

            below += sorted[i];
        }

        return double.PositiveInfinity;
    }
}
