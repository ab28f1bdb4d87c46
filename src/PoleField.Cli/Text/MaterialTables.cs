using PoleField.Materials;

namespace PoleField.Cli.Text;

/// <summary>Prints magnetisation curves.</summary>
internal static class MaterialTables
{
    private const int Width = 80;

    // Flux densities that a curve is tabulated at, T: the usable range of pole iron and the knee above it.
    private static readonly double[] FluxDensities =
        [0.01, 0.05, 0.1, 0.2, 0.4, 0.6, 0.8, 1.0, 1.2, 1.3, 1.4, 1.5, 1.6, 1.7, 1.8, 1.9, 2.0, 2.1, 2.2, 2.3, 2.4];

    public static void WriteList(TextWriter writer, IReadOnlyList<Material> materials, Ink ink)
    {
        int width = materials.Max(m => m.Name.Length);
        foreach (Material material in materials)
        {
            foreach (string line in Wrapped.Lines(Describe(material), Width, $"  {material.Name.PadRight(width)}  "))
            {
                writer.WriteLine(line);
            }
        }

        writer.WriteLine();
        writer.WriteLine(ink.Faint("A heat differs from its published curve; where the answer hangs on it,"));
        writer.WriteLine(ink.Faint("measure your own."));
    }

    public static void WriteOne(TextWriter writer, Material material, Ink ink)
    {
        writer.WriteLine(ink.Strong(material.Name));
        foreach ((string name, string text) in new[] { ("is", material.Description), ("source", material.Source), ("state", material.State), ("mind", material.Caution ?? string.Empty) })
        {
            if (text.Length == 0)
            {
                continue;
            }

            foreach (string line in Wrapped.Lines(text, Width, $"  {name,-7} "))
            {
                writer.WriteLine(line);
            }
        }

        writer.WriteLine($"  {"Js",-7} {SaturationWords(material)}");
        writer.WriteLine();
        var table = new TextTable(">B, T", ">H, A/m", ">mu_r", ">J, T");
        foreach ((double b, double h, double mu, double j) in Rows(material))
        {
            table.Add(Numbers.Fixed(b, 2), Numbers.Significant(h, 4), Numbers.Significant(mu, 4), Numbers.Significant(Math.Max(0, j), 4));
        }

        BeamTables.WriteTable(writer, table, ink);
        if (material.Findings.Count > 0)
        {
            writer.WriteLine(ink.Strong("Found in the table"));
            FindingText.Write(writer, CheckTables.Sorted(material.Findings), ink);
            writer.WriteLine();
        }
    }

    /// <summary>Points of the curve for people: B, H, relative permeability, polarisation.</summary>
    public static IEnumerable<(double B, double H, double Mu, double J)> Rows(Material material) =>
        FluxDensities.Select(b =>
        {
            double h = material.Law.At(b).FieldStrength;
            return (b, h, b / (PhysicalConstants.Mu0 * h), b - (PhysicalConstants.Mu0 * h));
        });

    private static string Describe(Material material) => double.IsFinite(material.Law.SaturationPolarisation)
        ? $"{material.Description}; Js {Numbers.Significant(material.Law.SaturationPolarisation, 4)} T ({material.State})"
        : $"{material.Description} ({material.State})";

    private static string SaturationWords(Material material) => double.IsFinite(material.Law.SaturationPolarisation)
        ? $"{Numbers.Significant(material.Law.SaturationPolarisation, 4)} T, saturation polarisation"
        : "none: linear";
}
