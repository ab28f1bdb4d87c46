using System.Diagnostics;
using System.Globalization;
using PoleField.Beam;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Benchmarks;

/// <summary>Whole runs of the model magnet, one table: what a user waits for.</summary>
internal static class WholeRuns
{
    private const int Repeats = 3;

    public static void Print(TextWriter writer)
    {
        Magnet magnet = ModelMagnet.Create();
        writer.WriteLine("Time to accuracy, best of three after one warm-up");
        writer.WriteLine("accuracy  unknowns  Newton  meshes  mesh s  solve s  evaluate s  all s  reached");
        foreach (double accuracy in new[] { 1e-3, 1e-4, 1e-5, 1e-6 })
        {
            (SolvedMagnet solved, double seconds) = Best(() =>
                MagnetSolver.Solve(magnet, ModelMagnet.Aperture, new SolveOptions { Accuracy = accuracy }));
            SolveRecord r = solved.Record;
            writer.WriteLine(string.Create(
                CultureInfo.InvariantCulture,
                $"{accuracy,8:g}  {r.Unknowns,8}  {r.NewtonSteps,6}  {r.AdaptiveSteps + 1,6}  {r.MeshSeconds,6:f3}  {r.SolveSeconds,7:f3}  {r.EvaluateSeconds,10:f3}  {seconds,5:f3}  {r.AccuracyReached:g2}"));
        }

        writer.WriteLine();
        writer.WriteLine("Meshing at uniform size");
        writer.WriteLine("triangles  seconds  triangles/s  smallest angle");
        foreach (double size in new[] { 2e-3, 1e-3, 0.5e-3 })
        {
            (Mesh mesh, double seconds) = Best(() => Mesher.Mesh(magnet.Section, SizeField.Uniform(size)));
            writer.WriteLine(string.Create(
                CultureInfo.InvariantCulture,
                $"{mesh.TriangleCount,9}  {seconds,7:f3}  {mesh.TriangleCount / seconds,11:f0}  {MeshQuality.Of(mesh).SmallestAngleDegrees,14:f1}"));
        }

        writer.WriteLine(string.Create(
            CultureInfo.InvariantCulture, $"\npeak memory {Process.GetCurrentProcess().PeakWorkingSet64 / 1e6:f0} MB"));
    }

    private static (T Result, double Seconds) Best<T>(Func<T> run)
    {
        T result = run();
        double best = double.PositiveInfinity;
        for (int k = 0; k < Repeats; k++)
        {
            var clock = Stopwatch.StartNew();
            result = run();
            best = Math.Min(best, clock.Elapsed.TotalSeconds);
        }

        return (result, best);
    }
}
