using PoleField.Beam;
using PoleField.Output.Figures;

namespace PoleField.Cli.Files;

/// <summary>The pictures of a case.</summary>
internal static class CasePictures
{
    /// <summary>The sketch with faults, doubts and healed joints marked, also when it is faulty; none when it holds no curve.</summary>
    public static PictureSet<LoadedCase> OfSketch { get; } = new(["sketch"], DrawSketch);

    /// <summary>Field lines of the whole section and around the beam.</summary>
    public static PictureSet<SolvedCase> OfSolution { get; } = new(["field", "field-beam"], result => DrawField(FieldScene.Of(result.Solved)));

    /// <summary>Field lines of the whole section and around the beam.</summary>
    public static IReadOnlyList<Figure> DrawField(FieldScene scene) => [FieldFigure.Whole(scene), FieldFigure.Beam(scene)];

    /// <summary>Deviation of the gradient over the aperture.</summary>
    public static Figure DrawGradient(SolvedMagnet solved) =>
        GradientMapFigure.Draw(solved.Field.Aperture, solved.Field.At, solved.Report.Gradient);

    private static IReadOnlyList<Figure> DrawSketch(LoadedCase loaded)
    {
        if (loaded.Sketch is not { Curves.Count: > 0 } sketch)
        {
            return [];
        }

        // What is wrong with the case file itself has no place in the drawing.
        Finding[] drawn = [.. loaded.Findings.Where(f => f.At is not null || f.AtDrawing is not null || f.Layer is not null)];
        return [SketchFigure.Draw(sketch, drawn)];
    }
}
