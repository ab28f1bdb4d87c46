using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>A converged finite-element field.</summary>
public sealed class FieldSolution
{
    private readonly Lazy<ElementLocator> _inner;
    private readonly Lazy<ElementLocator?> _outer;

    internal FieldSolution(FieldProblem problem, double[] potential, IReadOnlyList<NewtonStep> history)
    {
        Problem = problem;
        Potential = potential;
        History = history;
        _inner = new Lazy<ElementLocator>(() => new ElementLocator(problem.Space, exterior: false));
        _outer = new Lazy<ElementLocator?>(() => Mesh.Circle is null ? null : new ElementLocator(problem.Space, exterior: true));
    }

    /// <summary>The magnet.</summary>
    public Magnet Magnet => Problem.Magnet;

    /// <summary>The mesh.</summary>
    public Mesh Mesh => Problem.Space.Mesh;

    /// <summary>Order of the elements.</summary>
    public int Order => Problem.Space.Order;

    /// <summary>Newton's history.</summary>
    public IReadOnlyList<NewtonStep> History { get; }

    /// <summary>Newton steps that made a tangent; those that kept one cost little.</summary>
    public int NewtonSteps => History.Count(s => !s.TangentKept);

    internal FieldProblem Problem { get; }

    /// <summary>A by node, T·m.</summary>
    internal double[] Potential { get; }

    /// <summary>Field at a place, also outside the open circle; null outside a closed model.</summary>
    public FieldSample? At(Point p)
    {
        if (_inner.Value.Find(p) is (int element, double xi, double eta))
        {
            return Sample(element, xi, eta);
        }

        if (_outer.Value is null || Mesh.Circle is not { } circle || p.DistanceTo(circle.Centre) < 0.99 * circle.Radius)
        {
            return null;
        }

        return AtOutside(circle, p);
    }

    /// <summary>Derivatives of B at a place, by the functions of its element; null outside a closed model.</summary>
    public FieldSlopes? SlopesAt(Point p)
    {
        // Central differences over a thousandth of the element: exact to 1e-6 for the low-order functions, far below their own error.
        const double step = 1e-3;
        if (_inner.Value.Find(p) is not (int element, double xi, double eta))
        {
            return SlopesOutside(p);
        }

        Point byXi = (0.5 / step) * (Gradient(xi + step, eta) - Gradient(xi - step, eta));
        Point byEta = (0.5 / step) * (Gradient(xi, eta + step) - Gradient(xi, eta - step));
        int n = Problem.Space.Reference.NodeCount;
        Span<double> shapeXi = stackalloc double[n];
        Span<double> shapeEta = stackalloc double[n];
        Problem.Space.Reference.Gradients(xi, eta, shapeXi, shapeEta);
        Jacobian jacobian = Problem.Space.JacobianAt(element, shapeXi, shapeEta);
        Point ofDaDy = jacobian.Gradient(byXi.Y, byEta.Y);
        Point ofDaDz = jacobian.Gradient(byXi.Z, byEta.Z);
        return new FieldSlopes(ofDaDz.Y, ofDaDz.Z, -ofDaDy.Y, -ofDaDy.Z);

        Point Gradient(double x, double e) => PotentialAndGradient(element, x, e).Gradient;
    }

    // Outside the meshed circle the field changes over the distance to its centre.
    private FieldSlopes? SlopesOutside(Point p)
    {
        const double step = 1e-4;
        double h = step * (Mesh.Circle is { } circle ? p.DistanceTo(circle.Centre) : 0);
        return At(p + new Point(h, 0)) is { } right && At(p - new Point(h, 0)) is { } left && At(p + new Point(0, h)) is { } above && At(p - new Point(0, h)) is { } below
            ? new FieldSlopes((right.By - left.By) / (2 * h), (above.By - below.By) / (2 * h), (right.Bz - left.Bz) / (2 * h), (above.Bz - below.Bz) / (2 * h))
            : null;
    }

    /// <summary>
    /// The solution inside the model (without the second disc) cut into small straight triangles for drawing, each element
    /// into <paramref name="cuts"/>² pieces.
    /// </summary>
    public IEnumerable<FieldTriangle> Triangles(int cuts)
    {
        var places = new Point[(cuts + 1) * (cuts + 2) / 2];
        var samples = new FieldSample[places.Length];
        for (int e = 0; e < Problem.Space.ElementCount; e++)
        {
            int region = Mesh.Regions[e];
            if (region == Mesh.Exterior)
            {
                continue;
            }

            FillLattice(e, cuts, places, samples);
            for (int row = 0; row < cuts; row++)
            {
                for (int column = 0; column < cuts - row; column++)
                {
                    int a = LatticeIndex(cuts, row, column);
                    int b = LatticeIndex(cuts, row, column + 1);
                    int c = LatticeIndex(cuts, row + 1, column);
                    yield return new FieldTriangle(places[a], places[b], places[c], samples[a], samples[b], samples[c], region);
                    if (column < cuts - row - 1)
                    {
                        int d = LatticeIndex(cuts, row + 1, column + 1);
                        yield return new FieldTriangle(places[b], places[d], places[c], samples[b], samples[d], samples[c], region);
                    }
                }
            }
        }
    }

    /// <summary>
    /// Second-order cells of every element inside the model: corners then mid-edges 01, 12, 20, with the field there
    /// (one-sided: of the element's own region).
    /// </summary>
    public IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> QuadraticCells()
    {
        (double Xi, double Eta)[] at = [(0, 0), (1, 0), (0, 1), (0.5, 0), (0.5, 0.5), (0, 0.5)];
        for (int e = 0; e < Problem.Space.ElementCount; e++)
        {
            int region = Mesh.Regions[e];
            if (region != Mesh.Exterior)
            {
                int element = e;
                yield return (
                    [.. at.Select(a => PlaceOf(element, a.Xi, a.Eta))],
                    [.. at.Select(a => Sample(element, a.Xi, a.Eta))],
                    region);
            }
        }
    }

