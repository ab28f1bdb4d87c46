namespace PoleField.Cli.Case;

/// <summary>Collects what is wrong with a case file, so that all of it is told at once.</summary>
internal sealed class Faults(string file)
{
    private readonly List<Finding> _found = [];

    public int Count => _found.Count;

    /// <summary>True where lines of the file could not be read.</summary>
    public bool HasBrokenSyntax => _found.Exists(f => f.What == "toml-syntax");

    /// <summary>All that was found, in the order of the file.</summary>
    public IReadOnlyList<Finding> Sorted => [.. _found.OrderBy(f => f.Line).ThenBy(f => f.Column)];

    public void Add(Spot at, string what, string text, string fix) =>
        _found.Add(new Finding(Severity.Fault, what, text, fix) { File = file, Line = at.Line, Column = at.Column });

    public void Add(Spot at, Mistake mistake) => Add(at, mistake.What, mistake.Text, mistake.Fix);

    /// <summary>
    /// Drops what follows from broken syntax: where lines were lost, a key or layer that seems missing proves nothing.
    /// </summary>
    public void DropConsequencesOfBrokenSyntax()
    {
        if (HasBrokenSyntax)
        {
            _found.RemoveAll(f => f.What is "missing-key" or "unknown-layer");
        }
    }
}

/// <summary>What is wrong with one value: fixed name of the kind, what was found and is allowed, what to do.</summary>
internal sealed record Mistake(string What, string Text, string Fix);
