using PoleField.Cli.Commands;

namespace PoleField.Cli.Tests.Doubles;

/// <summary>One command line run in this process: status and what was printed.</summary>
internal sealed record Run(int Status, string Out, string Error)
{
    /// <summary>Everything printed.</summary>
    public string All => Out + Error;

    public static Task<Run> Of(Pipeline pipeline, params string[] args) => Of(pipeline, CancellationToken.None, args);

    public static async Task<Run> Of(Pipeline pipeline, CancellationToken cancellation, params string[] args)
    {
        using var output = new StringWriter { NewLine = "\n" };
        using var error = new StringWriter { NewLine = "\n" };
        var terminal = new Terminal(output, error);
        int status = await CommandLine.RunAsync(args, terminal, pipeline, cancellation);
        Assert.Equal(string.Empty, Schemas.Faults(output.ToString())); // whatever a test prints as JSON keeps its published schema
        return new Run(status, output.ToString(), error.ToString());
    }
}
