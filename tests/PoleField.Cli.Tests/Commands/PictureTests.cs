// Truth: faults set into a sound drawing by hand, the targets' contract, and the values of the solved case.
using System.Globalization;
using System.Xml.Linq;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class PictureTests
{
    [Fact]
    public async Task CheckDrawsAFaultySketchWithFaultAndHealedJointNumbered()
    {
        using SketchFolder folder = await SketchFolder.Of("two-wire");
        BreakLines(folder["two-wire.dxf"]);

        Run run = await Run.Of(Pipeline.OfLibrary(), "check", folder.CasePath, "--figures", folder["pictures"]);

        Assert.Equal(2, run.Status);
        string text = TextOf(folder[Path.Combine("pictures", "sketch.svg")]);
        Assert.Contains("1. Fault, layer RIDGE", text, StringComparison.Ordinal);
        Assert.Contains("Ends 1.2 µm apart", text, StringComparison.Ordinal);
        Assert.Contains("Faults (cross): 1.", text, StringComparison.Ordinal);
        Assert.True(new FileInfo(folder[Path.Combine("pictures", "sketch.png")]).Length > 10_000);
    }

    [Fact]
    public async Task CheckWithoutACurveDrawsNothingAndStillReports()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(Steps.Sound with { SketchPictures = Pipeline.OfLibrary().SketchPictures }, "check", folder.CasePath, "--figures", folder["pictures"]);

        Assert.Equal(0, run.Status);
        Assert.Equal(["magnet.toml", "poles.dxf"], folder.Names);
    }

    [Fact]
    public async Task SolveChecksItsPicturesBeforeTheSolve()
    {
        using var folder = new CaseFolder();
        Directory.CreateDirectory(folder["pictures"]);
        await File.WriteAllTextAsync(folder[Path.Combine("pictures", "field-beam.png")], "mine");
        bool solved = false;
        Pipeline pipeline = Steps.Sound with
        {
            Solve = (_, _, options, _, _) => { solved = true; return Steps.Solved(options); },
            ResultPictures = Pipeline.OfLibrary().ResultPictures,
        };

        Run run = await Run.Of(pipeline, "solve", folder.CasePath, "-o", folder["out.json"], "--figures", folder["pictures"]);

        Assert.Equal((2, false), (run.Status, solved));
        Assert.Contains("field-beam.png exists already", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task TheWholeFieldOfBareWiresShowsTheBeamAboveThem()
    {
        using SketchFolder folder = await SketchFolder.Of("round-wires", "--wire-radius", "1.5 mm"); // beam at z = 3.6 mm

        Run run = await Run.Of(Pipeline.OfLibrary(), "solve", folder.CasePath, "--accuracy", "1e-2", "-o", folder["out.json"], "--figures", folder["pictures"]);

        Assert.Equal(0, run.Status);
        string[] words = TextOf(folder[Path.Combine("pictures", "field.svg")]).Split('\n');
        Assert.Equal(2, words.Count(w => w == "3")); // on both axes: the wires' box with its margin alone ends below z = 3 mm
    }

    [Fact]
    public async Task ACurveIsPlottedUnderItsMaterialsName()
    {
        using var folder = new CaseFolder();

        Run run = await Run.Of(Pipeline.OfLibrary(), "materials", "pure-iron", "--figures", folder["pictures"]);

        Assert.Equal(0, run.Status);
        Assert.Contains("Magnetisation of pure-iron", TextOf(folder[Path.Combine("pictures", "material-pure-iron.svg")]), StringComparison.Ordinal);
    }

    private static string TextOf(string svg) => string.Join('\n', XDocument.Load(svg).Descendants().Where(e => e.Name.LocalName is "text" or "title" or "desc").Select(e => e.Value));

    // Ends of two lines moved: one by 1.2 µm, less than the join tolerance, one by 0.3 mm.
    private static void BreakLines(string path)
    {
        string[] lines = File.ReadAllLines(path);
        int count = 0;
        for (int i = 0; i < lines.Length; i++)
        {
            if (lines[i].Trim() == "LINE")
            {
                count++;
                int x = Array.FindIndex(lines, i, l => l.Trim() == "11") + 1;
                double move = count switch { 2 => 0.0012, 4 => 0.3, _ => 0 };
                lines[x] = (double.Parse(lines[x], CultureInfo.InvariantCulture) + move).ToString("R", CultureInfo.InvariantCulture);
            }
        }

        File.WriteAllLines(path, lines);
    }
}
