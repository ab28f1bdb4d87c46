// Truth: reviewed by a reader: each message of the golden file says where, what was found, what is allowed, what to do.
using System.Text;
using PoleField.Cli.Case;
using PoleField.Cli.Tests.Doubles;
using PoleField.Cli.Text;

namespace PoleField.Cli.Tests.Case;

public sealed class FaultTextTests
{
    private static readonly (string What, string Sound, string Wrong)[] Mistakes =
    [
        ("quotes forgotten", "width = \"3 mm\"", "width = 3 mm"),
        ("string not closed", "width = \"3 mm\"", "width = \"3 mm"),
        ("value forgotten", "width = \"3 mm\"", "width ="),
        ("equals sign forgotten", "width = \"3 mm\"", "width \"3 mm\""),
        ("bracket not closed", "[magnet]", "[magnet"),
        ("blank in a table name", "[parts.COIL]", "[parts.COIL LEFT]"),
        ("comma forgotten", "[\"0 mm\", \"3.6 mm\"]", "[\"0 mm\" \"3.6 mm\"]"),
        ("key twice", "width = \"3 mm\"", "width = \"3 mm\"\nwidth = \"4 mm\""),
        ("table twice", "[magnet]", "[beam]"),
        ("unknown key", "width =", "widht ="),
        ("unknown key, American spelling", "centre =", "center ="),
        ("unknown table", "[magnet]", "[magnte]"),
        ("unknown key in a part", "fill = 0.6", "full = 0.6"),
        ("decimal comma", "\"3 mm\"", "\"1,5 mm\""),
        ("bare number", "\"3 mm\"", "3"),
        ("string without unit", "\"3 mm\"", "\"3\""),
        ("wrong unit", "\"3 mm\"", "\"3 T\""),
        ("unknown unit", "\"3 mm\"", "\"3 ell\""),
        ("capital unit", "\"3 mm\"", "\"3 MM\""),
        ("not a number", "\"3 mm\"", "\"wide\""),
        ("out of range", "\"3 mm\"", "\"-3 mm\""),
        ("wrong type", "\"3 mm\"", "[\"3 mm\"]"),
        ("pair of three", "[\"0 mm\", \"3.6 mm\"]", "[\"0 mm\", \"3.6 mm\", \"1 mm\"]"),
        ("unknown material", "\"pure-iron\"", "\"pure-irn\""),
        ("two substances", "material = \"pure-iron\"", "material = \"pure-iron\"\nrelative_permeability = 1000"),
        ("no substance", "material = \"pure-iron\"", ""),
        ("permeability below one", "material = \"pure-iron\"", "relative_permeability = 0.5"),
        ("current in iron", "material = \"pure-iron\"", "material = \"pure-iron\"\nampere_turns = 100"),
        ("layer listed twice", "[parts.COIL]", "[parts.ridge]\nmaterial = \"air\"\n[parts.COIL]"),
        ("fill without current", "material = \"pure-iron\"", "material = \"pure-iron\"\nfill = 0.5"),
        ("direction without remanence", "material = \"pure-iron\"", "material = \"air\"\ndirection = 90"),
        ("magnet without direction", "material = \"pure-iron\"", "remanence = \"1.2 T\""),
        ("part is no table", "[parts.RIDGE]", "[parts]\nRIDGE = \"pure-iron\"\n[parts.X]"),
        ("missing curve file", "\"pure-iron\"", "{ file = \"gone.csv\" }"),
        ("missing sketch", "\"poles.dxf\"", "\"gone.dxf\""),
        ("missing format", "format = 1", ""),
        ("other format", "format = 1", "format = 2"),
        ("missing beam", "[beam]", "[map]"),
        ("layer and rectangle", "[beam]", "[beam]\nlayer = \"BEAM\""),
        ("beam on a part", "centre = [\"0 mm\", \"3.6 mm\"]\nwidth = \"3 mm\"\nheight = \"0.3 mm\"", "layer = \"RIDGE\""),
        ("closed without rim", "[magnet]", "[surroundings]\nopen = false\n[magnet]"),
        ("open with rim", "[magnet]", "[surroundings]\nopen = true\nrim = \"BOX\"\n[magnet]"),
        ("unknown symmetry", "[magnet]", "[symmetry]\nmirror = \"left_right\"\n[magnet]"),
        ("accuracy too fine", "[magnet]", "[accuracy]\nrelative = 1e-9\n[magnet]"),
        ("unknown requirement", "[magnet]", "[require]\ngradient = \"300 T/m\"\n[magnet]"),
        ("requirement in the wrong unit", "[magnet]", "[require]\ngradient_min = \"300 T\"\n[magnet]"),
        ("ramp that falls", "[magnet]", "[ramp]\nfactors = [1.0, 0.5]\n[magnet]"),
        ("map inside out", "[magnet]", "[map]\nfrom = [\"1 mm\", \"1 mm\"]\nto = [\"0 mm\", \"2 mm\"]\n[magnet]"),
        ("face that is no part", "[magnet]", "[tune]\nfaces = [\"RIGDE\"]\n[magnet]"),
        ("freedoms not whole", "[magnet]", "[tune]\nfaces = [\"RIDGE\"]\nfreedoms = 2.5\n[magnet]"),
        ("hold without comparison", "[magnet]", "[tune]\nfaces = [\"RIDGE\"]\nhold = { gradient = \"300 T/m\" }\n[magnet]"),
        ("species and mass", "[magnet]", "[flight]\nspecies = \"K-39\"\nmass = \"39 u\"\nsource = { temperature = \"478 K\" }\ndrift = \"1 m\"\n[magnet]"),
        ("mass alone", "[magnet]", "[flight]\nmass = \"39 u\"\nsource = { temperature = \"478 K\" }\ndrift = \"1 m\"\n[magnet]"),
        ("source of two kinds", "[magnet]", "[flight]\nspecies = \"K-39\"\nsource = { temperature = \"478 K\", speed = \"9 m/s\" }\ndrift = \"1 m\"\n[magnet]"),
    ];

    [Fact]
    public void EveryFaultReadsWell()
    {
        var around = new CaseSurroundings("magnet.toml", ["air", "pure-iron", "steel-1008"], f => !f.StartsWith("gone", StringComparison.Ordinal));
        var page = new StringBuilder();
        foreach ((string what, string sound, string wrong) in Mistakes)
        {
            Assert.Contains(sound, Cases.Small, StringComparison.Ordinal);
            IReadOnlyList<Finding> findings = CaseReader.Read(Cases.Small.Replace(sound, wrong, StringComparison.Ordinal), around).Findings;
            Assert.NotEmpty(findings);
            using var text = new StringWriter { NewLine = "\n" };
            FindingText.Write(text, findings, new Ink(false));
            page.Append("# ").Append(what).Append('\n').Append(text).Append('\n');
        }

        Golden.Check("case-faults.txt", page.ToString());
    }
}
