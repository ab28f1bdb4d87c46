using System.Numerics;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Output.Figures;

namespace PoleField.Cli.Files;

/// <summary>
/// The field of two opposite line currents at (±a, 0) about a midpoint (Biot and Savart), scaled to a given field at one place:
/// B_z − i B_y is proportional to 1/(s² + a²), s = z + i y.
/// </summary>
internal sealed class TwoWireCurve
{
    private readonly double _halfSpacing;
    private readonly Point _midpoint;
    private readonly Complex _strength;

    /// <param name="halfSpacing">a, metres.</param>
    /// <param name="midpoint">Midpoint of the wires, metres.</param>
    /// <param name="beam">Where the field shall be as computed.</param>
    public TwoWireCurve(double halfSpacing, Point midpoint, BeamValues beam)
    {
        (_halfSpacing, _midpoint) = (halfSpacing, midpoint);
        Complex s = Place(beam.At);
        _strength = beam.Field / Complex.Abs(1 / ((s * s) + (halfSpacing * halfSpacing))) * Math.Sign(beam.Bz == 0 ? 1 : beam.Bz);
    }

    /// <summary>Field and derivatives at a place.</summary>
    public BeamValues At(Point p)
    {
        Complex s = Place(p);
        Complex f = _strength / ((s * s) + (_halfSpacing * _halfSpacing));
        Complex slope = -2 * s * f / ((s * s) + (_halfSpacing * _halfSpacing));
        return new BeamValues(p, -f.Imaginary, f.Real, -slope.Imaginary, slope.Real);
    }

    /// <summary>Its profiles at the places of computed ones.</summary>
    public Profiles Along(BeamReport report) => new(
        "two-wire field", [.. report.ProfileY.Select(v => At(v.At))], [.. report.ProfileZ.Select(v => At(v.At))]);

    private Complex Place(Point p) => new(p.Z - _midpoint.Z, p.Y - _midpoint.Y);
}
