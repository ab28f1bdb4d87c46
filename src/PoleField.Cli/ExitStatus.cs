namespace PoleField.Cli;

/// <summary>What the exit status means.</summary>
internal static class ExitStatus
{
    public const int Done = 0;

    /// <summary>A fault in PoleField itself.</summary>
    public const int OwnFault = 1;

    /// <summary>Command line, case or sketch is wrong.</summary>
    public const int WrongInput = 2;

    /// <summary>The run ended, but a requirement or the asked accuracy was not met.</summary>
    public const int NotMet = 3;

    public const int Interrupted = 130;
}
