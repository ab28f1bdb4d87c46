using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Design;

/// <summary>
/// Velocities of a mesh's nodes that continue those of its curves: each vertex moves as the mean of its neighbours (harmonic
/// on the graph of edges), nodes on inner edges and inside elements linearly between vertices. Around the beam, on the rim
/// and in the second disc nothing moves.
/// </summary>
internal sealed class MeshMotion
{
    private readonly FiniteElementSpace _space;
    private readonly Point[][] _velocity; // of node n by parameter k at [k][n]
    private readonly bool[] _pinned;      // of each vertex

    private MeshMotion(FiniteElementSpace space, int count)
    {
        _space = space;
        _velocity = [.. Enumerable.Range(0, count).Select(_ => new Point[space.NodeCount])];
        _pinned = new bool[space.Mesh.Vertices.Count];
    }

    /// <summary>Number of parameters.</summary>
    public int Count => _velocity.Length;

    /// <summary>Velocity of each node by a parameter, metres per unit.</summary>
    public ReadOnlySpan<Point> Of(int parameter) => _velocity[parameter];

    /// <summary>Continues the velocities of curves into a mesh.</summary>
    /// <param name="space">Elements.</param>
    /// <param name="chi">Cut-off of the extraction by node: elements on which it is 1 do not move.</param>
    /// <param name="boundary">Velocities of the curves.</param>
    public static MeshMotion Of(FiniteElementSpace space, double[] chi, BoundaryVelocities boundary)
    {
        var motion = new MeshMotion(space, boundary.Count);
        motion.PinStill(chi);
        motion.PinCurves(boundary);
        motion.FillVertices();
        motion.FillElements();
        motion.PlaceCurveNodes(boundary);
        return motion;
    }

    private void PinStill(double[] chi)
    {
        for (int e = 0; e < _space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            bool still = _space.Mesh.Regions[e] == Mesh.Exterior;
            if (!still)
            {
                still = true;
                foreach (int node in nodes)
                {
                    still &= chi[node] == 1.0;
                }
            }

            for (int c = 0; still && c < 3; c++)
            {
                _pinned[nodes[c]] = true;
            }
        }
    }

    private void PinCurves(BoundaryVelocities boundary)
    {
        var own = new Point[Count];
        foreach (CurveEdge edge in _space.Mesh.CurveEdges)
        {
            (_pinned[edge.A], _pinned[edge.B]) = (true, true);
            if (edge.SectionEdge >= 0 && !boundary.IsAtRest(edge.SectionEdge))
            {
                Set(boundary, edge, edge.A, edge.TA, own);
                Set(boundary, edge, edge.B, edge.TB, own);
            }
        }
    }

    private void PlaceCurveNodes(BoundaryVelocities boundary)
    {
        var own = new Point[Count];
        int p = _space.Order;
        for (int k = 0; k < _space.Edges.Count; k++)
        {
            int c = _space.Edges.CurveEdgeOf(k);
            if (c < 0 || _space.Mesh.CurveEdges[c] is not { SectionEdge: >= 0 } edge || boundary.IsAtRest(edge.SectionEdge))
            {
                continue;
            }

            bool forward = _space.Edges.Ends(k).Lower == edge.A;
            for (int m = 1; m < p; m++)
            {
                double share = (double)(forward ? m : p - m) / p;
                Set(boundary, edge, _space.Mesh.Vertices.Count + (k * (p - 1)) + m - 1, edge.TA + (share * (edge.TB - edge.TA)), own);
            }
        }
    }

    private void Set(BoundaryVelocities boundary, CurveEdge edge, int node, double parameter, Point[] own)
    {
        Curve curve = _space.Mesh.Section.Edges[edge.SectionEdge].Curve;
        Point place = _space.Places[node];
        boundary.At(edge.SectionEdge, ReferenceEquals(curve, edge.Curve) ? parameter : curve.ClosestParameter(place), place, own);
        for (int k = 0; k < Count; k++)
        {
            _velocity[k][node] = own[k];
        }
    }

    private void FillVertices()
    {
        var unknown = new int[_pinned.Length];
        int count = 0;
        for (int v = 0; v < unknown.Length; v++)
        {
            unknown[v] = _pinned[v] ? -1 : count++;
        }

        int[] start = [.. Enumerable.Range(0, _space.Edges.Count + 1).Select(k => 2 * k)];
        int[] ends = [.. Enumerable.Range(0, _space.Edges.Count).SelectMany(k => new[] { unknown[_space.Edges.Ends(k).Lower], unknown[_space.Edges.Ends(k).Higher] })];
        SymmetricPattern pattern = SymmetricPattern.FromElements(count, start, ends);
        var values = new double[pattern.EntryCount];
        var right = new double[2 * Count * count];
        for (int k = 0; k < _space.Edges.Count; k++)
        {
            (int a, int b) = _space.Edges.Ends(k);
            Couple(a, b);
            Couple(b, a);
            if (unknown[a] >= 0 && unknown[b] >= 0)
            {
                values[pattern.PositionOf(Math.Max(unknown[a], unknown[b]), Math.Min(unknown[a], unknown[b]))] -= 1;
            }
        }

        CholeskyAnalysis.Analyse(pattern).Factor(values).Solve(right, 2 * Count);
        for (int v = 0; v < unknown.Length; v++)
        {
            for (int k = 0; k < Count && unknown[v] >= 0; k++)
            {
                _velocity[k][v] = new Point(right[(2 * k * count) + unknown[v]], right[(((2 * k) + 1) * count) + unknown[v]]);
            }
        }

        void Couple(int own, int other)
        {
            if (unknown[own] < 0)
            {
                return;
            }

            values[pattern.PositionOf(unknown[own], unknown[own])] += 1;
            for (int k = 0; k < Count && unknown[other] < 0; k++)
            {
                right[(2 * k * count) + unknown[own]] += _velocity[k][other].Y;
                right[(((2 * k) + 1) * count) + unknown[own]] += _velocity[k][other].Z;
            }
        }
    }

    private void FillElements()
    {
        for (int e = 0; e < _space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            for (int i = 3; i < nodes.Length; i++)
            {
                (double a, double b, double c) = (
                    _space.Reference.Barycentric(i, 0), _space.Reference.Barycentric(i, 1), _space.Reference.Barycentric(i, 2));
                foreach (Point[] v in _velocity)
                {
                    v[nodes[i]] = (a * v[nodes[0]]) + (b * v[nodes[1]]) + (c * v[nodes[2]]);
                }
            }
        }
    }
}
