namespace PoleField.Cli.Tests.Doubles;

/// <summary>Compares text with a reviewed file. Set POLEFIELD_UPDATE_GOLDEN=1 to write the files anew, then review the change.</summary>
internal static class Golden
{
    /// <summary>A file in Golden/.</summary>
    public static void Check(string name, string actual) => CheckFile(Path.Combine("tests", "PoleField.Cli.Tests", "Golden", name), actual);

    /// <summary>A file of the repository.</summary>
    public static void CheckFile(string path, string actual)
    {
        string file = Repository.File(path);
        if (Environment.GetEnvironmentVariable("POLEFIELD_UPDATE_GOLDEN") == "1")
        {
            File.WriteAllText(file, actual);
        }

        Assert.Equal(File.ReadAllText(file), actual);
    }
}
