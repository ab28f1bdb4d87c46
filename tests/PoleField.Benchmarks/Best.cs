using System.Diagnostics;

namespace PoleField.Benchmarks;

/// <summary>Shortest of several runs: what the machine can do when nothing else asks for it.</summary>
internal static class Best
{
    public static (T Result, double Seconds) Of<T>(int runs, Func<T> run)
    {
        T result = default!;
        double best = double.PositiveInfinity;
        for (int k = 0; k < runs; k++)
        {
            var clock = Stopwatch.StartNew();
            result = run();
            best = Math.Min(best, clock.Elapsed.TotalSeconds);
        }

        return (result, best);
    }

    public static double Time(int runs, Action run) => Of(runs, () =>
    {
        run();
        return 0;
    }).Seconds;
}
