using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>The rectangle of air around the aperture in which particles are followed, and the field in it.</summary>
/// <param name="Field">The field.</param>
/// <param name="Margin">Distance that is kept to anything that is not air, metres.</param>
internal sealed record FlightRoom(FlightField Field, double Margin)
{
    private const double LargestGrowth = 2.0;   // on each side, in widths or heights of the beam
    private const int MostMoves = 24;

    private const double KeptClearance = 0.2;   // of the aperture's
    private const double Accuracy = 1e-3;       // of the field over the whole room; the beam starts where it is better

    /// <summary>Why no field could be had around the aperture, so that particles that leave it are lost; null when it could.</summary>
    public string? WhyApertureOnly { get; private init; }

    /// <summary>
    /// Finds the room in a solved magnet. Where the mesh leaves no layer of air between room and parts, the magnet is solved
    /// once more with the room for its aperture.
    /// </summary>
    /// <exception cref="InputException">The rectangle around the aperture does not lie in air.</exception>
    public static FlightRoom In(SolvedMagnet solved, RunSettings settings)
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

        double margin = KeptClearance * Math.Min(clearance, LargestGrowth * beam.Diagonal);
        Box room = Grown(solved.Solution, beam, margin);
        try
        {
            BeamField field = FieldOver(solved, room) ?? SolvedOver(magnet, room, settings);
            settings.Progress?.Invoke(SolveProgress.Of("fly the beam"));
            return new FlightRoom(FlightField.Over(room, field.At, settings.Options.Threads), margin);
        }
        catch (MeshingException e)
        {
            return new FlightRoom(FlightField.Over(beam, solved.Field.At, settings.Options.Threads), clearance) { WhyApertureOnly = e.Message };
        }
    }

    private static BeamField SolvedOver(Magnet magnet, Box room, RunSettings settings)
    {
        SolveOptions options = settings.Options with { Accuracy = Math.Max(Accuracy, settings.Options.Accuracy) };
        Aperture wide = Aperture.Rectangle(room.Centre, room.Width, room.Height);
        return MagnetSolver.Solve(magnet, wide, options, p => settings.Progress?.Invoke(p.Within("field around the beam")), settings.Cancellation).Field;
    }

    // Each side moves out as far as its own clearance surely allows, again and again.
    private static Box Grown(FieldSolution solution, Box beam, double margin)
    {
        Box room = beam;
        double tall = LargestGrowth * Math.Max(beam.Height, beam.Width);
        foreach (Point direction in new[] { new Point(0, 1), new Point(0, -1), new Point(1, 0), new Point(-1, 0) })
        {
            double most = direction.Y == 0 ? tall : beam.Width;
            double moved = 0;
            for (int k = 0; k < MostMoves && moved < most; k++)
            {
                double step = Math.Min(ClearanceOf(solution.Magnet, Side(room, direction, 1e-3 * margin)) - margin, most - moved);
                Point corner = direction.Y + direction.Z > 0 ? room.Max : room.Min;
                while (step >= 0.02 * margin && !IsMeshed(solution.Mesh.Circle, room.Including(corner + (step * direction))))
                {
                    step *= 0.5;
                }

                if (step < 0.02 * margin)
                {
                    break;
                }

                moved += step;
                room = room.Including(corner + (step * direction));
            }
        }

        return room;
    }

    // Well inside the meshed circle of open surroundings.
    private static bool IsMeshed(OpenCircle? circle, Box room) => circle is null
        || new[] { room.Min, room.Max, new Point(room.Min.Y, room.Max.Z), new Point(room.Max.Y, room.Min.Z) }
            .All(p => p.DistanceTo(circle.Centre) < 0.85 * circle.Radius);

    // A thin rectangle along one side.
    private static Box Side(Box room, Point direction, double thickness) => direction switch
    {
        { Z: > 0 } => new Box(new Point(room.Min.Y, room.Max.Z - thickness), room.Max),
        { Z: < 0 } => new Box(room.Min, new Point(room.Max.Y, room.Min.Z + thickness)),
        { Y: > 0 } => new Box(new Point(room.Max.Y - thickness, room.Min.Z), room.Max),
        _ => new Box(room.Min, new Point(room.Min.Y + thickness, room.Max.Z)),
    };

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
