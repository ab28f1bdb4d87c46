// Truth: the mistakes planted in the text, each with its line counted by hand.
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Robustness;

public sealed class ManyMistakesTests
{
    private const string Text = """
        format = 2
        title = ""
        [sketch]
        file = "gone.dxf"
        unit = "furlong"
        join = "2 T"
        [parts.RIDGE]
        material = "pure-irn"
        [parts.ridge]
        material = 3
        [parts.COIL]
        ampere_turns = "1,5 kA"
        fill = 2
        [parts.SHIM]
        [parts.MAGNET]
        remanence = 1.2
        [surroundings]
        open = "yes"
        [symmetry]
        mirror = "up-down"
        [beam]
        centre = ["0 mm"]
        width = "3 MM"
        heigth = "1 mm"
        [accuracy]
        relative = 1
        [require]
        gradiant_min = "300 T/m"
        [ramp]
        factors = 3
        [flight]
        species = "K-39"
        """;

    [Fact]
    public async Task EveryMistakeIsToldAtOnceWithLineAndColumn()
    {
        using var folder = new CaseFolder(Text);

        Run run = await Run.Of(Steps.Sound, "check", folder.CasePath);

        Assert.Equal(2, run.Status);
        int[] lines = [.. run.All.Split('\n').Where(l => l.Contains(": fault: ", StringComparison.Ordinal)).Select(LineOf).Distinct().Order()];
        int[] planted = [1, 2, 4, 5, 6, 8, 9, 10, 12, 13, 14, 15, 16, 18, 20, 21, 22, 23, 24, 26, 28, 30, 31];
        Assert.Equal(planted, lines);
    }

    [Fact]
    public async Task BrokenLinesHideNoOtherMistake()
    {
        using var folder = new CaseFolder("format = 1\ntitle = \"open\n[sketch]\nfile = \"poles.dxf\"\nunit = mm\n[parts.COIL LEFT]\nampere_turns = 1\n[parts.A]\nmaterial = \"x\"\n[beam]\ncentre = [\"0 mm\" \"1 mm\"]\nwidth = \"1 T\"\nheight = \"1 mm\"\n");

        Run run = await Run.Of(Steps.Sound, "check", folder.CasePath);

        Assert.Equal(2, run.Status);
        Assert.Equal([2, 5, 6, 9, 11, 12], run.All.Split('\n').Where(l => l.Contains(": fault: ", StringComparison.Ordinal)).Select(LineOf).Distinct().Order());
    }

    // "magnet.toml:LINE:COLUMN: fault: ..."
    private static int LineOf(string text)
    {
        string[] parts = text.Split(':');
        Assert.Equal("magnet.toml", parts[0]);
        Assert.InRange(int.Parse(parts[2], System.Globalization.CultureInfo.InvariantCulture), 1, 100);
        return int.Parse(parts[1], System.Globalization.CultureInfo.InvariantCulture);
    }
}
