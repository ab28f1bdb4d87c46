// Truth: values worked out by hand; the case's own text.
using PoleField.Cli.Case;
using PoleField.Cli.Sweeping;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Sweeping;

public sealed class AxisTests
{
    [Theory]
    [InlineData("beam.width=1mm:2mm:3", "1 mm|1.5 mm|2 mm")]
    [InlineData("beam.width=1:2 mm:3", "1 mm|1.5 mm|2 mm")] // one end's unit holds for both
    [InlineData("beam.width=0.1:0.3:3", "0.1 mm|0.2 mm|0.3 mm")] // without unit: the case's, and no dust of binary fractions
    [InlineData("beam.width=200um,300 um", "200 um|300 um")]
    [InlineData("beam.width=1mm,2:3:2", "1 mm|2 mm|3 mm")]
    [InlineData("beam.centre[1]=-4e0:4:3", "-4 mm|0 mm|4 mm")]
    [InlineData("parts.\"COIL LEFT\".ampere_turns=100,200", "100|200")] // a bare number in the case stays bare
    [InlineData("parts.coil left.ampere_turns=1kA,2kA", "1 kA|2 kA")]
    [InlineData("parts.RIDGE.material=pure-iron, air", "pure-iron|air")]
    public void ValuesAreSpreadAndTakeTheCasesUnit(string text, string expected)
    {
        Axis axis = Reader.Read(text);

        Assert.Equal(expected, string.Join('|', axis.Values.Select((_, i) => axis.At(i).Text)));
    }

    [Fact]
    public void AFactorMultipliesEveryPlaceThePathLeadsTo()
    {
        Axis axis = Reader.Read("parts.COIL*.ampere_turns=x0.5:x1:2");

        TomlTable changed = CaseValues.Changed(Root(), [axis.At(0)]);

        Assert.Equal([1250, -1250], AmpereTurns(changed));
        Assert.Equal("parts.COIL*.ampere_turns_factor", axis.ToFile().Column);
    }

    [Fact]
    public void OnlyTheNamedValueChanges()
    {
        TomlTable before = Root();
        TomlTable after = CaseValues.Changed(before, [Reader.Read("beam.centre[1]=5 mm").At(0)]);

        var changed = CaseValues.Of(before).Zip(CaseValues.Of(after)).Where(p => p.First.Node != p.Second.Node).ToList();

        Assert.Equal("beam.centre.[1]", string.Join('.', Assert.Single(changed).Second.Keys));
        Assert.Equal("5 mm", ((TomlText)changed[0].Second.Node).Value);
    }

    [Theory]
    [InlineData("beam.width", "has no path")]
    [InlineData("=3", "has no path")]
    [InlineData("beam..width=3", "has no path")]
    [InlineData("beam.\"width=3", "has no path")]
    [InlineData("beam.widht=1,2", "\"beam.width\"")] // the nearest name
    [InlineData("beam.width=1:2", "is no range")]
    [InlineData("beam.width=1:2:1", "is no range")]
    [InlineData("beam.width=1 mm:2 cm:3", "is no range")]
    [InlineData("beam.width=1,,2", "empty value")]
    [InlineData("beam.width=wide", "in one unit")]
    [InlineData("beam.width=1 mm,1 cm", "in one unit")]
    [InlineData("beam.width=x2 mm", "in one unit")]
    [InlineData("parts.RIDGE.material=x2", "words")]
    [InlineData("parts.*.*=1", "words")]
    public void WhatCannotBeMeantIsSaidWithTheForm(string text, string says)
    {
        InputException e = Assert.Throws<InputException>(() => Reader.Read(text));

        Finding fault = Assert.Single(e.Findings);
        Assert.Contains(says, fault.Text + " " + fault.Fix, StringComparison.Ordinal);
        Assert.NotEmpty(fault.Fix);
    }

    private static AxisReader Reader => new([.. CaseValues.Of(Root())]);

    private static TomlTable Root() => TomlDocument.Parse(
        Cases.Whole.Replace("\"-2.5 kA\"", "-2500", StringComparison.Ordinal), "magnet.toml", new Faults("magnet.toml"));

    private static double[] AmpereTurns(TomlTable root) =>
        [.. CaseValues.Of(root).Where(v => v.Keys[^1] == "ampere_turns" && v.Keys[0] == "parts").Select(v => ((TomlNumber)v.Node).Value)];
}
