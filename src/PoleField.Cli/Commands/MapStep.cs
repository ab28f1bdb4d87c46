using System.CommandLine;
using System.CommandLine.Parsing;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Geometry;
using PoleField.Output.Maps;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield map CASE.toml</c>: the field on a grid for trajectory programs, and on the mesh for viewers.</summary>
internal static class MapStep
{
    // Endings of each format's files; a table of values has its description beside it.
    private static readonly Dictionary<string, string[]> Formats = new(StringComparer.Ordinal)
    {
        ["csv"] = [".map.csv", ".map.json"],
        ["h5"] = [".map.h5"],
        ["vtu"] = [".map.vtu"],
    };

    private static readonly double[] RoundNumbers = [1, 2, 5, 10];

    public static AnalysisStep Create()
    {
        var format = new Option<string[]>("--format")
        {
            Description = "csv: values on a grid, with a description beside them. h5: the same as HDF5 (openPMD 1.1.0). vtu: the mesh with A, B, H and mu_r "
                + "for viewers. May be given several times. Default: csv.",
            HelpName = "csv|h5|vtu",
            CustomParser = ParseFormats,
            DefaultValueFactory = _ => ["csv"],
            Arity = ArgumentArity.OneOrMore,
        };
        return new AnalysisStep("map", "Field maps for trajectory programs and viewers.")
        {
            Examples =
            [
                ("polefield map magnet.toml", "writes magnet.map.csv and magnet.map.json"),
                ("polefield map magnet.toml --format h5 --format vtu -o maps/", "HDF5 and mesh, into a folder"),
            ],
            Options = [format],
            FirstIsJson = false,
            Endings = arguments => [.. Chosen(arguments.GetValue(format)).SelectMany(f => Formats[f])],
            Run = request => Run(request, Chosen(request.Arguments.GetValue(format))),
        };
    }

    /// <summary>
    /// The grid of a case. Without [map]: the aperture with a margin of air that even at its corners ends before the nearest part,
    /// at most as wide as the aperture is large, in round steps that give about a hundred places along the longer side.
    /// </summary>
    public static MapGrid GridOf(MapSection section, SolvedMagnet solved)
    {
        Box aperture = solved.Field.Aperture.Outline.Bounds;
        double around = Math.Min(solved.Report.Clearance / Math.Sqrt(2), Math.Max(aperture.Width, aperture.Height));
        Box box = section is { From: { } from, To: { } to } ? new Box(from, to) : aperture.Inflated(around);
        double step = section.Step ?? RoundStep(Math.Max(box.Width, box.Height) / 100);
        if (section.From is not null)
        {
            return MapGrid.Rectangle(box.Min, box.Max, step);
        }

        // Places on round numbers, the outermost just inside the box.
        const double rounding = 1e-9;
        var first = new Point(Math.Ceiling((box.Min.Y / step) - rounding) * step, Math.Ceiling((box.Min.Z / step) - rounding) * step);
        return MapGrid.Rectangle(first, box.Max, step);
    }

    private static Analysis Run(AnalysisRequest request, IReadOnlyList<string> formats)
    {
        SolvedCase result = request.Solved;
        SolvedMagnet solved = result.Solved;
        var origin = new MapProvenance(
            result.Case.Case!.Title, result.Case.CaseSha256, result.Case.SketchSha256, ResultOutput.ProgramVersion, solved.Record.AccuracyReached);
        FieldMap? map = formats.Any(f => f != "vtu")
            ? FieldMap.Sample(GridOf(result.Case.Case.Map, solved), FieldMap.FieldOf(solved), origin, request.Cancellation)
            : null;
        return new Analysis(
            (writer, ink) => Print(writer, ink, result, map, formats),
            [.. formats.SelectMany(f => Writers(f, map, solved, origin))]);
    }

    private static IEnumerable<Action<Stream>> Writers(string format, FieldMap? map, SolvedMagnet solved, MapProvenance origin) => format switch
    {
        "csv" => [s => CsvMap.Write(map!, s), s => CsvMap.WriteSidecar(map!, s)],
        "h5" => [s => OpenPmdMap.Write(map!, s)],
        _ => [s => VtuMap.Write(solved.Solution.QuadraticCells(), solved.Solution.Magnet.Section, origin, s)],
    };

    private static void Print(TextWriter writer, Ink ink, SolvedCase result, FieldMap? map, IReadOnlyList<string> formats)
    {
        writer.WriteLine(ink.Strong(result.Case.Case!.Title));
        if (map is not null)
        {
            MapGrid grid = map.Grid;
            Point from = grid[0];
            Point to = grid[grid.Count - 1];
            int exact = map.Samples.Count(s => s.Source == MapSource.Extraction);
            int none = map.Samples.Count(s => s.Source == MapSource.None);
            writer.WriteLine(FormattableString.Invariant(
                $"  {grid.CountY} by {grid.CountZ} places, y from {Mm(from.Y)} to {Mm(to.Y)} mm, z from {Mm(from.Z)} to {Mm(to.Z)} mm"));
            writer.WriteLine(FormattableString.Invariant(
                $"  {exact} in the aperture, field and gradient from the extracted field"));
            writer.WriteLine(FormattableString.Invariant(
                $"  {map.Samples.Count - exact - none} outside it, field of the finite elements, no gradient"));
            if (none > 0)
            {
                writer.WriteLine(FormattableString.Invariant($"  {none} outside the model, empty"));
            }
        }

        if (formats.Contains("vtu"))
        {
            writer.WriteLine(FormattableString.Invariant($"  mesh of {result.Solved.Record.Triangles} triangles, values of the finite elements"));
        }

        static string Mm(double metres) => Numbers.Short(1e3 * metres);
    }

    private static IReadOnlyList<string> Chosen(string[]? formats) => [.. (formats ?? ["csv"]).Distinct()];

    private static string[] ParseFormats(ArgumentResult result)
    {
        string[] typed = [.. result.Tokens.Select(t => t.Value)];
        foreach (string unknown in typed.Where(t => !Formats.ContainsKey(t)))
        {
            result.AddError($"--format is \"{unknown}\"; it must be one of {string.Join(", ", Formats.Keys)}.");
        }

        return typed;
    }

    // 1, 2 or 5 times a power of ten, at least the given size.
    private static double RoundStep(double least)
    {
        double decade = Math.Pow(10, Math.Floor(Math.Log10(least)));
        return RoundNumbers.Select(m => m * decade).First(s => s >= least * (1 - 1e-9));
    }
}
