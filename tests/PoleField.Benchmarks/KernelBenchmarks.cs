using BenchmarkDotNet.Attributes;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Benchmarks;

/// <summary>The parts of one Newton step of the model problem with some 12,000 triangles, on one thread.</summary>
[MemoryDiagnoser]
public class KernelBenchmarks
{
    private const double Factor = 0.8;

    private Mesh _mesh = null!;
    private FieldEquations _equations = null!;
    private double[] _potential = null!;
    private double[] _entries = null!;
    private double[] _rightSide = null!;
    private CholeskyFactor _factor = null!;

    [Params(2, 3, 4)]
    public int Order { get; set; }

    [GlobalSetup]
    public void Solve()
    {
        _mesh = ModelProblem.Mesh(Factor);
        _equations = SizeRuns.Equations(_mesh, 1, Order);
        _potential = FieldSolver.Solve(_equations).Potential;
        _entries = [.. _equations.Assemble(_potential).Entries];
        _factor = _equations.Analysis.Factor(_entries);
        _rightSide = new double[_equations.UnknownCount];
        Array.Fill(_rightSide, 1.0);
    }

    [Benchmark]
    public int MeshAnew()
    {
        _mesh = ModelProblem.Mesh(Factor);
        return _mesh.TriangleCount;
    }

    [Benchmark]
    public CholeskyAnalysis OrderAndAnalyse() => CholeskyAnalysis.Analyse(_equations.Pattern);

    [Benchmark]
    public double Residual() => _equations.Evaluate(_potential).Energy;

    [Benchmark]
    public double AssembleTangent() => _equations.Assemble(_potential).Entries[0];

    [Benchmark]
    public void Refactor() => _factor.Refactor(_entries);

    [Benchmark]
    public void SolveOne() => _factor.Solve(_rightSide);
}
