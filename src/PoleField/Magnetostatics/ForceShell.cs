using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>
/// A shell of air elements around a body and the force on the body by Maxwell's stress T = ν0 (B Bᵀ − ½|B|² I) in it, in two
/// ways: over the whole shell, F = −∫ T ∇χ dS, and along a closed path through it, F = ∮ T n ds.
/// </summary>
/// <remarks>
/// χ is linear in each element, 1 on the body and 0 on everything else that is not air. The shell form is the derivative of
/// the stored energy when the body moves and the elements of the shell stretch (Coulomb 1983, recalled from memory), and
/// inherits the energy's accuracy; the path runs where χ = ½.
/// </remarks>
internal sealed class ForceShell
{
    private const int ExtraPoints = 2;      // Gauss points beyond the order, for the square of the field
    private const double OnPath = 0.5;      // χ there

    private readonly FieldSolution _solution;
    private readonly bool[] _inside;        // by vertex: χ = 1

    private ForceShell(FieldSolution solution, bool[] inside)
    {
        _solution = solution;
        _inside = inside;
    }

    /// <summary>
    /// The shell of the elements that touch a body, <paramref name="layers"/> − 1 layers of elements away from it where there
    /// is room; null when something other than air touches the body.
    /// </summary>
    /// <param name="solution">The field.</param>
    /// <param name="body">By region of the section: true for the body's.</param>
    /// <param name="layers">1 for the elements that touch the body.</param>
    public static ForceShell? Around(FieldSolution solution, bool[] body, int layers = 1)
    {
        Mesh mesh = solution.Mesh;
        var inside = new bool[mesh.Vertices.Count];
        var barred = new bool[mesh.Vertices.Count];
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            int region = mesh.Regions[t];
            bool own = region != Mesh.Exterior && body[region];
            if (own || !IsAir(solution.Problem, t))
            {
                Mark(mesh, t, own ? inside : barred);
            }
        }

        BarRim(mesh, barred);
        for (int v = 0; v < inside.Length; v++)
        {
            if (inside[v] && barred[v])
            {
                return null;
            }
        }

        for (int layer = 1; layer < layers; layer++)
        {
            inside = Grown(mesh, inside, barred);
        }

        return new ForceShell(solution, inside);
    }

    /// <summary>Force per metre on the body from the whole shell (y, z), N/m.</summary>
    public Point OverShell()
    {
        FiniteElementSpace space = _solution.Problem.Space;
        TriangleQuadrature rule = TriangleQuadrature.Collapsed(space.Order + ExtraPoints);
        var table = new ShapeTable(space.Reference, rule);
        Point force = default;
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (!Crosses(e))
            {
                continue;
            }

            double corner = Chi(e, 0);
            (double byXi, double byEta) = (Chi(e, 1) - corner, Chi(e, 2) - corner);
            for (int q = 0; q < rule.Count; q++)
            {
                Jacobian j = space.JacobianAt(e, table.XiRow(q), table.EtaRow(q));
                Point b = FluxDensity(e, rule.Xi[q], rule.Eta[q]);
                force -= rule.Weights[q] * j.Determinant * Traction(b, j.Gradient(byXi, byEta));
            }
        }

        return force;
    }

    /// <summary>Force per metre on the body from the closed path χ = ½ (y, z), N/m.</summary>
    public Point AlongPath()
    {
        FiniteElementSpace space = _solution.Problem.Space;
        Numerics.GaussRule rule = Numerics.GaussRule.Legendre(space.Order + ExtraPoints);
        Span<double> byXi = stackalloc double[space.Reference.NodeCount];
        Span<double> byEta = stackalloc double[space.Reference.NodeCount];
        Point force = default;
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (!Crosses(e))
            {
                continue;
            }

            ((double x0, double e0), (double x1, double e1)) = PathIn(e);
            for (int i = 0; i < rule.Nodes.Length; i++)
            {
                double xi = x0 + (rule.Nodes[i] * (x1 - x0));
                double eta = e0 + (rule.Nodes[i] * (e1 - e0));
                space.Reference.Gradients(xi, eta, byXi, byEta);
                Jacobian j = space.JacobianAt(e, byXi, byEta);
                Point along = ((x1 - x0) * j.ByXi) + ((e1 - e0) * j.ByEta);

                // The path has the body on its left, so that its outward normal is the tangent turned by −90 degrees.
                force += rule.Weights[i] * Traction(FluxDensity(e, xi, eta), -along.Perpendicular);
            }
        }

        return force;
    }

    /// <summary>T n for a normal of any length: N/m² times that length.</summary>
    public static Point Traction(Point b, Point normal) =>
        PhysicalConstants.Nu0 * ((b.Dot(normal) * b) - (0.5 * b.SquaredLength * normal));

    /// <summary>True where the stress of vacuum is free of divergence: no iron, no remanence, no current, not the second disc.</summary>
    private static bool IsAir(FieldProblem problem, int element)
    {
        ref readonly RegionPhysics physics = ref problem.PhysicsOf(element);
        return problem.Space.Mesh.Regions[element] != Mesh.Exterior
            && physics.Law is LinearLaw { RelativePermeability: 1.0 }
            && physics.CurrentDensity == 0.0
            && physics.RemanentGradient == default;
    }

    private static void Mark(Mesh mesh, int triangle, bool[] flags)
    {
        for (int c = 0; c < 3; c++)
        {
            flags[mesh.Triangles[(3 * triangle) + c]] = true;
        }
    }

    private static void BarRim(Mesh mesh, bool[] barred)
    {
        foreach (CurveEdge edge in mesh.CurveEdges)
        {
            bool rim = edge.SectionEdge < 0
                || mesh.Section.Edges[edge.SectionEdge].Left == Drawing.CrossSection.Outside
                || mesh.Section.Edges[edge.SectionEdge].Right == Drawing.CrossSection.Outside;
            if (rim)
            {
                barred[edge.A] = true;
                barred[edge.B] = true;
            }
        }
    }

    private static bool[] Grown(Mesh mesh, bool[] inside, bool[] barred)
    {
        var grown = (bool[])inside.Clone();
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            bool touches = false;
            for (int c = 0; c < 3; c++)
            {
                touches |= inside[mesh.Triangles[(3 * t) + c]];
            }

            for (int c = 0; touches && c < 3; c++)
            {
                int v = mesh.Triangles[(3 * t) + c];
                grown[v] |= !barred[v];
            }
        }

        return grown;
    }

    private double Chi(int element, int corner) => _inside[_solution.Mesh.Triangles[(3 * element) + corner]] ? 1.0 : 0.0;

    private bool Crosses(int element)
    {
        double sum = Chi(element, 0) + Chi(element, 1) + Chi(element, 2);
        return sum is > 0 and < 3;
    }

    // From the middle of one side to that of another, the corners with χ = 1 on the left.
    private ((double Xi, double Eta) From, (double Xi, double Eta) To) PathIn(int element)
    {
        ReadOnlySpan<(double Xi, double Eta)> middles = [(OnPath, 0), (OnPath, OnPath), (0, OnPath)];
        (double, double) from = default;
        (double, double) to = default;
        for (int side = 0; side < 3; side++)
        {
            double a = Chi(element, side);
            double b = Chi(element, (side + 1) % 3);
            if (a > b)
            {
                from = middles[side];
            }
            else if (a < b)
            {
                to = middles[side];
            }
        }

        return (from, to);
    }

    private Point FluxDensity(int element, double xi, double eta)
    {
        FieldSample s = _solution.Sample(element, xi, eta);
        return new Point(s.By, s.Bz);
    }
}
