namespace PoleField.Cli.Tests.Doubles;

/// <summary>Compares text with a reviewed file in Golden/. Set POLEFIELD_UPDATE_GOLDEN=1 to write the files anew, then review the change.</summary>
internal static class Golden
{
    public static void Check(string name, string actual)
    {
        string path = Path.Combine(Folder(), name);
        if (Environment.GetEnvironmentVariable("POLEFIELD_UPDATE_GOLDEN") == "1")
        {
            File.WriteAllText(path, actual);
        }

        Assert.Equal(File.ReadAllText(path), actual);
    }

    private static string Folder()
    {
        string? folder = AppContext.BaseDirectory;
        while (folder is not null && !File.Exists(Path.Combine(folder, "PoleField.sln")))
        {
            folder = Path.GetDirectoryName(folder);
        }

        return Path.Combine(folder ?? throw new InvalidOperationException("No solution above the tests."), "tests", "PoleField.Cli.Tests", "Golden");
    }
}
