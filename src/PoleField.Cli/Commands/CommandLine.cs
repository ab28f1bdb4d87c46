using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;
using PoleField.Cli.Case;

namespace PoleField.Cli.Commands;

/// <summary>The command tree and how a command line is run.</summary>
internal static class CommandLine
{
    // The framework's own limit behind Tool's, which ends every verb sooner; only reached when a step blocks even the thread pool.
    private static readonly TimeSpan TerminationTimeout = TimeSpan.FromSeconds(12);

    /// <summary>Runs one command line and returns its exit status.</summary>
    public static async Task<int> RunAsync(string[] args, Terminal terminal, Pipeline pipeline, CancellationToken cancellation = default)
    {
        RootCommand root = Build(new Tool(terminal, pipeline));
        if (args.Length == 0)
        {
            HelpText.WriteShort(terminal.Error, root);
            return ExitStatus.WrongInput;
        }

        ParseResult arguments = root.Parse(args, new ParserConfiguration { ResponseFileTokenReplacer = null });
        if (arguments.Errors.Count > 0 && arguments.Action is ParseErrorAction)
        {
            WriteErrors(terminal.Error, arguments);
            return ExitStatus.WrongInput;
        }

        var invocation = new InvocationConfiguration
        {
            Output = terminal.Out,
            Error = terminal.Error,
            EnableDefaultExceptionHandler = false,
            ProcessTerminationTimeout = TerminationTimeout,
        };
        try
        {
            int status = await arguments.InvokeAsync(invocation, cancellation).ConfigureAwait(false);
            const int terminated = 143;
            return status == terminated ? ExitStatus.Interrupted : status;
        }
        catch (IOException e)
        {
            // Files have their own messages; what is left is an output stream that takes no more.
            terminal.Error.WriteLine($"polefield: the output cannot be written: {e.Message}");
            return ExitStatus.WrongInput;
        }
    }

    /// <summary>The whole command tree.</summary>
    public static RootCommand Build(Tool tool)
    {
        var root = new RootCommand("Field, gradient and uniformity of the pole tips that deflect beams, from a drawing.")
        {
            tool.Quiet,
            tool.NoColor,
            tool.Verbose,
            CheckVerb.Create(tool),
            SolveVerb.Create(tool),
            ReportVerb.Create(tool),
        };
        foreach (AnalysisStep step in tool.Pipeline.Analyses)
        {
            root.Subcommands.Add(AnalysisVerb.Create(tool, step));
        }

        root.Subcommands.Add(SweepVerb.Create(tool));
        root.Subcommands.Add(GatherVerb.Create(tool));
        root.Subcommands.Add(SketchVerb.Create(tool));
        root.Subcommands.Add(MaterialsVerb.Create(tool));
        root.Subcommands.Add(CompletionVerb.Create(tool));
        root.Subcommands.Add(ManualVerb.Create(tool));
        HelpOption help = root.Options.OfType<HelpOption>().Single();
        help.Description = "Show help.";
        help.Action = new HelpText();
        root.Options.OfType<VersionOption>().Single().Description = "Show the version.";
        return root;
    }

    private static void WriteErrors(TextWriter error, ParseResult arguments)
    {
        Command command = arguments.CommandResult.Command;
        foreach (System.CommandLine.Parsing.ParseError fault in arguments.Errors)
        {
            error.WriteLine($"polefield: {fault.Message}");
        }

        var known = command.Subcommands.Select(c => c.Name)
            .Concat(arguments.RootCommandResult.Command.Options.Concat(command.Options).Select(o => o.Name)).ToList();
        foreach (string token in arguments.UnmatchedTokens)
        {
            if (NearestName.Of(token, known) is { } near)
            {
                error.WriteLine($"  Did you mean \"{near}\"?");
            }
        }

        if (command is VerbCommand { Subcommands.Count: > 0 } verb)
        {
            error.WriteLine($"  {verb.PartsAre.Heading}: {string.Join(", ", verb.Subcommands.Select(c => c.Name))}");
        }

        error.WriteLine($"  See: {VerbCommand.Path(command)} --help");
    }
}
