using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>
/// Isoparametric triangles of one order over a mesh: numbered nodes with their places on the true curves.
/// </summary>
/// <remarks>
/// Nodes are numbered vertices first, then edge by edge from the edge's lower vertex to its higher, then element by element
/// inside. Interior nodes of curved elements follow the blending rule x + d(t)·λa λb/(t(1 − t)), t = (1 + λb − λa)/2
/// (Szabó and Babuška 1991, recalled from memory).
/// </remarks>
internal sealed class FiniteElementSpace
{
    private readonly int[] _nodes; // node i of element e at [e·n + i], reference order

    private FiniteElementSpace(Mesh mesh, MeshEdges edges, ReferenceTriangle reference)
    {
        Mesh = mesh;
        Edges = edges;
        Reference = reference;
        int p = reference.Order;
        int vertices = mesh.Vertices.Count;
        SkeletonCount = vertices + (edges.Count * (p - 1));
        NodeCount = SkeletonCount + (mesh.TriangleCount * reference.InteriorCount);
        _nodes = new int[mesh.TriangleCount * reference.NodeCount];
        Places = new Point[NodeCount];
        IsCurved = new bool[mesh.TriangleCount];
    }

    public Mesh Mesh { get; }

    public MeshEdges Edges { get; }

    public ReferenceTriangle Reference { get; }

    public int Order => Reference.Order;

    /// <summary>Number of nodes.</summary>
    public int NodeCount { get; }

    /// <summary>Nodes on vertices and edges; the interior ones follow.</summary>
    public int SkeletonCount { get; }

    public int ElementCount => IsCurved.Length;

    /// <summary>Place of each node, metres (in the second disc: that disc's plane).</summary>
    public Point[] Places { get; }

    /// <summary>True for elements with a curved edge; the others have a constant Jacobian.</summary>
    public bool[] IsCurved { get; }

    /// <summary>Nodes of an element in reference order.</summary>
    public ReadOnlySpan<int> NodesOf(int element) =>
        _nodes.AsSpan(element * Reference.NodeCount, Reference.NodeCount);

    /// <summary>Places the nodes of elements of the given order.</summary>
    /// <exception cref="MeshingException">A curved element folds over: the mesh is too coarse for its curve.</exception>
    public static FiniteElementSpace Create(Mesh mesh, MeshEdges edges, int order)
    {
        var space = new FiniteElementSpace(mesh, edges, new ReferenceTriangle(order));
        space.NumberNodes();
        space.PlaceVerticesAndEdges();
        for (int e = 0; e < space.ElementCount; e++)
        {
            space.PlaceInterior(e);
        }

        space.CheckJacobians();
        return space;
    }

    /// <summary>Jacobian of an element at a reference place.</summary>
    public Jacobian JacobianAt(int element, ReadOnlySpan<double> byXi, ReadOnlySpan<double> byEta)
    {
        ReadOnlySpan<int> nodes = NodesOf(element);
        if (!IsCurved[element])
        {
            Point origin = Places[nodes[0]];
            return new Jacobian(Places[nodes[1]] - origin, Places[nodes[2]] - origin);
        }

        double yXi = 0, zXi = 0, yEta = 0, zEta = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            Point p = Places[nodes[i]];
            yXi += p.Y * byXi[i];
            zXi += p.Z * byXi[i];
            yEta += p.Y * byEta[i];
            zEta += p.Z * byEta[i];
        }

