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
        double[][] indicators = [.. functionals.Select(_ => new double[Problem.Space.ElementCount])];
        IndicateAll(indicators, adjoints, low, lowLifted);
        return indicators;
    }

    // An element's share is found by itself: threads change nothing.
    private void IndicateAll(double[][] indicators, double[][] adjoints, double[][] low, double[][] lowLifted)
    {
        FiniteElementSpace space = Problem.Space, lowSpace = _solution.Problem.Space;
        var kernels = new ElementKernel(Problem);
        var lowKernels = new ElementKernel(_solution.Problem);
        int batches = (space.ElementCount + Lanes.Count - 1) / Lanes.Count;
        Parallel.For(
            0,
            batches,
            new ParallelOptions { MaxDegreeOfParallelism = _equations.Threads },
            () => (High: kernels.Twin(), Low: lowKernels.Twin(), Elements: new int[Lanes.Count]),
            (batch, _, scratch) =>
            {
                int first = batch * Lanes.Count;
                Span<int> elements = scratch.Elements.AsSpan(0, Math.Min(Lanes.Count, space.ElementCount - first));
                for (int lane = 0; lane < elements.Length; lane++)
                {
                    elements[lane] = first + lane;
                }

                scratch.High.Evaluate(elements, _lifted, _equations.Background, withTangent: true);
                scratch.Low.Evaluate(elements, _solution.Potential, _lowBackground, withTangent: false);
                for (int lane = 0; lane < elements.Length; lane++)
                {
                    int e = first + lane;
                    ReadOnlySpan<int> nodes = space.NodesOf(e);
                    ReadOnlySpan<double> packed = Lanes.Numbers(scratch.High.Packed)[lane..];
                    ReadOnlySpan<double> residual = Lanes.Numbers(scratch.High.Residual)[lane..];
                    ReadOnlySpan<double> lowResidual = Lanes.Numbers(scratch.Low.Residual)[lane..];
                    for (int f = 0; f < indicators.Length; f++)
                    {
                        double consistency = Along(residual, nodes, lowLifted[f]) - Along(lowResidual, lowSpace.NodesOf(e), low[f]);
                        indicators[f][e] = Math.Abs(Bilinear(packed, nodes, adjoints[f], lowLifted[f])) + Math.Abs(consistency);
                    }
                }

                return scratch;
            },
            _ => { });
    }

    // (φ − Iφ)ᵀ K d of one element, whose numbers are a lane.
    private double Bilinear(ReadOnlySpan<double> packed, ReadOnlySpan<int> nodes, double[] adjoint, double[] interpolant)
    {
        double sum = 0;
        int k = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            double beyond = adjoint[nodes[i]] - interpolant[nodes[i]];
            double correction = _correction[nodes[i]];
            for (int j = 0; j < i; j++, k += Lanes.Count)
            {
                sum += packed[k] * ((beyond * _correction[nodes[j]])
                    + ((adjoint[nodes[j]] - interpolant[nodes[j]]) * correction));
            }

            sum += packed[k] * beyond * correction;
            k += Lanes.Count;
        }

        return sum;
    }

    private static double Along(ReadOnlySpan<double> residual, ReadOnlySpan<int> nodes, double[] function)
    {
        double sum = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            sum += residual[i * Lanes.Count] * function[nodes[i]];
        }

        return sum;
    }
}
