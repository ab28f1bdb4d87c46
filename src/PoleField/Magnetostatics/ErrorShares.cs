namespace PoleField.Magnetostatics;

/// <summary>
/// Shares of the elements in the errors of functionals: the dual-weighted residual ∫ Dh∇d·∇(φ − Iφ), φ the adjoint, I
/// interpolation in order p (Becker and Rannacher 2001, recalled from memory), and what the element's equations for Iφ change by
/// its better curved sides and quadrature. The shares of all elements sum to what the step in order p + 1 changes, to first order.
/// </summary>
internal sealed class ErrorShares
{
    private readonly HigherOrderStep _step;
    private readonly double[][] _adjoints;
    private readonly double[][] _low;        // Iφ by node of order p
    private readonly double[][] _lowLifted;  // Iφ by node of order p + 1
    private readonly double[] _lowBackground;

    public ErrorShares(HigherOrderStep step, double[][] adjoints, double[][] interpolants)
    {
        _step = step;
        _adjoints = adjoints;
        _low = interpolants;
        _lowLifted = [.. interpolants.Select(step.Lift.Up)];
        _lowBackground = RimTerms.Background(step.Solution.Problem);
    }

    /// <summary>Shares of all elements: of element e in functional f at [f][e].</summary>
    public double[][] OfAll() => Of([.. Enumerable.Range(0, _step.Problem.Space.ElementCount)]);

    /// <summary>Shares of the k-th of some elements in functional f at [f][k].</summary>
    public double[][] Of(int[] elements)
    {
        double[][] shares = [.. _adjoints.Select(_ => new double[elements.Length])];
        var kernel = new ElementKernel(_step.Problem);
        var lowKernel = new ElementKernel(_step.Solution.Problem);

        // An element's share is found by itself: threads change nothing.
        Parallel.For(
            0,
            (elements.Length + Lanes.Count - 1) / Lanes.Count,
            new ParallelOptions { MaxDegreeOfParallelism = _step.Threads },
            () => (High: kernel.Twin(), Low: lowKernel.Twin()),
            (batch, _, kernels) =>
            {
                int first = batch * Lanes.Count;
                Fill(shares, elements, (first, Math.Min(Lanes.Count, elements.Length - first)), kernels);
                return kernels;
            },
            _ => { });
        return shares;
    }

    private void Fill(double[][] shares, int[] elements, (int First, int Count) batch, (ElementKernel High, ElementKernel Low) kernels)
    {
        Span<int> own = elements.AsSpan(batch.First, batch.Count);
        kernels.High.Evaluate(own, _step.Lifted, _step.Background, withTangent: true);
        kernels.Low.Evaluate(own, _step.Solution.Potential, _lowBackground, withTangent: false);
        for (int lane = 0; lane < own.Length; lane++)
        {
            ReadOnlySpan<int> nodes = _step.Problem.Space.NodesOf(own[lane]);
            ReadOnlySpan<int> lowNodes = _step.Solution.Problem.Space.NodesOf(own[lane]);
            ReadOnlySpan<double> packed = Lanes.Numbers(kernels.High.Packed)[lane..];
            ReadOnlySpan<double> residual = Lanes.Numbers(kernels.High.Residual)[lane..];
            ReadOnlySpan<double> lowResidual = Lanes.Numbers(kernels.Low.Residual)[lane..];
            for (int f = 0; f < shares.Length; f++)
            {
                double consistency = Along(residual, nodes, _lowLifted[f]) - Along(lowResidual, lowNodes, _low[f]);
                shares[f][batch.First + lane] = Bilinear(packed, nodes, f) - consistency;
            }
        }
    }

    // (φ − Iφ)ᵀ K d of one element, whose numbers are a lane.
    private double Bilinear(ReadOnlySpan<double> packed, ReadOnlySpan<int> nodes, int functional)
    {
        double[] adjoint = _adjoints[functional];
        double[] interpolant = _lowLifted[functional];
        double sum = 0;
        int k = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            double beyond = adjoint[nodes[i]] - interpolant[nodes[i]];
            double correction = _step.Correction[nodes[i]];
            for (int j = 0; j < i; j++, k += Lanes.Count)
            {
                sum += packed[k] * ((beyond * _step.Correction[nodes[j]])
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
