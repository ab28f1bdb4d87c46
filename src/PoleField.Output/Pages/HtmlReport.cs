using System.Globalization;
using System.Text;
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
        ResultFile result = page.Result;
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
        (BeamSection beam, ApertureSection aperture) = (page.Result.Beam, page.Result.Aperture);
        html.Raw("<header>").Element("h1", page.Result.Title);
        (string kind, string words) = OverallVerdict(page.Result);
        html.Raw($"<p class=\"verdict {kind}\">{PageText.Escape(words)}</p>");
        html.Element("p class=\"lacks\"", page.Lacks);
        html.Raw("<dl class=\"key\">");
        Key(html, "field |B| at the beam", $"{ResultTables.Number(beam.Field)} T", $"± {ResultTables.Number(beam.FieldError, 2)} T");
        Key(html, "gradient d|B|/dz", $"{ResultTables.Number(beam.Gradient)} T/m", $"± {ResultTables.Number(beam.GradientError, 2)} T/m");
        Key(html, "spread of the gradient", ResultTables.Percent(aperture.Gradient.Spread), $"rms {ResultTables.Percent(aperture.Gradient.Rms)}");
        Key(html, "clearance of the beam", $"{ResultTables.Number(aperture.Clearance, 3)} mm", "to the nearest part");
        PartSection? worst = page.Result.Parts.Where(p => p.Kind == "iron" && p.FieldMax is not null).MaxBy(p => p.FieldMax);
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

    private static (string Kind, string Words) OverallVerdict(ResultFile result)
    {
        int missed = result.Require.Count(r => !r.Met);
        bool accurate = result.Run.AccuracyReached <= result.Run.AccuracyAsked;
        return (accurate, result.Require.Count, missed) switch
        {
            (false, _, 0) => ("missed", "✗ The asked accuracy was not reached"),
            (_, 0, _) => ("open", "The case sets no requirements"),
            (true, var all, 0) => ("met", all == 1 ? "✓ The requirement is met" : $"✓ All {all.ToString(CultureInfo.InvariantCulture)} requirements are met"),
            (_, var all, _) => ("missed", FormattableString.Invariant($"✗ {missed} of {all} requirements not met")),
        };
    }

    private static IEnumerable<(string Id, string Heading, Action<PageText> Body)> Sections(ReportPage page)
    {
        ResultFile result = page.Result;
        if (result.Require.Count > 0)
        {
            yield return ("requirements", "Requirements", h => h.Table(ResultTables.Requirements(result)));
        }

        if (result.Warnings.Count > 0)
        {
            yield return ("warnings", "Doubts of this run", h => h.List([.. result.Warnings.Select(w => w.Where.Length > 0 ? $"{w.Where}: {w.Text}" : w.Text)]));
        }

        yield return ("beam", "Beam and aperture", h => Pictures(h.Table(ResultTables.Beam(result.Beam)).Table(ResultTables.Aperture(result.Aperture)), page.Aperture));
        if (page.Field.Count > 0)
        {
            yield return ("field", "Field of the cross-section", h => Pictures(h, page.Field));
        }

        yield return ("iron", "Iron, currents and circuit", h => Iron(h, page));
        foreach (ReportSection section in page.Sections)
        {
            yield return (section.Id, section.Heading, h => WriteSection(h, section));
        }

        if (result.Cautions.Count > 0)
        {
            yield return ("cautions", "Cautions", h => h.List(result.Cautions));
        }

        yield return ("run", "Computation and provenance", h => h.Table(ResultTables.Run(result)).Table(ResultTables.Provenance(result)));
    }

    private static void Iron(PageText html, ReportPage page)
    {
        ResultFile result = page.Result;
        Pictures(html.Table(ResultTables.Iron(result.Parts)), page.Saturation is null ? [] : [page.Saturation]);
        html.Table(ResultTables.Circuit(result.Circuit));
        if (result.Parts.Any(p => p.Force is not null))
        {
            html.Table(ResultTables.Forces(result.Parts));
        }

        if (result.Parts.Any(p => p.ForceOnFreeFacesOnly == true))
        {
            html.Element("p class=\"soft\"", "Faces in air only: the part touches other iron or magnets, and what the joint itself carries is not in the number.");
        }

        if (result.Materials is { Count: > 0 } materials)
        {
            html.Table(ResultTables.Materials(materials));
        }
    }

    private static void WriteSection(PageText html, ReportSection section)
    {
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
        html.Raw("<footer>");
        html.Element("p", $"PoleField {page.Result.ProgramVersion}. Lengths in mm, everything else SI. Beam along +x, out of the page; z along the deflection, y across it.");
        html.Raw("</footer>");
    }

    // "<" as an escape, so that no text of the case can close the element.
    private static string EmbeddedJson(ResultFile result) =>
        JsonText.Of(result).TrimEnd().Replace("<", "\\u003c", StringComparison.Ordinal);
}
