using PoleField.Beam;
using PoleField.Drawing;
using PoleField.Geometry;
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

    /// <summary>Largest |B| in iron (T), where, and in which part, as the result states it; null to look for it in the triangles.</summary>
    public (double Field, Point At, string Part)? IronPeak { get; init; }

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
            Triangles = [.. solved.Solution.Triangles(cuts), .. Beyond(solved.Solution)],
            AmpereTurns = [.. magnet.Roles.Select(r => r.AmpereTurns)],
            IsIron = [.. magnet.Roles.Select(r => r.Kind == "iron")],
            Aperture = solved.Field.Aperture,
            IronPeak = PeakOf(report),
            Caption = $"At the beam (y = {FigureStyle.Number(1e3 * beam.At.Y)} mm, z = {FigureStyle.Number(1e3 * beam.At.Z)} mm): "
                + $"|B| = {FigureStyle.Number(beam.Field)} T, d|B|/dz = {FigureStyle.Number(beam.Gradient)} T/m.",
        };
    }

    // A ring around the circle that is meshed, so that the corners of a view are not left empty.
    private static IEnumerable<FieldTriangle> Beyond(FieldSolution solution)
    {
        if (solution.Mesh.Circle is not { } circle)
        {
            return [];
        }

        const int around = 360, outwards = 30;
        const double first = 0.998, last = 2; // radii of the ring over that of the circle; it overlaps a little so that no pixel stays empty
        FieldSample?[] samples = new FieldSample?[(around + 1) * (outwards + 1)];
        for (int i = 0; i < samples.Length; i++)
        {
            samples[i] = solution.At(Place(i));
        }

        return Enumerable.Range(0, around * outwards).SelectMany(k =>
        {
            int a = (k / around * (around + 1)) + (k % around), b = a + 1, c = a + around + 1, d = c + 1;
            return (FieldTriangle?[])[Triangle(a, c, b), Triangle(b, c, d)];
        }).OfType<FieldTriangle>();

        Point Place(int i) => circle.Centre + Point.Polar(
            circle.Radius * (first + ((last - first) * (i / (around + 1)) / outwards)), Math.Tau * (i % (around + 1)) / around);

        FieldTriangle? Triangle(int i, int j, int k) =>
            samples[i] is FieldSample s && samples[j] is FieldSample t && samples[k] is FieldSample u
                ? new FieldTriangle(Place(i), Place(j), Place(k), s, t, u, CrossSection.Air)
                : null;
    }

    private static (double Field, Point At, string Part)? PeakOf(BeamReport report) =>
        report.Parts.Where(p => p.Kind == "iron" && p.FieldMax is not null).MaxBy(p => p.FieldMax) is { FieldMaxAt: { } at } worst
            ? (worst.FieldMax!.Value, at, worst.Layer)
            : null;

    /// <summary>Ampere-turns of a region: those of its part, opposite in a mirror image.</summary>
    internal double CurrentOf(Region region) =>
        region.Part < 0 ? 0 : region.MirrorImage ? -AmpereTurns[region.Part] : AmpereTurns[region.Part];
}
