using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Text;
using PoleField.Output.Pages;

namespace PoleField.Cli.Commands;

/// <summary>A verb that solves a case and works something out of it: its words, its files, its pictures and its step.</summary>
/// <param name="Name">Verb; also the anchor of its section in a report.</param>
/// <param name="Description">What it does, one sentence.</param>
internal sealed record AnalysisStep(string Name, string Description)
{
    /// <summary>Command lines for the help, each with what it does.</summary>
    public required IReadOnlyList<(string Line, string Does)> Examples { get; init; }

    /// <summary>Options of its own.</summary>
    public IReadOnlyList<Option> Options { get; init; } = [];

    /// <summary>Endings of the files it will write, after the case's name: ".ramp.json". Checked before the solve.</summary>
    public required Func<ParseResult, IReadOnlyList<string>> Endings { get; init; }

    /// <summary>Names of all pictures it may draw; their files are checked before the solve.</summary>
    public IReadOnlyList<string> Pictures { get; init; } = [];

    /// <summary>True when the first file is JSON, which <c>--json</c> prints.</summary>
    public bool FirstIsJson { get; init; } = true;

    /// <summary>True when the command line allows files of an earlier run to be replaced without <c>--force</c>.</summary>
    public Func<ParseResult, bool> GoesOn { get; init; } = _ => false;

    /// <summary>Endings of files that are already written while it runs.</summary>
    public IReadOnlyList<string> KeptOnTheWay { get; init; } = [];

    /// <summary>How long an interrupted run may take to write what it has; null when it keeps nothing.</summary>
    public TimeSpan? Farewell { get; init; }

    /// <summary>True when the case's requirements are asked of what comes out, not of the solve it starts from.</summary>
    public bool JudgesItself { get; init; }

    /// <summary>What a case or the command line lacks for it, looked at before the solve.</summary>
    public Func<CaseFile, ParseResult, IReadOnlyList<Finding>> Needs { get; init; } = (_, _) => [];

    /// <summary>True when a report on the case holds it.</summary>
    public Func<CaseFile, bool> IsInReport { get; init; } = _ => false;

    public required Func<AnalysisRequest, Analysis> Run { get; init; }
}

/// <summary>What an analysis starts from.</summary>
internal sealed record AnalysisRequest
{
    public required SolvedCase Solved { get; init; }

    /// <summary>For further solves.</summary>
    public required SolveOptions Options { get; init; }

    /// <summary>Files to be written, in the order of <see cref="AnalysisStep.Endings"/>; empty when only JSON is printed.</summary>
    public IReadOnlyList<string> Targets { get; init; } = [];

    /// <summary>The command line; under <c>report</c> it knows no options of the step.</summary>
    public required ParseResult Arguments { get; init; }

    public required Action<SolveProgress> Progress { get; init; }

    public required CancellationToken Cancellation { get; init; }
}

/// <summary>What came out of an analysis.</summary>
/// <param name="Answer">It in words, for the terminal and for the page of a report.</param>
/// <param name="Files">Contents of the files, in the order of <see cref="AnalysisStep.Endings"/>; null for one that is not needed.</param>
internal sealed record Analysis(Answer Answer, IReadOnlyList<Action<Stream>?> Files)
{
    /// <summary>Pictures, named as <see cref="AnalysisStep.Pictures"/> says.</summary>
    public IReadOnlyList<ReportPicture> Pictures { get; init; } = [];

    /// <summary>What it was asked to reach, it reached.</summary>
    public bool Met { get; init; } = true;

    /// <summary>What was asked and not met, in words.</summary>
    public IReadOnlyList<string> NotMet { get; init; } = [];

    /// <summary>True when it was stopped from outside and holds the best so far.</summary>
    public bool Interrupted { get; init; }
}
