using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// The blended map of a triangle whose sides follow curves: x = x_straight + Σ d(t)·λa·λb / (t(1 − t)) over the bent sides,
/// t = (1 + λb − λa)/2, d the way from chord to curve (Szabó and Babuška, Finite Element Analysis, 1991).
/// </summary>
internal sealed class BentTriangle
{
    private readonly Point[] _corners = new Point[3];
    private readonly CurveEdge?[] _sides = new CurveEdge?[3]; // side c runs from corner c to corner c + 1
    private readonly bool[] _forward = new bool[3];

    /// <summary>Triangle of a mesh.</summary>
    /// <param name="mesh">Mesh.</param>
    /// <param name="triangle">Index.</param>
    /// <param name="curveEdgeOf">Curve edge on side c (from corner c to c + 1), or −1.</param>
    public BentTriangle(Mesh mesh, int triangle, Func<int, int> curveEdgeOf)
    {
        for (int c = 0; c < 3; c++)
        {
            int vertex = mesh.Triangles[(3 * triangle) + c];
            _corners[c] = mesh.Vertices[vertex];
            int edge = curveEdgeOf(c);
            if (edge >= 0 && mesh.CurveEdges[edge].Curve is not Line)
            {
                _sides[c] = mesh.CurveEdges[edge];
                _forward[c] = mesh.CurveEdges[edge].A == vertex;
                IsBent = true;
            }
        }
    }

    /// <summary>True when a side is not straight.</summary>
    public bool IsBent { get; }

    /// <summary>Determinant of the map at barycentric coordinates inside, over that of the straight triangle.</summary>
    public double Jacobian(double l0, double l1, double l2)
    {
        // Derivatives by λ1 and λ2, λ0 = 1 − λ1 − λ2.
        Point by1 = _corners[1] - _corners[0], by2 = _corners[2] - _corners[0];
        double straight = by1.Cross(by2);
        for (int c = 0; c < 3; c++)
        {
            if (_sides[c] is CurveEdge side)
            {
                (double la, double lb) = c == 0 ? (l0, l1) : c == 1 ? (l1, l2) : (l2, l0);
                (Point byA, Point byB) = Bend(side, _forward[c], la, lb);
                by1 += c == 0 ? byB - byA : c == 1 ? byA : -byB;
                by2 += c == 0 ? -byA : c == 1 ? byB : byA - byB;
            }
        }

        return by1.Cross(by2) / straight;
    }

    // Derivatives of d(t)·λa·λb / (t(1 − t)) by λa and λb.
    private static (Point ByA, Point ByB) Bend(CurveEdge side, bool forward, double la, double lb)
    {
        double t = 0.5 * (1 + lb - la);
        double span = side.TB - side.TA;
        double along = forward ? side.TA + (t * span) : side.TB - (t * span);
        Point start = side.Curve.At(forward ? side.TA : side.TB), end = side.Curve.At(forward ? side.TB : side.TA);
        Point d = side.Curve.At(along) - Point.Between(start, end, t);
        Point slope = ((forward ? span : -span) * side.Curve.Derivative(along)) - (end - start);
        double hump = t * (1 - t);
        double share = la * lb / hump;
        Point byT = (share * slope) - ((share * (1 - (2 * t)) / hump) * d);
        return (((lb / hump) * d) - (0.5 * byT), ((la / hump) * d) + (0.5 * byT));
    }
}
