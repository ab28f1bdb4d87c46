using System.Numerics;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>How the beam's field is had from the nodes' potentials: linear in them, at any place of the aperture.</summary>
internal interface IBeamExtraction
{
    /// <summary>Space of the potentials.</summary>
    FiniteElementSpace Space { get; }

    /// <summary>The beam's field of a potential given by node.</summary>
    BeamField FieldOf(Aperture aperture, double[] potential);

    /// <summary>Derivative by the nodes' potentials of a sum of Re(first·F′ + second·F″) over places.</summary>
    double[] Functional(IReadOnlyList<BeamTerm> terms);
}

/// <summary>Re(First·F′ + Second·F″) at a place.</summary>
internal readonly record struct BeamTerm(Point At, Complex First, Complex Second);

/// <summary>The extraction applied to fields that every mesh holds exactly.</summary>
internal static class ExtractionCheck
{
    /// <summary>
    /// Largest error at the given places, relative: of A = 1 (must give no field) and of A = y (must give F′ = 1, F″ = 0),
    /// lengths in units of <paramref name="scale"/>.
    /// </summary>
    public static double Worst(IBeamExtraction extraction, Aperture aperture, IEnumerable<Point> places, double scale)
    {
        FiniteElementSpace space = extraction.Space;
        var ones = new double[space.NodeCount];
        var linear = new double[space.NodeCount];
        Point origin = aperture.Centre;
        for (int node = 0; node < ones.Length; node++)
        {
            ones[node] = 1.0;
            linear[node] = space.Places[node].Y - origin.Y;
        }

        BeamField one = extraction.FieldOf(aperture, ones);
        BeamField y = extraction.FieldOf(aperture, linear);
        double worst = 0;
        foreach (Point p in places)
        {
            BeamValues v = one.At(p);
            worst = Math.Max(worst, scale * Math.Max(Math.Abs(v.By), Math.Abs(v.Bz)));
            worst = Math.Max(worst, scale * scale * Math.Max(Math.Abs(v.DByDz), Math.Abs(v.DBzDz)));
            v = y.At(p);
            worst = Math.Max(worst, Math.Max(Math.Abs(v.By), Math.Abs(v.Bz + 1)));
            worst = Math.Max(worst, scale * Math.Max(Math.Abs(v.DByDz), Math.Abs(v.DBzDz)));
        }

        return worst;
    }
}
