namespace PoleField.Numerics;

/// <summary>Numbers that stay in place, the first on a boundary of 64 bytes. Not cleared.</summary>
internal sealed unsafe class PinnedNumbers
{
    private const int Boundary = 64;

    private readonly double[] _numbers;

    public PinnedNumbers(long length)
    {
        Length = length;
        _numbers = GC.AllocateUninitializedArray<double>(
            checked((int)(length + (Boundary / sizeof(double)))), pinned: true);
        nuint address = (nuint)System.Runtime.CompilerServices.Unsafe.AsPointer(ref _numbers[0]);
        Start = (double*)((address + Boundary - 1) & ~(nuint)(Boundary - 1));
    }

    /// <summary>The first number; valid while this object is reachable.</summary>
    public double* Start { get; }

    /// <summary>How many there are.</summary>
    public long Length { get; }
}
