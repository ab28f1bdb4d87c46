namespace PoleField.Cli.Case;

/// <summary>Reads bounds on results: <c>gradient_min = "300 T/m"</c> and <c>gradient = ">= 300 T/m"</c>.</summary>
internal static class LimitReader
{
    /// <summary>Every name <c>[require]</c> knows.</summary>
    public static IReadOnlyList<string> RequireNames { get; } =
        [.. BeamQuantity.All.SelectMany(q => new[] { q.Name + "_min", q.Name + "_max" })];

    public static IReadOnlyList<Limit> ReadRequire(TableReader root)
    {
        if (root.Table("require") is not { } table)
        {
            return [];
        }

        var limits = new List<Limit>();
        foreach (TomlEntry entry in table.Entries())
        {
            BeamQuantity? quantity = BeamQuantity.All.FirstOrDefault(q => entry.Key == q.Name + "_min" || entry.Key == q.Name + "_max");
            if (quantity is null)
            {
                table.Faults.Add(entry.At, "unknown-key", $"Unknown key \"{entry.Key}\" in [require].", Advice(entry.Key));
                continue;
            }

            bool atLeast = entry.Key.EndsWith("_min", StringComparison.Ordinal);
            double bound = table.QuantityOf(entry.Value, table.Where(entry.Key), quantity.Dimension, Allowed.NotNegative);
            limits.Add(new Limit(quantity, atLeast, bound));
        }

        return limits;
    }

    private static string Advice(string key)
    {
        bool bare = BeamQuantity.All.Any(q => q.Name == key);
        string? near = bare ? key + "_min\" or \"" + key + "_max" : NearestName.Of(key, RequireNames);
        string question = near is not null ? $"Did you mean \"{near}\"? " : string.Empty;
        return $"{question}Known here: {string.Join(", ", BeamQuantity.All.Select(q => q.Name))}; each with _min or _max.";
    }

    /// <summary>Reads a table of comparisons, such as <c>{ gradient = ">= 300 T/m" }</c>.</summary>
    public static IReadOnlyList<Limit> ReadComparisons(TableReader table)
    {
        var limits = new List<Limit>();
        foreach (TomlEntry entry in table.Entries())
        {
            BeamQuantity? quantity = BeamQuantity.All.FirstOrDefault(q => q.Name == entry.Key);
            if (quantity is null)
            {
                table.Faults.Add(
                    entry.At, "unknown-key", $"Unknown key {table.Where(entry.Key)}.", NearestName.Advice(entry.Key, [.. BeamQuantity.All.Select(q => q.Name)]));
                continue;
            }

            string text = entry.Value is TomlText t ? t.Value.Trim() : string.Empty;
            string comparison = text.Length > 2 ? text[..2] : string.Empty;
            if (comparison is not (">=" or "<="))
            {
                table.WrongType(entry.Value, table.Where(entry.Key), "a comparison", $"\">= {quantity.Dimension.Example}\" or \"<= {quantity.Dimension.Example}\"");
                continue;
            }

            var bound = new TomlText(entry.Value.At, text[2..].Trim());
            limits.Add(new Limit(
                quantity, comparison == ">=", table.QuantityOf(bound, table.Where(entry.Key), quantity.Dimension, Allowed.NotNegative)));
        }

        return limits;
    }
}
