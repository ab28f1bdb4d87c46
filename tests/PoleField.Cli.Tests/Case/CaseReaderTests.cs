// Truth: the case text itself: each expected value and position stands in it and is looked up or converted by hand.
using PoleField.Cli.Case;
using PoleField.Cli.Tests.Doubles;
using PoleField.Geometry;

namespace PoleField.Cli.Tests.Case;

public sealed class CaseReaderTests
{
    private static readonly CaseSurroundings Around = new("case.toml", ["air", "pure-iron", "steel-1008"], _ => true);

    [Fact]
    public void AWholeCaseBindsToTheLastKey()
    {
        CaseReading reading = CaseReader.Read(Cases.Whole, Around);

        Assert.Empty(reading.Findings);
        CaseFile file = reading.Case!;
        Assert.Equal("Ridge and groove, wire half-spacing 3 mm", file.Title);
        Assert.Equal("ridge-groove.dxf", file.Sketch.File);
        Assert.Equal(2e-6, file.Sketch.Join);
        Assert.Equal(1e-3, file.Sketch.Unit!.Metres);
        Assert.True(file.MirrorLeftRight);
        Assert.Equal(new Point(0, 2e-4), file.Surroundings.AppliedField);
        Assert.Null(file.Surroundings.RimLayer);
        Assert.Equal(new BeamRectangle(new Point(0, 0.0036), 0.003, 0.0003), file.Beam);
        Assert.Equal(0.2, file.Length);
        Assert.Equal(60, file.Operation.Celsius, 1e-9);
        Assert.Equal([5e-4, 3e-3], file.Operation.StrayLevels);
        Assert.Equal(1e-5, file.Accuracy);
        Assert.Equal(["gradient_min", "spread_max", "iron_field_max"], file.Require.Select(r => r.Name));
        Assert.Equal([300, 0.02, 1.9], file.Require.Select(r => r.Bound));
    }

    [Fact]
    public void PartsKeepTheirOrderAndSayWhatTheyAre()
    {
        IReadOnlyList<PartSection> parts = CaseReader.Read(Cases.Whole, Around).Case!.Parts;

        Assert.Equal(["RIDGE", "YOKE", "COIL LEFT", "COIL RIGHT", "MAGNET", "SHIM", "HOLE"], parts.Select(p => p.Layer));
        Assert.Equal("pure-iron", Assert.IsType<NamedSubstance>(parts[0].Substance).Name);
        Assert.Equal("my-steel.csv", Assert.IsType<CurveFileSubstance>(parts[1].Substance).File);
        Assert.Equal([null, null, 2500, -2500, null, null, null], parts.Select(p => p.AmpereTurns));
        Assert.Equal([0.6, 0.6], parts.Skip(2).Take(2).Select(p => p.Fill!.Value));
        Assert.Equal(new MagnetSubstance(1.2, 1.05, Math.PI / 2), parts[4].Substance);
        Assert.Equal(new LinearSubstance(1000), parts[5].Substance);
        Assert.Equal("air", Assert.IsType<NamedSubstance>(parts[6].Substance).Name);
    }

    [Fact]
    public void TheSectionsOfTheAnalysesBind()
    {
        CaseFile file = CaseReader.Read(Cases.Whole, Around).Case!;

        Assert.Equal(new TwoWireSection(0.003, new Point(0, 0)), file.TwoWire);
        Assert.Equal([0.1, 0.5, 1.0], file.Ramp.Factors);
        Assert.Equal(0.02, file.Ramp.Onset);
        Assert.Equal(new MapSection(new Point(-0.004, 0.002), new Point(0.004, 0.006), 5e-5), file.Map);
        Assert.Equal([new TuneFace("RIDGE", null, null), new TuneFace("YOKE", new Point(-0.002, 0.001), new Point(0.002, 0.001))], file.Tune!.Faces);
        Assert.Equal((4e-4, 12, 3e-4), (file.Tune.Reach, file.Tune.Freedoms, file.Tune.SmallestRadius));
        Assert.Equal(TuneGoal.FieldTimesGradientSpread, file.Tune.Goal);
        Assert.Equal([("gradient", true, 300.0), ("clearance", true, 3e-4)], file.Tune.Hold.Select(h => (h.Quantity.Name, h.AtLeast, h.Bound)));
        Assert.Equal(
            new ToleranceSection
            {
                FormSize = 1e-5,
                FormLength = 0.002,
                PlaceY = 2e-5,
                PlaceZ = 2e-5,
                Turn = 0.0005,
                AmpereTurns = 0.001,
                Saturation = 0.01,
                BeamY = 5e-5,
                BeamZ = 5e-5,
            },
            file.Tolerance);
        Assert.Equal(
            new FlightSection(new FlightSpecies("K-39", null, null), new FlightSource(478, null, null), 0.32, 0.004, 0.0001), file.Flight);
    }

