using System.CommandLine;
using PoleField.Cli.Text;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Cli.Commands;

/// <summary>What every verb runs with: terminal, steps, and the options that hold for all verbs.</summary>
internal sealed class Tool(Terminal terminal, Pipeline pipeline)
{
    private const string Nothing = "Interrupted; nothing was written.";

    // A run must be gone within a second of Ctrl-C even when a step is slow to notice.
    private static readonly TimeSpan Patience = TimeSpan.FromSeconds(0.7);

    public Option<bool> Quiet { get; } = new("--quiet", "-q") { Description = "No tables, notes or progress; faults still appear.", Recursive = true };

    public Option<bool> NoColor { get; } = new("--no-color") { Description = "No colour (also with NO_COLOR set or TERM=dumb).", Recursive = true };

    public Option<bool> Verbose { get; } = new("--verbose") { Description = "More about the run, mesh by mesh, and about a fault in PoleField itself.", Recursive = true };

    public Terminal Terminal => terminal;

    public Pipeline Pipeline => pipeline;

    public Ink OutInk(ParseResult arguments) => new(terminal.OutIsTerminal && terminal.MayColour && !arguments.GetValue(NoColor));

    public Ink ErrorInk(ParseResult arguments) => new(terminal.ErrorIsTerminal && terminal.MayColour && !arguments.GetValue(NoColor));

    /// <summary>Prints faults and warnings of a case that has faults; false when it has none.</summary>
    public bool ReportFaults(ParseResult arguments, LoadedCase loaded)
    {
        if (loaded.HasFaults)
        {
            IEnumerable<Finding> serious = loaded.Findings.Where(f => f.Severity != Severity.Note);
            FindingText.Write(terminal.Error, CheckTables.Sorted(serious), ErrorInk(arguments), loaded.DrawingUnit);
        }

        return loaded.HasFaults;
    }

    /// <summary>Makes a command run <paramref name="run"/> on a thread of its own, with every way to end turned into an exit status.</summary>
    /// <param name="command">The command.</param>
    /// <param name="run">What it does.</param>
    /// <param name="interrupted">What to say when it was interrupted.</param>
    public void SetRun(Command command, Func<ParseResult, CancellationToken, int> run, string interrupted = Nothing) =>
        SetRun(command, (run, Patience), interrupted);

    /// <summary>Makes a command run that may take longer than to notice when it is interrupted, because it writes what it has.</summary>
    /// <param name="command">The command.</param>
    /// <param name="verb">What it does, and how long it may take to end.</param>
    /// <param name="interrupted">What to say when it was interrupted before it had anything.</param>
    public void SetRun(Command command, (Func<ParseResult, CancellationToken, int> Run, TimeSpan Farewell) verb, string interrupted = Nothing) =>
        command.SetAction(async (arguments, cancellation) =>
        {
            try
            {
                return await Guard(arguments, (token => verb.Run(arguments, token), verb.Farewell), cancellation).ConfigureAwait(false);
            }
            catch (OperationCanceledException)
            {
                terminal.Error.WriteLine(interrupted);
                return ExitStatus.Interrupted;
            }
        });

    private async Task<int> Guard(ParseResult arguments, (Func<CancellationToken, int> Run, TimeSpan Patience) verb, CancellationToken cancellation)
    {
        try
        {
            var work = Task.Run(() => verb.Run(cancellation), CancellationToken.None);
            Task first = await Task.WhenAny(work, Cancelled(verb.Patience, cancellation)).ConfigureAwait(false);
            if (first != work)
            {
                throw new OperationCanceledException(cancellation);
            }

            return await work.ConfigureAwait(false);
        }
        catch (InputException e)
        {
            FindingText.Write(terminal.Error, e.Findings, ErrorInk(arguments));
            return ExitStatus.WrongInput;
        }
        catch (MeshingException e)
        {
            FindingText.Write(terminal.Error, [SolverFaults.Of(e)], ErrorInk(arguments));
            return ExitStatus.WrongInput;
        }
        catch (FieldNotConvergedException e)
        {
            SolverFaults.Write(terminal.Error, e);
            return ExitStatus.NotMet;
        }
#pragma warning disable CA1031 // The one place where an unforeseen exception becomes a message instead of a stack trace.
        catch (Exception e) when (e is not (OperationCanceledException or IOException))
#pragma warning restore CA1031
        {
            return ReportOwnFault(e, arguments.GetValue(Verbose));
        }
    }

    private static async Task Cancelled(TimeSpan patience, CancellationToken cancellation)
    {
        var cancelled = new TaskCompletionSource();
        await using (cancellation.Register(() => cancelled.TrySetResult()).ConfigureAwait(false))
        {
            await cancelled.Task.ConfigureAwait(false);
        }

        await Task.Delay(patience, CancellationToken.None).ConfigureAwait(false);
    }

    private int ReportOwnFault(Exception e, bool verbose)
    {
        string message = e.Message.ReplaceLineEndings(" ");
        terminal.Error.WriteLine($"polefield: a fault in PoleField itself: {e.GetType().Name}: {message}");
        terminal.Error.WriteLine(verbose
            ? e.ToString()
            : "Please report it with the case, the sketch and what the same command prints with --verbose.");
        return ExitStatus.OwnFault;
    }
}
