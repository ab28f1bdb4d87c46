// Truth: reviewed by a reader: each message of the golden file says where, what was found, what is allowed, what to do;
// the list of kinds is read from the sources.
using System.Text;
using System.Text.RegularExpressions;
using PoleField.Cli.Tests.Doubles;
using PoleField.Cli.Text;
using PoleField.Drawing;

namespace PoleField.Cli.Tests.Drawing;

public sealed partial class DrawingMessageTests
{
    private const int MostShown = 3;

    private static IEnumerable<Provocation> Provocations => [.. FileProvocations.All, .. SectionProvocations.All];

    private static (string What, string How, Func<object> Try)[] Families { get; } =
    [
        ("unknown-family", "a name that is none", () => PoleFamilies.Get("sextupole")),
        ("family-dimension", "a negative radius", () => new TwoWirePair { GrooveRadius = -3 }.Draw()),
        ("family-dimension", "a circle smaller than the wires' distance", () => new TwoWirePair { RidgeRadius = 0.1 }.Draw()),
        ("family-dimension", "a groove's angle that leaves no face", () => new TwoWirePair { GrooveHalfAngle = 0.5 }.Draw()),
        ("family-dimension", "no number", () => new TwoWirePair { RidgeReach = double.NaN }.Draw()),
        ("family-dimension", "a coarse tolerance, and a ridge beyond the place of vanishing field",
            () => new FlatGradientPair { Tolerance = 50, RidgeDistance = 100 }.Draw()),
        ("family-dimension", "a beam as wide as the magnet", () => new TwoWirePair { Beam = new TwoWirePair().Beam with { Width = 90 } }.Draw()),
        ("family-dimension", "coils inside out", () => new ShiftedQuadrupolePair { Frame = new ShiftedQuadrupolePair().Frame with { CoilOuter = 1, FlankAngle = 90 } }.Draw()),
    ];

    [Fact]
    public void EveryMessageReadsWell()
    {
        var page = new StringBuilder();
        foreach (Provocation provocation in Provocations)
        {
            (IReadOnlyList<Finding> findings, string unit) = provocation.Provoke();
            Add(page, provocation.What, provocation.How, provocation.Shown, Text(findings, unit));
        }

        foreach ((string what, string how, Func<object> attempt) in Families)
        {
            IReadOnlyList<Finding> findings = Assert.Throws<InputException>(attempt).Findings;
            Assert.All(findings, f => Assert.Equal(what, f.What));
            Add(page, what, how, "", Text(findings, ""));
        }

        Golden.Check("drawing-messages.txt", page.ToString());
    }

    [Fact]
    public void EveryKindOfFindingIsProvoked()
    {
        var made = new SortedSet<string>(StringComparer.Ordinal);
        foreach (string file in Directory.EnumerateFiles(Repository.File("src/PoleField/Drawing"), "*.cs", SearchOption.AllDirectories))
        {
            foreach (Match kind in MadePattern().Matches(File.ReadAllText(file)))
            {
                made.UnionWith(kind.Groups["kind"].Captures.Select(c => c.Value));
            }
        }

        Assert.Equal(made, [.. Provocations.Select(p => p.What).Concat(Families.Select(f => f.What)).Distinct().Order(StringComparer.Ordinal)]);
    }

    // The kind stands after the severity, or before the sentence in a call or tuple.
    [GeneratedRegex("""
        (Severity\.\w+,\s*(\w+\s*\?\s*"(?<kind>[a-z-]+)"\s*:\s*)?"(?<kind>[a-z-]+)"\s*,)|(\(\s*"(?<kind>[a-z-]+)",\s*(\$?"[A-Z{\\]|FormattableString))
        """, RegexOptions.CultureInvariant | RegexOptions.ExplicitCapture)]
    private static partial Regex MadePattern();

    private static string[] Text(IReadOnlyList<Finding> findings, string unit) => [.. findings.Select(finding =>
    {
        using var text = new StringWriter { NewLine = "\n" };
        FindingText.Write(text, [finding], new Ink(false), unit);
        return text.ToString();
    })];

    private static void Add(StringBuilder page, string what, string how, string drawing, string[] messages)
    {
        Assert.True(messages.Length > 0, $"{how} provokes no {what}.");
        page.Append("# ").Append(what).Append(": ").Append(how).Append('\n');
        if (drawing.Length > 0)
        {
            page.Append("# ").Append(drawing).Append('\n');
        }

        IEnumerable<string> shown = messages.Length <= MostShown
            ? messages
            : [messages[0], FormattableString.Invariant($"... {messages.Length - 2} more ...\n"), messages[^1]];
        page.AppendJoin("", shown).Append('\n');
    }
}
