// Truth: closed forms for magnets of recoil permeability 1. Round bar magnetised across: B = Br/2 inside, a dipole Br R²/(2 r²)
// outside. Rectangular bar: charge sheets on two sides. Ring of M sectors whose magnetisation turns twice as fast as the
// angle: B = Br ln(ro/ri) · sin(2π/M)/(2π/M) in the bore; three times as fast: a gradient 2 Br (1/ri − 1/ro) · sin(3π/M)/(3π/M)
// (Halbach 1980, recalled from memory). Two opposite wedges of 45° about their magnetisation, as of saturated poles:
// B = (Br/π) ln(r2/r1) between them.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class PermanentMagnetTests(VerificationRecord record)
{
    private const double Br = 1.2;
    private static readonly SolveOptions Fine = new() { Accuracy = 1e-5 };

    private static readonly VerificationCase Round = new(
        "Round magnet magnetised across, 1.2 T, radius 10 mm", "Published: Br/2 inside, a dipole Br R²/(2 r²) outside; no force by itself.");

    private static readonly VerificationCase Rectangular = new(
        "Rectangular magnet 20 mm × 10 mm, 1.2 T", "Published: charge sheets on two faces, (Br/π)[atan((z + h/2)/(w/2)) − atan((z − h/2)/(w/2))] on its axis.");

    private static readonly VerificationCase Rings = new(
        "Rings of magnet sectors 10 to 30 mm, 1.2 T",
        "Published: dipole Br ln(ro/ri) sin(2π/M)/(2π/M); quadrupole gradient 2 Br (1/ri − 1/ro) sin(3π/M)/(3π/M) (Halbach 1980, recalled from memory).");

    private static readonly VerificationCase Wedges = new(
        "Saturated wedges of 45° about the axis, 2.15 T, radius ratio 10",
        "Closed form: (Br/π) ln(r2/r1), the most that iron of this saturation adds; as magnets of permeability 1.");

    [Fact]
    public void RoundBarHasHalfItsRemanenceInsideAndADipoleOutside()
    {
        Magnet magnet = new Drawn().Circle("BAR", 0, 0, 10).Remanent("BAR", new Point(0, Br)).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 20, 4, 2), Fine);

        var local = new OneOrderUp(solved);
        record.Check(Round, "B inside, T", 0.6, local.Bz(new Point(0.003, -0.004)));
        record.Check(Round, "B at twice the radius, T", 0.15, solved.FieldEstimate());
        record.Check(Round, "dB/dz at twice the radius, T/m", -2 * 0.15 / 0.020, solved.GradientEstimate());
        record.Check(Round, "force on it along z, N/m", 0, local.Of(s => PartReports.Of(s)[0].ForcePerMetre!.Value.Z));
    }

    [Fact]
    public void RectangularBarFollowsItsChargeSheets()
    {
        Magnet magnet = new Drawn().Rectangle("BAR", 0, 0, 20, 10).Remanent("BAR", new Point(0, Br)).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 10, 4, 2), Fine);

        var local = new OneOrderUp(solved);
        record.Check(Rectangular, "B 10 mm above the middle, the beam, T", 0.19829921, solved.FieldEstimate(), 5e-9);
        record.Check(Rectangular, "B in the middle, T", 0.35420068, local.Bz(default), 5e-9);
        record.Check(Rectangular, "B in the middle of the upper face, T", 0.3, local.Bz(new Point(0, 0.005)), 5e-9);
        record.Check(Rectangular, "B 20 mm above the middle, T", 0.07925772, local.Bz(new Point(0, 0.020)), 5e-9);
    }

    [Theory]
    [InlineData(8, 0.90031632)]
    [InlineData(16, 0.97449536)]
    public void RingOfSectorsHasAUniformFieldInItsBore(int pieces, double factor)
    {
        SolvedMagnet solved = MagnetSolver.Solve(Ring(pieces, turns: 2), Drawn.Beam(0, 0, 4, 2), Fine);

        record.Check(Rings, FormattableString.Invariant($"dipole of {pieces}: B in the bore, T"), 1.3183347 * factor, solved.FieldEstimate(), 1e-7);
    }

    [Fact]
    public void RingOfSectorsThatTurnFasterIsAQuadrupole()
    {
        // Sixteen pieces make the powers n = 2, 18, ... of B = Br Σ n/(n − 1) (1 − (r1/r2)^(n − 1)) Kn (r/r1)^(n − 1),
        // Kn = sin((n + 1) π/16)/((n + 1) π/16); the second is a millionth of the gradient here.
        double first = 160 * Math.Sin(3 * Math.PI / 16) / (3 * Math.PI / 16);
        double second = Br * (18.0 / 17) * Math.Sin(19 * Math.PI / 16) / (19 * Math.PI / 16) * Math.Pow(0.4, 17);
        double gradient = first + (17 * second / 0.004);

        SolvedMagnet solved = MagnetSolver.Solve(Ring(16, turns: 3), Drawn.Beam(0, 4, 3, 2), Fine);

        record.Check(Rings, "quadrupole of 16: gradient 4 mm above the middle, T/m", gradient, solved.GradientEstimate());
        record.Check(Rings, "quadrupole of 16: B 4 mm above the middle, T", (0.004 * first) + second, solved.FieldEstimate());
    }

    [Fact]
    public void SaturatedWedgesAddWhatTheirRatioSays()
    {
        const double saturation = 2.15;
        var drawn = new Drawn();
        foreach ((string layer, double from) in new[] { ("UPPER", Math.PI / 4), ("LOWER", 5 * Math.PI / 4) })
        {
            Sector(drawn, layer, 3, 30, from, Math.PI / 2);
            drawn.Remanent(layer, new Point(0, saturation));
        }

        SolvedMagnet solved = MagnetSolver.Solve(drawn.Magnet(), Drawn.Beam(0, 0, 2, 1), Fine);

        record.Check(Wedges, "B between them, T", saturation / Math.PI * Math.Log(10), solved.FieldEstimate());
    }

    private static Magnet Ring(int pieces, int turns)
    {
        var drawn = new Drawn();
        double step = Math.Tau / pieces;
        for (int k = 0; k < pieces; k++)
        {
            double from = (k - 0.5) * step;
            string layer = FormattableString.Invariant($"PIECE {k}");
            Sector(drawn, layer, 10, 30, from, step);
            drawn.Remanent(layer, Point.Polar(Br, turns * k * step));
        }

        return drawn.Magnet();
    }

    private static void Sector(Drawn drawn, string layer, double inside, double outside, double from, double sweep)
    {
        var outer = new CircularArc(default, outside, from, sweep);
        var inner = new CircularArc(default, inside, from, sweep);
        Point[] corners = [Point.Polar(inside, from), Point.Polar(outside, from), Point.Polar(outside, from + sweep), Point.Polar(inside, from + sweep)];
        drawn.Closed(
            layer,
            new Line(corners[0], corners[1]),
            outer.WithEnds(corners[1], corners[2]),
            new Line(corners[2], corners[3]),
            inner.WithEnds(corners[0], corners[3]).Reversed());
    }
}
