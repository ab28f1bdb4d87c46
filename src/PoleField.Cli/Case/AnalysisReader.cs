using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Cli.Case;

/// <summary>Reads the sections of the analyses: the magnet's use, two wires, ramp, map, tolerance.</summary>
internal static class AnalysisReader
{
    /// <summary>[magnet]: length, temperature of the warm coils, levels of stray field.</summary>
    public static OperationSetup ReadOperation(TableReader root)
    {
        const double zeroCelsius = 273.15;
        OperationSetup usual = OperationSetup.Default;
        if (root.Table("magnet") is not { } table)
        {
            return usual;
        }

        double length = table.RequiredQuantity("length", Dimension.Length, Allowed.Positive);
        double? kelvin = table.Quantity("coil_temperature", Dimension.Temperature, new Allowed(zeroCelsius - 50, zeroCelsius + 250));
        double[]? levels = table.List("stray_levels", "[\"0.5 mT\", \"3 mT\"]") is { } items
            ? [.. items.Select(i => table.QuantityOf(i, table.Where("stray_levels"), Dimension.Field, Allowed.Positive)).Order()]
            : null;
        table.Close();
        return new OperationSetup(length, kelvin - zeroCelsius ?? usual.Celsius, levels ?? usual.StrayLevels);
    }

    public static TwoWireSection ReadTwoWire(TableReader root)
    {
        if (root.Table("two_wire") is not { } table)
        {
            return new TwoWireSection(null, null);
        }

        var section = new TwoWireSection(
            table.Quantity("half_spacing", Dimension.Length, Allowed.Positive), table.Pair("midpoint", Dimension.Length));
        table.Close();
        return section;
    }

    public static RampSection ReadRamp(TableReader root)
    {
        if (root.Table("ramp") is not { } table)
        {
            return RampSection.Default;
        }

        IReadOnlyList<TomlNode>? items = table.List("factors", "[0.5, 1.0, 1.5]");
        double onset = table.Quantity("onset", Dimension.Ratio, new Allowed(0, 1, MinItself: false)) ?? RampSection.Default.Onset;
        table.Close();
        return new RampSection(items is null ? RampSection.Default.Factors : ReadFactors(table, items), onset);
    }

    private static List<double> ReadFactors(TableReader table, IReadOnlyList<TomlNode> items)
    {
        var factors = new List<double>();
        foreach (TomlNode item in items)
        {
            double factor = table.QuantityOf(item, table.Where("factors"), Dimension.Ratio, new Allowed(0, 1000, MinItself: false));
            if (factors.Count > 0 && factor <= factors[^1])
            {
                table.Faults.Add(item.At, "out-of-range", $"{table.Where("factors")} does not rise.", "Write the factors from small to large, each once.");
            }

            factors.Add(factor);
        }

        if (factors.Count == 0)
        {
            table.Faults.Add(table.SpotOf("factors"), "out-of-range", $"{table.Where("factors")} is empty.", "Write at least one factor, or leave the key out.");
        }

        return factors;
    }

    public static MapSection ReadMap(TableReader root)
    {
        if (root.Table("map") is not { } table)
        {
            return new MapSection(null, null, null);
        }

        Point? from = table.Pair("from", Dimension.Length);
        Point? to = table.Pair("to", Dimension.Length);
        double? step = table.Quantity("step", Dimension.Length, Allowed.Positive);
        if (from is null != to is null)
        {
            table.Missing(from is null ? "from" : "to", "[\"0 mm\", \"0 mm\"]");
        }
        else if (from is { } a && to is { } b && (a.Y >= b.Y || a.Z >= b.Z))
        {
            root.Faults.Add(table.SpotOf("to"), "out-of-range", "[map] ends before it starts.", "from is the lower left corner, to the upper right one.");
        }

        table.Close();
        return new MapSection(from, to, step);
    }

    public static ToleranceSection? ReadTolerance(TableReader root)
    {
        if (root.Table("tolerance") is not { } table)
        {
            return null;
        }

        TableReader? form = table.Table("form");
        TableReader? place = table.Table("place");
        TableReader? beam = table.Table("beam_place");
        TableReader? allow = table.Table("allow");
        var section = new ToleranceSection
        {
            FormSize = form?.RequiredQuantity("size", Dimension.Length, Allowed.NotNegative),
            FormLength = form?.RequiredQuantity("length", Dimension.Length, Allowed.Positive),
            PlaceY = place?.Quantity("y", Dimension.Length, Allowed.NotNegative),
            PlaceZ = place?.Quantity("z", Dimension.Length, Allowed.NotNegative),
            Turn = place?.Quantity("turn", Dimension.Angle, Allowed.NotNegative),
            AmpereTurns = table.Quantity("ampere_turns", Dimension.Ratio, new Allowed(0, 1)),
            Saturation = table.Quantity("saturation", Dimension.Ratio, new Allowed(0, 1)),
            BeamY = beam?.Quantity("y", Dimension.Length, Allowed.NotNegative),
            BeamZ = beam?.Quantity("z", Dimension.Length, Allowed.NotNegative),
            AllowGradient = allow?.RequiredQuantity("gradient", Dimension.Ratio, new Allowed(0, 1, MinItself: false)),
        };
        form?.Close();
        place?.Close();
        beam?.Close();
        allow?.Close();
        table.Close();
        return section;
    }
}
