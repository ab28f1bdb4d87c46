// Truth: closed forms — two opposite line currents push with μ0 I²/(2π d); a line current outside a permeable cylinder is pulled by
// its images with μ0 I² k/(2π) · R²/(d (d² − R²)), k = (μr − 1)/(μr + 1); a pole face is pulled with B²/(2 μ0) — and
// conservation laws: action equals reaction; the force is the derivative of the co-energy by displacement at fixed currents.
using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Verification;

[Collection(VerificationRecord.Collection)]
public class ForceTests(VerificationRecord record)
{
    private static readonly SolveOptions Fine = new() { Accuracy = 1e-5 };

    [Fact]
    public void TwoOppositeConductorsPushAsAmpereSays()
    {
        const double spacing = 0.010;
        const double current = 1000;
        Magnet magnet = new Drawn().Circle("UPPER", 0, 5, 2).Circle("LOWER", 0, -5, 2)
            .Part("UPPER", Material.Air, current).Part("LOWER", Material.Air, -current).Magnet();
        double truth = PhysicalConstants.Mu0 * current * current / (Math.Tau * spacing);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 0, 2, 1), Fine);

        Point upper = solved.Report.Parts[0].ForcePerMetre!.Value;
        Point lower = solved.Report.Parts[1].ForcePerMetre!.Value;
        record.Relative("two opposite conductors: push on the upper, J × B, N/m", truth, upper.Z, 1e-4);
        record.Absolute("two opposite conductors: sum of both forces over one, J × B", 0, (upper + lower).Length / truth, 1e-4);
        ForceShell shell = ForceShell.Around(solved.Solution, Body(magnet, 0));
        record.Relative("two opposite conductors: push on the upper, stress over the shell, N/m", truth, shell.OverShell().Z, 1e-4);
        record.Relative("two opposite conductors: push on the upper, stress along the path, N/m", truth, shell.AlongPath().Z, 1e-3);
        record.Relative("two opposite conductors: pull across the plane between them, N/m", -truth, solved.Report.Circuit.GapPullPerMetre, 1e-4);
    }

    [Fact]
    public void PermeableCylinderPullsALineCurrentAsItsImagesDo()
    {
        const double radius = 0.020;
        const double distance = 0.030;
        const double current = 1000;
        const double k = 999.0 / 1001.0;
        Magnet magnet = new Drawn().Circle("IRON", 0, 0, 20).Circle("WIRE", 30, 0, 2)
            .Linear("IRON", 1000).Part("WIRE", Material.Air, current).Magnet();
        double truth = PhysicalConstants.Mu0 * current * current * k / Math.Tau * radius * radius
            / (distance * ((distance * distance) - (radius * radius)));

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(25, 3.5, 1, 1), Fine);

        record.Relative("wire by cylinder: pull on the wire, J × B, N/m", -truth, solved.Report.Parts[1].ForcePerMetre!.Value.Y, 1e-4);
        record.Relative("wire by cylinder: pull on the cylinder, stress over the shell, N/m", truth, solved.Report.Parts[0].ForcePerMetre!.Value.Y, 1e-4);
        record.Relative(
            "wire by cylinder: pull on the cylinder, stress along the path, N/m",
            truth, ForceShell.Around(solved.Solution, Body(magnet, 0)).Outward().AlongPath().Y, 1e-3);
        record.Relative("wire by cylinder: pull on the cylinder, stress over a shell further out, N/m", truth, ForceShell.Around(solved.Solution, Body(magnet, 0)).Outward().OverShell().Y, 1e-4);
        foreach ((double y, double z, double by, double bz) in new[]
        {
            (25, 0, 0, -0.03087541), (0, 30, -0.0022358741, -0.0058026166), (-30, 0, 0, -0.0012861497), (50.0, 20.0, -0.0059118577, 0.0057540362),
        })
        {
            FieldSample s = solved.Solution.At(new Point(y / 1000, z / 1000))!.Value;
            record.Absolute($"wire by cylinder: B at ({y}, {z}) mm, difference over size", 0, new Point(s.By - by, s.Bz - bz).Length / new Point(by, bz).Length, 2e-3);
        }
    }

    [Fact]
    public void ForceOnSaturatedIronIsTheDerivativeOfTheCoEnergy()
    {
        Magnet magnet = new Drawn().Rectangle("IRON", 0, 0, 8, 12).Circle("WIRE", 15, 2, 5)
            .Part("IRON", MaterialLibrary.Get("mild-steel")).Part("WIRE", Material.Air, 40_000).Magnet();
        Mesh mesh = Mesher.Mesh(magnet.Section, SizeField.FromSources(3e-3, 0.35, []));
        const double move = 2e-5;

        FieldSolution solution = Solve(magnet, mesh, default).Solution;
        Point shell = ForceShell.Around(solution, Body(magnet, 0)).OverShell();
        double along = (CoEnergy(magnet, mesh, new Point(move, 0)) - CoEnergy(magnet, mesh, new Point(-move, 0))) / (2 * move);
        double across = (CoEnergy(magnet, mesh, new Point(0, move)) - CoEnergy(magnet, mesh, new Point(0, -move))) / (2 * move);

        Assert.InRange(solution.At(default)!.Value.Magnitude, 1.0, 3.0);
        record.Relative("saturated bar by wire: force along y, co-energy against stress, N/m", along, shell.Y, 1e-4);
        record.Absolute("saturated bar by wire: force along z over that along y, co-energy against stress", across / along, shell.Z / along, 1e-4);
    }

    [Theory]
    [InlineData(0.5)]
    [InlineData(1.6)]
    public void PoleFaceIsPulledWithTheFieldsPressure(double field)
    {
        // Steel fills a box from wall to wall but for a gap; the walls hold the flux uniform.
        Magnet magnet = new Drawn().Rectangle("RIM", 0, 0, 20, 60).Rectangle("UPPER", 0, 15, 20, 20).Rectangle("LOWER", 0, -15, 20, 20)
            .Part("UPPER", MaterialLibrary.Get("mild-steel")).Part("LOWER", MaterialLibrary.Get("mild-steel"))
            .Magnet(new Point(0, field), rim: "RIM");

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 0, 2, 1));

        double pressure = field * field / (2 * PhysicalConstants.Mu0);
        record.Relative(FormattableString.Invariant($"face pull at {field} T: across the gap, N/m²"), pressure, solved.Report.Circuit.GapPullPerMetre / 0.020, 1e-6);
        double steel = MaterialLibrary.Get("mild-steel").Law.At(field).FieldStrength;
        FieldSample inside = solved.Solution.At(new Point(0.003, 0.015))!.Value;
        record.Relative(FormattableString.Invariant($"flux tube at {field} T: H in steel, A/m"), steel, inside.FieldStrength, 1e-6);
        record.Relative(FormattableString.Invariant($"flux tube at {field} T: ampere-turns of the 10 mm gap, A"), field * 0.010 / PhysicalConstants.Mu0, solved.Report.Circuit.GapAmpereTurns, 1e-6);
    }

    [Fact]
    public void ForcesOfAllPartsOfAJoinedMagnetSumToNothing()
    {
        Magnet magnet = new Drawn()
            .Polygon("YOKE", new(-30, -30), new(30, -30), new(30, -20), new(-20, -20), new(-20, 20), new(30, 20), new(30, 30), new(-30, 30))
            .Rectangle("RIDGE", 15, -12.5, 10, 15).Rectangle("GROOVE", 15, 12.5, 10, 15)
            .Rectangle("COIL IN", -10, 0, 6, 20).Rectangle("COIL OUT", -40, 0, 6, 20)
            .Linear("YOKE", 500).Linear("RIDGE", 500).Linear("GROOVE", 500)
            .Part("COIL IN", Material.Air, 5000).Part("COIL OUT", Material.Air, -5000)
            .Magnet();

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(15, 0, 4, 2));

        PartReport[] parts = [.. solved.Report.Parts];
        double pull = solved.Report.Circuit.GapPullPerMetre;
        Point sum = parts.Aggregate(default(Point), (total, p) => total + p.ForcePerMetre!.Value);
        Assert.Equal([true, true, true, false, false], parts.Select(p => p.ForceOnFreeFacesOnly));
        record.Absolute("C magnet: sum of the forces of all parts over the gap's pull", 0, sum.Length / pull, 2e-3);
        Assert.True(parts.Sum(p => p.MmfDrop ?? 0) is > 0 and < 5000);
        Assert.True(pull > 0 && parts[1].ForcePerMetre!.Value.Z > 0 && parts[2].ForcePerMetre!.Value.Z < 0);

        // The lower half: everything below the plane of the beam, by the pull across the plane.
        Assert.InRange(parts[1].ForcePerMetre!.Value.Z / pull, 0.6, 1.1);
    }

    internal static bool[] Body(Magnet magnet, int part) => [.. magnet.Section.Regions.Select(r => r.Part == part)];

    private static double CoEnergy(Magnet magnet, Mesh mesh, Point shift) => -Solve(magnet, mesh, shift).Energy;

    // Moves the iron and lets the elements around it stretch.
    private static (FieldSolution Solution, double Energy) Solve(Magnet magnet, Mesh mesh, Point shift)
    {
        bool[] body = Body(magnet, 0);
        var moved = new bool[mesh.Vertices.Count];
        for (int slot = 0; slot < mesh.Triangles.Count; slot++)
        {
            int region = mesh.Regions[slot / 3];
            moved[mesh.Triangles[slot]] |= region >= 0 && body[region];
        }

        Point[] vertices = [.. mesh.Vertices.Select((p, v) => moved[v] ? p + shift : p)];
        CurveEdge[] edges = [.. mesh.CurveEdges.Select(e => moved[e.A] && moved[e.B]
            ? e with { Curve = new Line(e.Curve.Start + shift, e.Curve.End + shift) }
            : e)];
        var shifted = new Mesh(mesh.Section, vertices, [.. mesh.Triangles], [.. mesh.Regions], edges, mesh.Circle, mesh.Infinity);
        FiniteElementSpace space = FiniteElementSpace.Create(shifted, MeshEdges.Of(shifted), 3);
        FieldProblem problem = FieldProblem.Create(magnet, space);
        var equations = new FieldEquations(problem);
        (double[] potential, IReadOnlyList<NewtonStep> history) = FieldSolver.Solve(equations);
        return (new FieldSolution(problem, potential, history), equations.Evaluate(potential).Energy);
    }
}
