using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>The rectangle of air around the aperture in which particles are followed, and the field in it.</summary>
/// <param name="Field">The field.</param>
/// <param name="Margin">Distance that is kept to anything that is not air, metres.</param>
internal sealed record FlightRoom(FlightField Field, double Margin)
{
    private const double LargestGrowth = 4.0;   // on each side, in widths or heights of the beam
    private const int MostMoves = 24;

    // Margin as a share of the aperture's clearance, and growth as a share of the largest: the extraction needs a layer of
    // air elements in what is kept, and far from the beam elements are large.
    private static readonly (double Margin, double Growth)[] Attempts =
        [(0.12, 1), (0.25, 1), (0.25, 0.5), (0.45, 0.5), (0.45, 0.2), (0.7, 0.2), (0.7, 0.05)];

    /// <summary>Finds the room in a solved magnet.</summary>
    /// <exception cref="InputException">The rectangle around the aperture does not lie in air.</exception>
    public static FlightRoom In(SolvedMagnet solved)
    {
        Box beam = solved.Field.Aperture.Outline.Bounds;
        Magnet magnet = solved.Solution.Magnet;
        double clearance = ClearanceOf(magnet, beam);
        if (!(clearance > 0))
        {
            throw new InputException([new Finding(
                Severity.Fault,
                "beam-in-part",
                "The rectangle around the beam's aperture touches a part of iron, a magnet or a conductor.",
                "Shrink the aperture so that the rectangle around it lies in air.") { At = beam.Centre }]);
        }

        double usable = Math.Min(clearance, LargestGrowth * beam.Diagonal);
        foreach ((double share, double growth) in Attempts)
        {
            double margin = share * usable;
            Box room = Grown(magnet, beam, margin, growth * LargestGrowth);
            if (FieldOver(solved, room) is { } field)
            {
                return new FlightRoom(FlightField.Over(room, field.At), margin);
            }
        }

        return new FlightRoom(FlightField.Over(beam, solved.Field.At), clearance);
    }

    // Each side moves out as far as the remaining clearance surely allows, again and again.
    private static Box Grown(Magnet magnet, Box beam, double margin, double growth)
    {
        Box room = beam;
        double tall = growth * Math.Max(beam.Height, beam.Width);
        foreach (Point direction in new[] { new Point(0, 1), new Point(0, -1), new Point(1, 0), new Point(-1, 0) })
        {
            double most = direction.Y == 0 ? tall : Math.Min(1, growth) * beam.Width;
            double moved = 0;
            for (int k = 0; k < MostMoves && moved < most; k++)
            {
                double step = Math.Min(ClearanceOf(magnet, room) - margin, most - moved);
                if (step < 0.02 * margin)
                {
                    break;
                }

                moved += step;
                room = room.Including((direction.Y + direction.Z > 0 ? room.Max : room.Min) + (step * direction));
            }
        }

        return room;
    }

    private static double ClearanceOf(Magnet magnet, Box box) =>
        Clearance.Of(magnet, Aperture.Rectangle(box.Centre, box.Width, box.Height));

    private static BeamField? FieldOver(SolvedMagnet solved, Box room)
    {
        Aperture wide = Aperture.Rectangle(room.Centre, room.Width, room.Height);
        FieldProblem problem = solved.Solution.Problem;
        return BandCutOff.Nodal(problem, new ApertureShape(wide)) is { } chi
            ? BeamExtraction.Create(problem.Space, chi).FieldOf(wide, solved.Solution.Potential)
            : null;
    }
}
