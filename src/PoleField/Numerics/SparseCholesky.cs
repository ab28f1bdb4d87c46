namespace PoleField.Numerics;

/// <summary>What the order of elimination and the pattern determine: made once per mesh, used for every factorisation.</summary>
public sealed class CholeskyAnalysis
{
    /// <summary>Entries of the factor.</summary>
    public long FactorEntries => throw new NotImplementedException("seam");

    /// <summary>Floating-point operations of a factorisation.</summary>
    public double Operations => throw new NotImplementedException("seam");

    /// <summary>
    /// Orders and analyses a pattern. With <paramref name="places"/> (y, z of unknown i at [2i], [2i + 1]) nested
    /// dissection may use them; without, the graph alone.
    /// </summary>
    public static CholeskyAnalysis Analyse(SymmetricPattern pattern, ReadOnlySpan<double> places = default) =>
        throw new NotImplementedException("seam");

    /// <summary>Factors a matrix of this pattern; <paramref name="values"/> as in the pattern's value array.</summary>
    /// <exception cref="NotPositiveDefiniteException">A pivot is not positive.</exception>
    public CholeskyFactor Factor(ReadOnlySpan<double> values, int threads = 1) => throw new NotImplementedException("seam");
}

/// <summary>L·Lᵀ of a symmetric positive definite matrix.</summary>
public sealed class CholeskyFactor
{
    /// <summary>Solves A x = b in place.</summary>
    public void Solve(Span<double> rightSide) => throw new NotImplementedException("seam");

    /// <summary>Solves for several right-hand sides at once, one after the other in <paramref name="rightSides"/> (count × size values).</summary>
    public void Solve(Span<double> rightSides, int count) => throw new NotImplementedException("seam");
}

/// <summary>The matrix is not positive definite.</summary>
public sealed class NotPositiveDefiniteException(int unknown, double pivot) : Exception(
    FormattableString.Invariant($"The matrix is not positive definite: pivot {pivot:g6} at unknown {unknown}."))
{
    /// <summary>Unknown whose pivot failed.</summary>
    public int Unknown { get; } = unknown;

    /// <summary>The pivot.</summary>
    public double Pivot { get; } = pivot;
}
