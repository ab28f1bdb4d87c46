namespace PoleField.Cli.Tests.Doubles;

/// <summary>Files of the repository the tests were built in.</summary>
internal static class Repository
{
    /// <summary>Folder that holds the solution.</summary>
    public static string Root { get; } = Find();

    public static string File(string path) => Path.Combine(Root, path);

    // Upwards from the test's own binaries: paths compiled in are masked in reproducible builds.
    private static string Find()
    {
        string? folder = AppContext.BaseDirectory;
        while (folder is not null && !System.IO.File.Exists(Path.Combine(folder, "PoleField.sln")))
        {
            folder = Path.GetDirectoryName(folder);
        }

        return folder ?? throw new InvalidOperationException("No solution above the tests.");
    }
}
