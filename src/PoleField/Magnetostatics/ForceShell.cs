using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>
/// The shell of elements around a body and the force on the body by Maxwell's stress T = ν0 (B Bᵀ − ½|B|² I) in it, in two
/// ways: over the whole shell, F = −∫ (T ∇χ + χ J × B) dS, and along a closed path through it, F = ∮ T n ds.
/// </summary>
/// <remarks>
/// χ is linear in each element, 1 on the body and 0 away from it. The shell form is the derivative of the stored energy when
/// the body moves and the elements of the shell stretch (Coulomb 1983, recalled from memory), and inherits the energy's
/// accuracy; the path runs where χ = ½. Where bodies of iron or magnets touch, each gets an equal share of χ at the common
/// vertices: the sum of their forces is that on the whole; how the joint itself divides it is a question of mechanics.
/// </remarks>
internal sealed class ForceShell
{
    private const int ExtraPoints = 2;      // Gauss points beyond the order, for the square of the field
    private const double OnPath = 0.5;      // χ there

    private readonly FieldSolution _solution;
    private readonly bool[] _body;          // by region
    private readonly double[] _chi;         // by vertex

    private ForceShell(FieldSolution solution, bool[] body, double[] chi, bool hasJoints)
    {
        _solution = solution;
        _body = body;
        _chi = chi;
        HasJoints = hasJoints;
    }

    /// <summary>True when the body touches other iron or magnets, or the rim of a closed model.</summary>
    public bool HasJoints { get; }

    /// <summary>The shell of the elements that touch a body, given by region of the section.</summary>
    public static ForceShell Around(FieldSolution solution, bool[] body)
    {
        Mesh mesh = solution.Mesh;
        var own = new bool[mesh.Vertices.Count];
        MarkRegions(mesh, body, own);
        int[] sharers = Sharers(solution, body);
        var chi = new double[own.Length];
        bool joints = false;
        for (int v = 0; v < chi.Length; v++)
        {
            chi[v] = own[v] ? 1.0 / (1 + sharers[v]) : 0.0;
            joints |= own[v] && sharers[v] > 0;
        }

        return new ForceShell(solution, body, chi, joints);
    }

    /// <summary>The shell moved one layer of elements away from the body where there is room; only without joints.</summary>
    public ForceShell Outward()
    {
        Mesh mesh = _solution.Mesh;
        var barred = new bool[_chi.Length];
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            int region = mesh.Regions[t];
            if (!(region != Mesh.Exterior && _body[region]) && !IsAir(t))
            {
                Mark(mesh, t, barred);
            }
        }

        MarkRim(mesh, barred);
        var chi = (double[])_chi.Clone();
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            for (int c = 0; c < 3; c++)
            {
                int v = mesh.Triangles[(3 * t) + c];
                if (!barred[v] && Chi(t, 0) + Chi(t, 1) + Chi(t, 2) > 0)
                {
                    chi[v] = 1.0;
                }
            }
        }

        return new ForceShell(_solution, _body, chi, HasJoints);
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
            if (!IsInShell(e))
            {
                continue;
            }

            double corner = Chi(e, 0);
            (double byXi, double byEta) = (Chi(e, 1) - corner, Chi(e, 2) - corner);
            double current = _solution.Problem.PhysicsOf(e).CurrentDensity;
            for (int q = 0; q < rule.Count; q++)
            {
                Jacobian j = space.JacobianAt(e, table.XiRow(q), table.EtaRow(q));
                Point b = FluxDensity(e, rule.Xi[q], rule.Eta[q]);
                double chi = corner + (byXi * rule.Xi[q]) + (byEta * rule.Eta[q]);
                force -= (rule.Weights[q] * j.Determinant)
                    * (Traction(b, j.Gradient(byXi, byEta)) + ((chi * current) * b.Perpendicular));
            }
        }

        return force;
    }

    /// <summary>Force per metre on the body from the closed path χ = ½ (y, z), N/m; only without joints.</summary>
    public Point AlongPath()
    {
        FiniteElementSpace space = _solution.Problem.Space;
        Numerics.GaussRule rule = Numerics.GaussRule.Legendre(space.Order + ExtraPoints);
        Span<double> byXi = stackalloc double[space.Reference.NodeCount];
        Span<double> byEta = stackalloc double[space.Reference.NodeCount];
        Point force = default;
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (!IsInShell(e))
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

    // Bodies of iron or magnets, other than this one, that own each vertex; the rim of a closed model counts as one.
    private static int[] Sharers(FieldSolution solution, bool[] body)
    {
        Mesh mesh = solution.Mesh;
        var sharers = new int[mesh.Vertices.Count];
        for (int part = 0; part < solution.Magnet.Roles.Count; part++)
        {
            PartRole role = solution.Magnet.Roles[part];
            if (role.Material.IsMagnetic || role.Remanence != default)
            {
                Count(flags => MarkRegions(mesh, [.. mesh.Section.Regions.Select((r, i) => r.Part == part && !body[i])], flags));
            }
        }

        Count(flags => MarkRim(mesh, flags));
        return sharers;

        void Count(Action<bool[]> mark)
        {
            var flags = new bool[sharers.Length];
            mark(flags);
            for (int v = 0; v < flags.Length; v++)
            {
                sharers[v] += flags[v] ? 1 : 0;
            }
        }
    }

    private static void MarkRegions(Mesh mesh, bool[] regions, bool[] flags)
    {
        for (int t = 0; t < mesh.TriangleCount; t++)
        {
            if (mesh.Regions[t] != Mesh.Exterior && regions[mesh.Regions[t]])
            {
                Mark(mesh, t, flags);
            }
        }
    }

    private static void Mark(Mesh mesh, int triangle, bool[] flags)
    {
        for (int c = 0; c < 3; c++)
        {
            flags[mesh.Triangles[(3 * triangle) + c]] = true;
        }
    }

    private static void MarkRim(Mesh mesh, bool[] flags)
    {
        foreach (CurveEdge edge in mesh.CurveEdges)
        {
            bool rim = edge.SectionEdge < 0
                || mesh.Section.Edges[edge.SectionEdge].Left == Drawing.CrossSection.Outside
                || mesh.Section.Edges[edge.SectionEdge].Right == Drawing.CrossSection.Outside;
            if (rim)
            {
                flags[edge.A] = true;
                flags[edge.B] = true;
            }
        }
    }

    private double Chi(int element, int corner) => _chi[_solution.Mesh.Triangles[(3 * element) + corner]];

    private bool IsAir(int element) => IsVacuum(element) && _solution.Problem.PhysicsOf(element).CurrentDensity == 0.0;

    // Where the stress of vacuum holds: no iron, no remanence, not the second disc, whose plane is another.
    private bool IsVacuum(int element)
    {
        ref readonly RegionPhysics physics = ref _solution.Problem.PhysicsOf(element);
        return _solution.Mesh.Regions[element] != Mesh.Exterior
            && physics.Law is LinearLaw { RelativePermeability: 1.0 }
            && physics.RemanentGradient == default;
    }

    private bool IsInShell(int element)
    {
        (double a, double b, double c) = (Chi(element, 0), Chi(element, 1), Chi(element, 2));
        return (a > 0 || b > 0 || c > 0) && !(a == b && b == c && IsAir(element))
            && IsVacuum(element) && !_body[_solution.Mesh.Regions[element]];
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
