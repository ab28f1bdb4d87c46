// Truth: closed forms — two opposite line currents push with μ0 I²/(2π d); a line current outside a permeable cylinder is pulled by
// its images with μ0 I² k/(2π) · R²/(d (d² − R²)), k = (μr − 1)/(μr + 1) — and
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

    private static readonly VerificationCase Conductors = new(
        "Two opposite conductors of 1000 A, 10 mm apart: force", "Ampère's law: μ0 I²/(2π d) per metre; action equals reaction.");

    private static readonly VerificationCase Wire = new(
        "Line current 1000 A at 30 mm beside a cylinder of 20 mm, μr 1000",
        "Images: outside I at d, kI at R²/d, −kI in the middle; published field values; pull μ0 I² k/(2π) R²/(d (d² − R²)).");

    private static readonly VerificationCase Saturated = new(
        "Saturated bar beside a conductor: force", "Derivative of the co-energy by displacement at fixed current, central difference on moved meshes.");

    private static readonly VerificationCase Joined = new(
        "C magnet of joined parts: sum of all forces", "Action equals reaction: the forces of all parts sum to nothing.");

    [Fact]
    public void TwoOppositeConductorsPushAsAmpereSays()
    {
        const double spacing = 0.010;
        const double current = 1000;
        Magnet magnet = new Drawn().Circle("UPPER", 0, 5, 2).Circle("LOWER", 0, -5, 2)
            .Part("UPPER", Material.Air, current).Part("LOWER", Material.Air, -current).Magnet();
        double truth = PhysicalConstants.Mu0 * current * current / (Math.Tau * spacing);

        SolvedMagnet solved = MagnetSolver.Solve(magnet, Drawn.Beam(0, 0, 2, 1), Fine);

        var local = new OneOrderUp(solved);
        record.Check(Conductors, "push on the upper, J × B, N/m", truth, local.Of(s => PartReports.Of(s)[0].ForcePerMetre!.Value.Z));
        record.Check(Conductors, "sum of both forces along z, J × B, N/m", 0, local.Of(s => PartReports.Of(s)[0].ForcePerMetre!.Value.Z + PartReports.Of(s)[1].ForcePerMetre!.Value.Z));
        record.Check(Conductors, "push on the upper, stress over the shell, N/m", truth, local.Of(s => PartReports.Of(s)[0].ForceOtherWay!.Value.Z));
        record.Check(Conductors, "push on the upper, stress along the path, N/m", truth, local.Of(s => ForceShell.Around(s, Body(magnet, 0)).AlongPath().Z));
        record.Check(Conductors, "pull across the plane between them, N/m", -truth, local.Of(s => Circuit.Of(s, default).GapPullPerMetre));
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

        var local = new OneOrderUp(solved);
        record.Check(Wire, "pull on the wire, J × B, N/m", -truth, local.Of(s => PartReports.Of(s)[1].ForcePerMetre!.Value.Y));
        record.Check(Wire, "pull on the cylinder, stress over the shell, N/m", truth, local.Of(s => PartReports.Of(s)[0].ForcePerMetre!.Value.Y));
        record.Check(Wire, "pull on the cylinder, stress along the path, N/m", truth, local.Of(s => PartReports.Of(s)[0].ForceOtherWay!.Value.Y));
        record.Check(Wire, "pull on the cylinder, stress over a shell further out, N/m", truth, local.Of(s => ForceShell.Around(s, Body(magnet, 0)).Outward().OverShell().Y));
        foreach ((double y, double z, double by, double bz) in new[]
        {
            (25, 0, 0, -0.03087541), (0, 30, -0.0022358741, -0.0058026166), (-30, 0, 0, -0.0012861497), (50.0, 20.0, -0.0059118577, 0.0057540362),
        })
        {
            var place = new Point(y / 1000, z / 1000);
            string at = FormattableString.Invariant($" at ({y}, {z}) mm, T");
            record.Check(Wire, "By" + at, by, local.By(place), 5e-11);
            record.Check(Wire, "Bz" + at, bz, local.Bz(place), 5e-9);
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
        // The shell's form is the derivative on moved meshes; the difference leaves out (move over size)², the size a few mm.
        record.Check(Saturated, "force along y, N/m", along, shell.Y, Allowed.Relative(1e-4, "difference quotient: (move over distance)²"));
        record.Check(Saturated, "force along z over that along y", across / along, shell.Z / along, Allowed.Absolute(1e-4, "difference quotient: (move over distance)²"));
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
        Assert.Equal([true, true, true, false, false], parts.Select(p => p.ForceOnFreeFacesOnly));
        var local = new OneOrderUp(solved);
        record.Check(Joined, "along y, N/m", 0, local.Of(s => PartReports.Of(s).Sum(p => p.ForcePerMetre!.Value.Y)));
        record.Check(Joined, "along z, N/m", 0, local.Of(s => PartReports.Of(s).Sum(p => p.ForcePerMetre!.Value.Z)));
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