    /// <summary>Field at a reference place of an element.</summary>
    internal FieldSample Sample(int element, double xi, double eta)
    {
        (double a, Point gradient) = PotentialAndGradient(element, xi, eta);
        ref readonly RegionPhysics physics = ref Problem.PhysicsOf(element);
        MagneticState state = physics.Law.At((gradient - physics.RemanentGradient).Length);
        return new FieldSample(a, gradient.Z, -gradient.Y, state.FieldStrength, Math.Max(Mesh.Regions[element], 0));
    }

    /// <summary>Place of a reference point of an element.</summary>
    internal Point PlaceOf(int element, double xi, double eta)
    {
        Span<double> values = stackalloc double[Problem.Space.Reference.NodeCount];
        Problem.Space.Reference.Values(xi, eta, values);
        return Problem.Space.PlaceAt(element, values);
    }

    /// <summary>Potential at the nodes of another space over the same section, for a warm start.</summary>
    internal double[] InterpolatedTo(FiniteElementSpace space)
    {
        var potential = new double[space.NodeCount];
        var done = new bool[space.NodeCount];
        for (int e = 0; e < space.ElementCount; e++)
        {
            bool exterior = space.Mesh.Regions[e] == Mesh.Exterior;
            foreach (int node in space.NodesOf(e))
            {
                if (!done[node])
                {
                    done[node] = true;
                    ElementLocator? locator = exterior ? _outer.Value : _inner.Value;
                    if (locator?.Find(space.Places[node]) is (int element, double xi, double eta))
                    {
                        potential[node] = PotentialAndGradient(element, xi, eta).Potential;
                    }
                }
            }
        }

        return potential;
    }

    private FieldSample AtOutside(OpenCircle circle, Point p)
    {
        Point image = Kelvin.Invert(circle, p);
        if (_outer.Value!.Find(image) is not (int element, double xi, double eta))
        {
            // Only a rounding's breadth beside the rim: take the nearest place inside.
            image = circle.Centre + ((1 - 1e-9) * (image - circle.Centre));
            if (_outer.Value.Find(image) is not (int e2, double x2, double n2))
            {
                return new FieldSample(0, Magnet.AppliedField.Y, Magnet.AppliedField.Z, double.NaN, 0);
            }

            (element, xi, eta) = (e2, x2, n2);
        }

        (double a, Point inDisc) = OuterPotentialAndGradient(element, xi, eta);
        Point gradient = Kelvin.GradientOutside(circle, p, inDisc);
        Point d = p - circle.Centre;
        double ofNetCurrent = PhysicalConstants.Mu0 * Problem.NetCurrent / Math.Tau;
        Point line = (ofNetCurrent / d.SquaredLength) * d.Perpendicular;
        double by = gradient.Z + Magnet.AppliedField.Y + line.Y;
        double bz = -gradient.Y + Magnet.AppliedField.Z + line.Z;
        a -= ofNetCurrent * Math.Log(d.Length / circle.Radius);
        return new FieldSample(
            a + Problem.BackgroundPotential(p), by, bz, PhysicalConstants.Nu0 * new Point(by, bz).Length, 0);
    }

    private (double Potential, Point Gradient) PotentialAndGradient(int element, double xi, double eta) =>
        Interpolate(element, xi, eta, withoutBackground: false);

    private (double Potential, Point Gradient) OuterPotentialAndGradient(int element, double xi, double eta) =>
        Interpolate(element, xi, eta, withoutBackground: true);

    private (double Potential, Point Gradient) Interpolate(int element, double xi, double eta, bool withoutBackground)
    {
        FiniteElementSpace space = Problem.Space;
        int n = space.Reference.NodeCount;
        Span<double> values = stackalloc double[n];
        Span<double> byXi = stackalloc double[n];
        Span<double> byEta = stackalloc double[n];
        space.Reference.Values(xi, eta, values);
        space.Reference.Gradients(xi, eta, byXi, byEta);
        ReadOnlySpan<int> nodes = space.NodesOf(element);
        double a = 0, dXi = 0, dEta = 0;
        for (int i = 0; i < n; i++)
        {
            double v = Potential[nodes[i]];
            if (withoutBackground && Magnet.AppliedField != default && IsOnRim(nodes[i]))
            {
                v -= Problem.BackgroundPotential(space.Places[nodes[i]]);
            }

            a += values[i] * v;
            dXi += byXi[i] * v;
            dEta += byEta[i] * v;
        }

        return (a, space.JacobianAt(element, byXi, byEta).Gradient(dXi, dEta));
    }

    private bool IsOnRim(int node)
    {
        OpenCircle circle = Mesh.Circle!;
        return Math.Abs(Problem.Space.Places[node].DistanceTo(circle.Centre) - circle.Radius) < 1e-9 * circle.Radius;
    }

    private void FillLattice(int element, int cuts, Point[] places, FieldSample[] samples)
    {
        for (int row = 0; row <= cuts; row++)
        {
            for (int column = 0; column <= cuts - row; column++)
            {
                int k = LatticeIndex(cuts, row, column);
                double xi = (double)column / cuts;
                double eta = (double)row / cuts;
                places[k] = PlaceOf(element, xi, eta);
                samples[k] = Sample(element, xi, eta);
            }
        }
    }

    private static int LatticeIndex(int cuts, int row, int column) => (row * (cuts + 1)) - (row * (row - 1) / 2) + column;
}
