using System.Globalization;
using PoleField.Beam;
using PoleField.Meshing;

namespace PoleField.Benchmarks;

/// <summary>Whole runs of the model problem, one table each: what a user waits for and what it is made of.</summary>
internal static class WholeRuns
{
    private const int Repeats = 4;

    public static void Print(TextWriter writer, double largestUnknowns)
    {
        // First, so that the memory told with each size is not that of another table.
        SizeRuns.Print(writer, largestUnknowns);
        PrintAccuracies(writer);
        PrintMeshing(writer);
    }

    private static void PrintAccuracies(TextWriter writer)
    {
        writer.WriteLine("Time to accuracy: mesh, solve, error estimate, refinement, all on two threads");
        writer.WriteLine("accuracy  unknowns  Newton  meshes  mesh s  solve s  evaluate s  all s  error of B  error of dB/dz  bar of both");
        foreach (double accuracy in new[] { 1e-3, 1e-4, 1e-5, 1e-6 })
        {
            (SolvedMagnet solved, double seconds) = Best.Of(Repeats, () => MagnetSolver.Solve(
                ModelProblem.Magnet, ModelProblem.Aperture, new SolveOptions { Accuracy = accuracy, Threads = 2 }));
            SolveRecord r = solved.Record;
            BeamValues beam = solved.Report.Beam;
            double field = Math.Abs((beam.Bz / ModelProblem.Field) - 1);
            double gradient = Math.Abs((beam.DBzDz / ModelProblem.Gradient) - 1);
            writer.WriteLine(string.Create(
                CultureInfo.InvariantCulture,
                $"{accuracy,8:g}  {r.Unknowns,8}  {r.NewtonSteps,6}  {r.AdaptiveSteps + 1,6}  {r.MeshSeconds,6:f3}  {r.SolveSeconds,7:f3}  {r.EvaluateSeconds,10:f3}  {seconds,5:f3}  {field,10:e1}  {gradient,14:e1}  {r.AccuracyReached,11:e1}"));
        }

        writer.WriteLine();
    }

    private static void PrintMeshing(TextWriter writer)
    {
        writer.WriteLine("Meshing, one thread");
        writer.WriteLine("triangles  seconds  triangles/s  smallest angle");
        foreach (double factor in new[] { 0.52, 0.165, 0.073 })
        {
            (Mesh mesh, double seconds) = Best.Of(Repeats, () => ModelProblem.Mesh(factor));
            writer.WriteLine(string.Create(
                CultureInfo.InvariantCulture,
                $"{mesh.TriangleCount,9}  {seconds,7:f3}  {mesh.TriangleCount / seconds,11:f0}  {MeshQuality.Of(mesh).SmallestAngleDegrees,14:f1}"));
        }

        writer.WriteLine();
    }
}
