using PoleField.Cli.Sketching;
using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Cli.Case;

/// <summary>Reads <c>[tune]</c>.</summary>
internal static class TuneReader
{
    private const string GradientSpread = "gradient-spread";
    private const string ProductSpread = "field-times-gradient-spread";
    private const string Dimensions = "dimensions";
    private const string FacesExample = "[\"RIDGE\", \"GROOVE\"]";
    private const string DimensionsExample = "{ ridge-radius = [\"2.8 mm\", \"3.4 mm\"] }";
    private const int DefaultFreedoms = 12;
    private const int MostFreedoms = 60;

    // They are the beam's, not the poles', or no dimension of the drawing.
    private static readonly string[] NotTuned = ["beam-place", "beam-width", "beam-height", "face-tolerance", "frame-scale"];

    public static TuneSection? Read(TableReader root, List<string> layers)
    {
        if (root.Table("tune") is not { } table)
        {
            return null;
        }

        bool byDimensions = table.Has(Dimensions) || table.Has("family");
        IReadOnlyList<TomlNode>? faces = byDimensions && !table.Has("faces") ? [] : table.List("faces", FacesExample);
        if (faces is null)
        {
            table.Missing("faces", FacesExample);
        }
        else if (byDimensions && faces.Count > 0)
        {
            table.Faults.Add(table.SpotOf("faces"), "faces-and-dimensions", "[tune] names faces and dimensions.", "Tune one of them at a time: take out the other.");
        }

        TableReader? hold = table.Table("hold");
        var section = new TuneSection
        {
            Faces = [.. (faces ?? []).Select(f => ReadFace(table, f, layers))],
            Family = byDimensions ? ReadFamily(table) : null,
            Reach = table.Quantity("reach", Dimension.Length, Allowed.Positive),
            Freedoms = table.WholeNumber("freedoms", 1, MostFreedoms) ?? DefaultFreedoms,
            SmallestRadius = table.Quantity("smallest_radius", Dimension.Length, Allowed.NotNegative),
            Goal = table.Choice("goal", GradientSpread, ProductSpread) == ProductSpread
                ? TuneGoal.FieldTimesGradientSpread
                : TuneGoal.GradientSpread,
            Hold = hold is null ? [] : LimitReader.ReadComparisons(hold),
        };
        table.Close();
        return section;
    }

    private static TuneFamily? ReadFamily(TableReader table)
    {
        string[] names = [.. FamilyWords.All.Select(f => f.Usual.Name)];
        string? name = table.Choice("family", names);
        TableReader? drawnWith = table.Table("drawn_with");
        TableReader? dimensions = table.Table(Dimensions);
        if (name is null || dimensions is null)
        {
            table.Missing(name is null ? "family" : Dimensions, name is null ? $"\"{names[0]}\"" : DimensionsExample);
            return null;
        }

        FamilyWords words = FamilyWords.All.First(f => f.Usual.Name == name);
        var given = new Dictionary<FamilyOption, double>();
        foreach (TomlEntry entry in drawnWith?.Entries() ?? [])
        {
            if (OptionOf(words, drawnWith!, entry) is { } option)
            {
                given[option] = option.FromSi(drawnWith!.QuantityOf(entry.Value, drawnWith.Where(entry.Key), option.Kind, Allowed.Any));
            }
        }

        PoleFamily family = words.With(given);
        var each = new List<(FamilyOption, double, double)>();
        foreach (TomlEntry entry in dimensions.Entries())
        {
            if (OptionOf(words, dimensions, entry) is not { } option)
            {
                continue;
            }

            if (NotTuned.Contains(entry.Key))
            {
                dimensions.Faults.Add(entry.At, "not-tuned", $"{dimensions.Where(entry.Key)} is no dimension of the poles.", "Leave it out.");
            }
            else if (dimensions.Pair(entry.Key, option.Kind) is { } range)
            {
                (double low, double high, double now) = (option.FromSi(range.Y), option.FromSi(range.Z), option.Get(family));
                each.Add((option, low, high));
                if (double.IsFinite(low + high) && !(low < high && low <= now && now <= high))
                {
                    dimensions.Faults.Add(
                        entry.At,
                        "out-of-range",
                        FormattableString.Invariant($"{dimensions.Where(entry.Key)} runs from {low:g6} to {high:g6}; the drawing has {now:g6}."),
                        "Write the smallest value, then the largest, with the drawing's own between them (drawn_with says what the drawing has).");
                }
            }
        }

        return new TuneFamily(family, each, dimensions.At);
    }

    private static FamilyOption? OptionOf(FamilyWords words, TableReader table, TomlEntry entry)
    {
        FamilyOption? option = words.Options.FirstOrDefault(o => o.Key == entry.Key);
        if (option is null)
        {
            table.Faults.Add(
                entry.At, "unknown-key", $"Unknown key {table.Where(entry.Key)}.", NearestName.Advice(entry.Key, [.. words.Options.Select(o => o.Key)]));
        }

        return option;
    }

    private static TuneFace ReadFace(TableReader table, TomlNode node, List<string> layers)
    {
        switch (node)
        {
            case TomlText text:
                CheckLayer(table, text.Value, text.At, layers);
                return new TuneFace(text.Value, null, null);
            case TomlTable inline:
                TableReader face = table.Inside(inline, "faces");
                string layer = face.RequiredText("layer", "RIDGE");
                Point? from = face.Pair("from", Dimension.Length);
                Point? to = face.Pair("to", Dimension.Length);
                if (from is null != to is null)
                {
                    face.Missing(from is null ? "from" : "to", "[\"0 mm\", \"0 mm\"]");
                }

                CheckLayer(table, layer, face.SpotOf("layer"), layers);
                face.Close();
                return new TuneFace(layer, from, to);
            default:
                table.WrongType(node, table.Where("faces"), "a layer", "\"RIDGE\" or { layer = \"RIDGE\", from = [...], to = [...] }");
                return new TuneFace("?", null, null);
        }
    }

    private static void CheckLayer(TableReader table, string layer, Spot at, List<string> layers)
    {
        if (layer != "?" && !layers.Contains(layer, StringComparer.OrdinalIgnoreCase))
        {
            table.Faults.Add(at, "unknown-layer", $"{table.Where("faces")} names \"{layer}\", which is no part.", NearestName.Advice(layer, layers));
        }
    }
}
