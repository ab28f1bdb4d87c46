using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// The discrete equations ∂W/∂A = 0 of a field problem: energy, residual and tangent, with unknowns inside elements
/// condensed. Everything that does not depend on the solution is made once.
/// </summary>
internal sealed class FieldEquations
{
    private const int FixedNode = -1;

    private readonly int[] _unknownOfNode;    // skeleton node → unknown, or FixedNode
    private readonly ElementSweep _sweep;
    private readonly int[] _linear;
    private readonly int[] _nonlinear;
    private readonly double[] _backgroundLoad; // by node; empty without background
    private readonly double[] _linearValues;
    private readonly Condensation _linearCondensation;

    public FieldEquations(FieldProblem problem, int threads = 1)
    {
        Problem = problem;
        Threads = threads;
        _unknownOfNode = NumberUnknowns(problem.Space, out int count);
        UnknownCount = count;
        (_linear, _nonlinear) = SplitByLaw(problem);
        (Background, _backgroundLoad) = BackgroundTerms(problem);
        Pattern = MakePattern(out int[] scatter);
        _sweep = new ElementSweep(problem, Background, scatter, threads);
        Analysis = CholeskyAnalysis.Analyse(Pattern, UnknownPlaces());
        _linearValues = new double[Pattern.EntryCount];
        _linearCondensation = new Condensation(problem.Space);
        _sweep.AssembleTangent(_linear, null, null, _linearValues, _linearCondensation);
    }

    public FieldProblem Problem { get; }

    public int Threads { get; }

    /// <summary>Unknowns left after condensation and fixing.</summary>
    public int UnknownCount { get; }

    /// <summary>Unknowns before condensation.</summary>
    public int PotentialCount => UnknownCount + (Problem.Space.NodeCount - Problem.Space.SkeletonCount);

    public SymmetricPattern Pattern { get; }

    public CholeskyAnalysis Analysis { get; }

    /// <summary>True when some element's matrix depends on the solution.</summary>
    public bool IsNonlinear => _nonlinear.Length > 0;

    /// <summary>Potential of the uniform background on the rim between the discs, by node; empty without background.</summary>
    public double[] Background { get; }

    /// <summary>Potential with the given values on fixed nodes and zero elsewhere.</summary>
    public double[] FixedPotential()
    {
        var potential = new double[Problem.Space.NodeCount];
        ApplyFixedValues(potential);
        return potential;
    }

    /// <summary>Writes the given values of fixed nodes into a potential.</summary>
    public void ApplyFixedValues(double[] potential)
    {
        bool background = Problem.Magnet.AppliedField != default && Problem.Space.Mesh.Circle is null;
        for (int node = 0; node < _unknownOfNode.Length; node++)
        {
            if (_unknownOfNode[node] == FixedNode)
            {
                potential[node] = background ? Problem.BackgroundPotential(Problem.Space.Places[node]) : 0.0;
            }
        }
    }

    /// <summary>Energy W and residual ∂W/∂A (by node; zero on fixed nodes) at a potential.</summary>
    public FieldState Evaluate(double[] potential)
    {
        var residual = new double[potential.Length];
        (double energy, double product) = _sweep.AddResidual(_linear, potential, residual);
        (double energy2, double product2) = _sweep.AddResidual(_nonlinear, potential, residual);
        energy += energy2;
        for (int node = 0; node < _backgroundLoad.Length; node++)
        {
            residual[node] -= _backgroundLoad[node];
            energy -= _backgroundLoad[node] * potential[node];
        }

        for (int node = 0; node < _unknownOfNode.Length; node++)
        {
            if (_unknownOfNode[node] == FixedNode)
            {
                residual[node] = 0;
            }
        }

        return new FieldState(energy, product + product2, residual);
    }

    /// <summary>Factored tangent ∂²W/∂A² at a potential.</summary>
    public TangentSystem TangentAt(double[] potential) => Factor(potential, null);

    /// <summary>Factored tangent with every saturating material replaced by one of constant permeability.</summary>
    public TangentSystem LinearTangent(double relativePermeability) =>
        Factor(null, PhysicalConstants.Nu0 / relativePermeability);

    private TangentSystem Factor(double[]? potential, double? reluctivity)
    {
        var values = (double[])_linearValues.Clone();
        Condensation condensation = _linearCondensation;
        if (IsNonlinear)
        {
            condensation = _linearCondensation.Clone();
            _sweep.AssembleTangent(_nonlinear, potential, reluctivity, values, condensation);
        }

        return new TangentSystem(Problem.Space, _unknownOfNode, UnknownCount, condensation, Analysis.Factor(values, Threads));
    }

    private static int[] NumberUnknowns(FiniteElementSpace space, out int count)
    {
        var unknown = new int[space.SkeletonCount];
        foreach (int node in FixedNodes(space))
        {
            unknown[node] = FixedNode;
        }

        count = 0;
        for (int node = 0; node < unknown.Length; node++)
        {
            if (unknown[node] != FixedNode)
            {
                unknown[node] = count++;
            }
        }

        return unknown;
    }

