using System.Globalization;
using System.Text;
using PoleField.Beam;
using PoleField.Output.Results;

namespace PoleField.Output.Pages;

/// <summary>
/// A report as one HTML file that needs nothing else: no scripts, no network, pictures inside. It follows the reader's light or
/// dark setting, prints on A4, and carries the result file as data.
/// </summary>
public static class HtmlReport
{
    // No script may run and nothing may be fetched; styles and pictures stand in the file.
    private const string Policy = "default-src 'none'; style-src 'unsafe-inline'; img-src data:";

    /// <summary>Writes the page, UTF-8 without byte order mark.</summary>
    public static void Write(ReportPage page, Stream stream) => stream.Write(new UTF8Encoding(false).GetBytes(Text(page)));

    /// <summary>The page as text.</summary>
    public static string Text(ReportPage page)
    {
        SolveResult result = page.Result;
        (string Id, string Heading, Action<PageText> Body)[] sections = [.. Sections(page)];
        PageText html = new();
        html.Raw("<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">");
        html.Raw($"<meta http-equiv=\"Content-Security-Policy\" content=\"{Policy}\">");
        html.Raw("<meta name=\"viewport\" content=\"width=device-width,initial-scale=1\">\n<meta name=\"color-scheme\" content=\"light dark\">");
        html.Raw("<link rel=\"icon\" href=\"data:,\">");
        html.Element("title", result.Title + " – field report");
        html.Raw($"<style>\n{PageStyle.Css}\n</style>\n</head>\n<body>");
        WriteHeader(html, page, sections);
        html.Raw("<main>");
        foreach ((string id, string heading, Action<PageText> body) in sections)
        {
            string kind = id == "cautions" ? " class=\"cautions\"" : "";
            html.Raw($"<section id=\"{id}\"{kind} aria-labelledby=\"{id}-heading\">");
            html.Raw($"<h2 id=\"{id}-heading\">{PageText.Escape(heading)}</h2>");
            body(html);
            html.Raw("</section>");
        }

        html.Raw("</main>");
        WriteFooter(html, page);
        html.Raw("<script type=\"application/json\" id=\"result\">");
        html.Raw(EmbeddedJson(result));
        html.Raw("</script>\n</body>\n</html>");
        return html.ToString();
    }

    private static void WriteHeader(PageText html, ReportPage page, IReadOnlyList<(string Id, string Heading, Action<PageText> Body)> sections)
    {
        BeamReport report = page.Result.Report;
        html.Raw("<header>").Element("h1", page.Result.Title);
        (string kind, string words) = OverallVerdict(page.Result);
        html.Raw($"<p class=\"verdict {kind}\">{PageText.Escape(words)}</p>");
        html.Raw("<dl class=\"key\">");
        Key(html, "field |B| at the beam", $"{ResultTables.Number(report.Beam.Field)} T", $"± {ResultTables.Number(report.FieldError, 2)} T");
        Key(html, "gradient d|B|/dz", $"{ResultTables.Number(report.Beam.Gradient)} T/m", $"± {ResultTables.Number(report.GradientError, 2)} T/m");
        Key(html, "spread of the gradient", ResultTables.Percent(report.Gradient.Spread), $"rms {ResultTables.Percent(report.Gradient.Rms)}");
        Key(html, "clearance of the beam", $"{ResultTables.Number(1e3 * report.Clearance, 3)} mm", "to the nearest part");
        PartReport? worst = report.Parts.Where(p => p.Kind == "iron" && p.FieldMax is not null).MaxBy(p => p.FieldMax);
        if (worst is not null)
        {
            Key(html, "largest |B| in iron", $"{ResultTables.Number(worst.FieldMax, 3)} T", "in " + worst.Layer);
        }

        html.Raw("</dl>\n<nav aria-label=\"Contents\"><ul>");
        foreach ((string id, string heading, _) in sections)
        {
            html.Raw($"<li><a href=\"#{id}\">{PageText.Escape(heading)}</a></li>");
        }

        html.Raw("</ul></nav>\n</header>");
    }

    private static void Key(PageText html, string name, string value, string small) =>
        html.Raw($"<div><dt>{PageText.Escape(name)}</dt><dd>{PageText.Escape(value)}<small>{PageText.Escape(small)}</small></dd></div>");

    private static (string Kind, string Words) OverallVerdict(SolveResult result)
    {
        int missed = result.Requirements.Count(r => !r.Met);
        return (result.Record.AccuracyMet, result.Requirements.Count, missed) switch
        {
            (false, _, 0) => ("missed", "✗ The asked accuracy was not reached"),
            (_, 0, _) => ("open", "The case sets no requirements"),
            (true, var all, 0) => ("met", all == 1 ? "✓ The requirement is met" : $"✓ All {all.ToString(CultureInfo.InvariantCulture)} requirements are met"),
            (_, var all, _) => ("missed", FormattableString.Invariant($"✗ {missed} of {all} requirements not met")),
        };
    }

    private static IEnumerable<(string Id, string Heading, Action<PageText> Body)> Sections(ReportPage page)
    {
        SolveResult result = page.Result;
        BeamReport report = result.Report;
        if (result.Requirements.Count > 0)
        {
            yield return ("requirements", "Requirements", h => h.Table(ResultTables.Requirements(result)));
        }

        if (result.Warnings.Count > 0)
        {
            yield return ("warnings", "Doubts of this run", h => h.List([.. result.Warnings.Select(w => w.Where.Length > 0 ? $"{w.Where}: {w.Text}" : w.Text)]));
        }

        yield return ("beam", "Beam and aperture", h => Pictures(h.Table(ResultTables.Beam(report)).Table(ResultTables.Aperture(report)), page.Aperture));
        if (page.Field.Count > 0)
        {
            yield return ("field", "Field of the cross-section", h => Pictures(h, page.Field));
        }

        yield return ("iron", "Iron, coils and circuit", h => Pictures(
            h.Table(ResultTables.Parts(report)).Table(ResultTables.Circuit(report.Circuit)), page.Saturation is null ? [] : [page.Saturation]));
        foreach ((string id, ReportSection? section) in Analyses(page))
        {
            if (section is not null)
            {
                yield return (id, section.Heading, h => WriteSection(h, section));
            }
        }

        if (result.Cautions.Count > 0)
        {
            yield return ("cautions", "Cautions", h => h.List(result.Cautions));
        }

        yield return ("run", "Computation and provenance", h => h.Table(ResultTables.Run(result)).Table(ResultTables.Provenance(result)));
    }

    private static IEnumerable<(string Id, ReportSection? Section)> Analyses(ReportPage page) =>
    [
        ("two-wire", page.TwoWire),
        ("ramp", page.Ramp),
        ("tolerance", page.Tolerance),
        ("tuning", page.Tuning),
        ("coil", page.Coil),
        ("stray-field", page.StrayField),
        ("deflection", page.Deflection),
        .. page.Further.Select((s, i) => ("further-" + (i + 1).ToString(CultureInfo.InvariantCulture), (ReportSection?)s)),
    ];

    private static void WriteSection(PageText html, ReportSection section)
    {
        html.Element("p", section.Text);
        foreach (ReportTable table in section.Tables)
        {
            html.Table(table);
        }

        Pictures(html, section.Pictures);
        html.List(section.Remarks);
    }

    private static void Pictures(PageText html, IReadOnlyList<ReportPicture> pictures)
    {
        foreach (ReportPicture picture in pictures)
        {
            html.Picture(picture);
        }
    }

    private static void WriteFooter(PageText html, ReportPage page)
    {
        string made = page.MadeAt is DateTimeOffset at
            ? " Made " + at.ToString("yyyy-MM-dd HH:mm zzz", CultureInfo.InvariantCulture) + "."
            : "";
        html.Raw("<footer>");
        html.Element("p", $"PoleField {page.Result.ProgramVersion}. Lengths in mm, everything else SI. Beam along +x, out of the page; z along the deflection, y across it.{made}");
        html.Raw("</footer>");
    }

    // "<" as an escape, so that no text of the case can close the element.
    private static string EmbeddedJson(SolveResult result) =>
        ResultJson.Text(ResultJson.ToFile(result)).TrimEnd().Replace("<", "\\u003c", StringComparison.Ordinal);
}
