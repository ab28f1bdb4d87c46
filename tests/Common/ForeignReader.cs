using System.Diagnostics;

namespace PoleField.Tests.Common;

/// <summary>Runs Python scripts that read our files with other people's libraries.</summary>
internal static class ForeignReader
{
    private static readonly string[] Interpreters = ["/usr/bin/python3", "python3"];

    public static string? InterpreterWith(string module) =>
        Interpreters.FirstOrDefault(i => Start(i, ["-c", $"import {module}"]) is { ExitCode: 0 });

    /// <summary>Runs a script and returns the lines it prints.</summary>
    public static string[] Run(string module, string script, params string[] arguments)
    {
        string interpreter = InterpreterWith(module) ?? throw new InvalidOperationException($"No Python with {module}.");
        (int exitCode, string output, string errors) = Start(interpreter, ["-c", script, .. arguments])!.Value;
        Xunit.Assert.True(exitCode == 0, errors);
        return output.Split('\n', StringSplitOptions.RemoveEmptyEntries | StringSplitOptions.TrimEntries);
    }

    private static (int ExitCode, string Output, string Errors)? Start(string program, IReadOnlyList<string> arguments)
    {
        ProcessStartInfo start = new(program, arguments) { RedirectStandardOutput = true, RedirectStandardError = true };
        try
        {
            using Process process = Process.Start(start)!;
            Task<string> errors = process.StandardError.ReadToEndAsync();
            string output = process.StandardOutput.ReadToEnd();
            process.WaitForExit();
            return (process.ExitCode, output, errors.Result);
        }
        catch (System.ComponentModel.Win32Exception)
        {
            return null; // no such program
        }
    }
}

/// <summary>A fact that needs a Python library; skipped with the reason when it is not there.</summary>
[AttributeUsage(AttributeTargets.Method)]
public sealed class ForeignReaderFactAttribute : Xunit.FactAttribute
{
    public ForeignReaderFactAttribute(string module)
    {
        Module = module;
        if (ForeignReader.InterpreterWith(module) is null)
        {
            Skip = $"NOT CHECKED by a foreign reader: no Python 3 with '{module}' here.";
        }
    }

    public string Module { get; }
}
