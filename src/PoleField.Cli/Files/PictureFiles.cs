using PoleField.Output.Figures;

namespace PoleField.Cli.Files;

/// <summary>Pictures of something: their names, known before the run, and the drawing of them.</summary>
/// <param name="Names">Names of all pictures it may draw; their files are checked before the run.</param>
/// <param name="Draw">Draws them.</param>
internal sealed record PictureSet<T>(IReadOnlyList<string> Names, Func<T, IReadOnlyList<Figure>> Draw);

/// <summary>The folder of <c>--figures</c>: each picture as SVG and PNG, only SVG where PNG cannot be made.</summary>
/// <param name="folder">The folder; null when no pictures are wanted.</param>
/// <param name="notes">Where it is said that PNG pictures were left out.</param>
internal sealed class PictureFiles(string? folder, TextWriter notes)
{
    private static readonly string[] Endings = [".svg", ".png"];

    /// <summary>True when pictures are wanted.</summary>
    public bool Wanted => folder is not null;

    /// <summary>Paths of the pictures of these names.</summary>
    public IEnumerable<string> Targets(IEnumerable<string> names) =>
        folder is null ? [] : names.SelectMany(n => Endings.Select(e => Path.Combine(folder, n + e)));

    /// <summary>Writes pictures, if they are wanted.</summary>
    public void Write(OutputFiles files, IReadOnlyList<Figure> figures, CancellationToken cancellation)
    {
        bool png = true;
        foreach (Figure figure in folder is null ? [] : figures)
        {
            cancellation.ThrowIfCancellationRequested();
            files.Write(Path.Combine(folder!, figure.Name + Endings[0]), s => FigureWriter.Svg(figure, s));
            png = png && WritePng(files, figure);
        }
    }

    private bool WritePng(OutputFiles files, Figure figure)
    {
        using var picture = new MemoryStream();
        try
        {
            FigureWriter.Png(figure, picture);
        }
        catch (PngUnavailableException e)
        {
            notes.WriteLine("note: " + e.Message);
            return false;
        }

        files.Write(Path.Combine(folder!, figure.Name + Endings[1]), s => s.Write(picture.ToArray()));
        return true;
    }
}
