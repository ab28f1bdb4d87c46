using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// What a uniform background and a net current bring to the rim between the two discs: the part of the potential that the
/// second disc leaves out, and the load of its normal derivative.
/// </summary>
internal static class RimTerms
{
    /// <summary>Both by node; empty without background and net current.</summary>
    public static (double[] OnRim, double[] Load) Of(FieldProblem problem)
    {
        double[] onRim = RimBackground(problem, out bool[] isRim);
        if (onRim.Length == 0)
        {
            return (onRim, []);
        }

        double[] load = RimLoad(problem, isRim);
        SpreadReturnCurrent(problem, load);
        return (onRim, load);
    }

    /// <summary>Potential of the uniform background on the rim between the discs, by node; empty without background.</summary>
    public static double[] Background(FieldProblem problem) => RimBackground(problem, out _);

    private static double[] RimBackground(FieldProblem problem, out bool[] isRim)
    {
        FiniteElementSpace space = problem.Space;
        isRim = new bool[space.NodeCount];
        if (space.Mesh.Circle is null || (problem.Magnet.AppliedField == default && problem.NetCurrent == 0.0))
        {
            return [];
        }

        var onRim = new double[space.NodeCount];
        for (int e = 0; e < space.ElementCount; e++)
        {
            for (int side = 0; side < 3; side++)
            {
                int edge = space.Edges.OfTriangle(e, side);
                int c = space.Edges.CurveEdgeOf(edge);
                if (c < 0 || space.Mesh.CurveEdges[c].SectionEdge >= 0)
                {
                    continue;
                }

                (int lower, int higher) = space.Edges.Ends(edge);
                int first = space.Mesh.Vertices.Count + (edge * (space.Order - 1));
                foreach (int node in (IEnumerable<int>)[lower, higher, .. Enumerable.Range(first, space.Order - 1)])
                {
                    isRim[node] = true;
                    onRim[node] = problem.BackgroundPotential(space.Places[node]);
                }
            }
        }

        return onRim;
    }

    // A net current I makes A grow like the logarithm of the distance. The second disc holds what is left after taking
    // −(μ0 I/2π) ln(r/R) out, which vanishes on the rim and leaves there the load −I/(2πR) ∮ v ds.
    private static void SpreadReturnCurrent(FieldProblem problem, double[] load)
    {
        if (problem.NetCurrent == 0.0)
        {
            return;
        }

        FiniteElementSpace space = problem.Space;
        double perLength = problem.NetCurrent / (Math.Tau * space.Mesh.Circle!.Radius);
        for (int e = 0; e < space.ElementCount; e++)
        {
            for (int side = 0; side < 3 && space.Mesh.Regions[e] != Mesh.Exterior; side++)
            {
                int c = space.Edges.CurveEdgeOf(space.Edges.OfTriangle(e, side));
                if (c >= 0 && space.Mesh.CurveEdges[c].SectionEdge < 0)
                {
                    AddSideLoad(space, (e, side), -perLength, load);
                }
            }
        }
    }

    // factor · ∫ v ds along one side of an element.
    private static void AddSideLoad(FiniteElementSpace space, (int Element, int Side) at, double factor, double[] load)
    {
        ReadOnlySpan<(double Xi, double Eta)> corners = [(0, 0), (1, 0), (0, 1)];
        (double x0, double e0) = corners[at.Side];
        (double x1, double e1) = corners[(at.Side + 1) % 3];
        ReadOnlySpan<int> nodes = space.NodesOf(at.Element);
        Span<double> values = stackalloc double[nodes.Length];
        Span<double> byXi = stackalloc double[nodes.Length];
        Span<double> byEta = stackalloc double[nodes.Length];
        GaussRule rule = GaussRule.Legendre(space.Order + 2);
        for (int q = 0; q < rule.Nodes.Length; q++)
        {
            double xi = x0 + (rule.Nodes[q] * (x1 - x0));
            double eta = e0 + (rule.Nodes[q] * (e1 - e0));
            space.Reference.Values(xi, eta, values);
            space.Reference.Gradients(xi, eta, byXi, byEta);
            Jacobian j = space.JacobianAt(at.Element, byXi, byEta);
            double length = (((x1 - x0) * j.ByXi) + ((e1 - e0) * j.ByEta)).Length;
            for (int i = 0; i < nodes.Length; i++)
            {
                load[nodes[i]] += factor * rule.Weights[q] * length * values[i];
            }
        }
    }

    // ∮ ν0 ∂nA v ds of the background, by the divergence theorem: only rim nodes keep a share.
    private static double[] RimLoad(FieldProblem problem, bool[] isRim)
    {
        FiniteElementSpace space = problem.Space;
        var load = new double[space.NodeCount];
        var kernel = new ElementKernel(problem);
        var packed = new double[kernel.Packed.Length];
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            if (space.Mesh.Regions[e] == Mesh.Exterior || !nodes.ContainsAnyWhere(isRim))
            {
                continue;
            }

            kernel.EvaluateLinear([e], PhysicalConstants.Nu0);
            Lanes.CopyLane(kernel.Packed, 0, packed);
            int k = 0;
            for (int i = 0; i < nodes.Length; i++)
            {
                for (int j = 0; j <= i; j++, k++)
                {
                    load[nodes[i]] += packed[k] * problem.BackgroundPotential(space.Places[nodes[j]]);
                    if (j < i)
                    {
                        load[nodes[j]] += packed[k] * problem.BackgroundPotential(space.Places[nodes[i]]);
                    }
                }
            }
        }

        for (int node = 0; node < load.Length; node++)
        {
            if (!isRim[node])
            {
                load[node] = 0;
            }
        }

        return load;
    }
}
