using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Numerics;

namespace PoleField.Beam;

/// <summary>The ampere-turns' balance, stored energy and inductance.</summary>
internal static class Circuit
{
    private const int MarchSteps = 4000;
    private const int BisectionSteps = 60;
    private const int GapIntervals = 24;

    public static CircuitReport Of(FieldSolution solution, Point beam)
    {
        double driving = DrivingAmpereTurns(solution.Magnet);
        double gap = GapAmpereTurns(solution, beam);
        (double energy, double linkage) = Energies(solution);
        double? inductance = driving > 0 && !HasEnergyAtInfinity(solution.Problem) ? linkage / (driving * driving) : null;
        return new CircuitReport(driving, gap, driving - gap, energy, inductance)
        {
            GapPullPerMetre = ForceReports.AcrossGap(solution, beam),
        };
    }

    /// <summary>Sum of the positive ampere-turns, A.</summary>
    public static double DrivingAmpereTurns(Magnet magnet)
    {
        double positive = 0;
        foreach (Region region in magnet.Section.Regions)
        {
            if (region.Part >= 0)
            {
                double turns = magnet.Roles[region.Part].AmpereTurns;
                positive += Math.Max(0, region.MirrorImage ? -turns : turns);
            }
        }

        return positive;
    }

    // ∫ H·dl through the beam's centre along z, from iron to iron; not a number where the line does not end in iron.
    private static double GapAmpereTurns(FieldSolution solution, Point beam)
    {
        Box box = solution.Magnet.Section.Bounds;
        if (IronSurface(solution, beam, box.Max.Z + (0.01 * box.Height)) is not double upper
            || IronSurface(solution, beam, box.Min.Z - (0.01 * box.Height)) is not double lower)
        {
            return double.NaN;
        }

        GaussRule rule = GaussRule.Legendre(4);
        double sum = 0;
        double step = (upper - lower) / GapIntervals;
        for (int k = 0; k < GapIntervals; k++)
        {
            for (int i = 0; i < rule.Nodes.Length; i++)
            {
                double z = lower + ((k + rule.Nodes[i]) * step);
                sum += step * rule.Weights[i] * (solution.At(new Point(beam.Y, z))?.Bz ?? 0.0);
            }
        }

        return Math.Abs(PhysicalConstants.Nu0 * sum);
    }

    private static double? IronSurface(FieldSolution solution, Point beam, double end)
    {
        double inAir = beam.Z;
        double step = (end - beam.Z) / MarchSteps;
        for (int k = 1; k <= MarchSteps; k++)
        {
            double z = beam.Z + (k * step);
            if (IsIron(solution, new Point(beam.Y, z)))
            {
                double inIron = z;
                for (int b = 0; b < BisectionSteps; b++)
                {
                    double middle = 0.5 * (inAir + inIron);
                    (inAir, inIron) = IsIron(solution, new Point(beam.Y, middle)) ? (inAir, middle) : (middle, inIron);
                }

                return inAir;
            }

            inAir = z;
        }

        return null;
    }

    /// <summary>True where a part that guides flux fills the place.</summary>
    public static bool IsIron(FieldSolution solution, Point p)
    {
        if (solution.At(p) is not { } sample)
        {
            return false;
        }

        int part = solution.Magnet.Section.Regions[sample.Region].Part;
        return part >= 0 && solution.Magnet.Roles[part].Material.GuidesFlux;
    }

    /// <summary>With a uniform background, or a net current in open surroundings, the energy of all space is infinite.</summary>
    public static bool HasEnergyAtInfinity(FieldProblem problem) =>
        problem.Magnet.AppliedField != default || (problem.Space.Mesh.Circle is not null && problem.NetCurrent != 0.0);

    /// <summary>Stored energy per metre ∫ w dS over all space, and ∫ J A dS, J/m.</summary>
    public static (double Energy, double Linkage) Energies(FieldSolution solution)
    {
        FieldProblem problem = solution.Problem;
        FiniteElementSpace space = problem.Space;
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + 1));
        double energy = 0;
        double linkage = 0;
        for (int e = 0; e < space.ElementCount; e++)
        {
            ref readonly RegionPhysics physics = ref problem.PhysicsOf(e);
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            for (int q = 0; q < table.Count; q++)
            {
                ReadOnlySpan<double> values = table.ValueRow(q);
                ReadOnlySpan<double> xi = table.XiRow(q);
                ReadOnlySpan<double> eta = table.EtaRow(q);
                double a = 0, byXi = 0, byEta = 0;
                for (int i = 0; i < nodes.Length; i++)
                {
                    double v = solution.Potential[nodes[i]];
                    a += values[i] * v;
                    byXi += xi[i] * v;
                    byEta += eta[i] * v;
                }

                Jacobian j = space.JacobianAt(e, xi, eta);
                double area = table.Quadrature.Weights[q] * j.Determinant;
                energy += area * physics.Law.At((j.Gradient(byXi, byEta) - physics.RemanentGradient).Length).Energy;
                linkage += area * physics.CurrentDensity * a;
            }
        }

        return (HasEnergyAtInfinity(problem) ? double.NaN : energy, linkage);
    }
}
