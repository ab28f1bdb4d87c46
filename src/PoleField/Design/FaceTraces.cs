using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Materials;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Design;

/// <summary>
/// What the field does at the faces, and the shape derivative made of it. For an outward move V of the inner region
/// dq = ∫ V { (Dh∇φ)ₙ [∂ₙA] − ∂τφ [h_τ] + [J(φ − φ̄)] } ds, φ the adjoint, h = ν(∇A − gᵣ), [·] inner less outer.
/// </summary>
/// <remarks>
/// Derived from the weak form; for the volume and boundary forms see Hiptmair, Paganini and Sargheini, BIT 55 (2015) 459
/// (recalled from memory). Everything is taken from the inner side, the outer values following from the continuity of h_n
/// and ∂τA: in iron the traces are better by orders of magnitude than in air, and the extraction's band may touch the face
/// on the air side. The mean φ̄ over a conductor keeps its ampere-turns when its area changes.
/// </remarks>
internal sealed class FaceTraces
{
    private readonly FieldSolution _solution;
    private readonly FiniteElementSpace _space;
    private readonly double[][] _values;   // shape functions at Gauss point k of side s at [s·n + k]
    private readonly double[][] _byXi;
    private readonly double[][] _byEta;
    private readonly GaussRule _rule;
    private readonly List<FacePoint> _points = [];
    private readonly List<Trace> _traces = [];

    public FaceTraces(FieldSolution solution)
    {
        _solution = solution;
        _space = solution.Problem.Space;
        _rule = GaussRule.Legendre(_space.Order + 1);
        int rows = 3 * _rule.Nodes.Length;
        (_values, _byXi, _byEta) = (new double[rows][], new double[rows][], new double[rows][]);
        Tabulate();
        AddFaces();
    }

    /// <summary>Gauss points of all faces, mesh edge by mesh edge in the order of the section's edges.</summary>
    public IReadOnlyList<FacePoint> Points => _points;

    /// <summary>Derivative by outward move, per metre of move and metre of face, at each point, for an adjoint by node.</summary>
    /// <param name="adjoint">φ by node.</param>
    /// <param name="means">Mean of φ over each region.</param>
    public double[] Density(double[] adjoint, double[] means)
    {
        var density = new double[_points.Count];
        for (int i = 0; i < density.Length; i++)
        {
            Trace trace = _traces[i];
            FacePoint point = _points[i];
            (double value, Point gradient) = At(trace.Element, trace.Row, adjoint);
            Point n = point.Outward;
            double normal = (trace.Reluctivity * gradient.Dot(n))
                + (trace.Excess * trace.Turned.Dot(gradient) * trace.Turned.Dot(n));
            density[i] = (normal * trace.NormalJump) - (gradient.Dot(n.Perpendicular) * trace.TangentialJump)
                + Current(point.Inner, value, means) - Current(point.Outer, value, means);
        }

        return density;
    }

    /// <summary>True when iron touches a conductor, so that a moved face changes the conductor's area.</summary>
    public bool TouchesConductor => _points.Exists(p =>
        _solution.Problem.Regions[p.Outer].CurrentDensity != 0 && !SameLaw(_solution.Problem.Regions[p.Inner].Law, LinearLaw.Vacuum));

    private double Current(int region, double value, double[] means)
    {
        double density = _solution.Problem.Regions[region].CurrentDensity;
        return density == 0 ? 0 : density * (value - means[region]);
    }

    private void Tabulate()
    {
        int n = _rule.Nodes.Length;
        int nodes = _space.Reference.NodeCount;
        for (int row = 0; row < _values.Length; row++)
        {
            double t = _rule.Nodes[row % n];
            (double xi, double eta) = (row / n) switch
            {
                0 => (t, 0.0),
                1 => (1 - t, t),
                _ => (0.0, 1 - t),
            };
            (_values[row], _byXi[row], _byEta[row]) = (new double[nodes], new double[nodes], new double[nodes]);
            _space.Reference.Values(xi, eta, _values[row]);
            _space.Reference.Gradients(xi, eta, _byXi[row], _byEta[row]);
        }
    }

    private void AddFaces()
    {
        var sides = new (int Element, int Side)[2 * _space.Edges.Count];
        Array.Fill(sides, (-1, -1));
        for (int slot = 0; slot < 3 * _space.ElementCount; slot++)
        {
            int edge = _space.Edges.OfTriangle(slot / 3, slot % 3);
            sides[(2 * edge) + (sides[2 * edge].Element < 0 ? 0 : 1)] = (slot / 3, slot % 3);
        }

        Mesh mesh = _space.Mesh;
        IEnumerable<int> faces = Enumerable.Range(0, _space.Edges.Count)
            .Where(e => _space.Edges.CurveEdgeOf(e) >= 0 && mesh.CurveEdges[_space.Edges.CurveEdgeOf(e)].SectionEdge >= 0)
            .Where(e => sides[(2 * e) + 1].Element >= 0)
            .OrderBy(e => mesh.CurveEdges[_space.Edges.CurveEdgeOf(e)].SectionEdge)
            .ThenBy(e => mesh.CurveEdges[_space.Edges.CurveEdgeOf(e)].TA);
        foreach (int e in faces)
        {
            int first = mesh.Regions[sides[2 * e].Element];
            int second = mesh.Regions[sides[(2 * e) + 1].Element];
            if (!Differ(first, second))
            {
                continue;
            }

            bool firstInside = Rank(first).CompareTo(Rank(second)) >= 0;
            (int element, int side) = firstInside ? sides[2 * e] : sides[(2 * e) + 1];
            AddEdge(mesh.CurveEdges[_space.Edges.CurveEdgeOf(e)], element, side, firstInside ? second : first);
        }
    }

