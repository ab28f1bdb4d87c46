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
    private readonly int[] _scatter;           // packed boundary entry k of element e goes to entry [e·packed + k], or nowhere
    private readonly ElementSweep _linear;
    private readonly ElementSweep _nonlinear;
    private readonly double[] _backgroundLoad; // by node; empty without background
    private readonly double[] _linearEntries;
    private readonly Condensation _linearCondensation;
    private double[]? _entries;

    public FieldEquations(FieldProblem problem, int threads = 1)
    {
        Problem = problem;
        Threads = threads;
        _unknownOfNode = NumberUnknowns(problem.Space, out int count);
        UnknownCount = count;
        (List<int> linear, List<int> nonlinear) = SplitByLaw(problem);
        IsNonlinear = nonlinear.Count > 0;
        (Background, _backgroundLoad) = RimTerms.Of(problem);
        Pattern = MakePattern(out _scatter);
        ElementKernel[] kernels = Kernels(problem, threads);
        _linear = new ElementSweep(problem, Background, linear, kernels);
        _nonlinear = new ElementSweep(problem, Background, nonlinear, kernels);
        Analysis = CholeskyAnalysis.Analyse(Pattern, threads);
        _linearEntries = new double[Pattern.EntryCount];
        _linearCondensation = new Condensation(problem.Space);
        _linear.AssembleTangent(null, null, _linearCondensation, _scatter, _linearEntries);
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
    public bool IsNonlinear { get; }

    /// <summary>Potential of the uniform background on the rim between the discs, by node; empty without background.</summary>
    public double[] Background { get; }

    /// <summary>Whether a node of the skeleton is an unknown; the others are fixed.</summary>
    public bool IsUnknown(int node) => _unknownOfNode[node] != FixedNode;

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

    /// <summary>
    /// Energy W and residual ∂W/∂A (by node; zero on fixed nodes) at a potential; <paramref name="spent"/> is a state no
    /// longer needed, whose memory is used.
    /// </summary>
    public FieldState Evaluate(double[] potential, FieldState? spent = null)
    {
        double[] residual = spent?.Residual ?? new double[potential.Length];
        Array.Clear(residual);
        (double energy, double product) = _linear.AddResidual(potential, residual);
        (double energy2, double product2) = _nonlinear.AddResidual(potential, residual);
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

    /// <summary>Factored tangent ∂²W/∂A² at a potential; <paramref name="spent"/> is a system no longer needed, whose memory is used.</summary>
    public TangentSystem TangentAt(double[] potential, TangentSystem? spent = null) => Factor(potential, null, spent);

    /// <summary>Factored tangent with every saturating material replaced by one of constant permeability.</summary>
    public TangentSystem LinearTangent(double relativePermeability) =>
        Factor(null, PhysicalConstants.Nu0 / relativePermeability, null);

    /// <summary>
    /// The tangent's entries in <see cref="Pattern"/>, and its condensation: at a potential, or with one reluctivity in every
    /// saturating material. The entries are good until the next call; the memory of <paramref name="spent"/> is used again.
    /// </summary>
    public (double[] Entries, Condensation Condensation) Assemble(
        double[]? potential, double? reluctivity = null, Condensation? spent = null)
    {
        if (!IsNonlinear)
        {
            return (_linearEntries, _linearCondensation);
        }

        _entries ??= new double[_linearEntries.Length];
        _linearEntries.CopyTo(_entries.AsSpan());

        // What linear elements have there does not change.
        Condensation condensation = spent ?? _linearCondensation.Clone();
        _nonlinear.AssembleTangent(potential, reluctivity, condensation, _scatter, _entries);
        return (_entries, condensation);
    }

    private TangentSystem Factor(double[]? potential, double? reluctivity, TangentSystem? spent)
    {
        (double[] entries, Condensation condensation) = Assemble(potential, reluctivity, spent?.Condensation);
        CholeskyFactor factor;
        if (spent is null)
        {
            factor = Analysis.Factor(entries, Threads);
        }
        else
        {
            factor = spent.CholeskyFactor;
            factor.Refactor(entries, Threads);
        }

        return new TangentSystem(Problem.Space, _unknownOfNode, UnknownCount, condensation, factor);
    }

    private static ElementKernel[] Kernels(FieldProblem problem, int threads)
    {
        var kernels = new ElementKernel[Math.Max(1, threads)];
        kernels[0] = new ElementKernel(problem);
        for (int k = 1; k < kernels.Length; k++)
        {
            kernels[k] = kernels[0].Twin();
        }

        return kernels;
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

    private static (List<int> Linear, List<int> Nonlinear) SplitByLaw(FieldProblem problem)
    {
        var linear = new List<int>();
        var nonlinear = new List<int>();
        for (int e = 0; e < problem.Space.ElementCount; e++)
        {
            (problem.PhysicsOf(e).IsLinear ? linear : nonlinear).Add(e);
        }

        return (linear, nonlinear);
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
        scatter = pattern.ScatterMap();
        return pattern;
    }
}

/// <summary>Energy and residual of the equations at a potential.</summary>
/// <param name="Energy">W, J/m.</param>
/// <param name="FieldProduct">∫ H·B dS, J/m.</param>
/// <param name="Residual">∂W/∂A by node, A; zero on fixed nodes.</param>
internal sealed record FieldState(double Energy, double FieldProduct, double[] Residual);
