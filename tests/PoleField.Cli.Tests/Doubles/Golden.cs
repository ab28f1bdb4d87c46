namespace PoleField.Cli.Tests.Doubles;

/// <summary>Compares text with a reviewed file in Golden/. Set POLEFIELD_UPDATE_GOLDEN=1 to write the files anew, then review the change.</summary>
internal static class Golden
{
    public static void Check(string name, string actual) => CheckFile(Path.Combine("tests", "PoleField.Cli.Tests", "Golden", name), actual);

    /// <summary>Compares with any file of the repository that is made from the program.</summary>
    public static void CheckFile(string file, string actual)
    {
        string path = Repository.File(file);
        if (Environment.GetEnvironmentVariable("POLEFIELD_UPDATE_GOLDEN") == "1")
        {
            File.WriteAllText(path, actual);
        }

        Assert.Equal(File.ReadAllText(path), actual);
    }
}
