namespace PoleField.Cli.Case;

/// <summary>A place in a text file, both from 1.</summary>
internal readonly record struct Spot(int Line, int Column);

/// <summary>A value of the case file together with where it stands.</summary>
internal abstract record TomlNode(Spot At)
{
    /// <summary>What it is, for messages: "a string", "a number", ...</summary>
    public abstract string Kind { get; }
}

internal sealed record TomlText(Spot At, string Value) : TomlNode(At)
{
    public override string Kind => "the string \"" + Value + "\"";
}

internal sealed record TomlNumber(Spot At, double Value, bool IsInteger) : TomlNode(At)
{
    public override string Kind => FormattableString.Invariant($"the number {Value}");
}

internal sealed record TomlFlag(Spot At, bool Value) : TomlNode(At)
{
    public override string Kind => Value ? "true" : "false";
}

internal sealed record TomlDate(Spot At) : TomlNode(At)
{
    public override string Kind => "a date";
}

internal sealed record TomlList(Spot At, IReadOnlyList<TomlNode> Items) : TomlNode(At)
{
    public override string Kind => FormattableString.Invariant($"a list of {Items.Count}");
}

/// <summary>A table, inline or under a header, its keys in file order.</summary>
internal sealed record TomlTable(Spot At) : TomlNode(At)
{
    private readonly List<TomlEntry> _entries = [];

    public override string Kind => "a table";

    public IReadOnlyList<TomlEntry> Entries => _entries;

    public TomlEntry? Find(string key) => _entries.Find(e => e.Key == key);

    internal void Add(TomlEntry entry) => _entries.Add(entry);
}

/// <summary>A key of a table with its value.</summary>
internal sealed record TomlEntry(string Key, Spot At, TomlNode Value);
