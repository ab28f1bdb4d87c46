// Truth: the case as written by hand; a tuned case is the same text with another sketch, and every other line is kept.
using PoleField.Cli.Commands;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests;

public sealed class TunedCaseTests
{
    [Theory]
    [InlineData("file = \"poles.dxf\"   # drawn by hand")]
    [InlineData("unit = \"mm\"\nfile='poles.dxf'")]
    public void OnlyTheSketchOfTheCaseChanges(string sketch)
    {
        using var folder = new CaseFolder();
        string text = $"format = 1\n[parts.IRON]\nmaterial = {{ file = \"steel.csv\" }}\n\n[sketch]\n{sketch}\n[beam]\nlayer = \"BEAM\"\n";
        File.WriteAllText(folder.CasePath, text);

        string tuned = TunedCase.TextOf(new LoadedCase { Path = folder.CasePath, Findings = [] }, "poles.tuned.dxf");

        Assert.Equal(text.Replace("\"poles.dxf\"", "\"poles.tuned.dxf\"", StringComparison.Ordinal).Replace("'poles.dxf'", "\"poles.tuned.dxf\"", StringComparison.Ordinal), tuned);
    }
}
