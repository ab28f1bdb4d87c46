// Truth: the built tool started as a user starts it; statuses and streams of the contract.
using System.Diagnostics;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests;

public sealed class ExecutableTests
{
    [Fact]
    public async Task HelpStartsAndEndsWell()
    {
        Run run = await Start("--help");

        Assert.Equal((0, string.Empty), (run.Status, run.Error));
        Assert.Contains("solve", run.Out, StringComparison.Ordinal);
    }

    [Fact]
    public async Task AFaultyCaseEndsWithTwoAlsoUnderACommaLocale()
    {
        using var folder = new CaseFolder(Cases.Small.Replace("\"3 mm\"", "\"1,5 mm\"", StringComparison.Ordinal).Replace("\"0.3 mm\"", "\"-0.5 mm\"", StringComparison.Ordinal));

        Run run = await Start("check", folder.CasePath, "--quiet");

        Assert.Equal(2, run.Status);
        Assert.Contains("\"1.5 mm\"", run.Error, StringComparison.Ordinal);
        Assert.Contains("is -0.5 mm", run.Error, StringComparison.Ordinal);
    }

    [Fact]
    public async Task MaterialsArePrintedWithoutColourIntoAPipe()
    {
        Run run = await Start("materials");

        Assert.Equal(0, run.Status);
        Assert.StartsWith("  air", run.Out, StringComparison.Ordinal);
        Assert.DoesNotContain("\u001b", run.Out, StringComparison.Ordinal);
    }

    private static async Task<Run> Start(params string[] args)
    {
        var start = new ProcessStartInfo("dotnet", [typeof(Terminal).Assembly.Location, .. args])
        {
            RedirectStandardOutput = true,
            RedirectStandardError = true,
            Environment = { ["LANG"] = "de_DE.UTF-8", ["LC_ALL"] = "de_DE.UTF-8" },
        };
        using Process process = Process.Start(start)!;
        Task<string> output = process.StandardOutput.ReadToEndAsync();
        Task<string> error = process.StandardError.ReadToEndAsync();
        await process.WaitForExitAsync();
        return new Run(process.ExitCode, await output, await error);
    }
}
