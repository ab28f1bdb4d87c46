using System.CommandLine;
using System.CommandLine.Parsing;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Geometry;
using PoleField.Output.Figures;
using PoleField.Output.Maps;
using PoleField.Output.Pages;

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
        var points = new Option<string?>("--points")
        {
            Description = "Take the places from a table of y and z in mm, one place a line, instead of a grid; for csv.",
            HelpName = "FILE",
        };
        return new AnalysisStep("map", "Field maps for trajectory programs and viewers.")
        {
            Examples =
            [
                ("polefield map magnet.toml", "writes magnet.map.csv and magnet.map.json"),
                ("polefield map magnet.toml --format h5 --format vtu -o maps/", "HDF5 and mesh, into a folder"),
                ("polefield map magnet.toml --points probes.csv", "the field at listed places"),
            ],
            Options = [format, points],
            FirstIsJson = false,
            Pictures = CasePictures.OfSolution.Names,
            Endings = arguments => [.. Chosen(arguments.GetValue(format)).SelectMany(f => Formats[f])],
            Needs = (_, arguments) => Faults(Chosen(arguments.GetValue(format)), arguments.GetValue(points)),
            Run = request => Run(request, Chosen(request.Arguments.GetValue(format)), request.Arguments.GetValue(points)),
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

    // Looked at before the solve: a list that cannot be read, and a list for a format that holds grids only.
    private static IReadOnlyList<Finding> Faults(IReadOnlyList<string> formats, string? points)
    {
        if (points is null)
        {
            return [];
        }

        try
        {
            PlacesFile.Read(points);
        }
        catch (InputException e)
        {
            return e.Findings;
        }

        return formats.All(f => f == "csv")
            ? []
            : [new Finding(Severity.Fault, "map-places", "A list of places goes into csv only; h5 holds grids and vtu the mesh.", "Leave --points out, or take --format csv.")];
    }

    private static Analysis Run(AnalysisRequest request, IReadOnlyList<string> formats, string? points)
    {
        SolvedCase result = request.Solved;
        SolvedMagnet solved = result.Solved;
        var origin = new MapProvenance(
            result.Case.Case!.Title, result.Case.CaseSha256, result.Case.SketchSha256, ResultOutput.ProgramVersion, solved.Record.AccuracyReached);
        request.Progress(SolveProgress.Of("field map"));
        FieldMap? map = formats.Any(f => f != "vtu")
            ? FieldMap.Sample(
                points is null ? GridOf(result.Case.Case.Map, solved) : MapGrid.Places(PlacesFile.Read(points)),
                FieldMap.FieldOf(solved),
                origin,
                new ParallelOptions { MaxDegreeOfParallelism = request.Options.Threads, CancellationToken = request.Cancellation })
            : null;
        return new Analysis(MapText.Of(map, formats.Contains("vtu") ? solved.Record.Triangles : null), [.. formats.SelectMany(f => Writers(f, map, solved, origin))])
        {
            Pictures = [.. CasePictures.DrawField(FieldScene.Of(solved)).Select(f => new ReportPicture(f))],
        };
    }

    private static IEnumerable<Action<Stream>> Writers(string format, FieldMap? map, SolvedMagnet solved, MapProvenance origin) => format switch
    {
        "csv" => [s => CsvMap.Write(map!, s), s => CsvMap.WriteSidecar(map!, s)],
        "h5" => [s => OpenPmdMap.Write(map!, s)],
        _ => [s => VtuMap.Write(solved.Solution.QuadraticCells(), solved.Solution.Magnet.Section, origin, s)],
    };

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
