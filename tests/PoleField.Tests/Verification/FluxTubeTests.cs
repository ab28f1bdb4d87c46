// Truth: a straight flux tube of steel and a gap between walls of A: B is the same everywhere in it, and NI = H(B) l + B g/μ0
// (nonlinear steel), NI = B (l/μr + g)/μ0 (linear core); a pole face is pulled with B²/(2 μ0) (closed forms, published values).
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Numerics;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class FluxTubeTests(VerificationRecord record)
{
    // The field in a flux tube is uniform and in every space of elements, so that rounding alone is left.
    private const string Exact = "uniform field, rounding alone";
    private const double Width = 20; // mm

    private static readonly VerificationCase Slab = new(
        "Steel 200 mm and gap 2 mm in a flux tube",
        "Published: NI = H(B) l + B g/μ0, steel of TEAM 20 joined by straight lines. The published B is impressed; its ampere-turns and gap share must come out.");

    private static readonly VerificationCase Core = new(
        "Core 300 mm and gap 5 mm without fringing",
        "Published: B = μ0 NI/(g + l/μr), NI = 5000 A. The published B is impressed; 5000 A must come out.");

    private static readonly VerificationCase Pull = new("Pull on a pole face", "Closed form: B²/(2 μ0).");

    [Theory]
    [InlineData(500, 0.28539356, 0.90843592)]
    [InlineData(2000, 1.1598136, 0.92295038)]
    [InlineData(3000, 1.5497597, 0.82217304)]
    [InlineData(5000, 1.8087337, 0.57573782)]
    [InlineData(8000, 1.9802113, 0.39395053)]
    public void SteelAndGapShareTheAmpereTurns(double ampereTurns, double field, double gapShare)
    {
        (SolvedMagnet solved, double around) = Tube(PiecewiseLinearLaw.MildSteel, field, 200, 2);
        string at = FormattableString.Invariant($"NI {ampereTurns} A: ");

        // Eight digits of B: half a unit of the last, times dNI/dB, at most 150 kA/m per tesla in the steel here.
        double digits = 0.2 * 150_000 * 5e-8;
        record.Check(Slab, at + "∫ H·dl along the tube, A", ampereTurns, around, Allowed.Absolute(digits, "published digits of B"));
        record.Check(Slab, at + "share of the gap", gapShare, solved.Report.Circuit.GapAmpereTurns / around, Allowed.Absolute(1e-6, "published digits of B"));
    }

    [Theory]
    [InlineData(500, 1.1219974)]
    [InlineData(2000, 1.2200360)]
    [InlineData(1e9, 1.2566370)]
    public void LinearCoreAndGapShareTheAmpereTurns(double permeability, double field)
    {
        (_, double around) = Tube(new Material("linear", new LinearLaw(permeability), "", "", ""), field, 300, 5);

        record.Check(Core, FormattableString.Invariant($"μr {permeability:g4}: ∫ H·dl along the tube, A"), 5000, around, Allowed.Relative(5e-8, "published digits of B"));
    }

    [Theory]
    [InlineData(0.5, 99471.839)]
    [InlineData(1.0, 397887.36)]
    [InlineData(1.6, 1018591.6)]
    public void PoleFaceIsPulledWithTheFieldsPressure(double field, double published)
    {
        Material steel = MaterialLibrary.Get("mild-steel");
        (SolvedMagnet solved, _) = Tube(steel, field, 40, 10);
        string at = FormattableString.Invariant($"at {field} T: ");

        record.Check(Pull, at + "across the gap, N/m²", published, solved.Report.Circuit.GapPullPerMetre / (Width / 1000), Allowed.Relative(5e-8, "published digits"));
        record.Check(Pull, at + "H in the built-in steel, A/m", steel.Law.At(field).FieldStrength, solved.Solution.At(new Point(0.003, 0.015))!.Value.FieldStrength, Allowed.Relative(1e-9, Exact));
        record.Check(Pull, at + "ampere-turns of the 10 mm gap, A", field * 0.010 / PhysicalConstants.Mu0, solved.Report.Circuit.GapAmpereTurns, Allowed.Relative(1e-9, Exact));
    }

    // Steel fills a box from wall to wall but for a gap in the middle; the walls hold the flux. Returns ∫ H·dl over its height.
    private static (SolvedMagnet Solved, double Around) Tube(Material steel, double field, double length, double gap)
    {
        double half = length / 2;
        double middle = (gap + half) / 2;
        Magnet magnet = new Drawn().Rectangle("RIM", 0, 0, Width, length + gap)
            .Rectangle("UPPER", 0, middle, Width, half).Rectangle("LOWER", 0, -middle, Width, half)
            .Part("UPPER", steel).Part("LOWER", steel)
            .Magnet(new Point(0, field), rim: "RIM");
        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 0, 2, 0.1 * gap));
        double top = 0.0005 * (length + gap), face = 0.0005 * gap;
        double around = Along(solved, -top, -face) + Along(solved, -face, face) + Along(solved, face, top);
        return (solved, around);
    }

    private static double Along(SolvedMagnet solved, double from, double to)
    {
        GaussRule rule = GaussRule.Legendre(6);
        double sum = 0;
        for (int i = 0; i < rule.Nodes.Length; i++)
        {
            FieldSample s = solved.Solution.At(new Point(0.002, from + (rule.Nodes[i] * (to - from))))!.Value;
            sum += rule.Weights[i] * (to - from) * s.FieldStrength * Math.Sign(s.Bz);
        }

        return sum;
    }
}