    /// <summary>True when two regions are filled differently.</summary>
    public bool Differ(int a, int b)
    {
        RegionPhysics[] regions = _solution.Problem.Regions;
        return !SameLaw(regions[a].Law, regions[b].Law) || regions[a].RemanentGradient != regions[b].RemanentGradient
            || regions[a].CurrentDensity != regions[b].CurrentDensity;
    }

    internal static bool SameLaw(MagneticLaw a, MagneticLaw b) =>
        ReferenceEquals(a, b)
        || (a is LinearLaw first && b is LinearLaw second && first.RelativePermeability == second.RelativePermeability);

    // Iron before magnets before conductors before air.
    private (double Permeability, bool Magnet, bool Current) Rank(int region)
    {
        ref readonly RegionPhysics physics = ref _solution.Problem.Regions[region];
        return (1 / physics.Law.InitialReluctivity, physics.RemanentGradient != default, physics.CurrentDensity != 0);
    }

    private void AddEdge(CurveEdge edge, int element, int side, int outer)
    {
        int n = _rule.Nodes.Length;
        int inner = _space.Mesh.Regions[element];
        bool forward = _space.NodesOf(element)[side] == edge.A;
        Curve curve = _space.Mesh.Section.Edges[edge.SectionEdge].Curve;
        bool onCurve = ReferenceEquals(curve, edge.Curve);
        for (int k = 0; k < n; k++)
        {
            int row = (side * n) + k;
            Point along = Along(element, side, row);
            Point at = _space.PlaceAt(element, _values[row]);
            double share = forward ? _rule.Nodes[k] : 1 - _rule.Nodes[k];
            double parameter = onCurve ? edge.TA + (share * (edge.TB - edge.TA)) : curve.ClosestParameter(at);
            Point outward = -along.Unit().Perpendicular;
            _points.Add(new FacePoint(
                edge.SectionEdge, parameter, at, outward, _rule.Weights[k] * along.Length, inner, outer));
            _traces.Add(TraceAt(element, row, outward, outer));
        }
    }

    // Derivative of the place along a side, counter-clockwise around the element.
    private Point Along(int element, int side, int row)
    {
        Jacobian j = _space.JacobianAt(element, _byXi[row], _byEta[row]);
        return side switch
        {
            0 => j.ByXi,
            1 => j.ByEta - j.ByXi,
            _ => -j.ByEta,
        };
    }

    private (double Value, Point Gradient) At(int element, int row, double[] nodal)
    {
        ReadOnlySpan<int> nodes = _space.NodesOf(element);
        double value = 0, xi = 0, eta = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            double v = nodal[nodes[i]];
            value += _values[row][i] * v;
            xi += _byXi[row][i] * v;
            eta += _byEta[row][i] * v;
        }

        return (value, _space.JacobianAt(element, _byXi[row], _byEta[row]).Gradient(xi, eta));
    }

    private Trace TraceAt(int element, int row, Point outward, int outer)
    {
        ref readonly RegionPhysics inside = ref _solution.Problem.PhysicsOf(element);
        ref readonly RegionPhysics outside = ref _solution.Problem.Regions[outer];
        Point gradient = At(element, row, _solution.Potential).Gradient;
        Point turned = gradient - inside.RemanentGradient;
        (double reluctivity, double excess) = Tangent.Of(inside.Law, turned.Length);
        double tangential = gradient.Dot(outward.Perpendicular);
        double across = reluctivity * turned.Dot(outward);

        double beyondTangential = tangential - outside.RemanentGradient.Dot(outward.Perpendicular);
        double beyondNormal = Tangent.NormalPart(outside.Law, across, beyondTangential);
        double beyond = Tangent.Of(outside.Law, new Point(beyondNormal, beyondTangential).Length).Reluctivity;
        return new Trace(
            element,
            row,
            turned,
            reluctivity,
            excess,
            gradient.Dot(outward) - beyondNormal - outside.RemanentGradient.Dot(outward),
            (reluctivity * turned.Dot(outward.Perpendicular)) - (beyond * beyondTangential));
    }

    /// <param name="Element">Element on the inner side.</param>
    /// <param name="Row">Row of the shape tables.</param>
    /// <param name="Turned">∇A − gᵣ there, T.</param>
    /// <param name="Reluctivity">H/B there, m/H.</param>
    /// <param name="Excess">(dH/dB − H/B)/B² there.</param>
    /// <param name="NormalJump">[∂ₙA], T.</param>
    /// <param name="TangentialJump">[h_τ], A/m.</param>
    private readonly record struct Trace(
        int Element, int Row, Point Turned, double Reluctivity, double Excess, double NormalJump, double TangentialJump);
}
