using System.Buffers;
using PoleField.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>The factored tangent of the field equations: solves K x = r for right sides given on all nodes.</summary>
internal sealed class TangentSystem
{
    private readonly FiniteElementSpace _space;
    private readonly int[] _unknownOfNode;
    private readonly int _unknowns;

    public TangentSystem(
        FiniteElementSpace space, int[] unknownOfNode, int unknowns, Condensation condensation, CholeskyFactor factor)
    {
        _space = space;
        _unknownOfNode = unknownOfNode;
        _unknowns = unknowns;
        Condensation = condensation;
        CholeskyFactor = factor;
    }

    /// <summary>The factor; its memory may be used again when this system is no longer needed.</summary>
    internal CholeskyFactor CholeskyFactor { get; }

    /// <summary>The condensation, whose memory too.</summary>
    internal Condensation Condensation { get; }

    /// <summary>Solution by node (zero on fixed nodes) for a right side by node.</summary>
    public double[] Solve(double[] rightSide) => Solve([rightSide])[0];

    /// <summary>Solutions for several right sides at once.</summary>
    public double[][] Solve(IReadOnlyList<double[]> rightSides)
    {
        int length = rightSides.Count * _unknowns;
        double[] packed = ArrayPool<double>.Shared.Rent(length);
        double[][] solutions = [.. rightSides.Select(_ => new double[_space.NodeCount])];
        for (int k = 0; k < solutions.Length; k++)
        {
            // Until it holds the solution it holds the condensed right side.
            double[] skeleton = solutions[k];
            rightSides[k].AsSpan(0, _space.SkeletonCount).CopyTo(skeleton);
            for (int e = 0; e < _space.ElementCount; e++)
            {
                Condensation.ReduceRightSide(e, _space.NodesOf(e), rightSides[k], skeleton);
            }

            for (int node = 0; node < _unknownOfNode.Length; node++)
            {
                if (_unknownOfNode[node] >= 0)
                {
                    packed[(k * _unknowns) + _unknownOfNode[node]] = skeleton[node];
                }
            }
        }

        CholeskyFactor.Solve(packed.AsSpan(0, length), rightSides.Count);
        for (int k = 0; k < solutions.Length; k++)
        {
            Expand(packed.AsSpan(k * _unknowns, _unknowns), rightSides[k], solutions[k]);
        }

        ArrayPool<double>.Shared.Return(packed);
        return solutions;
    }

    private void Expand(ReadOnlySpan<double> unknowns, double[] rightSide, double[] solution)
    {
        for (int node = 0; node < _unknownOfNode.Length; node++)
        {
            int unknown = _unknownOfNode[node];
            solution[node] = unknown >= 0 ? unknowns[unknown] : 0.0;
        }

        for (int e = 0; e < _space.ElementCount; e++)
        {
            Condensation.Recover(e, _space.NodesOf(e), rightSide, solution);
        }
    }
}
