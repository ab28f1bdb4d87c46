using System.Diagnostics;

namespace PoleField.Cli.Tests.Doubles;

/// <summary>The built tool started as a user starts it.</summary>
internal static class ToolProcess
{
    /// <summary>How to start it.</summary>
    public static ProcessStartInfo Described(params string[] args) => new("dotnet", [typeof(Terminal).Assembly.Location, .. args])
    {
        RedirectStandardOutput = true,
        RedirectStandardError = true,
    };

    public static Task<Run> Of(params string[] args) => Of(Described(args));

    /// <summary>Runs it to its end.</summary>
    public static async Task<Run> Of(ProcessStartInfo start)
    {
        using Process process = Process.Start(start)!;
        Task<string> output = process.StandardOutput.ReadToEndAsync();
        Task<string> error = process.StandardError.ReadToEndAsync();
        await process.WaitForExitAsync();
        return new Run(process.ExitCode, await output, await error);
    }
}
