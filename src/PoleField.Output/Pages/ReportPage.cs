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
    /// <summary>Heading.</summary>
    public required string Heading { get; init; }

    /// <summary>What the reader should take from it, one or two sentences; may be empty.</summary>
    public string Text { get; init; } = "";

    /// <summary>Tables in sight.</summary>
    public IReadOnlyList<ReportTable> Tables { get; init; } = [];

    /// <summary>Pictures.</summary>
    public IReadOnlyList<ReportPicture> Pictures { get; init; } = [];

    /// <summary>Remarks listed under the rest.</summary>
    public IReadOnlyList<string> Remarks { get; init; } = [];
}

/// <summary>A report as one page: the result, and each analysis that was made. Sections that are null are left out.</summary>
public sealed record ReportPage
{
    /// <summary>The result the page leads with; also embedded as data.</summary>
    public required SolveResult Result { get; init; }

    /// <summary>Field lines of the whole section and around the beam.</summary>
    public IReadOnlyList<ReportPicture> Field { get; init; } = [];

    /// <summary>Gradient map and profiles.</summary>
    public IReadOnlyList<ReportPicture> Aperture { get; init; } = [];

    /// <summary>Flux density in the iron.</summary>
    public ReportPicture? Saturation { get; init; }

    /// <summary>Excitation curve.</summary>
    public ReportSection? Ramp { get; init; }

    /// <summary>Comparison with the two-wire field.</summary>
    public ReportSection? TwoWire { get; init; }

    /// <summary>Tuning of the faces.</summary>
    public ReportSection? Tuning { get; init; }

    /// <summary>Tolerance budget.</summary>
    public ReportSection? Tolerance { get; init; }

    /// <summary>Coil: current density, heat, cooling.</summary>
    public ReportSection? Coil { get; init; }

    /// <summary>Stray field around the magnet.</summary>
    public ReportSection? StrayField { get; init; }

    /// <summary>Deflection and pattern of the beam.</summary>
    public ReportSection? Deflection { get; init; }

    /// <summary>Any other sections, in order, after the named ones.</summary>
    public IReadOnlyList<ReportSection> Further { get; init; } = [];

    /// <summary>When the page was made; null leaves it out, so that equal input gives equal bytes.</summary>
    public DateTimeOffset? MadeAt { get; init; }
}
