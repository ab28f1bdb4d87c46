// Truth: closed forms for magnets of recoil permeability 1. Round bar magnetised across: B = Br/2 inside, a dipole Br R²/(2 r²)
// outside. Rectangular bar: charge sheets on two sides. Ring of M sectors whose magnetisation turns twice as fast as the
// angle: B = Br ln(ro/ri) · sin(2π/M)/(2π/M) in the bore (Halbach 1980, recalled from memory).
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

    [Fact]
    public void RoundBarHasHalfItsRemanenceInsideAndADipoleOutside()
    {
        Magnet magnet = new Drawn().Circle("BAR", 0, 0, 10).Remanent("BAR", new Point(0, Br)).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 20, 4, 2), Fine);

        FieldSample inside = solved.Solution.At(new Point(0.003, -0.004))!.Value;
        record.Relative("round magnet: B inside, T", 0.6, inside.Bz, 1e-5);
        record.Relative("round magnet: B at twice the radius, T", 0.15, solved.Report.Beam.Field, 1e-5);
        record.Relative("round magnet: dB/dz at twice the radius, T/m", -2 * 0.15 / 0.020, solved.Report.Beam.Gradient, 1e-5);
        record.Absolute("round magnet: force on it, N/m", 0, solved.Report.Parts[0].ForcePerMetre!.Value.Length, 0.1);
    }

    [Fact]
    public void RectangularBarFollowsItsChargeSheets()
    {
        Magnet magnet = new Drawn().Rectangle("BAR", 0, 0, 20, 10).Remanent("BAR", new Point(0, Br)).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 10, 4, 2), Fine);

        record.Relative("rectangular magnet: B 10 mm above the middle, T", 0.1982992, solved.Report.Beam.Bz, 2e-6);
        record.Relative("rectangular magnet: B in the middle, T", 0.3542007, solved.Solution.At(default)!.Value.Bz, 2e-4);
        record.Relative("rectangular magnet: B 20 mm above the middle, T", 0.0792577, solved.Solution.At(new Point(0, 0.020))!.Value.Bz, 1e-3);
    }

    [Theory]
    [InlineData(8, 0.90031632)]
    [InlineData(16, 0.97449536)]
    public void RingOfSectorsHasAUniformFieldInItsBore(int pieces, double factor)
    {
        var drawn = new Drawn();
        double step = Math.Tau / pieces;
        for (int k = 0; k < pieces; k++)
        {
            double from = (k - 0.5) * step;
            string layer = FormattableString.Invariant($"PIECE {k}");
            var outer = new CircularArc(default, 30, from, step);
            var inner = new CircularArc(default, 10, from, step);
            Point[] corners = [Point.Polar(10, from), Point.Polar(30, from), Point.Polar(30, from + step), Point.Polar(10, from + step)];
            drawn.Closed(
                layer,
                new Line(corners[0], corners[1]),
                outer.WithEnds(corners[1], corners[2]),
                new Line(corners[2], corners[3]),
                inner.WithEnds(corners[0], corners[3]).Reversed());
            drawn.Remanent(layer, Point.Polar(Br, 2 * k * step));
        }

        SolvedMagnet solved = MagnetSolver.Solve(drawn.Magnet(), Drawn.Beam(0, 0, 4, 2), Fine);

        record.Relative(
            FormattableString.Invariant($"ring of {pieces} magnets: B in the bore, T"), 1.3183347 * factor, solved.Report.Beam.Field, 1e-5);
    }
}
