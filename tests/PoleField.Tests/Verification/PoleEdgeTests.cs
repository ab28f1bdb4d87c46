// Truth: Maxwell's map of the edge of two thin plates, x + iy = (h/π)(1 + w + eʷ), w = p + iψ, whose field is
// B/B0 = 1/|1 + eʷ|. The equipotential ψ = π/2 is Rogowski's 90° profile of half gap h/2: poles of infinite permeability along it
// have the plates' field between them, on the mid-plane and on their own surface (closed form).
using System.Numerics;
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class PoleEdgeTests(VerificationRecord record)
{
    private const double H = 10;        // mm: half the plates' distance; the poles' gap is H
    private const double Inner = -12;   // p where the profile is straight to 1e-5 of the gap
    private const double Cut = 4;       // p where the pole ends

    private static readonly VerificationCase Plates = new(
        "Edge of two thin plates, on the mid-plane",
        "Published: x/h = (p + 1 + eᵖ)/π, B/B0 = 1/(1 + eᵖ). Plates without thickness cannot be drawn; poles along the equipotential half way to them have the same field. They are cut at p = 4, which changes B by exp(2(p − 4)).");

    private static readonly VerificationCase Profile = new(
        "Rogowski's 90° profile, on the pole's surface",
        "Published: y/h' = 1 + (2/π) exp(πx/(2h') − 1), B/B0 = 1/√(1 + e²ᵖ), x/h' = (2/π)(p + 1): nowhere above B0. Poles cut at p = 4 as above.");

    [Fact]
    public void FieldFollowsMaxwellsMap()
    {
        SolvedMagnet solved = MagnetSolver.Solve(Poles(), Drawn.Beam(0, 0, 6, 3), new SolveOptions { Accuracy = 1e-5 });

        var local = new OneOrderUp(solved);
        Estimate deep = local.Bz(new Point(-0.055, 0));
        foreach ((double place, double share) in new[]
        {
            (-1.0, 0.98459053), (-0.5, 0.93351707), (0.0, 0.78218829), (0.5, 0.55638731), (1.0, 0.37817388), (2.0, 0.20334773),
        })
        {
            double p = Math.Log((1 / share) - 1);
            Estimate field = place == 0
                ? solved.FieldEstimate()
                : local.Magnitude(new Point(place * H / 1000, 0));
            CheckShare(Plates, FormattableString.Invariant($"B/B0 at x/h = {place}"), share, field, deep, p);
        }

        foreach ((double p, double y, double share) in new[]
        {
            (-3.0, 1.0316954, 0.99876292), (-2.0, 1.0861571, 0.99096609), (-1.0, 1.2341993, 0.9385079), (0.0, 1.6366198, 0.70710678), (1.0, 2.730512, 0.34525776),
        })
        {
            Point surface = At(p, (Math.PI / 2) - 1e-6);
            Assert.Equal(y * H / 2, 1000 * surface.Z, 1e-4);
            CheckShare(Profile, FormattableString.Invariant($"B/B0 at x/h' = {2 / Math.PI * (p + 1):f4}"), share, local.Magnitude(surface), deep, p);
        }
    }

    private void CheckShare(VerificationCase subject, string quantity, double share, Estimate field, Estimate deep, double p)
    {
        double size = Math.Abs(deep.Value);
        double allowed = ((field.Bar + deep.Bar) / size) + (share * Math.Exp(2 * (p - Cut))) + 1e-5;
        record.Check(subject, quantity, share, field.Value / size, Allowed.Absolute(allowed, "own error bar, poles cut, profile's straight part"));
    }

    // Metres.
    private static Point At(double p, double psi)
    {
        Complex place = H / (1000 * Math.PI) * (1 + new Complex(p, psi) + Complex.Exp(new Complex(p, psi)));
        return new Point(place.Real, place.Imaginary);
    }

    private static Magnet Poles()
    {
        const double step = 0.1;
        int pieces = (int)Math.Round((Cut - Inner) / step);
        Point[] profile = [.. Enumerable.Range(0, pieces + 1).Select(i => 1000 * At(Inner + (i * step), Math.PI / 2))];
        Point first = profile[0], last = profile[^1];
        Curve upper = NurbsInterpolation.Through(profile);
        Curve lower = NurbsInterpolation.Through([.. profile.Select(q => new Point(q.Y, -q.Z))]);
        Point[] around =
        [
            last, new(last.Y, 400), new(-200, 400), new(-200, -400), new(last.Y, -400), new(last.Y, -last.Z),
        ];
        Point[] slot =
        [
            new(first.Y, -first.Z), new(-80, -first.Z), new(-80, -40), new(-130, -40), new(-130, 40), new(-80, 40), new(-80, first.Z), first,
        ];
        return new Drawn()
            .Closed("IRON",
            [
                .. around.Zip(around.Skip(1), (a, b) => (Curve)new Line(a, b)), lower.Reversed(),
                .. slot.Zip(slot.Skip(1), (a, b) => (Curve)new Line(a, b)), upper,
            ])
            .Rectangle("COIL", -105, 0, 20, 60).Rectangle("RETURN", -230, 0, 20, 60)
            .Linear("IRON", 1e7).Part("COIL", Material.Air, -5000).Part("RETURN", Material.Air, 5000)
            .Magnet();
    }
}
