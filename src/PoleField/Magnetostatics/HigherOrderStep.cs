namespace PoleField.Magnetostatics;

/// <summary>
/// One Newton step in order p + 1 on the same mesh from the lifted solution of order p: what it changes is the
/// discretisation error of every value at once, and its adjoint says which elements it comes from.
/// </summary>
internal sealed class HigherOrderStep
{
    private readonly FieldEquations _equations;
    private readonly TangentSystem _tangent;
    private readonly OrderLift _lift;
    private readonly double[] _lifted;
    private readonly double[] _correction;
    private readonly FieldSolution _solution;
    private readonly double[] _lowBackground;

    private HigherOrderStep(
        FieldSolution solution, FieldEquations equations, TangentSystem tangent, OrderLift lift, double[] lifted, double[] correction)
    {
        _solution = solution;
        _lowBackground = RimTerms.Background(solution.Problem);
        _equations = equations;
        _tangent = tangent;
        _lift = lift;
        _lifted = lifted;
        _correction = correction;
        Potential = new double[lifted.Length];
        for (int i = 0; i < lifted.Length; i++)
        {
            Potential[i] = lifted[i] + correction[i];
        }
    }

    /// <summary>Problem in order p + 1.</summary>
    public FieldProblem Problem => _equations.Problem;

    /// <summary>Corrected potential in order p + 1, by node.</summary>
    public double[] Potential { get; }

    /// <summary>Lifts functions of the solution's order.</summary>
    public OrderLift Lift => _lift;

    /// <summary>Takes the step.</summary>
    public static HigherOrderStep From(FieldSolution solution, int threads, CancellationToken cancellation)
    {
        FieldProblem higher = solution.Problem.InOrder(solution.Order + 1);
        var equations = new FieldEquations(higher, threads);
        cancellation.ThrowIfCancellationRequested();
        var lift = new OrderLift(solution.Problem.Space, higher.Space);
        double[] lifted = lift.Up(solution.Potential);
        FieldState state = equations.Evaluate(lifted);
        TangentSystem tangent = equations.TangentAt(lifted);
        double[] correction = tangent.Solve(state.Residual);
        for (int i = 0; i < correction.Length; i++)
        {
            correction[i] = -correction[i];
        }

        return new HigherOrderStep(solution, equations, tangent, lift, lifted, correction);
    }

    /// <summary>
    /// Share of each element in the error of each functional (given as its derivative by the nodes' values in order p + 1):
    /// the dual-weighted residual ∫ Dh∇d·∇(φ − Iφ), φ the adjoint, I interpolation in order p (Becker and Rannacher 2001,
    /// recalled from memory), and what the element's equations for Iφ change by its better curved sides and quadrature.
    /// </summary>
    public double[][] Indicators(IReadOnlyList<double[]> functionals)
    {
        double[][] adjoints = _tangent.Solve(functionals);
        double[][] low = [.. adjoints.Select(_lift.Down)];
        double[][] lowLifted = [.. low.Select(_lift.Up)];
        FiniteElementSpace space = Problem.Space;
        var indicators = new double[functionals.Count][];
        for (int f = 0; f < indicators.Length; f++)
        {
            indicators[f] = new double[space.ElementCount];
        }

        var kernel = new ElementKernel(Problem);
        var lowKernel = new ElementKernel(_solution.Problem);
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            ReadOnlySpan<int> lowNodes = _solution.Problem.Space.NodesOf(e);
            kernel.Evaluate(e, _lifted, _equations.Background, withTangent: true);
            lowKernel.Evaluate(e, _solution.Potential, _lowBackground, withTangent: false);
            for (int f = 0; f < indicators.Length; f++)
            {
                double consistency = Along(kernel.Residual, nodes, lowLifted[f]) - Along(lowKernel.Residual, lowNodes, low[f]);
                indicators[f][e] = Math.Abs(Bilinear(kernel.Packed, nodes, adjoints[f], lowLifted[f])) + Math.Abs(consistency);
            }
        }

        return indicators;
    }

    // (φ − Iφ)ᵀ K d of one element.
    private double Bilinear(double[] packed, ReadOnlySpan<int> nodes, double[] adjoint, double[] interpolant)
    {
        double sum = 0;
        int k = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            double beyond = adjoint[nodes[i]] - interpolant[nodes[i]];
            double correction = _correction[nodes[i]];
            for (int j = 0; j < i; j++, k++)
            {
                sum += packed[k] * ((beyond * _correction[nodes[j]])
                    + ((adjoint[nodes[j]] - interpolant[nodes[j]]) * correction));
            }

            sum += packed[k++] * beyond * correction;
        }

        return sum;
    }

    private static double Along(double[] residual, ReadOnlySpan<int> nodes, double[] function)
    {
        double sum = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            sum += residual[i] * function[nodes[i]];
        }

        return sum;
    }
}
