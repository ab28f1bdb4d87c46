// Truth: no-color.org's rule (set and not empty switches colour off), the ten lines a second of the contract, and a clock by hand.
using PoleField.Beam;
using PoleField.Cli.Tests.Doubles;
using PoleField.Cli.Text;

namespace PoleField.Cli.Tests.Text;

public sealed class TerminalTests
{
    [Theory]
    [InlineData(null, "xterm", true)]
    [InlineData("", "xterm", true)]
    [InlineData("1", "xterm", false)]
    [InlineData(null, "dumb", false)]
    public void ColourFollowsTheEnvironment(string? noColor, string term, bool coloured)
    {
        var terminal = new Terminal(TextWriter.Null, TextWriter.Null) { Variable = name => name == "NO_COLOR" ? noColor : term };

        Assert.Equal(coloured, terminal.MayColour);
    }

    [Theory]
    [InlineData(true, false, true)]
    [InlineData(true, true, false)] // --no-color
    [InlineData(false, false, false)] // not a terminal
    public async Task ColourIsForTerminalsOnly(bool isTerminal, bool noColor, bool coloured)
    {
        using var folder = new CaseFolder();
        using var output = new StringWriter();
        var terminal = new Terminal(output, TextWriter.Null) { OutIsTerminal = isTerminal };

        await PoleField.Cli.Commands.CommandLine.RunAsync(["check", folder.CasePath, .. noColor ? ["--no-color"] : Array.Empty<string>()], terminal, Steps.Sound);

        Assert.Equal(coloured, output.ToString().Contains('\u001b', StringComparison.Ordinal));
    }

    [Fact]
    public void ProgressIsOneLineAtMostTenTimesASecondAndIsWiped()
    {
        using var error = new StringWriter();
        var clock = new ManualClock();
        var terminal = new Terminal(TextWriter.Null, error) { ErrorIsTerminal = true, Width = 40 };
        using (var line = new ProgressLine(terminal, on: true, asked: 1e-4, clock))
        {
            for (int i = 0; i < 100; i++)
            {
                line.Report(new SolveProgress("solve", 3, 12345, i, 0.1, 2e-4));
                clock.Milliseconds += 10;
            }
        }

        string[] updates = error.ToString().Split('\r', StringSplitOptions.RemoveEmptyEntries);
        Assert.InRange(updates.Length, 9, 12); // a second of reports, and the wiping
        Assert.All(updates, u => Assert.InRange(u.Length, 1, 39));
        Assert.DoesNotContain("\n", error.ToString(), StringComparison.Ordinal);
        Assert.Equal(string.Empty, updates[^1].Trim());
    }

    [Theory]
    [InlineData(true, false)] // quiet, or JSON
    [InlineData(false, true)] // no terminal
    public void ProgressIsSilentElsewhere(bool isTerminal, bool on)
    {
        using var error = new StringWriter();
        using (var line = new ProgressLine(new Terminal(TextWriter.Null, error) { ErrorIsTerminal = isTerminal }, on, 1e-4, TimeProvider.System))
        {
            line.Report(new SolveProgress("solve", 1, 1, 1, 0.1, 0.1));
        }

        Assert.Empty(error.ToString());
    }

    private sealed class ManualClock : TimeProvider
    {
        public long Milliseconds { get; set; }

        public override long TimestampFrequency => 1000;

        public override long GetTimestamp() => Milliseconds;
    }
}
