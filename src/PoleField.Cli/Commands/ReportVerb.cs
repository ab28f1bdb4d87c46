using System.CommandLine;
using PoleField.Beam;
using PoleField.Cli.Files;
using PoleField.Cli.Text;
using PoleField.Output.Pages;

namespace PoleField.Cli.Commands;

/// <summary><c>polefield report CASE.toml</c>: solve and all analyses as one page, and its pictures.</summary>
internal sealed class ReportVerb
{
    private const string Ending = ".report.html";

    private readonly Tool _tool;
    private readonly CaseRun _run;
    private readonly Option<string?> _figures = CommonOptions.Figures();

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
            ],
            Notes = ["The page needs no network and no scripts, follows the reader's light or dark setting, and carries the result file inside."],
        };
        verb._run.AddTo(command, withJson: false);
        command.Options.Add(verb._figures);
        tool.SetRun(command, verb.Run);
        return command;
    }

    private int Run(ParseResult arguments, CancellationToken cancellation)
    {
        if (_run.Load(arguments) is not { } loaded)
        {
            return ExitStatus.WrongInput;
        }

        ReportPart[] parts = [.. _tool.Pipeline.Analyses.Select(a => a.Report).OfType<ReportPart>()];
        string target = ResultName.For(_run.CasePath(arguments), Ending, _run.Out(arguments));
        var pictures = new PictureFiles(arguments.GetValue(_figures), _tool.Terminal.Error);
        IEnumerable<string> drawn = pictures.Targets(ReportOutput.Pictures.Concat(parts.SelectMany(p => p.Pictures)));
        using OutputFiles files = OutputFiles.Plan(drawn.Prepend(target), _run.Force(arguments));
        SolveOptions options = _run.OptionsOf(arguments, loaded);
        SolvedCase solved;
        ReportPage page;
        using (ProgressLine progress = _run.Progress(arguments, options))
        {
            solved = _run.Solve(loaded, options, progress, cancellation);
            var request = new AnalysisRequest
            {
                Solved = solved,
                Options = options,
                Arguments = arguments,
                Progress = progress.Report,
                Cancellation = cancellation,
            };
            page = parts.Aggregate(_tool.Pipeline.Page(solved), (p, part) => part.AddTo(request, p));
        }

        files.Write(target, s => HtmlReport.Write(page, s));
        pictures.Write(files, ReportOutput.PicturesOf(page), cancellation);
        files.Commit(cancellation);
        if (!_run.Quiet(arguments))
        {
            _tool.Terminal.Error.WriteLine($"Report: {target}");
        }

        _run.ReportNotMet(solved);
        return solved.AllMet ? ExitStatus.Done : ExitStatus.NotMet;
    }
}
