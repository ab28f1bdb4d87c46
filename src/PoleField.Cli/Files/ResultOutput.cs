using System.Reflection;
using PoleField.Beam;
using PoleField.Cli.Case;
using PoleField.Cli.Text;
using PoleField.Output.Results;

namespace PoleField.Cli.Files;

/// <summary>Hands a solved case to the writers of results and pictures.</summary>
internal static class ResultOutput
{
    /// <summary>Version with commit.</summary>
    public static string ProgramVersion { get; } =
        typeof(ResultOutput).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()?.InformationalVersion ?? "unknown";

    /// <summary>The result file.</summary>
    public static ResultFile FileOf(SolvedCase result) => ResultJson.ToFile(Of(result));

    /// <summary>What the files of all analyses repeat of the solve.</summary>
    public static AnalysisHead HeadOf(SolvedCase result) => new(
        result.Case.Case?.Title ?? string.Empty, result.Case.CaseSha256, result.Case.SketchSha256, ProgramVersion, result.Solved.Report);

    private static SolveResult Of(SolvedCase result)
    {
        SolveRecord record = result.Solved.Record;
        return new SolveResult
        {
            Title = result.Case.Case?.Title ?? string.Empty,
            CaseSha256 = result.Case.CaseSha256,
            SketchSha256 = result.Case.SketchSha256,
            ProgramVersion = ProgramVersion,
            Report = result.Solved.Report,
            Record = record,
            Seconds = new RunSeconds(
                result.ReadSeconds, record.MeshSeconds, record.SolveSeconds, record.EvaluateSeconds, result.TotalSeconds),
            PeakMemoryMB = result.PeakMemoryMegabytes,
            Requirements = [.. result.Verdicts.Select(Requirement)],
            Materials = [.. result.Case.Roles.Select(r => r.Material).DistinctBy(m => m.Name)],
            Operation = result.Operation,
            Cautions = result.Cautions,
            Warnings = [.. result.Warnings.Select(w => Warning(w, result.Case.DrawingUnit))],
        };
    }

    private static RequirementResult Requirement(Verdict verdict)
    {
        Unit unit = verdict.Limit.Quantity.Dimension.Shown;
        return new RequirementResult(
            verdict.Limit.Name,
            unit.Name.Length > 0 ? unit.Name : "1",
            unit.FromSi(verdict.Limit.Bound),
            verdict.Found is { } found ? unit.FromSi(found.Value) : double.NaN,
            verdict.Met);
    }

    private static ResultWarning Warning(Finding finding, string drawingUnit) => new(
        (finding.File + " " + FindingText.Place(finding, drawingUnit)).Trim(' ', ':'), $"{finding.Text} {finding.Fix}".Trim());
}