        return new Jacobian(new Point(yXi, zXi), new Point(yEta, zEta));
    }

    /// <summary>Place of a reference point of an element from the values of the shape functions there.</summary>
    public Point PlaceAt(int element, ReadOnlySpan<double> values)
    {
        ReadOnlySpan<int> nodes = NodesOf(element);
        double y = 0, z = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            y += values[i] * Places[nodes[i]].Y;
            z += values[i] * Places[nodes[i]].Z;
        }

        return new Point(y, z);
    }

    private void NumberNodes()
    {
        int p = Order;
        int n = Reference.NodeCount;
        int vertices = Mesh.Vertices.Count;
        for (int e = 0; e < ElementCount; e++)
        {
            Span<int> nodes = _nodes.AsSpan(e * n, n);
            for (int c = 0; c < 3; c++)
            {
                nodes[c] = Mesh.Triangles[(3 * e) + c];
            }

            for (int side = 0; side < 3; side++)
            {
                int edge = Edges.OfTriangle(e, side);
                bool forward = nodes[side] == Edges.Ends(edge).Lower;
                int first = vertices + (edge * (p - 1));
                for (int m = 1; m < p; m++)
                {
                    nodes[Reference.EdgeNode(side, m)] = first + (forward ? m - 1 : p - 1 - m);
                }
            }

            for (int i = 0; i < Reference.InteriorCount; i++)
            {
                nodes[Reference.BoundaryCount + i] = SkeletonCount + (e * Reference.InteriorCount) + i;
            }
        }
    }

    private void PlaceVerticesAndEdges()
    {
        int p = Order;
        int vertices = Mesh.Vertices.Count;
        for (int v = 0; v < vertices; v++)
        {
            Places[v] = Mesh.Vertices[v];
        }

        for (int edge = 0; edge < Edges.Count; edge++)
        {
            (int lower, int higher) = Edges.Ends(edge);
            int curveEdge = Edges.CurveEdgeOf(edge);
            for (int m = 1; m < p; m++)
            {
                double t = (double)m / p;
                Places[vertices + (edge * (p - 1)) + m - 1] = curveEdge >= 0
                    ? OnCurve(Mesh.CurveEdges[curveEdge], lower, t)
                    : Point.Between(Places[lower], Places[higher], t);
            }
        }
    }

    private static Point OnCurve(CurveEdge e, int lower, double t)
    {
        (double from, double to) = e.A == lower ? (e.TA, e.TB) : (e.TB, e.TA);
        return e.Curve.At(from + (t * (to - from)));
    }

    private void PlaceInterior(int element)
    {
        Span<int> nodes = _nodes.AsSpan(element * Reference.NodeCount, Reference.NodeCount);
        Point a = Places[nodes[0]];
        Point b = Places[nodes[1]];
        Point c = Places[nodes[2]];
        for (int i = Reference.BoundaryCount; i < nodes.Length; i++)
        {
            Places[nodes[i]] = (Reference.Barycentric(i, 0) * a) + (Reference.Barycentric(i, 1) * b)
                + (Reference.Barycentric(i, 2) * c);
        }

        for (int side = 0; side < 3; side++)
        {
            int curveEdge = Edges.CurveEdgeOf(Edges.OfTriangle(element, side));
            if (curveEdge < 0 || Mesh.CurveEdges[curveEdge].Curve is Line)
            {
                continue;
            }

            IsCurved[element] = true;
            BlendInterior(nodes, side, Mesh.CurveEdges[curveEdge]);
        }
    }

    private void BlendInterior(Span<int> nodes, int side, CurveEdge e)
    {
        int from = nodes[side];
        int to = nodes[(side + 1) % 3];
        for (int i = Reference.BoundaryCount; i < nodes.Length; i++)
        {
            double la = Reference.Barycentric(i, side);
            double lb = Reference.Barycentric(i, (side + 1) % 3);
            double t = (1 + lb - la) / 2;
            Point fromChord = OnCurve(e, from, t) - Point.Between(Places[from], Places[to], t);
            Places[nodes[i]] += (la * lb / (t * (1 - t))) * fromChord;
        }
    }

    private void CheckJacobians()
    {
        var proof = new JacobianProof(this);
        for (int e = 0; e < ElementCount; e++)
        {
            double ofStraight = IsCurved[e] ? double.NaN : JacobianAt(e, default, default).Determinant;
            if (!(IsCurved[e] ? proof.IsPositive(e) : ofStraight > 0.0))
            {
                Point at = Places[NodesOf(e)[0]];
                throw new MeshingException(FormattableString.Invariant(
                    $"Element {e} at ({1e3 * at.Y:g6}, {1e3 * at.Z:g6}) mm folds over; the mesh is too coarse for its curved edge."), at);
            }
        }
    }
}
