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

    private HigherOrderStep(
        FieldSolution solution, FieldEquations equations, TangentSystem tangent, OrderLift lift, double[] lifted, double[] correction)
    {
        Solution = solution;
        _equations = equations;
        _tangent = tangent;
        _lift = lift;
        Lifted = lifted;
        Correction = correction;
        Potential = new double[lifted.Length];
        for (int i = 0; i < lifted.Length; i++)
        {
            Potential[i] = lifted[i] + correction[i];
        }
    }

    /// <summary>The solution in order p.</summary>
    public FieldSolution Solution { get; }

    /// <summary>Problem in order p + 1.</summary>
    public FieldProblem Problem => _equations.Problem;

    /// <summary>Threads to work on.</summary>
    public int Threads => _equations.Threads;

    /// <summary>Background on the rim in order p + 1, as in <see cref="FieldEquations.Background"/>.</summary>
    public double[] Background => _equations.Background;

    /// <summary>The solution lifted to order p + 1, by node.</summary>
    public double[] Lifted { get; }

    /// <summary>The step, by node.</summary>
    public double[] Correction { get; }

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

    /// <summary>What each element contributes to the error of functionals, given as their derivatives by the nodes' values in order p + 1.</summary>
    public ErrorShares SharesOf(IReadOnlyList<double[]> functionals)
    {
        double[][] adjoints = _tangent.Solve(functionals);
        double[][] interpolants = [.. adjoints.Select(_lift.Down)];
        return new ErrorShares(this, adjoints, interpolants);
    }
}
