using PoleField.Beam;

namespace PoleField.Cli.Case;

/// <summary>Reads <c>[flight]</c>.</summary>
internal static class FlightReader
{
    public static FlightSection? Read(TableReader root)
    {
        if (root.Table("flight") is not { } table)
        {
            return null;
        }

        FlightSpecies species = ReadSpecies(table);
        FlightSource source = ReadSource(table);
        double drift = table.RequiredQuantity("drift", Dimension.Length, Allowed.NotNegative);
        TableReader? slit = table.Table("slit");
        var section = new FlightSection(
            species,
            source,
            drift,
            slit?.RequiredQuantity("width", Dimension.Length, Allowed.Positive),
            slit?.RequiredQuantity("height", Dimension.Length, Allowed.Positive));
        slit?.Close();
        table.Close();
        return section;
    }

    private static FlightSpecies ReadSpecies(TableReader table)
    {
        string? name = table.Text("species");
        double? mass = table.Quantity("mass", Dimension.Mass, Allowed.Positive);
        double? moment = table.Quantity("moment", Dimension.Moment, Allowed.Positive);
        double? relaxedAt = table.Quantity("relaxed_at", Dimension.Temperature, Allowed.Positive);
        if (name is null && mass is null && moment is null)
        {
            table.Missing("species", "\"K-39\", or mass and moment");
        }
        else if (name is null && (mass is null || moment is null))
        {
            table.Missing(mass is null ? "mass" : "moment", mass is null ? "\"39 u\"" : "\"1 muB\"");
        }
        else if (name is not null && (mass is not null || moment is not null || relaxedAt is not null))
        {
            table.Faults.Add(
                table.SpotOf("species"),
                "contradiction",
                "[flight] has a species and a mass, moment or relaxed_at.",
                "Keep species, or keep mass and moment, with relaxed_at if they relax.");
        }
        else if (name is not null && Atom.Find(name) is null)
        {
            string[] known = [.. Atom.All.Select(a => a.Name)];
            table.Faults.Add(
                table.SpotOf("species"),
                "unknown-species",
                $"There is no built-in species \"{name}\".",
                $"Known are {string.Join(", ", known)}; or give mass and moment.");
        }

        return new FlightSpecies(name, mass, moment, relaxedAt);
    }

    private static FlightSource ReadSource(TableReader table)
    {
        if (table.Table("source") is not { } source)
        {
            if (!table.Has("source"))
            {
                table.Missing("source", "{ temperature = \"478 K\" }");
            }

            return new FlightSource(null, null, null);
        }

        double? temperature = source.Quantity("temperature", Dimension.Temperature, Allowed.Positive);
        double? speed = source.Quantity("speed", Dimension.Speed, Allowed.Positive);
        double? width = source.Quantity("width", Dimension.Ratio, new Allowed(0, 0.5));
        if (temperature is null == speed is null)
        {
            table.Faults.Add(
                source.At,
                temperature is null ? "missing-key" : "contradiction",
                "[flight.source] needs a temperature or a speed, one of them.",
                "Write { temperature = \"478 K\" } for an effusive source, or { speed = \"900 m/s\", width = \"5 %\" }.");
        }

        source.Close();
        return new FlightSource(temperature, speed, width);
    }
}
