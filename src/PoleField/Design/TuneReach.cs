using PoleField.Beam;
using PoleField.Geometry;

namespace PoleField.Design;

/// <summary>Which stretch of which face moves.</summary>
internal static class TuneReach
{
    private const double Wanted = 0.99;  // share of a face's effect on the gradient that a stretch must hold
    private const double Farthest = 6;   // in distances from the beam to the face: half the longest stretch
    private const int Samples = 512;

    /// <summary>Modes of each stretch.</summary>
    /// <exception cref="InputException">A stretch names no face of iron.</exception>
    public static IEnumerable<FaceModes> Modes(
        IReadOnlyList<Face> faces, TuneSettings settings, FixedMeshSolve start, Aperture aperture)
    {
        var effect = new Lazy<(Sensitivity Of, double[] Density)>(() =>
        {
            Sensitivity s = Sensitivity.Of(start);
            return (s, s.Densities([DesignQuantity.Gradient.Terms(s.Measures, s.SampleWeights)])[0]);
        });
        bool even = IsMirrored(start.Measures);
        foreach (TuneStretch stretch in settings.Stretches)
        {
            Face[] own = [.. faces.Where(f => string.Equals(f.Layer, stretch.Layer, StringComparison.OrdinalIgnoreCase))];
            if (own.Length == 0)
            {
                throw new InputException([new Finding(
                    Severity.Fault, "no-face", $"Layer {stretch.Layer} has no face of iron towards air.", "Name a part of iron that faces the beam.")]);
            }

            Point beam = aperture.Centre;
            Face face = own.MinBy(f => Nearest(f, beam).Distance)!;
            (double from, double to) = stretch is { From: { } a, To: { } b }
                ? (Nearest(face, a).At, Nearest(face, b).At)
                : Around(face, effect.Value.Of, effect.Value.Density, beam);
            yield return FaceModes.On(face, Math.Min(from, to), Math.Max(from, to), settings.Freedoms, even);
        }
    }

    // A magnet that is its own mirror image has a field of one direction on y = 0, and |By| the same on both sides.
    public static bool IsMirrored(BeamMeasures m)
    {
        const double tolerance = 1e-4;
        double scale = Math.Abs(m.Centre.Bz);
        return Math.Abs(m.Centre.At.Y) < 1e-9
            && m.ProfileY.Zip(m.ProfileY.Reverse(), (a, b) => Math.Abs(a.Bz - b.Bz) + Math.Abs(a.By + b.By)).Max() < tolerance * scale;
    }

    /// <summary>
    /// Places and weights for tuning: more of them along the aperture's longer side than the report has, because faces with
    /// many freedoms could make a few places right and leave those between them wrong.
    /// </summary>
    public static (Point[] Places, double[] Weights) Places(Aperture aperture, bool mirrored)
    {
        const int many = 20, few = 4, equal = 10;
        Box box = aperture.Outline.Bounds;
        double ratio = box.Width / box.Height;
        var samples = ApertureSamples.Of(
            aperture, new ApertureShape(aperture), ratio > 2 ? (few, many) : ratio < 0.5 ? (many, few) : (equal, equal));
        int[] kept = [.. Enumerable.Range(0, samples.Inside.Length).Where(k => !mirrored || samples.Inside[k].Y >= 0)];
        double total = kept.Sum(k => samples.Weights[k]);
        return ([.. kept.Select(k => samples.Inside[k])], [.. kept.Select(k => samples.Weights[k] / total)]);
    }

    private static (double At, double Distance) Nearest(Face face, Point p)
    {
        (double at, double best) = (0, double.PositiveInfinity);
        foreach (Face.FaceEdge e in face.Edges)
        {
            double t = e.Edge.Curve.ClosestParameter(p);
            double distance = e.Edge.Curve.At(t).DistanceTo(p);
            (at, best) = distance < best ? (e.ArcLengthAt(t), distance) : (at, best);
        }

        return (at, best);
    }

    // Symmetric about the place nearest to the beam, as far as the face matters, within one turn of a closed outline.
    private static (double From, double To) Around(Face face, Sensitivity s, double[] density, Point beam)
    {
        (double middle, double distance) = Nearest(face, beam);
        double half = Math.Min(Math.Min(middle, face.Length - middle), Farthest * distance);
        (double Away, double Weight)[] points =
        [
            .. Enumerable.Range(0, density.Length)
                .Select(i => (At: face.ArcLengthAt(s.Points[i].SectionEdge, s.Points[i].Parameter), Weight: Math.Abs(density[i]) * s.Points[i].Length))
                .Where(p => p.At is not null)
                .Select(p => (Math.Abs(p.At!.Value - middle), p.Weight)),
        ];
        double total = points.Sum(p => p.Weight);
        for (int k = 1; k <= Samples; k++)
        {
            double reach = half * k / Samples;
            if (points.Where(p => p.Away <= reach).Sum(p => p.Weight) >= Wanted * total)
            {
                return (middle - reach, middle + reach);
            }
        }

        return (middle - half, middle + half);
    }
}
