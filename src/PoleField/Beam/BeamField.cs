using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>How the beam's field was taken from the finite elements.</summary>
public enum BeamFieldMethod
{
    /// <summary>
    /// By weighted integrals over a band of air around the aperture (Babuška and Miller 1984, recalled from memory): one exactly
    /// harmonic function.
    /// </summary>
    HarmonicBand,

    /// <summary>
    /// By harmonic polynomials fitted to the elements around each place, where the aperture touches a part and leaves no room for a
    /// band: harmonic at each place, with small jumps from place to place and a larger error.
    /// </summary>
    LocalFits,
}

/// <summary>The field in and around the aperture, extracted from the finite-element potential instead of differentiated.</summary>
public sealed class BeamField
{
    private readonly Func<Point, BeamValues> _at;

    internal BeamField(Aperture aperture, Func<Point, BeamValues> at, BeamFieldMethod method)
    {
        Aperture = aperture;
        _at = at;
        Method = method;
    }

    /// <summary>The aperture it was made for.</summary>
    public Aperture Aperture { get; }

    /// <summary>How it was obtained.</summary>
    public BeamFieldMethod Method { get; }

    /// <summary>Values at a place inside the aperture (or on its edge).</summary>
    public BeamValues At(Point p) => _at(p);

    /// <summary>The sum of two fields.</summary>
    internal BeamField Plus(BeamField other) => new(
        Aperture,
        p =>
        {
            (BeamValues a, BeamValues b) = (_at(p), other._at(p));
            return new BeamValues(p, a.By + b.By, a.Bz + b.Bz, a.DByDz + b.DByDz, a.DBzDz + b.DBzDz);
        },
        Method);
}
