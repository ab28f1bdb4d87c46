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

    [Fact]
    public async Task CtrlCEndsARunWhoseStepIsDeaf()
    {
        if (OperatingSystem.IsWindows())
        {
            return; // no named pipes in the file system, no signals
        }

        using var folder = new CaseFolder();
        string pipe = folder["never.toml"];
        using (var made = Process.Start("mkfifo", pipe))
        {
            await made.WaitForExitAsync();
        }

        using Process process = Process.Start(Described("check", pipe))!;
        Task<string> error = process.StandardError.ReadToEndAsync();

        // Opening the writing end returns once the tool has opened the reading end, where it then waits for ever.
        await using FileStream writing = await Task.Run(() => new FileStream(pipe, FileMode.Open, FileAccess.Write)).WaitAsync(TimeSpan.FromSeconds(60));
        using (var kill = Process.Start("kill", ["-INT", process.Id.ToString(System.Globalization.CultureInfo.InvariantCulture)]))
        {
            await kill.WaitForExitAsync();
        }

        await process.WaitForExitAsync().WaitAsync(TimeSpan.FromSeconds(20));

        Assert.Equal((130, "Interrupted; nothing was written.\n"), (process.ExitCode, await error));
    }

    private static ProcessStartInfo Described(params string[] args) => new("dotnet", [typeof(Terminal).Assembly.Location, .. args])
    {
        RedirectStandardOutput = true,
        RedirectStandardError = true,
        Environment = { ["LANG"] = "de_DE.UTF-8", ["LC_ALL"] = "de_DE.UTF-8" },
    };

    private static async Task<Run> Start(params string[] args)
    {
        using Process process = Process.Start(Described(args))!;
        Task<string> output = process.StandardOutput.ReadToEndAsync();
        Task<string> error = process.StandardError.ReadToEndAsync();
        await process.WaitForExitAsync();
        return new Run(process.ExitCode, await output, await error);
    }
}
