using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>What the files of all analyses repeat of the solve.</summary>
internal static class AnalysisOutput
{
    public static AnalysisHead HeadOf(SolvedCase result) => new(
        result.Case.Case?.Title ?? string.Empty,
        result.Case.CaseSha256,
        result.Case.SketchSha256,
        ResultOutput.ProgramVersion,
        result.Solved.Report);
}
