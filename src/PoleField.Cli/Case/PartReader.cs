namespace PoleField.Cli.Case;

/// <summary>Reads <c>[parts]</c>: one table per layer.</summary>
internal static class PartReader
{
    // Sintered rare-earth magnets: 1.03 to 1.1 (common practice).
    private const double DefaultRecoilPermeability = 1.05;

    private static readonly string[] Substances = ["material", "relative_permeability", "remanence"];
    private static readonly string[] OfMagnets = ["recoil_permeability", "direction"];

    public static IReadOnlyList<PartSection> ReadAll(TableReader root, CaseSurroundings around)
    {
        var parts = new List<PartSection>();
        if (root.Table("parts") is not { } all)
        {
            CaseReader.MissingTable(root, "parts", "one table per layer, such as [parts.YOKE]");
            return parts;
        }

        foreach (TomlEntry entry in all.Entries())
        {
            if (parts.Find(p => p.Layer.Equals(entry.Key, StringComparison.OrdinalIgnoreCase)) is { } same)
            {
                all.Faults.Add(
                    entry.At, "same-layer", $"The layer \"{entry.Key}\" is listed already as \"{same.Layer}\".", "Keep one: drawings do not tell layers apart by capitals.");
            }

            if (entry.Value is TomlTable table)
            {
                parts.Add(ReadPart(all.Inside(table, Quoted(entry.Key)), entry, around));
            }
            else
            {
                all.WrongType(entry.Value, $"{entry.Key} in [parts]", "a table", $"[parts.{Quoted(entry.Key)}]");
            }
        }

        if (all.Entries().Count == 0)
        {
            root.Faults.Add(all.At, "missing-key", "[parts] is empty.", "Add one table per layer, such as [parts.YOKE].");
        }

        return parts;
    }

    private static PartSection ReadPart(TableReader table, TomlEntry entry, CaseSurroundings around)
    {
        double? ampereTurns = table.Quantity("ampere_turns", Dimension.AmpereTurns, Allowed.Any);
        double? fill = table.Quantity("fill", Dimension.Ratio, new Allowed(0, 1, MinItself: false));
        Substance substance = ReadSubstance(table, ampereTurns, around);
        if (fill is not null && ampereTurns is null)
        {
            table.Faults.Add(
                table.SpotOf("fill"), "contradiction", $"[parts.{Quoted(entry.Key)}] has a fill and no ampere_turns.", "Add ampere_turns, or leave fill out.");
        }

        table.Close();
        return new PartSection(entry.Key, substance, ampereTurns, fill, entry.At);
    }

    private static Substance ReadSubstance(TableReader table, double? ampereTurns, CaseSurroundings around)
    {
        string[] stated = [.. Substances.Where(table.Has)];
        if (stated.Length > 1)
        {
            table.Faults.Add(
                table.SpotOf(stated[1]),
                "contradiction",
                $"{table.Where(stated[1])} stands beside {stated[0]}.",
                "A part has one of material, relative_permeability and remanence.");
        }

        Substance substance = ReadMagnet(table) ?? ReadLinear(table) ?? ReadMaterial(table, around) ?? Unstated(table.At, ampereTurns);
        bool maySurround = ampereTurns is null
            || (substance is NamedSubstance named && (!around.MaterialNames.Contains(named.Name) || !around.IsMagnetic(named.Name)));
        if (stated.Length == 0 && ampereTurns is null)
        {
            table.Faults.Add(
                table.At,
                "missing-key",
                $"{table.Where("material")} is missing: nothing says what this part is.",
                "Add material = \"...\", relative_permeability, remanence or ampere_turns; material = \"air\" for a hole.");
        }

        if (stated.Length == 1 && !maySurround)
        {
            table.Faults.Add(
                table.SpotOf("ampere_turns"), "contradiction", $"{table.Where("ampere_turns")} stands beside {stated[0]}.", "A part is a coil or magnetic, not both.");
        }

        return substance;
    }

    // A coil is copper unless the case says otherwise.
    private static NamedSubstance Unstated(Spot at, double? ampereTurns) => ampereTurns is null ? Air(at) : new(NamedSubstance.Copper, at);

    private static NamedSubstance Air(Spot at) => new("air", at);

    private static Substance? ReadMaterial(TableReader table, CaseSurroundings around)
    {
        switch (table.Find("material"))
        {
            case null:
                return null;
            case TomlText name:
                if (!around.MaterialNames.Contains(name.Value))
                {
                    table.Faults.Add(
                        name.At, "unknown-material", $"There is no built-in material \"{name.Value}\".", NearestName.Advice(name.Value, around.MaterialNames));
                }

                return new NamedSubstance(name.Value, name.At);
            case TomlTable inline:
                return ReadCurveFile(table.Inside(inline, "material"), around);
            case var other:
                table.WrongType(other, table.Where("material"), "a name or a file", "material = \"pure-iron\" or material = { file = \"my-steel.csv\" }");
                return Air(other.At);
        }
    }

    private static CurveFileSubstance ReadCurveFile(TableReader table, CaseSurroundings around)
    {
        string file = table.RequiredText("file", "my-steel.csv");
        if (file != "?" && !around.FileExists(file))
        {
            table.Faults.Add(
                table.SpotOf("file"), "missing-file", $"The magnetisation curve \"{file}\" is not there.", "Paths count from the folder of the case file.");
        }

        table.Close();
        return new CurveFileSubstance(file, table.SpotOf("file"));
    }

    private static LinearSubstance? ReadLinear(TableReader table) =>
        table.Number("relative_permeability", new Allowed(1, 1e9)) is { } value ? new LinearSubstance(value) : null;

    private static MagnetSubstance? ReadMagnet(TableReader table)
    {
        double? remanence = table.Quantity("remanence", Dimension.Field, Allowed.Positive);
        double? recoil = table.Number("recoil_permeability", new Allowed(1, 100));
        double? direction = table.Quantity("direction", Dimension.Direction, Allowed.Any);
        if (remanence is null)
        {
            foreach (string key in OfMagnets.Where(table.Has))
            {
                table.Faults.Add(
                    table.SpotOf(key), "contradiction", $"{table.Where(key)} stands without a remanence.", "Add remanence = \"1.20 T\", or leave it out.");
            }

            return null;
        }

        if (direction is null)
        {
            table.Missing("direction", "90 (degrees from +y towards +z)");
        }

        return new MagnetSubstance(remanence.Value, recoil ?? DefaultRecoilPermeability, direction ?? 0);
    }

    private static string Quoted(string layer) =>
        layer.All(c => char.IsAsciiLetterOrDigit(c) || c is '_' or '-') ? layer : $"\"{layer}\"";
}
