// Truth: the order of the layers as DEVELOPERS.md states it; a folder may use only folders left of it.
using System.Text.RegularExpressions;
using Xunit;

namespace PoleField.Tests.House;

public partial class LayerTests
{
    private static readonly string[] Layers =
        ["Numerics", "Geometry", "Drawing", "Materials", "Meshing", "Magnetostatics", "Beam", "Design"];

    [Fact]
    public void NoLayerUsesOneToItsRight()
    {
        var offences = new List<string>();
        for (int i = 0; i < Layers.Length; i++)
        {
            string folder = Path.Combine(Root(), "src", "PoleField", Layers[i]);
            string[] files = Directory.GetFiles(folder, "*.cs", SearchOption.AllDirectories);
            Assert.NotEmpty(files);
            foreach (string file in files)
            {
                offences.AddRange(Uses(File.ReadAllText(file))
                    .Where(used => Array.IndexOf(Layers, used) > i)
                    .Select(used => $"{Path.GetFileName(file)} in {Layers[i]} uses {used}"));
            }
        }

        Assert.Empty(offences);
    }

    [Fact]
    public void TheScanSeesAForbiddenUse()
    {
        Assert.Contains("Beam", Uses("using PoleField.Beam;\nnamespace PoleField.Numerics;"));
        Assert.Contains("Design", Uses("var x = PoleField.Design.Tuner.Make();"));
        Assert.Contains("Meshing", Uses("Meshing.Mesh mesh;"));
    }

    // Upwards from the test's own binaries: paths compiled in are masked in reproducible builds.
    internal static string Root()
    {
        for (string? folder = AppContext.BaseDirectory; folder is not null; folder = Path.GetDirectoryName(folder))
        {
            if (File.Exists(Path.Combine(folder, "PoleField.sln")))
            {
                return folder;
            }
        }

        throw new DirectoryNotFoundException("PoleField.sln is not above the tests' binaries.");
    }

    private static IEnumerable<string> Uses(string source)
    {
        // XML references in comments name neighbours without depending on them.
        string code = Comment().Replace(source, string.Empty);
        IEnumerable<string> full = FullName().Matches(code).Select(m => m.Groups[1].Value);
        IEnumerable<string> bare = BareName().Matches(code)
            .Where(m => TypesOf(m.Groups[1].Value).Contains(m.Groups[2].Value))
            .Select(m => m.Groups[1].Value);
        return full.Concat(bare).Distinct();
    }

    // A property may be called Beam: only a layer's own types count after a bare layer name.
    private static HashSet<string> TypesOf(string layer)
    {
        string folder = Path.Combine(Root(), "src", "PoleField", layer);
        return [.. Directory.GetFiles(folder, "*.cs", SearchOption.AllDirectories).Select(f => Path.GetFileNameWithoutExtension(f))];
    }

    [GeneratedRegex(@"//.*")]
    private static partial Regex Comment();

    [GeneratedRegex(@"PoleField\.(Numerics|Geometry|Drawing|Materials|Meshing|Magnetostatics|Beam|Design)[.;]")]
    private static partial Regex FullName();

    [GeneratedRegex(@"(?<![\w.])(Numerics|Geometry|Drawing|Materials|Meshing|Magnetostatics|Beam|Design)\.(\w+)")]
    private static partial Regex BareName();
}
