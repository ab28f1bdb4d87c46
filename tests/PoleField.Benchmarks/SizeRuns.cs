using System.Diagnostics;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Benchmarks;

/// <summary>
/// The parts of one solve of the model problem with second-order elements, at four sizes from ten thousand to a million
/// unknowns.
/// </summary>
internal static class SizeRuns
{
    private const int Order = 2;

    /// <summary>Factors on the mesh sizes that give about 10k, 50k, 200k and 1M unknowns.</summary>
    public static IReadOnlyList<double> Factors { get; } = [1.35, 0.39, 0.094, 0.0247];

    public static void Print(TextWriter writer, double largestUnknowns)
    {
        writer.WriteLine("One solve with second-order elements, seconds; (2) on two threads");
        writer.WriteLine(
            "unknowns   mesh  set-up  order+symbolic  Newton  residual  assemble (2)    factor    (2)   GFLOP  GFLOP/s  entries of L  solve    all (2)  peak MB so far");
        var times = new List<(double Unknowns, double Seconds)>();
        _ = Measure(Factors[0]); // compiled by now
        foreach (double factor in Factors)
        {
            Row row = Measure(factor);
            writer.WriteLine(row.ToString());
            times.Add((row.Unknowns, row.All));
            if (row.Unknowns > largestUnknowns / 3)
            {
                break;
            }
        }

        if (times.Count > 1)
        {
            writer.WriteLine(FormattableString.Invariant($"all grows like unknowns to the power {Exponent(times):f2}"));
        }

        writer.WriteLine();
    }

    /// <summary>The equations of the model problem on the mesh with the given factor.</summary>
    public static FieldEquations Equations(Mesh mesh, int threads, int order = Order) => new(
        FieldProblem.Create(ModelProblem.Magnet, FiniteElementSpace.Create(mesh, MeshEdges.Of(mesh), order)), threads);

    private static Row Measure(double factor)
    {
        (Mesh mesh, double meshing) = Best.Of(factor < 0.05 ? 1 : 2, () => ModelProblem.Mesh(factor));
        int runs = factor < 0.05 ? 2 : 4;
        (FieldEquations one, double setUp) = Best.Of(Math.Min(2, runs), () => Equations(mesh, 1));
        FieldEquations two = Equations(mesh, 2);
        double analysis = Best.Time(Math.Min(2, runs), () => _ = CholeskyAnalysis.Analyse(one.Pattern));
        ((double[] potential, IReadOnlyList<NewtonStep> history), double all) = Best.Of(runs / 2, () => FieldSolver.Solve(Equations(mesh, 2)));
        long peak = Process.GetCurrentProcess().PeakWorkingSet64;
        double residual = Best.Time(runs, () => _ = one.Evaluate(potential));
        double assemble = Best.Time(runs, () => _ = one.Assemble(potential));
        double assembleTwo = Best.Time(runs, () => _ = two.Assemble(potential));
        double[] entries = one.Assemble(potential).Entries;
        CholeskyFactor cholesky = one.Analysis.Factor(entries);
        double factorTwo = Best.Time(runs, () => cholesky.Refactor(entries, 2));
        double factorOne = Best.Time(runs, () => cholesky.Refactor(entries));
        double[] right = new double[one.UnknownCount];
        Array.Fill(right, 1.0);
        double solve = Best.Time(runs, () => cholesky.Solve(right));
        return new Row
        {
            Unknowns = one.UnknownCount,
            Mesh = meshing,
            SetUp = setUp - analysis,
            Analysis = analysis,
            Steps = history.Count,
            Residual = residual,
            Assemble = assemble,
            AssembleTwo = assembleTwo,
            Factor = factorOne,
            FactorTwo = factorTwo,
            Operations = one.Analysis.Operations,
            Entries = one.Analysis.FactorEntries,
            Solve = solve,
            All = all,
            Peak = peak,
        };
    }

    // Slope of log time over log unknowns, least squares.
    private static double Exponent(List<(double Unknowns, double Seconds)> times)
    {
        double[] x = [.. times.Select(t => Math.Log(t.Unknowns))], y = [.. times.Select(t => Math.Log(t.Seconds))];
        double mx = x.Average(), my = y.Average();
        return x.Zip(y, (a, b) => (a - mx) * (b - my)).Sum() / x.Sum(a => (a - mx) * (a - mx));
    }

    private sealed record Row
    {
        public required int Unknowns { get; init; }

        public required double Mesh { get; init; }

        public required double SetUp { get; init; }

        public required double Analysis { get; init; }

        public required int Steps { get; init; }

        public required double Residual { get; init; }

        public required double Assemble { get; init; }

        public required double AssembleTwo { get; init; }

        public required double Factor { get; init; }

        public required double FactorTwo { get; init; }

        public required double Operations { get; init; }

        public required long Entries { get; init; }

        public required double Solve { get; init; }

        public required double All { get; init; }

        public required long Peak { get; init; }

        public override string ToString() => FormattableString.Invariant(
            $"{Unknowns,8}  {Mesh,5:f2}  {SetUp,6:f3}  {Analysis,14:f3}  {Steps,6}  {Residual,8:f4}  {Assemble,8:f4} {AssembleTwo,6:f4}  {Factor,6:f4} {FactorTwo,6:f4}  {Operations / 1e9,6:f3}  {Operations / 1e9 / Factor,7:f1}  {Entries / 1e6,10:f2} M  {Solve,5:f4}  {All,6:f2}  {Peak / 1e6,7:f0}");
    }
}
