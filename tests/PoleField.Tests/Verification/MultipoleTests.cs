// Truth: poles of infinite permeability along the equipotentials rⁿ sin nθ = ±Rⁿ of an ideal multipole give |B| = n μ0 NI rⁿ⁻¹/Rⁿ:
// for n = 2 the quadrupole of gradient 2 μ0 NI/R², for n = 3 the sextupole of second derivative 6 μ0 NI/R³ (closed forms).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class MultipoleTests(VerificationRecord record)
{
    private const double R = 10;                // mm
    private const double Turns = 1000;          // A per pole
    private const double Permeability = 1e7;
    private const double IronShare = 1e-5;      // 300 mm of iron at up to 0.8 T spend 0.02 A of the 2000 A round a loop

    private static readonly VerificationCase Quadrupole = new(
        "Quadrupole with hyperbolic poles, R = 10 mm, 1000 A per pole",
        "Published: gradient 2 μ0 NI/R², 25.132741 T/m, pole tip 0.25132741 T. The poles are cut at 3 R: in the plane of s² the gap is a strip 2R² wide, in which the cut fades as exp(−π 3²/2) = 7e-7.");

    private static readonly VerificationCase Sextupole = new(
        "Sextupole with cubic poles, R = 10 mm, 1000 A per pole",
        "Published: second derivative 6 μ0 NI/R³, 7539.8224 T/m², pole tip 0.37699112 T. The poles are cut at 2.2 R, which in the plane of s³ fades as exp(−π 2.2³/2) = 5e-8.");

    [Fact]
    public void HyperbolicPolesMakeAQuadrupole()
    {
        SolvedMagnet solved = Solve(2, cut: 3 * R, halfWindow: 22);

        Allowed allowed = Allowed.Relative((solved.Report.GradientError / 25.132741) + IronShare, "own error bar, iron of permeability 1e7");
        record.Check(Quadrupole, "gradient at (0, 4) mm, T/m", 25.132741, Math.Abs(solved.Report.Beam.Gradient), allowed);
        record.Check(Quadrupole, "B at (0, 4) mm times R/r, T", 0.25132741, solved.Report.Beam.Field * R / 4, allowed);
    }

    [Fact]
    public void CubicPolesMakeASextupole()
    {
        SolvedMagnet solved = Solve(3, cut: 2.2 * R, halfWindow: 7);

        Allowed allowed = Allowed.Relative((solved.Report.GradientError / 30.15929) + IronShare, "own error bar, iron of permeability 1e7");
        record.Check(Sextupole, "gradient over r at (0, 4) mm, T/m²", 7539.8224, Math.Abs(solved.Report.Beam.Gradient) / 0.004, allowed);
        record.Check(Sextupole, "B at (0, 4) mm times R²/r², T", 0.37699112, solved.Report.Beam.Field * R * R / 16, allowed);
    }

    // 2n poles between as many windows; the window in direction kπ/n holds the neighbouring legs of two coils.
    private static SolvedMagnet Solve(int n, double cut, double halfWindow)
    {
        const double depth = 30;
        double from = Math.Asin(Math.Pow(R / cut, n)) / n;
        Point lip = Point.Polar(cut, from);
        double outer = lip.Y + depth;
        var drawn = new Drawn().Rectangle("IRON", 0, 0, 3 * outer, 3 * outer);
        var inside = new List<Curve>();
        for (int k = 0; k < 2 * n; k++)
        {
            double turn = k * Math.PI / n;
            Point[] sides = [new(lip.Y, -lip.Z), new(lip.Y, -halfWindow), new(outer, -halfWindow), new(outer, halfWindow), new(lip.Y, halfWindow), lip];
            Point[] placed = [.. sides.Select(p => Turned(p, turn))];
            inside.AddRange(placed.Zip(placed.Skip(1), (a, b) => (Curve)new Line(a, b)));
            inside.Add(Face(n, from, turn));
            string layer = FormattableString.Invariant($"COIL {k}");
            Point centre = Turned(new Point(lip.Y + (depth / 2), 0), turn);
            drawn.Circle(layer, centre.Y, centre.Z, 5).Part(layer, Material.Air, k % 2 == 0 ? 2 * Turns : -2 * Turns);
        }

        Magnet magnet = drawn.Closed("IRON", [.. inside]).Linear("IRON", Permeability).Magnet();
        return MagnetSolver.Solve(magnet, Drawn.Beam(0, 4, 3, 2), new SolveOptions { Accuracy = 1e-5 });
    }

    // The equipotential of one pole through many places of it; the spline is off by some 1e-8 R.
    private static Curve Face(int n, double from, double turn)
    {
        const int pieces = 120;
        double reach = Math.Atanh(Math.Cos(n * from));
        Point[] places = [.. Enumerable.Range(0, pieces + 1).Select(i =>
        {
            // Even in the strip's own length, so that the places follow the curve's bend.
            double angle = Math.Acos(Math.Tanh(reach * (1 - (2.0 * i / pieces)))) / n;
            return Turned(Point.Polar(R / Math.Pow(Math.Sin(n * angle), 1.0 / n), angle), turn);
        })];
        return NurbsInterpolation.Through(places);
    }

    private static Point Turned(Point p, double angle) => Point.Polar(p.Length, Math.Atan2(p.Z, p.Y) + angle);
}
