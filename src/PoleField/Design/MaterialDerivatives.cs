using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>Derivatives by what fills each region: dq = −φ·∂r/∂(parameter), r the residual of the field equations.</summary>
/// <param name="AmpereTurns">By a relative change of the region's ampere-turns: ∫ J φ dS.</param>
/// <param name="Saturation">By a relative change of its polarisation: ∫ (B − μ0 H) dH/dB ĝ·∇φ dS.</param>
/// <param name="Remanence">By a relative change of its remanence: ∫ Dh gᵣ·∇φ dS.</param>
/// <param name="Turn">By turning its remanence, per radian.</param>
/// <param name="Mean">Mean of φ over the region.</param>
internal readonly record struct MaterialDerivatives(
    double AmpereTurns, double Saturation, double Remanence, double Turn, double Mean)
{
    /// <summary>Derivatives of each region of a solved field for an adjoint by node.</summary>
    public static MaterialDerivatives[] Of(FieldSolution solution, double[] adjoint)
    {
        FieldProblem problem = solution.Problem;
        FiniteElementSpace space = problem.Space;
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + 1));
        var sums = new MaterialDerivatives[problem.Regions.Length - 1];
        var areas = new double[sums.Length];
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region < 0 || !IsWanted(problem.Regions[region]))
            {
                continue;
            }

            for (int q = 0; q < table.Count; q++)
            {
                (double area, MaterialDerivatives own) = At(solution, adjoint, e, (table, q));
                areas[region] += area;
                sums[region] = sums[region].Plus(own);
            }
        }

        return [.. sums.Select((s, r) => areas[r] > 0 ? s with { Mean = s.Mean / areas[r] } : s)];
    }

    private static bool IsWanted(in RegionPhysics physics) =>
        physics.CurrentDensity != 0 || physics.RemanentGradient != default || physics.Law.SaturationPolarisation > 0;

    private static (double Area, MaterialDerivatives Own) At(
        FieldSolution solution, double[] adjoint, int element, (ShapeTable Table, int Point) at)
    {
        FiniteElementSpace space = solution.Problem.Space;
        ref readonly RegionPhysics physics = ref solution.Problem.PhysicsOf(element);
        ReadOnlySpan<int> nodes = space.NodesOf(element);
        ReadOnlySpan<double> values = at.Table.ValueRow(at.Point);
        ReadOnlySpan<double> xi = at.Table.XiRow(at.Point);
        ReadOnlySpan<double> eta = at.Table.EtaRow(at.Point);
        double phi = 0, phiXi = 0, phiEta = 0, aXi = 0, aEta = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            phi += values[i] * adjoint[nodes[i]];
            phiXi += xi[i] * adjoint[nodes[i]];
            phiEta += eta[i] * adjoint[nodes[i]];
            aXi += xi[i] * solution.Potential[nodes[i]];
            aEta += eta[i] * solution.Potential[nodes[i]];
        }

        Jacobian j = space.JacobianAt(element, xi, eta);
        double area = at.Table.Quadrature.Weights[at.Point] * j.Determinant;
        Point gradient = j.Gradient(phiXi, phiEta);
        Point remanent = physics.RemanentGradient;
        Point g = j.Gradient(aXi, aEta) - remanent;
        double b = g.Length;
        (double reluctivity, double excess) = Tangent.Of(physics.Law, b);
        double slope = reluctivity + (excess * b * b);
        double Pull(Point change) => (reluctivity * change.Dot(gradient)) + (excess * g.Dot(change) * g.Dot(gradient));
        return (area, new MaterialDerivatives(
            area * physics.CurrentDensity * phi,
            area * (1 - (PhysicalConstants.Mu0 * reluctivity)) * slope * g.Dot(gradient),
            area * Pull(remanent),
            area * Pull(remanent.Perpendicular),
            area * phi));
    }

    /// <summary>Sum.</summary>
    public MaterialDerivatives Plus(in MaterialDerivatives other) => new(
        AmpereTurns + other.AmpereTurns,
        Saturation + other.Saturation,
        Remanence + other.Remanence,
        Turn + other.Turn,
        Mean + other.Mean);
}
