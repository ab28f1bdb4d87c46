using BenchmarkDotNet.Attributes;
using PoleField.Beam;
using PoleField.Magnetostatics;

namespace PoleField.Benchmarks;

/// <summary>The model magnet at the default accuracy, on one thread and on two.</summary>
[MemoryDiagnoser]
public class SolveBenchmark
{
    private readonly Magnet _magnet = ModelProblem.Magnet;

    [Params(1, 2)]
    public int Threads { get; set; }

    [Benchmark]
    public double Gradient() =>
        MagnetSolver.Solve(_magnet, ModelProblem.Aperture, new SolveOptions { Threads = Threads }).Report.Beam.Gradient;
}
