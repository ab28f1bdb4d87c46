namespace PoleField.Cli.Commands;

/// <summary><c>polefield manual</c>: the manual page, made from the command tree.</summary>
internal static class ManualVerb
{
    public static VerbCommand Create(Tool tool)
    {
        var verb = new VerbCommand("manual", "Prints the manual page of all verbs.")
        {
            Examples =
            [
                ("polefield manual | man -l -", "reads it"),
                ("polefield manual > ~/.local/share/man/man1/polefield.1", "installs it for man polefield"),
            ],
        };
        tool.SetRun(verb, (arguments, _) =>
        {
            ManualPage.Write(tool.Terminal.Out, arguments.RootCommandResult.Command);
            return ExitStatus.Done;
        });
        return verb;
    }
}
