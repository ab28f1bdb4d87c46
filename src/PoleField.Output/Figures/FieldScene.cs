using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Magnetostatics;

namespace PoleField.Output.Figures;

/// <summary>What pictures of a solved cross-section need.</summary>
public sealed record FieldScene
{
    /// <summary>The section, whose exact curves are drawn.</summary>
    public required CrossSection Section { get; init; }

    /// <summary>The field, cut into small triangles.</summary>
    public required IReadOnlyList<FieldTriangle> Triangles { get; init; }

    /// <summary>Ampere-turns of each part, in the order of <see cref="CrossSection.Parts"/>; zero for parts without current.</summary>
    public required IReadOnlyList<double> AmpereTurns { get; init; }

    /// <summary>True for each part that carries flux (iron), in the order of <see cref="CrossSection.Parts"/>.</summary>
    public required IReadOnlyList<bool> IsIron { get; init; }

    /// <summary>The aperture.</summary>
    public required Aperture Aperture { get; init; }

    /// <summary>The numbers for the caption, such as field and gradient at the beam; one or two sentences.</summary>
    public string Caption { get; init; } = "";

    /// <summary>The scene of a solved magnet; each element is cut into <paramref name="cuts"/>² triangles.</summary>
    public static FieldScene Of(SolvedMagnet solved, int cuts = 6)
    {
        Magnet magnet = solved.Solution.Magnet;
        BeamReport report = solved.Report;
        BeamValues beam = report.Beam;
        return new FieldScene
        {
            Section = magnet.Section,
            Triangles = [.. solved.Solution.Triangles(cuts)],
            AmpereTurns = [.. magnet.Roles.Select(r => r.AmpereTurns)],
            IsIron = [.. magnet.Roles.Select(r => r.Kind == "iron")],
            Aperture = solved.Field.Aperture,
            Caption = $"At the beam (y = {FigureStyle.Number(1e3 * beam.At.Y)} mm, z = {FigureStyle.Number(1e3 * beam.At.Z)} mm): "
                + $"|B| = {FigureStyle.Number(beam.Field)} T, d|B|/dz = {FigureStyle.Number(beam.Gradient)} T/m.",
        };
    }

    /// <summary>Ampere-turns of a region: those of its part, opposite in a mirror image.</summary>
    internal double CurrentOf(Region region) =>
        region.Part < 0 ? 0 : region.MirrorImage ? -AmpereTurns[region.Part] : AmpereTurns[region.Part];
}
