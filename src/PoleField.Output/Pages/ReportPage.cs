using PoleField.Output.Figures;
using PoleField.Output.Results;

namespace PoleField.Output.Pages;

/// <summary>A table of a page; cells are plain text.</summary>
/// <param name="Caption">What the table holds.</param>
/// <param name="Columns">Headings with units.</param>
/// <param name="Rows">Rows, each with as many cells as there are headings; the first cell names the row.</param>
public sealed record ReportTable(string Caption, IReadOnlyList<string> Columns, IReadOnlyList<IReadOnlyList<string>> Rows);

/// <summary>A picture with the numbers behind it.</summary>
/// <param name="Figure">The picture.</param>
/// <param name="Numbers">The numbers it shows, folded away under it; null for none.</param>
public sealed record ReportPicture(Figure Figure, ReportTable? Numbers = null);

/// <summary>One analysis on the page.</summary>
public sealed record ReportSection
{
    /// <summary>Name of its anchor, lower-case letters and hyphens, unique on the page.</summary>
    public required string Id { get; init; }

    /// <summary>Heading.</summary>
    public required string Heading { get; init; }

    /// <summary>Tables in sight.</summary>
    public IReadOnlyList<ReportTable> Tables { get; init; } = [];

    /// <summary>Pictures.</summary>
    public IReadOnlyList<ReportPicture> Pictures { get; init; } = [];

    /// <summary>What to make of the numbers, and what they leave out; listed under the rest.</summary>
    public IReadOnlyList<string> Remarks { get; init; } = [];
}

/// <summary>A report as one page: the result file with its pictures, and each analysis that was made.</summary>
public sealed record ReportPage
{
    /// <summary>The result the page leads with; also embedded as data.</summary>
    public required ResultFile Result { get; init; }

    /// <summary>What the page lacks and why; empty when it is whole.</summary>
    public string Lacks { get; init; } = "";

    /// <summary>Field lines of the whole section and around the beam.</summary>
    public IReadOnlyList<ReportPicture> Field { get; init; } = [];

    /// <summary>Gradient map and profiles.</summary>
    public IReadOnlyList<ReportPicture> Aperture { get; init; } = [];

    /// <summary>Flux density in the iron.</summary>
    public ReportPicture? Saturation { get; init; }

    /// <summary>Further sections in their order: coils and stray field, then the analyses.</summary>
    public IReadOnlyList<ReportSection> Sections { get; init; } = [];

    /// <summary>All pictures in the order of the page.</summary>
    public IEnumerable<ReportPicture> Pictures =>
        [.. Aperture, .. Field, .. Saturation is null ? (ReportPicture[])[] : [Saturation], .. Sections.SelectMany(s => s.Pictures)];
}
