using PoleField.Geometry;

namespace PoleField.Cli.Case;

/// <summary>Reads <c>[tune]</c>.</summary>
internal static class TuneReader
{
    private const string GradientSpread = "gradient-spread";
    private const string ProductSpread = "field-times-gradient-spread";
    private const int DefaultFreedoms = 12;
    private const int MostFreedoms = 60;

    public static TuneSection? Read(TableReader root, List<string> layers)
    {
        if (root.Table("tune") is not { } table)
        {
            return null;
        }

        IReadOnlyList<TomlNode>? faces = table.List("faces", "[\"RIDGE\", \"GROOVE\"]");
        if (faces is null)
        {
            table.Missing("faces", "[\"RIDGE\", \"GROOVE\"]");
        }

        TableReader? hold = table.Table("hold");
        var section = new TuneSection(
            [.. (faces ?? []).Select(f => ReadFace(table, f, layers))],
            table.Quantity("reach", Dimension.Length, Allowed.Positive),
            table.WholeNumber("freedoms", 1, MostFreedoms) ?? DefaultFreedoms,
            table.Quantity("smallest_radius", Dimension.Length, Allowed.NotNegative),
            table.Choice("goal", GradientSpread, ProductSpread) == ProductSpread
                ? TuneGoal.FieldTimesGradientSpread
                : TuneGoal.GradientSpread,
            hold is null ? [] : LimitReader.ReadComparisons(hold));
        table.Close();
        return section;
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
