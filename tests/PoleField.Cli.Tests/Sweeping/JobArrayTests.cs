// Truth: the variables a scheduler gives to the tasks of an array; together the tasks are the whole.
using System.Diagnostics;
using System.Globalization;
using PoleField.Cli.Tests.Doubles;

namespace PoleField.Cli.Tests.Sweeping;

public sealed class JobArrayTests
{
    [Theory]
    [InlineData("1", "", "1/3")] // arrays from 1
    [InlineData("0", "", "1/3")] // and from 0
    [InlineData("2", "5", "2/5")] // one task of five alone
    public async Task EachTaskSolvesItsPart(string first, string parts, string expected)
    {
        if (OperatingSystem.IsWindows())
        {
            return; // job arrays run under bash
        }

        (int status, string words) = await Task(first, parts, toolStatus: 0);

        Assert.Equal(0, status);
        Assert.Equal($"sweep a b.toml -o out --shard {expected} --threads 2 --vary x=1,2", words);
    }

    [Theory]
    [InlineData(3, 0)] // missed requirements are the table's matter, not the scheduler's
    [InlineData(2, 2)]
    [InlineData(130, 130)]
    public async Task TheSchedulerSeesOnlyRealFaults(int toolStatus, int expected)
    {
        if (OperatingSystem.IsWindows())
        {
            return;
        }

        Assert.Equal(expected, (await Task("1", string.Empty, toolStatus)).Status);
    }

    private static async Task<(int Status, string Words)> Task(string first, string parts, int toolStatus)
    {
        using var folder = new CaseFolder();
        await File.WriteAllTextAsync(folder["tool"], string.Create(CultureInfo.InvariantCulture, $"echo \"$*\"; exit {toolStatus}\n"));
        var start = new ProcessStartInfo("bash", [Repository.File("geometries/job-array/sweep.slurm"), "a b.toml", "out", "--vary", "x=1,2"])
        {
            RedirectStandardOutput = true,
            Environment =
            {
                ["POLEFIELD"] = "bash " + folder["tool"],
                ["SLURM_ARRAY_TASK_ID"] = first,
                ["SLURM_ARRAY_TASK_MIN"] = first,
                ["SLURM_ARRAY_TASK_COUNT"] = "3",
                ["SLURM_CPUS_PER_TASK"] = "2",
                ["PARTS"] = parts,
            },
        };
        using Process process = Process.Start(start)!;
        string words = await process.StandardOutput.ReadToEndAsync();
        await process.WaitForExitAsync();
        return (process.ExitCode, words.Trim());
    }
}
