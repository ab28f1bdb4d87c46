namespace PoleField.Cli.Files;

/// <summary>Where a result goes.</summary>
internal static class ResultName
{
    /// <summary>
    /// The file named by <c>-o</c>. It is a folder when it exists as one, ends with a separator or has no extension;
    /// then the file inside it is called after the case.
    /// </summary>
    /// <param name="casePath">Case file.</param>
    /// <param name="ending">Ending after the case's name, such as ".result.json".</param>
    /// <param name="output">Value of <c>-o</c>; null for the current folder.</param>
    public static string For(string casePath, string ending, string? output)
    {
        string name = Path.GetFileNameWithoutExtension(casePath) + ending;
        if (output is null)
        {
            return name;
        }

        bool folder = Directory.Exists(output) || Path.EndsInDirectorySeparator(output)
            || (!Path.HasExtension(output) && !File.Exists(output));
        return folder ? Path.Combine(output, name) : output;
    }

    /// <summary>
    /// The files of several endings. A name after <c>-o</c> whose extension is that of one of them names all of them;
    /// any other is a folder. Where two endings share an extension, the later file's name keeps its whole ending.
    /// </summary>
    public static IEnumerable<string> ForAll(string casePath, IReadOnlyList<string> endings, string? output)
    {
        if (endings.Count == 1 || output is null)
        {
            return endings.Select(e => For(casePath, e, output));
        }

        bool stem = !Directory.Exists(output) && endings.Any(e => Path.GetExtension(e).Equals(Path.GetExtension(output), StringComparison.OrdinalIgnoreCase));
        return stem
            ? endings.Select((e, i) => endings.Take(i).Any(o => Path.GetExtension(o) == Path.GetExtension(e))
                ? Path.ChangeExtension(output, null) + e
                : Path.ChangeExtension(output, Path.GetExtension(e)))
            : endings.Select(e => For(casePath, e, Path.EndsInDirectorySeparator(output) ? output : output + Path.DirectorySeparatorChar));
    }

    /// <summary>True when the file is a result of the given format, written by PoleField earlier.</summary>
    public static bool IsOwn(string path, string format)
    {
        const int head = 200;
        if (!File.Exists(path))
        {
            return false;
        }

        using var reader = new StreamReader(path);
        char[] start = new char[head];
        int read = reader.ReadBlock(start, 0, head);
        return new string(start, 0, read).Contains($"\"{format}\"", StringComparison.Ordinal);
    }
}
