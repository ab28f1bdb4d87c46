using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// Follows one particle through the magnet and the drift behind it: m r̈ = μ(B) grad|B| across the beam, with the field the
/// same all along the iron length and nothing outside it.
/// </summary>
/// <remarks>Nyström's method of fourth order (Nyström 1925; Hairer, Nørsett and Wanner, Solving ODEs I, II.14, recalled from memory).</remarks>
/// <param name="field">Field in the room.</param>
/// <param name="mass">Mass, kg.</param>
/// <param name="length">Length of the magnet, metres.</param>
/// <param name="drift">Magnet exit to detector, metres.</param>
internal sealed class Trajectory(FlightField field, double mass, double length, double drift)
{
    private const int Steps = 8;

    /// <summary>Place at the detector; null when the particle leaves the room inside the magnet.</summary>
    /// <param name="entrance">Place at the entrance, where it flies straight along the beam.</param>
    /// <param name="speed">Speed, m/s.</param>
    /// <param name="moment">Effective moment (J/T) at a field (T).</param>
    /// <param name="steps">Steps along the magnet.</param>
    public Point? At(Point entrance, double speed, Func<double, double> moment, int steps = Steps)
    {
        // Along s = x / length the equation is r'' = (length² / m v²) μ grad|B|.
        double scale = length * length / (mass * speed * speed);
        double h = 1.0 / steps;
        Point place = entrance;
        Point slope = default;
        for (int k = 0; k < steps; k++)
        {
            if (Force(place, moment) is not { } k1
                || Force(place + (0.5 * h * slope) + (h * h * scale / 8 * k1), moment) is not { } k2
                || Force(place + (h * slope) + (h * h * scale / 2 * k2), moment) is not { } k3)
            {
                return null;
            }

            place += (h * slope) + (h * h * scale / 6 * (k1 + (2 * k2)));
            slope += h * scale / 6 * (k1 + (4 * k2) + k3);
        }

        return IsInside(place) ? place + (drift / length * slope) : null;
    }

    private Point? Force(Point p, Func<double, double> moment)
    {
        if (!IsInside(p))
        {
            return null;
        }

        BeamValues v = field.At(p);
        return moment(v.Field) * new Point(v.TransverseGradient, v.Gradient);
    }

    private bool IsInside(Point p)
    {
        Box room = field.Room;
        return p.Y >= room.Min.Y && p.Y <= room.Max.Y && p.Z >= room.Min.Z && p.Z <= room.Max.Z;
    }
}
