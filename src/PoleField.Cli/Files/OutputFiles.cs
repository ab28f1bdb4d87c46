namespace PoleField.Cli.Files;

/// <summary>
/// The files of one run. Targets are checked before the long computation; contents go to temporary files beside them;
/// only when all are complete do they take their names.
/// </summary>
internal sealed class OutputFiles : IDisposable
{
    private readonly List<(string Target, string Temporary)> _written = [];
    private readonly HashSet<string> _replaceable;
    private readonly bool _force;

    private OutputFiles(bool force, IEnumerable<string> replaceable)
    {
        _force = force;
        _replaceable = [.. replaceable.Select(Path.GetFullPath)];
    }

    /// <summary>Checks that every target can be written.</summary>
    /// <param name="targets">Paths of files to come.</param>
    /// <param name="force">Existing files may be replaced.</param>
    /// <param name="replaceable">Targets that may be replaced in any case.</param>
    /// <exception cref="InputException">Some target exists or cannot be written; lists all of them.</exception>
    public static OutputFiles Plan(IEnumerable<string> targets, bool force, params IEnumerable<string> replaceable)
    {
        var files = new OutputFiles(force, replaceable);
        Finding[] faults = [.. targets.Select(files.Check).OfType<Finding>()];
        return faults.Length == 0 ? files : throw new InputException(faults);
    }

    /// <summary>Allows a target that was free at the check to be replaced: the run itself writes it on the way.</summary>
    public void MayReplace(string target) => _replaceable.Add(Path.GetFullPath(target));

    /// <summary>Writes a file's content under a temporary name, down to the disk.</summary>
    /// <exception cref="InputException">It cannot be written: a full disk, a folder that went away.</exception>
    public void Write(string target, Action<Stream> content)
    {
        try
        {
            WritePart(target, content);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            string why = _written.Count == 0 ? e.Message : e.Message.Replace(_written[^1].Temporary, target, StringComparison.Ordinal);
            throw new InputException([Cannot(target, why.TrimEnd('.'))]);
        }
    }

    private void WritePart(string target, Action<Stream> content)
    {
        Directory.CreateDirectory(FolderOf(target));
        string temporary = Path.Combine(FolderOf(target), $".{Path.GetFileName(target)}.{Path.GetRandomFileName()}.part");
        _written.Add((target, temporary));
        using FileStream stream = new(temporary, FileMode.CreateNew, FileAccess.Write);
        content(stream);
        stream.Flush(flushToDisk: true);
    }

    /// <summary>Gives all files their names; on failure takes back those that replaced nothing.</summary>
    public void Commit(CancellationToken cancellation)
    {
        cancellation.ThrowIfCancellationRequested();
        var placed = new List<string>();
        string current = string.Empty;
        try
        {
            foreach ((string target, string temporary) in _written)
            {
                current = target;
                bool existed = File.Exists(target);
                File.Move(temporary, target, _force || _replaceable.Contains(Path.GetFullPath(target)));
                if (!existed)
                {
                    placed.Add(target);
                }
            }
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            placed.ForEach(File.Delete);
            throw new InputException([Cannot(current, e.Message.TrimEnd('.'))]);
        }

        _written.Clear();
    }

    /// <summary>Removes what was not committed.</summary>
    public void Dispose()
    {
        foreach ((_, string temporary) in _written)
        {
            try
            {
                File.Delete(temporary);
            }
            catch (Exception e) when (e is IOException or UnauthorizedAccessException)
            {
                // The folder is gone or locked, and the run has a better reason to end with than this.
            }
        }

        _written.Clear();
    }

    private Finding? Check(string target)
    {
        if (Directory.Exists(target))
        {
            return Cannot(target, "it is a folder");
        }

        if (File.Exists(target) && !_force && !_replaceable.Contains(Path.GetFullPath(target)))
        {
            return new Finding(Severity.Fault, "file-exists", $"{target} exists already.", "Use --force to replace it, or -o to write elsewhere.");
        }

        try
        {
            Probe(FolderOf(target));
            return null;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException or NotSupportedException)
        {
            return Cannot(target, e.Message.TrimEnd('.'));
        }
    }

    // Only writing tells whether a folder can be written; a folder that is still to be made is judged by its parent.
    private static void Probe(string folder)
    {
        while (!Directory.Exists(folder))
        {
            if (File.Exists(folder))
            {
                throw new IOException($"{folder} is a file, not a folder");
            }

            folder = Path.GetDirectoryName(folder) ?? throw new IOException($"{folder} is not there");
        }

        string probe = Path.Combine(folder, $".{Path.GetRandomFileName()}.part");
        try
        {
            using FileStream stream = new(probe, FileMode.CreateNew, FileAccess.Write, FileShare.None, 1, FileOptions.DeleteOnClose);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new IOException($"no file can be made in {folder} ({e.Message.Replace(probe, folder, StringComparison.Ordinal).TrimEnd('.')})");
        }
    }

    private static string FolderOf(string target) => Path.GetDirectoryName(Path.GetFullPath(target))!;

    private static Finding Cannot(string target, string why) =>
        new(Severity.Fault, "cannot-write", $"{target} cannot be written: {why}.", "Write elsewhere with -o, make room, or change the folder's permissions.");
}