    [Fact]
    public void WhatIsLeftOutHasTheDocumentedDefault()
    {
        CaseFile file = CaseReader.Read(Cases.Small, Around).Case!;

        Assert.Equal(2e-6, file.Sketch.Join);
        Assert.Equal(1e-4, file.Accuracy);
        Assert.Equal([0.1, 0.25, 0.5, 0.75, 1.0, 1.25, 1.5], file.Ramp.Factors);
        Assert.False(file.MirrorLeftRight);
        Assert.Equal(default, file.Surroundings.AppliedField);
        Assert.Null(file.Tune);
        Assert.Null(file.Flight);
    }

    [Theory]
    [InlineData("width = \"3 mm\"", "widht = \"3 mm\"", "widht", "unknown-key")]
    [InlineData("width = \"3 mm\"", "width = \"1,5 mm\"", "\"1,5 mm\"", "decimal-comma")]
    [InlineData("width = \"3 mm\"", "width = 3", "3\nheight", "missing-unit")]
    [InlineData("width = \"3 mm\"", "width = \"3 T\"", "\"3 T\"", "wrong-unit")]
    [InlineData("width = \"3 mm\"", "width = true", "true", "wrong-type")]
    [InlineData("width = \"3 mm\"", "width = \"0 mm\"", "\"0 mm\"\nheight", "out-of-range")]
    [InlineData("material = \"pure-iron\"", "material = \"pure-irn\"", "\"pure-irn\"", "unknown-material")]
    [InlineData("[magnet]", "[magnte]", "[magnte]", "unknown-key")]
    [InlineData("fill = 0.6", "fill = 1.6", "1.6", "out-of-range")]
    public void AMistakeIsFoundWhereItStands(string sound, string wrong, string at, string what)
    {
        string text = Cases.Small.Replace(sound, wrong, StringComparison.Ordinal);
        int offset = text.IndexOf(wrong, StringComparison.Ordinal) + (wrong + "\nheight").IndexOf(at, StringComparison.Ordinal);
        int line = text[..offset].Count(c => c == '\n') + 1;
        int column = offset - text[..offset].LastIndexOf('\n');

        Finding finding = Assert.Single(CaseReader.Read(text, Around).Findings, f => f.What == what);

        Assert.Equal(("case.toml", line, column), (finding.File, finding.Line, finding.Column));
    }

    [Fact]
    public void AllMistakesAreToldAtOnceInTheOrderOfTheFile()
    {
        string text = Cases.Small
            .Replace("unit = \"mm\"", "unit = \"ell\"", StringComparison.Ordinal)
            .Replace("ampere_turns = 2500", "ampere_turns = \"2500 T\"", StringComparison.Ordinal)
            .Replace("title = \"Small\"", "title = Small", StringComparison.Ordinal)
            .Replace("height =", "hieght =", StringComparison.Ordinal);

        IReadOnlyList<Finding> findings = CaseReader.Read(text, Around).Findings;

        Assert.Equal(["toml-syntax", "unknown-unit", "wrong-unit", "unknown-key"], findings.Select(f => f.What));
        Assert.Equal(findings.Select(f => f.Line).Order(), findings.Select(f => f.Line));
    }

    [Fact]
    public void ACaseWithAFaultIsNeverReturned()
    {
        foreach (string line in Cases.Small.Split('\n').Where(l => l.Contains('=', StringComparison.Ordinal)))
        {
            string key = line[..line.IndexOf('=', StringComparison.Ordinal)].Trim();
            CaseReading reading = CaseReader.Read(Cases.Small.Replace(line, key + "_ = 1", StringComparison.Ordinal), Around);

            Assert.Null(reading.Case);
            Assert.Contains(reading.Findings, f => f.What == "unknown-key");
        }
    }

    [Fact]
    public void AWindowsFileAndAByteOrderMarkReadTheSame()
    {
        string text = Cases.Small.ReplaceLineEndings("\r\n");

        Assert.NotNull(CaseReader.Read(text, Around).Case);
    }
}