    private static IEnumerable<int> FixedNodes(FiniteElementSpace space)
    {
        if (space.Mesh.Infinity >= 0)
        {
            yield return space.Mesh.Infinity;
        }

        if (!space.Mesh.Section.HasRim)
        {
            yield break;
        }

        var triangles = new int[space.Edges.Count];
        for (int slot = 0; slot < 3 * space.ElementCount; slot++)
        {
            triangles[space.Edges.OfTriangle(slot / 3, slot % 3)]++;
        }

        for (int edge = 0; edge < triangles.Length; edge++)
        {
            if (triangles[edge] != 1)
            {
                continue;
            }

            (int lower, int higher) = space.Edges.Ends(edge);
            yield return lower;
            yield return higher;
            for (int m = 0; m < space.Order - 1; m++)
            {
                yield return space.Mesh.Vertices.Count + (edge * (space.Order - 1)) + m;
            }
        }
    }

    private static (int[] Linear, int[] Nonlinear) SplitByLaw(FieldProblem problem)
    {
        var linear = new List<int>();
        var nonlinear = new List<int>();
        for (int e = 0; e < problem.Space.ElementCount; e++)
        {
            (problem.PhysicsOf(e).IsLinear ? linear : nonlinear).Add(e);
        }

        return ([.. linear], [.. nonlinear]);
    }

    private SymmetricPattern MakePattern(out int[] scatter)
    {
        FiniteElementSpace space = Problem.Space;
        int boundary = space.Reference.BoundaryCount;
        var start = new int[space.ElementCount + 1];
        var unknowns = new int[space.ElementCount * boundary];
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            start[e + 1] = (e + 1) * boundary;
            for (int i = 0; i < boundary; i++)
            {
                unknowns[(e * boundary) + i] = _unknownOfNode[nodes[i]];
            }
        }

        SymmetricPattern pattern = SymmetricPattern.FromElements(UnknownCount, start, unknowns);
        scatter = ScatterMap(pattern, unknowns, boundary);
        return pattern;
    }

    private static int[] ScatterMap(SymmetricPattern pattern, int[] unknowns, int boundary)
    {
        int packed = boundary * (boundary + 1) / 2;
        int elements = unknowns.Length / boundary;
        var map = new int[elements * packed];
        int k = 0;
        for (int e = 0; e < elements; e++)
        {
            ReadOnlySpan<int> own = unknowns.AsSpan(e * boundary, boundary);
            for (int i = 0; i < boundary; i++)
            {
                for (int j = 0; j <= i; j++, k++)
                {
                    map[k] = own[i] < 0 || own[j] < 0
                        ? -1
                        : pattern.PositionOf(Math.Max(own[i], own[j]), Math.Min(own[i], own[j]));
                }
            }
        }

        return map;
    }

    // Unknowns of the second disc are unfolded to where they are in space, so that cuts of the plane separate them too.
    private double[] UnknownPlaces()
    {
        FiniteElementSpace space = Problem.Space;
        var places = new double[2 * UnknownCount];
        var outer = new bool[space.SkeletonCount];
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (space.Mesh.Regions[e] == Mesh.Exterior)
            {
                foreach (int node in space.NodesOf(e)[..space.Reference.BoundaryCount])
                {
                    outer[node] = true;
                }
            }
        }

        for (int node = 0; node < _unknownOfNode.Length; node++)
        {
            int unknown = _unknownOfNode[node];
            if (unknown >= 0)
            {
                Geometry.Point p = outer[node] ? Kelvin.Invert(space.Mesh.Circle!, space.Places[node]) : space.Places[node];
                places[2 * unknown] = p.Y;
                places[(2 * unknown) + 1] = p.Z;
            }
        }

        return places;
    }

    private static (double[] OnRim, double[] Load) BackgroundTerms(FieldProblem problem)
    {
        FiniteElementSpace space = problem.Space;
        if (space.Mesh.Circle is null || (problem.Magnet.AppliedField == default && problem.NetCurrent == 0.0))
        {
            return ([], []);
        }

        var onRim = new double[space.NodeCount];
        var isRim = new bool[space.NodeCount];
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

        double[] load = RimLoad(problem, isRim);
        SpreadReturnCurrent(problem, isRim, load);
        return (onRim, load);
    }

    // A net current I makes A grow like the logarithm of the distance. The second disc holds what is left after taking
    // −(μ0 I/2π) ln(r/R) out, which vanishes on the rim and leaves there the load −I/(2πR) ∮ v ds.
    private static void SpreadReturnCurrent(FieldProblem problem, bool[] isRim, double[] load)
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
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            if (space.Mesh.Regions[e] == Mesh.Exterior || !nodes.ContainsAnyWhere(isRim))
            {
                continue;
            }

            kernel.EvaluateLinear(e, PhysicalConstants.Nu0);
            int k = 0;
            for (int i = 0; i < nodes.Length; i++)
            {
                for (int j = 0; j <= i; j++, k++)
                {
                    load[nodes[i]] += kernel.Packed[k] * problem.BackgroundPotential(space.Places[nodes[j]]);
                    if (j < i)
                    {
                        load[nodes[j]] += kernel.Packed[k] * problem.BackgroundPotential(space.Places[nodes[i]]);
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

/// <summary>Energy and residual of the equations at a potential.</summary>
/// <param name="Energy">W, J/m.</param>
/// <param name="FieldProduct">∫ H·B dS, J/m.</param>
/// <param name="Residual">∂W/∂A by node, A; zero on fixed nodes.</param>
internal sealed record FieldState(double Energy, double FieldProduct, double[] Residual);
