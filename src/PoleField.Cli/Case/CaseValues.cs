namespace PoleField.Cli.Case;

/// <summary>The single values of a case, numbers and texts, each under the keys that lead to it ("[0]" for the first of a list).</summary>
internal static class CaseValues
{
    /// <summary>All values in the order of the file.</summary>
    public static IEnumerable<(IReadOnlyList<string> Keys, TomlNode Node)> Of(TomlNode node, params IReadOnlyList<string> keys) => node switch
    {
        TomlTable table => table.Entries.SelectMany(e => Of(e.Value, [.. keys, e.Key])),
        TomlList list => list.Items.SelectMany((item, i) => Of(item, [.. keys, Index(i)])),
        TomlText or TomlNumber => [(keys, node)],
        _ => [],
    };

    /// <summary>The same table with other values.</summary>
    public static TomlTable Changed(TomlTable table, IReadOnlyList<CaseChange> changes) => (TomlTable)Changed(table, changes, []);

    private static TomlNode Changed(TomlNode node, IReadOnlyList<CaseChange> changes, IReadOnlyList<string> keys)
    {
        switch (node)
        {
            case TomlTable table:
                var made = new TomlTable(table.At);
                foreach (TomlEntry entry in table.Entries)
                {
                    made.Add(entry with { Value = Changed(entry.Value, changes, [.. keys, entry.Key]) });
                }

                return made;
            case TomlList list:
                return new TomlList(list.At, [.. list.Items.Select((item, i) => Changed(item, changes, [.. keys, Index(i)]))]);
            case TomlText or TomlNumber:
                return changes.Where(c => c.Path.Matches(keys)).Aggregate(node, (old, change) => change.Of(old));
            default:
                return node;
        }
    }

    private static string Index(int i) => FormattableString.Invariant($"[{i}]");
}
