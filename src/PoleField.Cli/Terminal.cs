using System.Text;

namespace PoleField.Cli;

/// <summary>Where a run writes and what it knows about the place: everything tests need to stand in for a terminal.</summary>
/// <param name="Out">Results.</param>
/// <param name="Error">Everything else.</param>
internal sealed record Terminal(TextWriter Out, TextWriter Error)
{
    public bool OutIsTerminal { get; init; }

    public bool ErrorIsTerminal { get; init; }

    /// <summary>Columns that may be filled.</summary>
    public int Width { get; init; } = 80;

    /// <summary>Looks up an environment variable.</summary>
    public Func<string, string?> Variable { get; init; } = _ => null;

    /// <summary>The process's own streams.</summary>
    public static Terminal OfProcess()
    {
        if (OperatingSystem.IsWindows())
        {
            Console.OutputEncoding = Encoding.UTF8;
        }

        return new Terminal(Console.Out, Console.Error)
        {
            OutIsTerminal = !Console.IsOutputRedirected,
            ErrorIsTerminal = !Console.IsErrorRedirected,
            Variable = Environment.GetEnvironmentVariable,
        };
    }

    /// <summary>Prints what a writer of UTF-8 text writes, as the result.</summary>
    public void Print(Action<Stream> write)
    {
        using var stream = new MemoryStream();
        write(stream);
        Out.Write(Encoding.UTF8.GetString(stream.ToArray()));
    }

    /// <summary>True when the terminal may be coloured: NO_COLOR unset or empty, TERM not "dumb".</summary>
    public bool MayColour => string.IsNullOrEmpty(Variable("NO_COLOR")) && Variable("TERM") != "dumb";
}
