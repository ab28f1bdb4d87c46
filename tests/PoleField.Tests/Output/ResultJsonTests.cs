// Truth: the layout and units of the published result format, and round trips.
using System.Text;
using System.Text.Json;
using PoleField.Output.Results;
using Xunit;

namespace PoleField.Tests.Output;

public sealed class ResultJsonTests
{
    [Fact]
    public void NumbersStandUnderTheirUnitsInMillimetresAndSI()
    {
        using JsonDocument document = Write();
        JsonElement root = document.RootElement;

        Assert.Equal("polefield-result/1", root.GetProperty("format").GetString());
        JsonElement beam = root.GetProperty("beam");
        Assert.Equal(3.6, beam.GetProperty("z_mm").GetDouble(), 1e-14);
        Assert.Equal(1.25, beam.GetProperty("field_T").GetDouble());
        Assert.Equal(-310.25, beam.GetProperty("gradient_T_per_m").GetDouble());
        JsonElement aperture = root.GetProperty("aperture");
        Assert.Equal(0.9, aperture.GetProperty("area_mm2").GetDouble(), 1e-14);
        Assert.Equal(0.45, aperture.GetProperty("clearance_mm").GetDouble(), 1e-14);
        Assert.Equal(0.04, aperture.GetProperty("field").GetProperty("spread").GetDouble(), 1e-15);
        Assert.Equal(-1.5, aperture.GetProperty("profile_y")[0].GetProperty("y_mm").GetDouble(), 1e-14);
        Assert.Equal(3.45, aperture.GetProperty("profile_z")[0].GetProperty("z_mm").GetDouble(), 1e-14);
        JsonElement iron = root.GetProperty("parts")[0];
        Assert.Equal(2.75, iron.GetProperty("field_max_at_mm")[1].GetDouble(), 1e-14);
        Assert.Equal(1250, iron.GetProperty("force_N_per_m")[1].GetDouble());
        JsonElement coil = root.GetProperty("parts")[1];
        Assert.Equal(41.5, coil.GetProperty("current_density_A_per_mm2").GetDouble(), 1e-13);
        Assert.Equal(4.0, root.GetProperty("circuit").GetProperty("inductance_uH_per_m_turn2").GetDouble(), 1e-14);
        Assert.Equal(0.96, root.GetProperty("circuit").GetProperty("efficiency").GetDouble());
        Assert.Equal(1.125, root.GetProperty("run").GetProperty("seconds").GetProperty("total").GetDouble());
    }

    [Fact]
    public void TopLevelKeysStandInTheOrderOfTheFormat()
    {
        using JsonDocument document = Write();

        string[] expected =
        [
            "format", "title", "case_sha256", "sketch_sha256", "program_version", "beam", "aperture", "parts", "circuit",
            "mesh", "run", "require", "cautions", "warnings", "materials", "operation",
        ];
        Assert.Equal(expected, document.RootElement.EnumerateObject().Select(p => p.Name));
    }

    [Fact]
    public void WhatDoesNotApplyToAPartIsLeftOutAndWhatIsNoNumberIsNull()
    {
        using JsonDocument document = Write();

        Assert.False(document.RootElement.GetProperty("parts")[1].TryGetProperty("field_max_T", out _));
        Assert.False(document.RootElement.GetProperty("parts")[0].TryGetProperty("ampere_turns", out _));
        Assert.Equal(JsonValueKind.Null, document.RootElement.GetProperty("require")[1].GetProperty("found").ValueKind);
    }

    [Fact]
    public void ReadingGivesBackWhatWasWrittenToTheLastBit()
    {
        byte[] first = Bytes(ResultJson.ToFile(SampleResult.Make()));

        ResultFile read = ResultJson.Read(new MemoryStream(first));

        Assert.Equal(first, Bytes(read));
        Assert.Equal("Ridge and groove <µ & \"quotes\">", read.Title);
        Assert.Equal(0.45e-3 * 1e3, read.Aperture.Clearance);
    }

    [Fact]
    public void TheFileHasNoByteOrderMarkAndUsesLineFeeds()
    {
        byte[] bytes = Bytes(ResultJson.ToFile(SampleResult.Make()));

        Assert.Equal((byte)'{', bytes[0]);
        Assert.DoesNotContain((byte)'\r', bytes);
        Assert.Equal((byte)'\n', bytes[^1]);
    }

    [Theory]
    [InlineData("{", "polefield-result/1")] // not JSON
    [InlineData("{\"format\":\"polefield-result/1\"}", "polefield-result/1")] // keys missing
    public void AFileThatIsNoResultSaysSoWithItsName(string text, string named)
    {
        InputException e = Assert.Throws<InputException>(
            () => ResultJson.Read(new MemoryStream(Encoding.UTF8.GetBytes(text)), "old.json"));

        Assert.Contains("old.json", e.Findings[0].Text, StringComparison.Ordinal);
        Assert.Contains(named, e.Findings[0].Text, StringComparison.Ordinal);
    }

    [Fact]
    public void AnotherFormatIsRefusedByItsName()
    {
        string text = JsonText.Of(ResultJson.ToFile(SampleResult.Make())).Replace("polefield-result/1", "polefield-result/9", StringComparison.Ordinal);

        InputException e = Assert.Throws<InputException>(() => ResultJson.Read(new MemoryStream(Encoding.UTF8.GetBytes(text))));

        Assert.Contains("polefield-result/9", e.Findings[0].Text, StringComparison.Ordinal);
    }

    internal static string RepositoryRoot()
    {
        string? folder = AppContext.BaseDirectory;
        while (folder is not null && !File.Exists(Path.Combine(folder, "PoleField.sln")))
        {
            folder = Path.GetDirectoryName(folder);
        }

        return folder ?? throw new InvalidOperationException("The tests run outside the repository.");
    }

    private static JsonDocument Write() => JsonDocument.Parse(Bytes(ResultJson.ToFile(SampleResult.Make())));

    private static byte[] Bytes(ResultFile file)
    {
        using MemoryStream stream = new();
        JsonText.Write(file, stream);
        return stream.ToArray();
    }
}
