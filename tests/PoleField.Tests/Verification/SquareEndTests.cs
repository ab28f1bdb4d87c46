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
    private const double HalfGap = 5;   // mm
    private const double Tall = 1000;   // mm

    private static readonly VerificationCase Case = new(
        "Square-ended pole over a mid-plane",
        "Published: x/h = [2u + ln((u − 1)/(u + 1))]/π, u = B0/B. Poles 1 m tall instead of endless add a field of order 2 (h/1 m)² x/h.");

    [Fact]
    public void FieldFallsOffAtASquareEndAsTheMapSays()
    {
        Magnet magnet = new Drawn()
            .Polygon("IRON", new(-300, -Tall), new(80, -Tall), new(80, -HalfGap), new(-80, -HalfGap), new(-80, -30), new(-120, -30), new(-120, 30),
                new(-80, 30), new(-80, HalfGap), new(80, HalfGap), new(80, Tall), new(-300, Tall))
            .Rectangle("COIL", -100, 0, 10, 40).Rectangle("RETURN", -330, 0, 10, 40)
            .Linear("IRON", 1e7).Part("COIL", Material.Air, -5000).Part("RETURN", Material.Air, 5000)
            .Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(80, 0, 4, 2), new SolveOptions { Accuracy = 1e-5 });

        var local = new OneOrderUp(solved);
        Estimate deep = local.Bz(new Point(0.030, 0));
        foreach ((double place, double share) in new[]
        {
            (-2.0, 0.99949518), (-1.5, 0.99758316), (-1.0, 0.98863410), (-0.5, 0.95054724), (0.0, 0.83355656),
            (0.5, 0.64458718), (1.0, 0.47815254), (2.0, 0.29062645), (3.0, 0.20331101),
        })
        {
            Estimate field = place == 0 ? solved.FieldEstimate() : local.Magnitude(new Point(0.001 * (80 + (HalfGap * place)), 0));
            double size = Math.Abs(deep.Value);
            double finite = 2 * HalfGap * HalfGap / (Tall * Tall) * Math.Max(1, place);
            record.Check(
                Case, FormattableString.Invariant($"B/B0 at x/h = {place}"), share, field.Value / size,
                Allowed.Absolute(((field.Bar + deep.Bar) / size) + finite + 5e-9, "own error bar, poles of finite height"));
        }
    }
}
