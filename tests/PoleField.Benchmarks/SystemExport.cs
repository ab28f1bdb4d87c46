using System.Globalization;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Benchmarks;

/// <summary>
/// Writes what other programs need to be timed beside PoleField: the model problem's matrices (Matrix Market, coordinate,
/// real, symmetric, lower triangle), for each unknown the ends of its mesh edge, and the outline as straight pieces.
/// </summary>
internal static class SystemExport
{
    private const double Chord = 0.2e-3; // m

    public static void Write(string folder)
    {
        Directory.CreateDirectory(folder);
        WriteOutline(Path.Combine(folder, "outline.txt"));
        foreach (double factor in SizeRuns.Factors)
        {
            Mesh mesh = ModelProblem.Mesh(factor);
            FieldEquations equations = SizeRuns.Equations(mesh, 1);
            double[] potential = FieldSolver.Solve(equations).Potential;
            string name = Path.Combine(folder, FormattableString.Invariant($"tangent-{equations.UnknownCount}"));
            WriteMatrix(name + ".mtx", equations.Pattern, equations.Assemble(potential).Entries);
            WriteEnds(name + ".ends", equations);
        }
    }

    private static void WriteMatrix(string path, SymmetricPattern pattern, double[] entries)
    {
        using var writer = new StreamWriter(path);
        writer.WriteLine("%%MatrixMarket matrix coordinate real symmetric");
        writer.WriteLine(FormattableString.Invariant($"{pattern.Size} {pattern.Size} {pattern.EntryCount}"));
        for (int column = 0; column < pattern.Size; column++)
        {
            for (int k = pattern.ColumnStart[column]; k < pattern.ColumnStart[column + 1]; k++)
            {
                writer.WriteLine(string.Create(
                    CultureInfo.InvariantCulture, $"{pattern.Rows[k] + 1} {column + 1} {entries[k]:r}"));
            }
        }
    }

    // A vertex's line has its number twice.
    private static void WriteEnds(string path, FieldEquations equations)
    {
        using var writer = new StreamWriter(path);
        FiniteElementSpace space = equations.Problem.Space;
        for (int node = 0; node < space.SkeletonCount; node++)
        {
            if (!equations.IsUnknown(node))
            {
                continue;
            }

            int vertices = space.Mesh.Vertices.Count;
            (int a, int b) = node < vertices ? (node, node) : space.Edges.Ends((node - vertices) / (space.Order - 1));
            writer.WriteLine(FormattableString.Invariant($"{a} {b}"));
        }
    }

    // Number of places, their coordinates; number of pieces, their two places and what is left and right.
    private static void WriteOutline(string path)
    {
        using var writer = new StreamWriter(path);
        var places = new List<Point>();
        var pieces = new List<string>();
        foreach (SectionEdge edge in ModelProblem.Section.Edges)
        {
            int parts = edge.Curve is Line ? 1 : (int)Math.Ceiling(edge.Curve.Length / Chord);
            int last = IndexOf(places, edge.Curve.Start);
            for (int k = 1; k <= parts; k++)
            {
                int next = IndexOf(places, k == parts ? edge.Curve.End : edge.Curve.At((double)k / parts));
                pieces.Add(FormattableString.Invariant($"{last} {next} {edge.Left} {edge.Right}"));
                last = next;
            }
        }

        writer.WriteLine(places.Count);
        places.ForEach(p => writer.WriteLine(string.Create(CultureInfo.InvariantCulture, $"{p.Y:r} {p.Z:r}")));
        writer.WriteLine(pieces.Count);
        pieces.ForEach(writer.WriteLine);
    }

    private static int IndexOf(List<Point> places, Point p)
    {
        int found = places.IndexOf(p);
        if (found < 0)
        {
            found = places.Count;
            places.Add(p);
        }

        return found;
    }
}
