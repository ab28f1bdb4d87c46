using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Pages;
using PoleField.Output.Results;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield report CASE.toml</c>: solve and all analyses as one page, and its pictures; or the page of a result file.</summary>
internal sealed class ReportVerb
{
    private const string Ending = ".report.html";
    private const string ResultEnding = ".result";

    private const string FromResult =
        "Made from the result file alone: pictures of the field and the analyses need the case; make the report from it to have them.";

    private readonly Tool _tool;
    private readonly CaseRun _run;

    private ReportVerb(Tool tool)
    {
        _tool = tool;
        _run = new CaseRun(tool, "HTML file, or folder for it. Default: CASE.report.html in the current folder.");
    }

    public static VerbCommand Create(Tool tool)
    {
        var verb = new ReportVerb(tool);
        var command = new VerbCommand("report", "Solve and all analyses the case asks for, as one HTML page that prints well.")
        {
            Examples =
            [
                ("polefield report magnet.toml", "writes magnet.report.html"),
                ("polefield report magnet.toml --figures pictures/", "also each picture as SVG and PNG"),
                ("polefield report magnet.result.json", "the page of a result file, without solving"),
            ],
            Notes = ["The page needs no network and no scripts, follows the reader's light or dark setting, and carries the result file inside."],
        };
        verb._run.AddTo(command, withJson: false);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation) =>
        Path.GetExtension(_run.CasePath(arguments)).Equals(".json", StringComparison.OrdinalIgnoreCase)
            ? OfResult(arguments, cancellation)
            : OfCase(arguments, cancellation);

    private int OfResult(ParseResult arguments, CancellationToken cancellation)
    {
        string path = _run.CasePath(arguments);
        byte[] bytes = CaseLoader.ReadFile(path, "result file");
        ResultFile result = ResultJson.Read(new MemoryStream(bytes), Path.GetFileName(path));
        string name = Path.GetFileNameWithoutExtension(path);
        name = name.EndsWith(ResultEnding, StringComparison.OrdinalIgnoreCase) ? name[..^ResultEnding.Length] : name;
        string target = ResultName.For(name + ".toml", Ending, _run.Out(arguments));
        PictureFiles pictures = _run.Pictures(arguments);
        using OutputFiles files = OutputFiles.Plan(pictures.Targets(ReportOutput.PicturesOfResult).Prepend(target), _run.Force(arguments));
        Write(arguments, ReportOutput.PageOf(result) with { Lacks = FromResult }, (files, target, pictures), cancellation);
        return result.Require.All(r => r.Met) && result.Run.AccuracyReached <= result.Run.AccuracyAsked ? ExitStatus.Done : ExitStatus.NotMet;
    }

    private int OfCase(ParseResult arguments, CancellationToken cancellation)
    {
        if (_run.Load(arguments) is not { } loaded)
        {
            return ExitStatus.WrongInput;
        }

        AnalysisStep[] steps = [.. _tool.Pipeline.Analyses.Where(a => a.IsInReport(loaded.Case!))];
        string target = ResultName.For(_run.CasePath(arguments), Ending, _run.Out(arguments));
        PictureFiles pictures = _run.Pictures(arguments);
        IEnumerable<string> drawn = pictures.Targets(ReportOutput.Pictures.Union(steps.SelectMany(s => s.Pictures)));
        using OutputFiles files = OutputFiles.Plan(drawn.Prepend(target), _run.Force(arguments));
        SolveOptions options = _run.OptionsOf(arguments, loaded);
        SolvedCase solved;
        ReportPage page;
        using (ProgressLine progress = _run.Progress(arguments, options))
        {
            solved = _run.Solve(loaded, options, progress, cancellation);
            AnalysisRequest request = CaseRun.Request(arguments, solved, new SolveSteps(options, progress.Report, cancellation));
            page = _tool.Pipeline.Page(solved);
            page = page with { Sections = [.. page.Sections, .. steps.Select(s => SectionOf(s, request, page))] };
        }

        Write(arguments, page, (files, target, pictures), cancellation);
        _run.ReportNotMet(solved);
        return solved.AllMet ? ExitStatus.Done : ExitStatus.NotMet;
    }

    // An analysis that this magnet does not allow says why in its place; the rest of the page stands.
    private static ReportSection SectionOf(AnalysisStep step, AnalysisRequest request, ReportPage page)
    {
        try
        {
            Analysis analysis = step.Run(request);
            string[] there = [.. page.Pictures.Select(p => p.Figure.Name)];
            return analysis.Answer.ForPage(step.Name, [.. analysis.Pictures.Where(p => !there.Contains(p.Figure.Name))]);
        }
        catch (InputException e)
        {
            return new ReportSection
            {
                Id = step.Name,
                Heading = char.ToUpperInvariant(step.Name[0]) + step.Name[1..],
                Remarks = [.. e.Findings.Select(f => $"Not made: {f.Text} {f.Fix}")],
            };
        }
    }

    private void Write(
        ParseResult arguments, ReportPage page, (OutputFiles Files, string Page, PictureFiles Pictures) to, CancellationToken cancellation)
    {
        to.Files.Write(to.Page, s => HtmlReport.Write(page, s));
        to.Pictures.Write(to.Files, [.. page.Pictures.Select(p => p.Figure)], cancellation);
        to.Files.Commit(cancellation);
        if (!_run.Quiet(arguments))
        {
            _tool.Terminal.Error.WriteLine($"Report: {to.Page}");
        }
    }
}
