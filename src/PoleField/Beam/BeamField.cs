using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// The field in and around the aperture as one exactly harmonic function, extracted from the finite-element potential by
/// weighted integrals over a band of air (Babuška and Miller 1984) instead of differentiation.
/// </summary>
public sealed class BeamField
{
    /// <summary>The aperture it was made for.</summary>
    public Aperture Aperture => throw new NotImplementedException("seam");

    /// <summary>Values at a place inside the aperture (or on its edge).</summary>
    public BeamValues At(Point p) => throw new NotImplementedException("seam");
}
