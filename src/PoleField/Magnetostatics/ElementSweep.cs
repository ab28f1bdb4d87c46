namespace PoleField.Magnetostatics;

/// <summary>
/// Runs element kernels over lists of elements on several threads and adds up their results in the elements' order, so that
/// the sums are the same bits on any number of threads.
/// </summary>
internal sealed class ElementSweep
{
    private const int BlockSize = 64;         // elements per task
    private const int BlocksPerBatch = 64;    // blocks computed before their results are added up

    private readonly FieldProblem _problem;
    private readonly double[] _background;
    private readonly int[] _scatter; // packed boundary entry k of element e goes to value [e·packed + k], or −1
    private readonly ElementKernel[] _kernels;
    private readonly int _packedBoundary;
    private readonly int _nodes;

    public ElementSweep(FieldProblem problem, double[] background, int[] scatter, int threads)
    {
        _problem = problem;
        _background = background;
        _scatter = scatter;
        int boundary = problem.Space.Reference.BoundaryCount;
        _packedBoundary = boundary * (boundary + 1) / 2;
        _nodes = problem.Space.Reference.NodeCount;
        _kernels = new ElementKernel[Math.Max(1, threads)];
        _kernels[0] = new ElementKernel(problem);
        for (int k = 1; k < _kernels.Length; k++)
        {
            _kernels[k] = _kernels[0].Twin();
        }
    }

    /// <summary>Adds the elements' residuals at a potential; returns their energy and field product.</summary>
    public (double Energy, double FieldProduct) AddResidual(int[] elements, double[] potential, double[] residual)
    {
        int batch = Math.Min(elements.Length, BlockSize * BlocksPerBatch);
        var local = new double[batch * (_nodes + 2)];
        double energy = 0;
        double product = 0;
        ForBatches(elements.Length, (first, count) =>
        {
            ForBlocks(count, (kernel, from, to) =>
            {
                for (int k = from; k < to; k++)
                {
                    kernel.Evaluate(elements[first + k], potential, _background, withTangent: false);
                    Span<double> own = local.AsSpan(k * (_nodes + 2), _nodes + 2);
                    kernel.Residual.CopyTo(own);
                    own[_nodes] = kernel.Energy;
                    own[_nodes + 1] = kernel.FieldProduct;
                }
            });
            for (int k = 0; k < count; k++)
            {
                ReadOnlySpan<int> nodes = _problem.Space.NodesOf(elements[first + k]);
                ReadOnlySpan<double> own = local.AsSpan(k * (_nodes + 2), _nodes + 2);
                for (int i = 0; i < nodes.Length; i++)
                {
                    residual[nodes[i]] += own[i];
                }

                energy += own[_nodes];
                product += own[_nodes + 1];
            }
        });
        return (energy, product);
    }

    /// <summary>
    /// Adds the elements' condensed tangents to the matrix values: at a potential, or with a constant reluctivity, or (both
    /// null, for linear elements) as the law has it.
    /// </summary>
    public void AssembleTangent(
        int[] elements, double[]? potential, double? reluctivity, double[] values, Condensation condensation)
    {
        int batch = Math.Min(elements.Length, BlockSize * BlocksPerBatch);
        var local = new double[batch * _packedBoundary];
        ForBatches(elements.Length, (first, count) =>
        {
            ForBlocks(count, (kernel, from, to) =>
            {
                for (int k = from; k < to; k++)
                {
                    int element = elements[first + k];
                    if (potential is not null)
                    {
                        kernel.Evaluate(element, potential, _background, withTangent: true);
                    }
                    else
                    {
                        kernel.EvaluateLinear(element, reluctivity ?? _problem.PhysicsOf(element).Law.InitialReluctivity);
                    }

                    condensation.Reduce(element, kernel.Packed);
                    kernel.Packed.AsSpan(0, _packedBoundary).CopyTo(local.AsSpan(k * _packedBoundary));
                }
            });
            for (int k = 0; k < count; k++)
            {
                ReadOnlySpan<int> map = _scatter.AsSpan(elements[first + k] * _packedBoundary, _packedBoundary);
                ReadOnlySpan<double> own = local.AsSpan(k * _packedBoundary, _packedBoundary);
                for (int i = 0; i < map.Length; i++)
                {
                    if (map[i] >= 0)
                    {
                        values[map[i]] += own[i];
                    }
                }
            }
        });
    }

    private static void ForBatches(int count, Action<int, int> batch)
    {
        for (int first = 0; first < count; first += BlockSize * BlocksPerBatch)
        {
            batch(first, Math.Min(BlockSize * BlocksPerBatch, count - first));
        }
    }

    private void ForBlocks(int count, Action<ElementKernel, int, int> block)
    {
        int blocks = (count + BlockSize - 1) / BlockSize;
        if (_kernels.Length == 1 || blocks == 1)
        {
            block(_kernels[0], 0, count);
            return;
        }

        int next = -1;
        Parallel.For(0, _kernels.Length, new ParallelOptions { MaxDegreeOfParallelism = _kernels.Length }, thread =>
        {
            for (int b = Interlocked.Increment(ref next); b < blocks; b = Interlocked.Increment(ref next))
            {
                block(_kernels[thread], b * BlockSize, Math.Min(count, (b + 1) * BlockSize));
            }
        });
    }
}
