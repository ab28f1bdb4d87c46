using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Tests.Doubles;

/// <summary>A folder with a small magnet, solved in a fraction of a second: a round nose under a block in a background field.</summary>
internal sealed class PolesFolder : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("polefield-");

    /// <param name="sections">What the case asks beyond sketch, parts, field and beam.</param>
    /// <param name="material">Material line of both poles.</param>
    public PolesFolder(string sections, string material = "relative_permeability = 500")
    {
        File.WriteAllText(CasePath, $"""
            format = 1
            title = "Nose under a block"
            [sketch]
            file = "poles.dxf"
            [parts.NOSE]
            {material}
            [parts.BLOCK]
            {material}
            [surroundings]
            applied_field = ["0 T", "0.4 T"]
            [beam]
            centre = ["0 mm", "4.2 mm"]
            width = "2 mm"
            height = "0.3 mm"
            [accuracy]
            relative = 1e-3

            """.Replace("\r", string.Empty, StringComparison.Ordinal) + sections);
        var nose = new CircularArc(new Point(0, 0), 3, 0, Math.PI);
        Curve[] noseOutline = [nose, new Line(nose.End, new Point(-3, -9)), new Line(new Point(-3, -9), new Point(3, -9)), new Line(new Point(3, -9), nose.Start)];
        IEnumerable<SketchCurve> curves = noseOutline.Select(c => new SketchCurve(c, "NOSE", "LINE", null, 0))
            .Concat(Outline.Rectangle(new Point(0, 9), 12, 6).Curves.Select(c => new SketchCurve(c, "BLOCK", "LINE", null, 0)));
        using FileStream stream = File.Create(this["poles.dxf"]);
        DxfWriter.Write(new Sketch("poles.dxf", LengthUnit.Millimetre, UnitOrigin.InsertUnits, [.. curves], [], []), stream);
    }

    public string CasePath => this["magnet.toml"];

    public string this[string name] => Path.Combine(_folder.FullName, name);

    /// <summary>Names of all files in a folder below, sorted.</summary>
    public IReadOnlyList<string> NamesIn(string folder) =>
        [.. Directory.GetFiles(this[folder]).Select(f => Path.GetFileName(f)!).Order(StringComparer.Ordinal)];

    public void Dispose() => _folder.Delete(recursive: true);
}
