// Truth: closed forms of straight conductors with even current density — rectangular (Biot and Savart integrated), round
// (Ampère), a thin plate and a thin tube as current sheets, across which the field along the sheet jumps by μ0 K.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class ConductorTests(VerificationRecord record)
{
    private static readonly SolveOptions Fine = new() { Accuracy = 1e-6 };

    private static readonly VerificationCase Rectangular = new(
        "Rectangular conductor 20 mm × 10 mm, 5 A/mm²", "Closed form of Biot and Savart's integral; published to eight digits.");

    private static readonly VerificationCase Round = new(
        "Round conductor of 10 mm radius, 1000 A", "Ampère's law; the energy inside is μ0 I²/(16π) per metre.");

    private static readonly VerificationCase Sheet = new(
        "Current sheets of 100 kA/m",
        "The jump μ0 K = 0.12566371 T, half of it on each side of a wide plate (rectangle's closed form at its faces); a tube has the whole jump at its skin and nothing inside.");

    [Fact]
    public void RectangularConductorFollowsTheClosedForm()
    {
        Magnet magnet = new Drawn().Rectangle("BAR", 0, 0, 20, 10).Part("BAR", Material.Air, 1000).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(30, 0, 4, 2), Fine);

        var local = new OneOrderUp(solved);
        foreach ((double y, double z, double by, double bz) in new[]
        {
            (10, 0, 0, 0.023965213), (0, 5, -0.022639435, 0), (10, 5, -0.013302923, 0.017320142),
            (15, 20, -0.0065026734, 0.0044984567), (5, 2.5, -0.010288507, 0.0093580119),
        })
        {
            var place = new Point(y / 1000, z / 1000);
            string at = FormattableString.Invariant($"at ({y}, {z}) mm, T");
            record.Check(Rectangular, "By " + at, by, local.By(place), 5e-10);
            record.Check(Rectangular, "Bz " + at, bz, local.Bz(place), 5e-10);
        }

        record.Check(Rectangular, "B at (30, 0) mm, the beam, T", 0.0068551227, solved.FieldEstimate(), 5e-11);
    }

    [Fact]
    public void RoundConductorFollowsAmperesLaw()
    {
        Magnet magnet = new Drawn().Circle("WIRE", 0, 0, 10).Part("WIRE", Material.Air, 1000).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(20, 0, 4, 2), Fine);

        var local = new OneOrderUp(solved);
        record.Check(Round, "B at 5 mm, T", PhysicalConstants.Mu0 * 1000 / (Math.Tau * 0.020), local.Magnitude(Point.Polar(0.005, 1)));
        record.Check(Round, "B at 9.999 mm, T", PhysicalConstants.Mu0 * 1000 * 0.9999 / (Math.Tau * 0.010), local.Magnitude(Point.Polar(0.009999, 1)));
        record.Check(Round, "B at 20 mm, the beam, T", PhysicalConstants.Mu0 * 1000 / (Math.Tau * 0.020), solved.FieldEstimate());
        record.Check(Round, "energy inside, J/m", PhysicalConstants.Mu0 * 1e6 / (16 * Math.PI), local.Of(s => EnergyTests.EnergyIn(s, 0)));
    }

    [Fact]
    public void FieldJumpsAcrossASheetOfCurrent()
    {
        const double sheet = 100_000; // A/m
        const double width = 0.200, thickness = 0.001;
        Magnet magnet = new Drawn().Rectangle("PLATE", 0, 0, 1000 * width, 1000 * thickness)
            .Part("PLATE", Material.Air, sheet * width).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 10, 6, 4), new SolveOptions { Accuracy = 1e-5 });

        var local = new OneOrderUp(solved);
        Estimate above = local.By(new Point(0, thickness / 2)), below = local.By(new Point(0, -thickness / 2));
        double face = RectangleFace(sheet / thickness, width, thickness);
        record.Check(Sheet, "plate 200 mm × 1 mm: By on its upper face, T", -face, above);
        record.Check(Sheet, "plate 200 mm × 1 mm: jump, T", -2 * face, new Estimate(above.Value - below.Value, above.Bar + below.Bar));

        // Endless and thin in the published form: the plate's ends and thickness take (2/π) t/w of it, to first order.
        record.Check(Sheet, "plate, published for an endless sheet: By on its upper face, T", -0.062831853, above.Value, Allowed.Relative(2.1 / Math.PI * thickness / width, "(2/π) t/w of a plate that ends"));
        record.Check(Sheet, "plate, published for an endless sheet: jump, T", -0.12566371, above.Value - below.Value, Allowed.Relative(2.1 / Math.PI * thickness / width, "(2/π) t/w of a plate that ends"));
    }

    [Fact]
    public void ATubeOfCurrentHasNoFieldInside()
    {
        const double sheet = 100_000, radius = 0.020;
        Magnet magnet = new Drawn().Circle("TUBE", 0, 0, 20).Circle("TUBE", 0, 0, 19.5)
            .Part("TUBE", Material.Air, sheet * Math.Tau * radius).Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 30, 6, 4), new SolveOptions { Accuracy = 1e-5 });

        var local = new OneOrderUp(solved);
        Estimate outside = local.Magnitude(Point.Polar(0.020001, 0.3)), inside = local.Magnitude(Point.Polar(0.0194, 0.3));
        record.Check(Sheet, "tube of 20 mm: B at its skin, T", PhysicalConstants.Mu0 * sheet * radius / 0.020001, outside);
        record.Check(Sheet, "tube of 20 mm: B within, T", 0, inside);
    }

    // By on the middle of the upper face of a plate: g(u, v) = v atan(u/v) + (u/2) ln(u² + v²) over its corners.
    private static double RectangleFace(double density, double width, double thickness)
    {
        double u = width / 2, v = thickness;
        double corner = (v * Math.Atan(u / v)) + (0.5 * u * Math.Log((u * u) + (v * v))) - (u * Math.Log(u));
        return PhysicalConstants.Mu0 * density / Math.Tau * 2 * corner;
    }
}
