using System.Collections.Frozen;

namespace PoleField.Materials;

/// <summary>The built-in materials by name. Each table is read when its material is first asked for.</summary>
public static class MaterialLibrary
{
    private const string ResourceFolder = "PoleField.Materials.Library.";
    private const string ResourceEnding = ".csv";
    private const string MagnetSource =
        "Modelica Standard Library (Modelica.Magnetic.FluxTubes.Material.HardMagnetic), exemplary values, BSD-3-Clause, (c) 1998-2025 Modelica Association and contributors; recoil permeability computed from Br and HcB";

    private static readonly FrozenDictionary<string, Lazy<Material>> Known = Build();

    /// <summary>Names of the materials, in alphabetical order.</summary>
    public static IReadOnlyList<string> Names { get; } = [.. Known.Keys.Order(StringComparer.Ordinal)];

    /// <summary>Permanent magnets: remanence, recoil permeability and temperature coefficient.</summary>
    public static IReadOnlyList<MagnetGrade> Magnets { get; } =
    [
        new("ndfeb-sintered", 1.20, 1.0610, -0.001, "Neodymium-iron-boron, sintered", MagnetSource),
        new("sm2co17-sintered", 1.02, 1.0823, -0.0003, "Samarium-cobalt 2:17, sintered", MagnetSource),
        new("smco5-sintered", 0.95, 1.0500, -0.0004, "Samarium-cobalt 1:5, sintered", MagnetSource),
    ];

    /// <summary>The material of that name, or null.</summary>
    public static Material? Find(string name) => Known.TryGetValue(name, out Lazy<Material>? material) ? material.Value : null;

    /// <summary>The material of that name.</summary>
    /// <exception cref="InputException">There is none; names the nearest one.</exception>
    public static Material Get(string name) => Find(name) ?? throw Unknown("material", name, Names);

    /// <summary>The magnet of that name.</summary>
    /// <exception cref="InputException">There is none; names the nearest one.</exception>
    public static MagnetGrade GetMagnet(string name) =>
        Magnets.FirstOrDefault(m => m.Name == name) ?? throw Unknown("magnet", name, [.. Magnets.Select(m => m.Name)]);

    /// <summary>The built-in material's name nearest to a misspelt one, by edit distance without regard to case; null when none is near.</summary>
    public static string? NearestName(string name) => Nearest(name, Names);

    private static InputException Unknown(string kind, string name, IReadOnlyList<string> names)
    {
        string fix = Nearest(name, names) is { } near ? $"Did you mean '{near}'?" : $"Known are: {string.Join(", ", names)}.";
        return new InputException([new Finding(Severity.Fault, "unknown-" + kind, $"There is no built-in {kind} '{name}'.", fix)]);
    }

    private static string? Nearest(string name, IReadOnlyList<string> names)
    {
        string wanted = name.ToUpperInvariant();
        (string Name, int Distance) best = names
            .Select(n => (Name: n, Distance: EditDistance(wanted, n.ToUpperInvariant())))
            .MinBy(n => n.Distance);

        // A third of the letters wrong is a misspelling; more is another word.
        return 3 * best.Distance <= best.Name.Length ? best.Name : null;
    }

    // V. I. Levenshtein (1966): least number of insertions, deletions and exchanges of letters.
    private static int EditDistance(string a, string b)
    {
        int[] row = [.. Enumerable.Range(0, b.Length + 1)];
        for (int i = 1; i <= a.Length; i++)
        {
            int diagonal = row[0];
            row[0] = i;
            for (int j = 1; j <= b.Length; j++)
            {
                int exchanged = diagonal + (a[i - 1] == b[j - 1] ? 0 : 1);
                diagonal = row[j];
                row[j] = Math.Min(exchanged, 1 + Math.Min(row[j], row[j - 1]));
            }
        }

        return row[b.Length];
    }

    private static FrozenDictionary<string, Lazy<Material>> Build()
    {
        Dictionary<string, Lazy<Material>> all = new(StringComparer.Ordinal);
        foreach (Material simple in NonMagnetic())
        {
            all.Add(simple.Name, new Lazy<Material>(simple));
        }

        foreach (string resource in typeof(MaterialLibrary).Assembly.GetManifestResourceNames())
        {
            if (resource.StartsWith(ResourceFolder, StringComparison.Ordinal) && resource.EndsWith(ResourceEnding, StringComparison.Ordinal))
            {
                string file = resource[ResourceFolder.Length..];
                all.Add(file[..^ResourceEnding.Length], new Lazy<Material>(() => ReadResource(resource, file)));
            }
        }

        return all.ToFrozenDictionary(StringComparer.Ordinal);
    }

    private static Material ReadResource(string resource, string file)
    {
        using Stream stream = typeof(MaterialLibrary).Assembly.GetManifestResourceStream(resource)
            ?? throw new InvalidOperationException($"The built-in table {resource} is missing.");
        return MaterialFile.Read(stream, file);
    }

    private static IEnumerable<Material> NonMagnetic()
    {
        yield return Material.Air;
        yield return new Material("copper", LinearLaw.Vacuum, "Copper", "handbook value 0.999994, taken as 1", "rounded to 1");
        yield return new Material("aluminium", LinearLaw.Vacuum, "Aluminium", "handbook value 1.000022, taken as 1", "rounded to 1");
        yield return new Material("brass", LinearLaw.Vacuum, "Brass or bronze", "handbook order of magnitude, recalled from memory", "rounded to 1")
        {
            Caution = "traces of iron can raise the relative permeability to about 1.01",
        };
        yield return new Material(
            "stainless-316l", new LinearLaw(1.01), "Austenitic stainless steel 316L, annealed", "handbook range 1.003 to 1.02, recalled from memory", "middle of a range")
        {
            Caution = "welds and cold work raise the permeability; measure the part if it stands near the beam",
        };
    }
}
