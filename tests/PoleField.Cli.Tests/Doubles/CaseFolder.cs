namespace PoleField.Cli.Tests.Doubles;

/// <summary>A folder of its own with a case and an (empty) sketch, gone at the end of the test.</summary>
internal sealed class CaseFolder : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("polefield-");

    public CaseFolder(string? caseText = null)
    {
        File.WriteAllText(CasePath, caseText ?? Cases.Small);
        File.WriteAllText(this["poles.dxf"], "drawing");
    }

    public string CasePath => this["magnet.toml"];

    public string this[string name] => Path.Combine(_folder.FullName, name);

    /// <summary>Names of all files below the folder, sorted.</summary>
    public IReadOnlyList<string> Names =>
        [.. _folder.GetFiles("*", SearchOption.AllDirectories).Select(f => Path.GetRelativePath(_folder.FullName, f.FullName)).Order(StringComparer.Ordinal)];

    // Every JSON file a test leaves behind keeps its published schema.
    public void Dispose()
    {
        string[] faults = [.. _folder.GetFiles("*.json", SearchOption.AllDirectories).Select(f => Schemas.Faults(File.ReadAllText(f.FullName)))];
        _folder.Delete(recursive: true);
        Assert.All(faults, f => Assert.Equal(string.Empty, f));
    }
}
