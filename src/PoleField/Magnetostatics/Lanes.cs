using System.Numerics;
using System.Runtime.InteropServices;

namespace PoleField.Magnetostatics;

/// <summary>Vectors whose lanes are elements: one number of each of a few elements.</summary>
internal static class Lanes
{
    /// <summary>Elements at once.</summary>
    public static int Count => Vector<double>.Count;

    /// <summary>The numbers of an array of vectors: that of lane l of vector i at [i · Count + l].</summary>
    public static Span<double> Numbers(Vector<double>[] vectors) => MemoryMarshal.Cast<Vector<double>, double>(vectors.AsSpan());

    /// <summary>The numbers of one lane.</summary>
    public static void CopyLane(Vector<double>[] vectors, int lane, Span<double> to)
    {
        ReadOnlySpan<double> numbers = Numbers(vectors);
        for (int i = 0; i < to.Length; i++)
        {
            to[i] = numbers[(i * Count) + lane];
        }
    }
}
