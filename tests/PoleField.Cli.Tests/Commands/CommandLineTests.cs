// Truth: the written contract of the command line: exit statuses, streams, help.
using System.CommandLine;
using PoleField.Cli.Commands;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Commands;

public sealed class CommandLineTests
{
    [Fact]
    public async Task WithoutWordsTheShortHelpGoesToTheErrorStream()
    {
        Run run = await Run.Of(Steps.Sound);

        Assert.Equal(2, run.Status);
        Assert.Empty(run.Out);
        Assert.Contains("Usage: polefield VERB", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task HelpNamesEveryVerbAndEveryOption()
    {
        RootCommand root = CommandLine.Build(new Tool(new Terminal(TextWriter.Null, TextWriter.Null), Steps.Sound));
        Run whole = await Run.Of(Steps.Sound, "--help");

        Assert.Equal(0, whole.Status);
        foreach (Command verb in root.Subcommands)
        {
            Run one = await Run.Of(Steps.Sound, verb.Name, "--help");

            Assert.Equal(0, one.Status);
            Assert.Contains("  " + verb.Name, whole.Out, StringComparison.Ordinal);
            Assert.Contains("Examples\n  ", one.Out, StringComparison.Ordinal);
            Assert.NotEmpty(verb.Description!);
            foreach (Option option in verb.Options)
            {
                Assert.False(string.IsNullOrEmpty(option.Description), $"{verb.Name} {option.Name} has no description.");
                Assert.Contains(option.Name, one.Out, StringComparison.Ordinal);
            }
        }
    }

    [Fact]
    public async Task HelpFitsEightyColumns()
    {
        RootCommand root = CommandLine.Build(new Tool(new Terminal(TextWriter.Null, TextWriter.Null), Pipeline.OfLibrary()));
        foreach (string[] verb in root.Subcommands.Select(c => new[] { c.Name }).Prepend([]))
        {
            Run run = await Run.Of(Pipeline.OfLibrary(), [.. verb, "--help"]);

            Assert.All(run.Out.Split('\n'), line => Assert.True(line.Length <= 80, line));
        }
    }

    [Theory]
    [InlineData("solve", "Required argument")] // the case is missing
    [InlineData("slove x.toml", "\"solve\"")] // the nearest verb
    [InlineData("solve x.toml --jsno", "\"--json\"")] // the nearest option
    [InlineData("solve x.toml --threads 0", "from 1 to 1024")]
    [InlineData("solve x.toml --accuracy 0.5", "from 1e-7 to 1e-2")]
    [InlineData("solve x.toml --accuracy fine", "1e-4")]
    [InlineData("solve x.toml y.toml", "y.toml")]
    public async Task AWrongCommandLineEndsWithTwoAndSaysHowToGoOn(string line, string hint)
    {
        Run run = await Run.Of(Steps.Sound, line.Split(' '));

        Assert.Equal(2, run.Status);
        Assert.Empty(run.Out);
        Assert.Contains(hint, run.Error, StringComparison.Ordinal);
        Assert.Contains("--help", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task TheVersionIsPrintedAlone()
    {
        Run run = await Run.Of(Steps.Sound, "--version");

        Assert.Equal(0, run.Status);
        Assert.Matches(@"^\d+\.\d+\.\d+\S*\n$", run.Out);
        Assert.Empty(run.Error);
    }

    [Theory]
    [InlineData("bash", "complete ")]
    [InlineData("zsh", "compdef ")]
    [InlineData("fish", "complete -c polefield")]
    [InlineData("pwsh", "Register-ArgumentCompleter -Native -CommandName polefield")]
    public async Task EachShellGetsItsCompletion(string shell, string command)
    {
        Run run = await Run.Of(Steps.Sound, "completion", shell);

        Assert.Equal(0, run.Status);
        Assert.Contains(command, run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task CompletionOffersTheVerbs()
    {
        Run run = await Run.Of(Steps.Sound, "[suggest:12]", "polefield so");

        Assert.Contains("solve", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AnUnforeseenFaultIsOneLineAndHowToReportIt()
    {
        using var folder = new CaseFolder();
        Pipeline broken = Steps.Sound with { Cut = (_, _) => throw new InvalidOperationException("two\nlines") };

        Run plain = await Run.Of(broken, "check", folder.CasePath);
        Run verbose = await Run.Of(broken, "check", folder.CasePath, "--verbose");

        Assert.Equal((1, 1), (plain.Status, verbose.Status));
        Assert.Equal(2, plain.Error.Split('\n', StringSplitOptions.RemoveEmptyEntries).Length);
        Assert.Contains("report", plain.Error, StringComparison.Ordinal);
        Assert.DoesNotContain("   at ", plain.Error, StringComparison.Ordinal);
        Assert.Contains("   at ", verbose.Error, StringComparison.Ordinal);
    }
}
