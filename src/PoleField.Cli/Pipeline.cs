using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Commands;
using PoleField.Cli.Files;
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli;

/// <summary>The steps of a run, each a call into the library; tests replace single steps.</summary>
internal sealed record Pipeline
{
    /// <summary>Drawing file to sketch; the unit overrides the drawing's own.</summary>
    public required Func<Stream, string, LengthUnit?, Sketch> ReadSketch { get; init; }

    /// <summary>Sketch to section.</summary>
    public required Func<Sketch, SectionRequest, SectionReading> Cut { get; init; }

    /// <summary>Built-in materials.</summary>
    public required MaterialShelf Materials { get; init; }

    /// <summary>Table of a magnetisation curve to material.</summary>
    public required Func<Stream, string, Material> ReadMaterial { get; init; }

    /// <summary>Magnet to field and report.</summary>
    public required Func<Magnet, Aperture, SolveOptions, Action<SolveProgress>, CancellationToken, SolvedMagnet> Solve { get; init; }

    /// <summary>|B| of a solved magnet at any place, T; null where the model ends.</summary>
    public Func<SolvedMagnet, Func<Point, double?>> FieldOf { get; init; } = solved => place => solved.Solution.At(place)?.Magnitude;

    /// <summary>Writes the result file.</summary>
    public Action<Stream, ResultFile> WriteResult { get; init; } = (stream, file) => JsonText.Write(file, stream);

    /// <summary>Pictures of a sketch with what was found in it.</summary>
    public PictureSet<LoadedCase> SketchPictures { get; init; } = new([], _ => []);

    /// <summary>Pictures of a solved magnet.</summary>
    public PictureSet<SolvedCase> ResultPictures { get; init; } = new([], _ => []);

    /// <summary>The page of a report as far as the solve itself goes.</summary>
    public Func<SolvedCase, ReportPage> Page { get; init; } = solved => ReportOutput.PageOf(ResultOutput.FileOf(solved));

    /// <summary>Verbs that solve a case and work something out of it; each is registered as it is listed here.</summary>
    public IReadOnlyList<AnalysisStep> Analyses { get; init; } = [];

    /// <summary>The library's own steps.</summary>
    public static Pipeline OfLibrary()
    {
        Pipeline pipeline = Steps();
        return pipeline with
        {
            Analyses =
            [
                MapStep.Create(),
                RampVerbStep.Create(),
                CompareStep.Create(),
                DeflectStep.Create(),
                TuneVerbStep.Create(pipeline),
                ToleranceStep.Create(),
            ],
        };
    }

    private static Pipeline Steps() => new()
    {
        ReadSketch = ReadDxf,
        Cut = CutSection,
        Materials = MaterialShelf.OfLibrary(),
        ReadMaterial = ReadCurve,
        Solve = (magnet, aperture, options, progress, cancellation) =>
            MagnetSolver.Solve(magnet, aperture, options, progress, cancellation),
        SketchPictures = CasePictures.OfSketch,
        ResultPictures = CasePictures.OfSolution,
        Page = solved => ReportOutput.PageOf(solved),
    };

    private static Sketch ReadDxf(Stream stream, string name, LengthUnit? unit) =>
        DxfReader.Read(stream, name, new DxfReadOptions { Unit = unit });

    private static SectionReading CutSection(Sketch sketch, SectionRequest request) => Sectioning.Read(sketch, request);

    private static Material ReadCurve(Stream stream, string name) => MaterialFile.Read(stream, name);
}

/// <summary>A solved case with all that its result file says.</summary>
internal sealed record SolvedCase
{
    public required LoadedCase Case { get; init; }

    public required SolvedMagnet Solved { get; init; }

    public required IReadOnlyList<Verdict> Verdicts { get; init; }

    /// <summary>Heat, pull, energy and stray field.</summary>
    public required OperationReport Operation { get; init; }

    public required IReadOnlyList<string> Cautions { get; init; }

    /// <summary>Warnings of drawing and solve.</summary>
    public required IReadOnlyList<Finding> Warnings { get; init; }

    public required double ReadSeconds { get; init; }

    public required double TotalSeconds { get; init; }

    public required double PeakMemoryMegabytes { get; init; }

    /// <summary>True when the asked accuracy was reached and every requirement met.</summary>
    public bool AllMet => Solved.Record.AccuracyMet && Verdicts.All(v => v.Met);
}
