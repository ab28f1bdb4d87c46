// Truth: the promise of the case reader — whatever the text, it throws nothing and gives either a case or faults, each with a line and
// a column that exist in the text and with words for what was found and what to do.
using System.Globalization;
using System.Text;
using PoleField.Cli.Case;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Case;

public sealed class CaseFuzzTests
{
    private static readonly CaseSurroundings Around = new("case.toml", ["air", "pure-iron", "steel-1008"], file => file.Length % 2 == 0);

    private static readonly string[] Scraps =
    [
        "[", "]", "[[", "]]", "=", "\"", "'", "\"\"\"", "'''", "{", "}", ",", ".", "#", "\\", "\\u12", "\\x", "\n", "\r", "\r\n", "\t", "\0", "\u0007",
        " ", "-", "+", "_", "0x1F", "1_0", "1e999", "-1e999", "nan", "inf", "-inf", "true", "false", "2020-01-01", "07:32:00", "99999999999999999999", "-0",
        "0.0", "é", "μm", "😀", "\uFFFD", "\uFEFF", "format = 1\n", "[beam]\n", "[parts]\n", "[[parts]]\n", "[parts.RIDGE]\n", "a.b.c = 1\n", "[sketch.file]\n",
        "material", "ampere_turns = \"1 kA\"\n", "\"\" = 1\n", "[parts.\"\"]\n", "file = {}\n", "[]", "[[],[]]", "{ }", "3 mm", "\"3 mm\"", "\"-3 mm\"", "\"nan mm\"", "\"1e400 T\"",
    ];

    // POLEFIELD_RANDOM_CASES asks for more of them.
    [Fact]
    public void AMutatedCaseGivesACaseOrFaultsWithTheirPlaces()
    {
        int count = Environment.GetEnvironmentVariable("POLEFIELD_RANDOM_CASES") is { Length: > 0 } text ? int.Parse(text, CultureInfo.InvariantCulture) : 3000;
        var broken = new List<string>();
        int sound = 0;
        for (int seed = 0; seed < count && broken.Count < 20; seed++)
        {
            string mutant = Mutant(seed);
            string fault = FaultOf(mutant, ref sound);
            if (fault.Length > 0)
            {
                broken.Add(FormattableString.Invariant($"seed {seed}: {fault}\n{mutant}\n----"));
            }
        }

        Assert.True(broken.Count == 0, string.Join("\n", broken));
        Assert.InRange(sound, count / 100, count); // mutants that all break at the first letter would prove nothing
    }

    private static string FaultOf(string text, ref int sound)
    {
        CaseReading reading;
        try
        {
            reading = CaseReader.Read(text, Around);
        }
#pragma warning disable CA1031 // the very promise is that there is none
        catch (Exception e)
#pragma warning restore CA1031
        {
            return e.ToString();
        }

        if (reading.Case is not null)
        {
            sound++;
        }

        if ((reading.Case is null) != reading.Findings.Any(f => f.Severity == Severity.Fault))
        {
            return "neither a case nor a fault, or both";
        }

        string[] lines = text.ReplaceLineEndings("\n").Split('\n');
        foreach (Finding f in reading.Findings)
        {
            // A place may be just past the end of a line, or the line after the last.
            bool there = f.Line is { } line && f.Column is { } column && line >= 1 && line <= lines.Length + 1 && column >= 1
                && column <= (line <= lines.Length ? lines[line - 1].Length : 0) + 2;
            if (!there || f.Text.Length == 0 || f.Fix.Length == 0)
            {
                return FormattableString.Invariant($"line {f.Line}, column {f.Column}: {f.What}: {f.Text} {f.Fix}");
            }
        }

        return "";
    }

    private static string Mutant(int seed)
    {
        var random = new Random(seed);
        var text = new StringBuilder(seed % 2 == 0 ? Cases.Whole : Cases.Small);
        int changes = random.Next(1, 5);
        for (int i = 0; i < changes && text.Length > 0; i++)
        {
            int at = random.Next(text.Length);
            switch (random.Next(7))
            {
                case 0:
                    text.Remove(at, Math.Min(text.Length - at, random.Next(1, 12)));
                    break;
                case 1:
                    text.Insert(at, Scraps[random.Next(Scraps.Length)]);
                    break;
                case 2:
                    text[at] = (char)random.Next(1, 300);
                    break;
                case 3:
                    ReplaceValue(text, random);
                    break;
                case 4:
                    MoveLine(text, random, twice: true);
                    break;
                case 5:
                    MoveLine(text, random, twice: false);
                    break;
                default:
                    text.Length = random.Next(8) == 0 ? at : text.Length;
                    break;
            }
        }

        return text.ToString();
    }

    // A key keeps its name and gets another value.
    private static void ReplaceValue(StringBuilder text, Random random)
    {
        string[] lines = text.ToString().Split('\n');
        int line = random.Next(lines.Length);
        int equals = lines[line].IndexOf('=', StringComparison.Ordinal);
        if (equals > 0)
        {
            lines[line] = lines[line][..(equals + 1)] + " " + Scraps[random.Next(Scraps.Length)];
            text.Clear().AppendJoin('\n', lines);
        }
    }

    private static void MoveLine(StringBuilder text, Random random, bool twice)
    {
        List<string> lines = [.. text.ToString().Split('\n')];
        string line = lines[random.Next(lines.Count)];
        if (!twice)
        {
            lines.Remove(line);
        }

        lines.Insert(random.Next(lines.Count + 1), line);
        text.Clear().AppendJoin('\n', lines);
    }
}
