using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>An aperture in its magnet, and the places at which it is looked at.</summary>
/// <param name="Aperture">The aperture.</param>
/// <param name="Shape">Its outline as a polygon.</param>
/// <param name="Samples">The places.</param>
/// <param name="Clearance">Distance to anything that is not air, metres; 0 when it touches.</param>
internal sealed record BeamPlace(Aperture Aperture, ApertureShape Shape, ApertureSamples Samples, double Clearance)
{
    private const double Overlap = 1e-4; // of the aperture's diagonal: so much counts as touching, not as crossing
    private const int LooksPerSide = 48;

    /// <summary>True when the aperture is so near to a part that no band of air fits between them.</summary>
    public bool Touches => Clearance < MeshSizing.LeastGap * Aperture.Outline.Bounds.Diagonal;

    /// <summary>Finds the aperture's place in a magnet.</summary>
    /// <exception cref="InputException">The aperture reaches into something that is not air, or lies inside it.</exception>
    public static BeamPlace In(Magnet magnet, Aperture aperture)
    {
        var shape = new ApertureShape(aperture);
        var samples = ApertureSamples.Of(aperture, shape);
        if (Trouble(magnet, aperture, samples) is not var (problem, layer))
        {
            return new BeamPlace(aperture, shape, samples, Beam.Clearance.Of(magnet, aperture));
        }

        Point centre = aperture.Centre;
        throw new InputException([new Finding(
            Severity.Fault,
            "beam-in-part",
            FormattableString.Invariant(
                $"The beam's aperture around ({1e3 * centre.Y:g6}, {1e3 * centre.Z:g6}) mm {problem}."),
            "Move or shrink the aperture so that it lies in air; it may touch a part.") { At = centre, Layer = layer }]);
    }

    private static (string Problem, string? Layer)? Trouble(Magnet magnet, Aperture aperture, ApertureSamples samples)
    {
        CrossSection section = magnet.Section;
        int centre = SectionPoint.RegionAt(section, aperture.Centre);
        if (centre == CrossSection.Outside)
        {
            return ("lies outside the model's rim", null);
        }

        if (Beam.Clearance.IsSolid(magnet, centre))
        {
            string inside = section.Parts[section.Regions[centre].Part];
            return ($"lies inside the part on layer {inside}", inside);
        }

        double overlap = Overlap * aperture.Outline.Bounds.Diagonal;
        foreach (Point p in samples.Inside.Concat(JustInside(aperture, overlap)))
        {
            int region = SectionPoint.RegionAt(section, p);
            if (region == CrossSection.Outside)
            {
                return ("reaches beyond the model's rim", null);
            }

            if (Beam.Clearance.IsSolid(magnet, region))
            {
                string layer = section.Parts[section.Regions[region].Part];
                return ($"reaches into the part on layer {layer}", layer);
            }
        }

        return section.Edges.Any(e => IsBoundary(magnet, e) && ReachesInto(aperture, e.Curve, overlap))
            ? ("encloses a part of iron, a magnet or a conductor, or is crossed by one", null)
            : null;
    }

    private static IEnumerable<Point> JustInside(Aperture aperture, double depth) =>
        aperture.Outline.Curves.SelectMany(c => Enumerable.Range(0, LooksPerSide).Select(k =>
        {
            double t = (k + 0.5) / LooksPerSide;
            return c.At(t) + (depth * c.Derivative(t).Unit().Perpendicular);
        }));

    private static bool IsBoundary(Magnet magnet, SectionEdge e) =>
        Beam.Clearance.IsSolid(magnet, e.Left) || Beam.Clearance.IsSolid(magnet, e.Right);

    private static bool ReachesInto(Aperture aperture, Curve curve, double overlap)
    {
        for (int k = 0; k <= LooksPerSide; k++)
        {
            Point p = curve.At((double)k / LooksPerSide);
            if (aperture.Outline.Contains(p) && aperture.Outline.DistanceToEdge(p) > overlap)
            {
                return true;
            }
        }

        return false;
    }
}
