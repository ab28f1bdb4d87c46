namespace PoleField.Numerics;

/// <summary>L·Lᵀ of a symmetric positive definite matrix.</summary>
/// <remarks>
/// Solving is safe from several threads at once; <see cref="Refactor"/> is not.
/// </remarks>
public sealed unsafe class CholeskyFactor
{
    // Fewer right sides are solved one by one.
    private const int WorthABlock = 3;

    private readonly CholeskyAnalysis _analysis;
    private readonly PinnedNumbers _numbers;
    private readonly UpdateStore _store = new();

    internal CholeskyFactor(CholeskyAnalysis analysis)
    {
        _analysis = analysis;
        _numbers = new PinnedNumbers(analysis.PanelStart[^1]);
    }

    /// <summary>Factors another matrix of the same pattern into the same memory.</summary>
    /// <exception cref="NotPositiveDefiniteException">A pivot is not positive; this factor can then not solve.</exception>
    public void Refactor(ReadOnlySpan<double> values, int threads = 1)
    {
        if (values.Length != _analysis.Pattern.EntryCount)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"The pattern has {_analysis.Pattern.EntryCount} entries, got {values.Length} values."));
        }

        ArgumentOutOfRangeException.ThrowIfLessThan(threads, 1);
        fixed (double* entries = values)
        {
            new Multifrontal(_analysis, entries, _numbers.Start, _store).Run(threads);
        }

        GC.KeepAlive(_numbers);
    }

    /// <summary>Solves A x = b in place.</summary>
    public void Solve(Span<double> rightSide) => Solve(rightSide, 1);

    /// <summary>Solves for several right-hand sides at once, one after the other in <paramref name="rightSides"/> (count × size values).</summary>
    public void Solve(Span<double> rightSides, int count)
    {
        if (rightSides.Length != (long)count * _analysis.Size)
        {
            throw new ArgumentException(FormattableString.Invariant(
                $"{count} right-hand sides of {_analysis.Size} unknowns, got {rightSides.Length} numbers."));
        }

        int n = _analysis.Size;
        for (int done = 0, together; done < count; done += together)
        {
            together = Math.Min(count - done, BlockSolve.Width);
            Span<double> part = rightSides.Slice(done * n, together * n);
            if (together < WorthABlock)
            {
                TriangularSolve.Solve(_analysis, _numbers.Start, part, together);
            }
            else
            {
                BlockSolve.Solve(_analysis, _numbers.Start, part, together);
            }
        }

        GC.KeepAlive(_numbers);
    }

    /// <summary>Entry of the permuted factor; zero where none is stored.</summary>
    internal double Entry(int row, int column)
    {
        Supernodes fronts = _analysis.Fronts;
        int s = Array.BinarySearch(fronts.ColumnStart, column);
        s = s >= 0 ? s : ~s - 1;
        int local = row - fronts.ColumnStart[s];
        if (local >= fronts.Columns(s))
        {
            int found = fronts.Rows[s].BinarySearch(row);
            local = found < 0 ? -1 : fronts.Columns(s) + found;
        }

        return local < 0 || row < column
            ? 0.0
            : _numbers.Start[_analysis.PanelStart[s] + _analysis.Layout(s).PanelRow(local)
                + (8 * (column - fronts.ColumnStart[s]))];
    }
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
