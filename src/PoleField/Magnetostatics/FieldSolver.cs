namespace PoleField.Magnetostatics;

/// <summary>One Newton step.</summary>
/// <param name="Energy">W after the step, J/m.</param>
/// <param name="Decrement">√(rᵀK⁻¹r / ∫H·B): relative size of the step in the energy norm.</param>
/// <param name="StepLength">Fraction of the full step taken.</param>
/// <param name="TangentKept">True for a step with the tangent of the step before, which costs no factorisation.</param>
public readonly record struct NewtonStep(double Energy, double Decrement, double StepLength, bool TangentKept = false);

/// <summary>Newton's method ended without a solution.</summary>
public sealed class FieldNotConvergedException(IReadOnlyList<NewtonStep> history) : Exception(
    FormattableString.Invariant(
        $"The field did not converge: after {history.Count} Newton steps the relative decrement is {(history.Count > 0 ? history[^1].Decrement : double.NaN):g3}."))
{
    /// <summary>The steps taken.</summary>
    public IReadOnlyList<NewtonStep> History { get; } = history;
}

/// <summary>
/// Newton's method with a line search on the strictly convex energy (Armijo 1966): it converges from any start (Egger,
/// Engertsberger and Radu 2024, abstract). The last digits are won with the last tangent kept.
/// </summary>
internal static class FieldSolver
{
    private const double AcceptedDecrement = 1e-6;     // a full step of this size ends at about its square
    private const double AcceptedKeptDecrement = 1e-8; // what a step with a kept tangent may leave is a share of its size
    private const double AcceptedRest = 1e-10;         // of the next step with a kept tangent, foreseen
    private const double NearDecrement = 1e-4;         // below it steps shrink so fast that a tangent serves again
    private const double KeptReduction = 0.25;         // a tangent that reduces less is made anew: a step with it costs a fifth
    private const double StartPermeability = 100;
    private const double ArmijoShare = 1e-4;
    private const double ShortestStep = 1e-6;
    private const double EnergyRounding = 1e-11; // slopes below this share of |W| cannot be seen in W
    private const int MostSteps = 60;

    /// <summary>Solves the equations from a given potential, or from a linear solve with constant permeability.</summary>
    /// <param name="equations">The equations.</param>
    /// <param name="start">Start, by node, or null.</param>
    /// <param name="step">Called after each step.</param>
    /// <param name="cancellation">Checked at each step.</param>
    /// <exception cref="FieldNotConvergedException">Not converged within the most steps.</exception>
    public static (double[] Potential, IReadOnlyList<NewtonStep> History) Solve(
        FieldEquations equations,
        double[]? start = null,
        Action<int, NewtonStep>? step = null,
        CancellationToken cancellation = default)
    {
        var history = new List<NewtonStep>();
        TangentSystem? tangent = null;
        double[] potential = start ?? LinearStart(equations, out tangent, cancellation);
        var now = new Iterate(potential, equations.Evaluate(potential));
        Iterate? spent = null;
        for (int k = 1; k <= MostSteps; k++)
        {
            cancellation.ThrowIfCancellationRequested();
            bool kept = history.Count > 0 && MayKeepTangent(history);
            tangent = kept ? tangent! : equations.TangentAt(now.Potential, tangent);
            double[] direction = tangent.Solve(now.State.Residual);
            double slope = -Dot(now.State.Residual, direction);
            double decrement = Math.Sqrt(Math.Max(0, -slope) / Math.Max(now.State.FieldProduct, double.Epsilon));
            if (!double.IsFinite(slope))
            {
                throw new FieldNotConvergedException(history);
            }

            (Iterate next, double length) = Step(equations, now, spent, direction, slope);
            history.Add(new NewtonStep(next.State.Energy, decrement, length, kept));
            step?.Invoke(k, history[^1]);
            if (!equations.IsNonlinear || IsConverged(history))
            {
                return (next.Potential, history);
            }

            // The start is the caller's.
            spent = k > 1 ? now : null;
            now = next;
        }

        throw new FieldNotConvergedException(history);
    }

    private static bool IsConverged(List<NewtonStep> history)
    {
        NewtonStep last = history[^1];
        bool small = last.TangentKept
            ? last.Decrement < AcceptedKeptDecrement || Rest(history) < AcceptedRest
            : last.Decrement < AcceptedDecrement;
        return small && last.StepLength == 1.0;
    }

    private static bool MayKeepTangent(List<NewtonStep> history)
    {
        NewtonStep last = history[^1];
        double reduction = last.TangentKept ? Reduction(history) : Rest(history) / last.Decrement;
        return last.StepLength == 1.0 && last.Decrement < NearDecrement && reduction < KeptReduction;
    }

    // Decrement of the next step, foreseen: with a kept tangent in proportion to the last; with a new one, where the laws of the
    // materials are smooth, with its square.
    private static double Rest(List<NewtonStep> history)
    {
        double reduction = Reduction(history);
        return history[^1].Decrement * (history[^1].TangentKept ? reduction : reduction * reduction);
    }

    private static double Reduction(List<NewtonStep> history) =>
        history.Count < 2 ? 1.0 : Math.Min(1.0, history[^1].Decrement / history[^2].Decrement);

    // The tangent is no longer needed, but its memory is.
    private static double[] LinearStart(
        FieldEquations equations, out TangentSystem? tangent, CancellationToken cancellation)
    {
        tangent = null;
        cancellation.ThrowIfCancellationRequested();
        double[] potential = equations.FixedPotential();
        if (!equations.IsNonlinear)
        {
            return potential;
        }

        double[] residual = equations.Evaluate(potential).Residual;
        tangent = equations.LinearTangent(StartPermeability);
        double[] direction = tangent.Solve(residual);
        Subtract(potential, 1.0, direction);
        return potential;
    }

    private static (Iterate Next, double Length) Step(
        FieldEquations equations, Iterate now, Iterate? spent, double[] direction, double slope)
    {
        double length = 1.0;
        bool visible = Math.Abs(slope) > EnergyRounding * Math.Abs(now.State.Energy);
        double[] trial = spent?.Potential ?? new double[now.Potential.Length];
        FieldState? state = spent?.State;
        while (true)
        {
            now.Potential.CopyTo(trial.AsSpan());
            Subtract(trial, length, direction);
            state = equations.Evaluate(trial, state);
            double rise = state.Energy - now.State.Energy;
            if (!visible || rise <= ArmijoShare * length * slope || length <= ShortestStep)
            {
                return (new Iterate(trial, state), length);
            }

            // Minimum of the parabola through the old energy, its slope and the new energy, kept within bounds.
            double best = -slope * length * length / (2 * (rise - (slope * length)));
            length = Math.Clamp(best, 0.1 * length, 0.5 * length);
        }
    }

    private static void Subtract(double[] a, double factor, double[] b)
    {
        for (int i = 0; i < a.Length; i++)
        {
            a[i] -= factor * b[i];
        }
    }

    private static double Dot(double[] a, double[] b)
    {
        double sum = 0;
        for (int i = 0; i < a.Length; i++)
        {
            sum += a[i] * b[i];
        }

        return sum;
    }

    private sealed record Iterate(double[] Potential, FieldState State);
}
