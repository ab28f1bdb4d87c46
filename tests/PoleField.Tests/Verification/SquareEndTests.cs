// Truth: a square-ended pole of infinite permeability over a mid-plane (Schwarz and Christoffel): with u = B0/B on the
// mid-plane, x/h = [2u + ln((u − 1)/(u + 1))]/π, x outward from the edge, h the half gap, B0 deep inside (closed form).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class SquareEndTests(VerificationRecord record)
{
    [Fact]
    public void FieldFallsOffAtASquareEndAsTheMapSays()
    {
        // Poles 160 mm wide at a gap of 10 mm; the frame's other leg closes the circuit far to the left.
        Magnet magnet = new Drawn()
            .Polygon("IRON", new(-120, -60), new(80, -60), new(80, -5), new(-80, -5), new(-80, -30), new(-100, -30), new(-100, 30),
                new(-80, 30), new(-80, 5), new(80, 5), new(80, 60), new(-120, 60))
            .Rectangle("COIL", -90, 0, 8, 40).Rectangle("RETURN", -130, 0, 8, 40)
            .Linear("IRON", 1e5).Part("COIL", Material.Air, -5000).Part("RETURN", Material.Air, 5000)
            .Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(80, 0, 4, 2));

        double deep = solved.Solution.At(new Point(0.030, 0))!.Value.Bz;
        foreach ((double place, double share) in new[] { (-1.5, 0.99758316), (-1.0, 0.98863410), (-0.5, 0.95054724), (0.0, 0.83355656), (0.5, 0.64458718) })
        {
            double field = solved.Solution.At(new Point(0.080 + (0.005 * place), 0))!.Value.Bz;

            // The poles are H = 11 h tall, not infinitely: outside that changes the fringe by the order of (h/H)².
            double tolerance = place > 0 ? 1.0 / 121 : 1e-3;
            record.Relative(FormattableString.Invariant($"square pole end: B/B0 at {place} half gaps"), share, field / deep, tolerance);
        }
    }
}
