using System.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// Adds up what a list of elements contributes to nodes or matrix entries, on several threads. The list is cut into chunks
/// that depend on the list alone; elements that share no node with another chunk are added where they are computed, those on
/// a seam afterwards, in order: the sums are the same bits on any number of threads.
/// </summary>
internal sealed class ElementSweep
{
    private const int ElementsPerChunk = 512; // at least: shorter chunks have more seam than inside
    private const int MostChunks = 16;
    private const int Unseen = -1; // in place of the chunk that a node belongs to

    private readonly FieldProblem _problem;
    private readonly double[] _background;
    private readonly ElementKernel[] _kernels;
    private readonly Chunk[] _chunks;
    private readonly int _seamCount;
    private double[] _seam = [];

    public ElementSweep(FieldProblem problem, double[] background, List<int> elements, ElementKernel[] kernels)
    {
        _problem = problem;
        _background = background;
        _kernels = kernels;
        _chunks = Cut(problem.Space, elements, out _seamCount);
    }

    /// <summary>Adds the elements' residuals at a potential; returns their energy and field product.</summary>
    public (double Energy, double FieldProduct) AddResidual(double[] potential, double[] residual)
    {
        var sums = new (double Energy, double FieldProduct)[_chunks.Length];
        FiniteElementSpace space = _problem.Space;
        Add(
            (kernel, elements, chunk) =>
            {
                kernel.Evaluate(elements, potential, _background, withTangent: false);
                for (int lane = 0; lane < elements.Length; lane++)
                {
                    sums[chunk].Energy += kernel.Energy[lane];
                    sums[chunk].FieldProduct += kernel.FieldProduct[lane];
                }

                return kernel.Residual;
            },
            new Targets(space.Reference.NodeCount, e => space.NodesOf(e)),
            residual);
        double energy = 0, product = 0;
        foreach ((double e, double p) in sums)
        {
            energy += e;
            product += p;
        }

        return (energy, product);
    }

    /// <summary>
    /// Adds the elements' condensed tangents to the matrix entries: at a potential, or with a constant reluctivity, or (both
    /// null, for linear elements) as the law has it. Entry k of an element's packed boundary goes to where
    /// <paramref name="scatter"/> says at [e · packed + k]; negative ones nowhere.
    /// </summary>
    public void AssembleTangent(
        double[]? potential, double? reluctivity, Condensation condensation, int[] scatter, double[] entries)
    {
        int boundary = _problem.Space.Reference.BoundaryCount;
        int packed = boundary * (boundary + 1) / 2;
        Add(
            (kernel, elements, _) =>
            {
                if (potential is not null)
                {
                    kernel.Evaluate(elements, potential, _background, withTangent: true);
                }
                else
                {
                    kernel.EvaluateLinear(elements, reluctivity);
                }

                condensation.Reduce(elements, kernel.Packed);
                return kernel.Packed;
            },
            new Targets(packed, e => scatter.AsSpan(e * packed, packed)),
            entries);
    }

    private void Add(Contribution contribution, Targets targets, double[] sums)
    {
        if (_seam.Length < _seamCount * targets.Count)
        {
            _seam = new double[_seamCount * targets.Count];
        }

        ForChunks((kernel, c) =>
        {
            Chunk chunk = _chunks[c];
            for (int k = 0; k < chunk.Inside.Length; k += Lanes.Count)
            {
                ReadOnlySpan<int> elements = chunk.Inside.AsSpan(k, Math.Min(Lanes.Count, chunk.Inside.Length - k));
                ReadOnlySpan<double> numbers = Lanes.Numbers(contribution(kernel, elements, c));
                for (int lane = 0; lane < elements.Length; lane++)
                {
                    Add(numbers[lane..], Lanes.Count, targets.Of(elements[lane]), sums);
                }
            }

            for (int k = 0; k < chunk.Seam.Length; k += Lanes.Count)
            {
                ReadOnlySpan<int> elements = chunk.Seam.AsSpan(k, Math.Min(Lanes.Count, chunk.Seam.Length - k));
                Vector<double>[] vectors = contribution(kernel, elements, c);
                for (int lane = 0; lane < elements.Length; lane++)
                {
                    Lanes.CopyLane(vectors, lane, _seam.AsSpan((chunk.FirstOnSeam + k + lane) * targets.Count, targets.Count));
                }
            }
        });
        foreach (Chunk chunk in _chunks)
        {
            for (int k = 0; k < chunk.Seam.Length; k++)
            {
                Add(_seam.AsSpan((chunk.FirstOnSeam + k) * targets.Count, targets.Count), 1, targets.Of(chunk.Seam[k]), sums);
            }
        }
    }

    private static void Add(ReadOnlySpan<double> numbers, int step, ReadOnlySpan<int> targets, double[] sums)
    {
        for (int i = 0; i < targets.Length; i++)
        {
            int target = targets[i];
            if (target >= 0)
            {
                sums[target] += numbers[i * step];
            }
        }
    }

    private void ForChunks(Action<ElementKernel, int> work)
    {
        int crew = Math.Min(_kernels.Length, _chunks.Length);
        int taken = -1;
        void Take(int thread)
        {
            for (int c; (c = Interlocked.Increment(ref taken)) < _chunks.Length;)
            {
                work(_kernels[thread], c);
            }
        }

        if (crew <= 1)
        {
            Take(0);
            return;
        }

        Parallel.For(0, crew, new ParallelOptions { MaxDegreeOfParallelism = crew }, Take);
    }

    private static Chunk[] Cut(FiniteElementSpace space, List<int> elements, out int seamCount)
    {
        int count = Math.Clamp(elements.Count / ElementsPerChunk, Math.Min(1, elements.Count), MostChunks);
        var chunkOf = new int[space.SkeletonCount];
        Array.Fill(chunkOf, Unseen);
        var shared = new bool[chunkOf.Length];
        int First(int chunk) => (int)((long)elements.Count * chunk / count);
        for (int c = 0; c < count; c++)
        {
            for (int k = First(c); k < First(c + 1); k++)
            {
                foreach (int node in space.NodesOf(elements[k])[..space.Reference.BoundaryCount])
                {
                    shared[node] |= chunkOf[node] != Unseen && chunkOf[node] != c;
                    chunkOf[node] = c;
                }
            }
        }

        var chunks = new Chunk[count];
        seamCount = 0;
        for (int c = 0; c < count; c++)
        {
            List<int> own = elements.GetRange(First(c), First(c + 1) - First(c));
            ILookup<bool, int> onSeam = own.ToLookup(
                e => space.NodesOf(e)[..space.Reference.BoundaryCount].ContainsAnyWhere(shared));
            chunks[c] = new Chunk(StraightFirst(space, onSeam[false]), StraightFirst(space, onSeam[true]), seamCount);
            seamCount += chunks[c].Seam.Length;
        }

        return chunks;
    }

    // Elements beside a curved one cost as much as it does.
    private static int[] StraightFirst(FiniteElementSpace space, IEnumerable<int> elements) =>
        [.. elements.OrderBy(e => space.IsCurved[e])];

    /// <summary>What a kernel finds for a few elements.</summary>
    private delegate Vector<double>[] Contribution(ElementKernel kernel, ReadOnlySpan<int> elements, int chunk);

    /// <summary>Where an element's numbers go; negative: nowhere.</summary>
    private sealed record Targets(int Count, Func<int, ReadOnlySpan<int>> Of);

    /// <summary>A run of the list: elements that share no node with other chunks, and the others.</summary>
    private sealed record Chunk(int[] Inside, int[] Seam, int FirstOnSeam);
}
