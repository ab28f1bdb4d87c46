namespace PoleField.Cli.Tests.Doubles;

/// <summary>A folder with a case of a family, sketched by the tool itself; gone at the end of the test.</summary>
internal sealed class SketchFolder : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("polefield-");

    private SketchFolder(string family) => CasePath = this[family + ".toml"];

    public string CasePath { get; }

    public string this[string name] => Path.Combine(_folder.FullName, name);

    public static async Task<SketchFolder> Of(string family, params string[] dimensions)
    {
        var folder = new SketchFolder(family);
        Run run = await Run.Of(Pipeline.OfLibrary(), ["sketch", family, "-o", folder._folder.FullName, .. dimensions]);
        Assert.Equal(0, run.Status);
        return folder;
    }

    // Every JSON file a test leaves behind keeps its published schema.
    public void Dispose()
    {
        string[] faults = [.. _folder.GetFiles("*.json", SearchOption.AllDirectories).Select(f => Schemas.Faults(File.ReadAllText(f.FullName)))];
        _folder.Delete(recursive: true);
        Assert.All(faults, f => Assert.Equal(string.Empty, f));
    }
}
