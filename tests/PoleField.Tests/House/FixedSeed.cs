using CsCheck;

namespace PoleField.Tests.House;

/// <summary>Property checks over the same random inputs in every run, so that a red run means a change and not a new draw.</summary>
internal static class FixedSeed
{
    private const uint Stream = 1;
    private const ulong Seed = 20261201;

    public static void SampleFixed<T>(this Gen<T> gen, Action<T> check, int iter = 100)
    {
        var random = new PCG(Stream, Seed);
        for (int i = 0; i < iter; i++)
        {
            T value = gen.Generate(random, null, out _);
            try
            {
                check(value);
            }
            catch (Exception e)
            {
                throw new InvalidOperationException($"Draw {i} of seed {Seed}: {Check.Print(value)}", e);
            }
        }
    }

    public static void SampleFixed<T1, T2>(this Gen<(T1, T2)> gen, Action<T1, T2> check, int iter = 100) =>
        gen.SampleFixed(t => check(t.Item1, t.Item2), iter);

    public static void SampleFixed<T1, T2, T3>(this Gen<(T1, T2, T3)> gen, Action<T1, T2, T3> check, int iter = 100) =>
        gen.SampleFixed(t => check(t.Item1, t.Item2, t.Item3), iter);

    public static void SampleFixed<T1, T2, T3, T4>(this Gen<(T1, T2, T3, T4)> gen, Action<T1, T2, T3, T4> check, int iter = 100) =>
        gen.SampleFixed(t => check(t.Item1, t.Item2, t.Item3, t.Item4), iter);

    public static void SampleFixed<T1, T2, T3, T4, T5>(
        this Gen<(T1, T2, T3, T4, T5)> gen, Action<T1, T2, T3, T4, T5> check, int iter = 100) =>
        gen.SampleFixed(t => check(t.Item1, t.Item2, t.Item3, t.Item4, t.Item5), iter);
}
