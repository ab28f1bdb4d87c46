using PoleField.Geometry;

namespace PoleField.Meshing;

/// <content>Which triangles are bad and where their new vertex goes.</content>
internal sealed partial class Refinement
{
    // Share of the Jacobian a curved side may take away, all sides of a triangle together.
    private const double BendAllowed = 0.75;

    private readonly double _sinSquared;
    private readonly double _offCentre;

    private bool IsBad(int t)
    {
        int a = _triangulation.Origin(3 * t), b = _triangulation.Origin((3 * t) + 1), c = _triangulation.Origin((3 * t) + 2);
        Point pa = _triangulation.Place(a), pb = _triangulation.Place(b), pc = _triangulation.Place(c);
        double ab = (pb - pa).SquaredLength, bc = (pc - pb).SquaredLength, ca = (pa - pc).SquaredLength;
        if (IsLong(a, b, ab) || IsLong(b, c, bc) || IsLong(c, a, ca))
        {
            return true;
        }

        double twiceArea = (pb - pa).Cross(pc - pa);
        (double shortest, int p, int q) = ab <= bc && ab <= ca ? (ab, a, b) : bc <= ca ? (bc, b, c) : (ca, c, a);

        // sin of the smallest angle = 2·area / product of the two sides around it.
        bool skinny = twiceArea * twiceArea * shortest < _sinSquared * ab * bc * ca;
        return (skinny && !SpansSharpCorner(p, q)) || BendsTooMuch(t, pa, pb, pc) || IsLongInside(a, b, c, pa, pb, pc);
    }

    /// <summary>Square of the sine of the triangle's smallest angle.</summary>
    public static double SmallestSineSquared(Triangulation triangulation, int t)
    {
        Point a = triangulation.Place(triangulation.Origin(3 * t));
        Point b = triangulation.Place(triangulation.Origin((3 * t) + 1));
        Point c = triangulation.Place(triangulation.Origin((3 * t) + 2));
        double ab = (b - a).SquaredLength, bc = (c - b).SquaredLength, ca = (a - c).SquaredLength;
        double twiceArea = (b - a).Cross(c - a);
        return twiceArea * twiceArea * Math.Min(ab, Math.Min(bc, ca)) / (ab * bc * ca);
    }

    private bool IsLong(int a, int b, double squaredLength)
    {
        double wanted = Stretch * 0.5 * (_sizeAt[a] + _sizeAt[b]);
        return squaredLength > wanted * wanted;
    }

    // Sources inside a triangle whose corners do not feel them: the field's growth bounds what can hide there.
    private bool IsLongInside(int a, int b, int c, Point pa, Point pb, Point pc)
    {
        double longest = Math.Sqrt(Math.Max((pb - pa).SquaredLength, Math.Max((pc - pb).SquaredLength, (pa - pc).SquaredLength)));
        double lowest = Math.Max(_sizeAt[a], Math.Max(_sizeAt[b], _sizeAt[c])) - (_size.Growth * longest);
        if (longest <= Stretch * lowest)
        {
            return false;
        }

        return longest > Stretch * _size.At((1.0 / 3) * (pa + pb + pc));
    }

    // The shortest side joins two curves of one sharp corner at one distance from it: splitting would repeat for ever.
    private bool SpansSharpCorner(int p, int q)
    {
        int curveP = _curveOf[p], curveQ = _curveOf[q];
        if (curveP < 0 || curveQ < 0)
        {
            return false;
        }

        BoundaryCurve first = _mesh.Curves[curveP], second = _mesh.Curves[curveQ];
        return (first.AtStart != Corner.Open && MeetAt(first.Start, second, p, q, curveP == curveQ))
            || (first.AtEnd != Corner.Open && MeetAt(first.End, second, p, q, curveP == curveQ));
    }

    private bool MeetAt(int corner, BoundaryCurve second, int p, int q, bool same)
    {
        bool meet = same
            ? second.Start == second.End
            : (second.Start == corner && second.AtStart != Corner.Open) || (second.End == corner && second.AtEnd != Corner.Open);
        if (!meet)
        {
            return false;
        }

        const double alike = 0.01;
        double dp = _triangulation.Place(corner).DistanceTo(_triangulation.Place(p));
        double dq = _triangulation.Place(corner).DistanceTo(_triangulation.Place(q));
        return Math.Abs(dp - dq) <= alike * Math.Max(dp, dq);
    }

    // Moving a side of sagitta s over height H to its curve changes the Jacobian by at most 4·s/H times the larger
    // barycentric coordinate of the height's foot (the blended map of a parabola over the side).
    private bool BendsTooMuch(int t, Point pa, Point pb, Point pc)
    {
        double bend = 0, largest = 0;
        int worst = Triangulation.None;
        for (int i = 0; i < 3; i++)
        {
            int piece = _triangulation.PieceOf((3 * t) + i);
            if (piece < 0 || StaysStraight(_mesh, piece))
            {
                continue;
            }

            (Point from, Point to, Point apex) = i == 0 ? (pa, pb, pc) : i == 1 ? (pb, pc, pa) : (pc, pa, pb);
            Point side = to - from;
            double squared = side.SquaredLength;
            double height = side.Cross(apex - from); // times the side's length
            double foot = (apex - from).Dot(side) / squared;
            double sagitta = Sagitta(_mesh.Pieces[piece], from, side);
            double part = 4 * sagitta * Math.Max(Math.Abs(foot), Math.Abs(1 - foot)) / height;
            bend += part;
            if (part > largest)
            {
                (largest, worst) = (part, piece);
            }
        }

        if (bend <= BendAllowed || _limits.PiecesFixed)
        {
            return false;
        }

        _condemnedPieces.Add(worst);
        _triangles.Add(t);
        return false;
    }

    // Distance of the curve from the chord, times the chord's length.
    private double Sagitta(in CurvePiece piece, Point from, Point side)
    {
        Curve curve = _mesh.Curves[piece.Curve].Curve;
        const double quarter = 0.25;
        double largest = 0;
        for (double s = quarter; s < 1; s += quarter)
        {
            // For a parabola the deviation at s is 4·s·(1 − s) of the sagitta.
            Point at = curve.At(piece.TA + (s * (piece.TB - piece.TA)));
            largest = Math.Max(largest, Math.Abs(side.Cross(at - from)) / (4 * s * (1 - s)));
        }

        return largest;
    }

    /// <summary>True when the mesh edge on the piece stays a chord: the curve is straight, or touches another one at a cusp.</summary>
    public static bool StaysStraight(PlanarMesh mesh, int piece)
    {
        CurvePiece p = mesh.Pieces[piece];
        BoundaryCurve curve = mesh.Curves[p.Curve];
        return curve.IsStraight || (p.TA == 0 && curve.AtStart == Corner.Cusp) || (p.TB == 1 && curve.AtEnd == Corner.Cusp);
    }

    // The circumcentre or, when nearer, the off-centre over the shortest side.
    private Point NewPlace(int t)
    {
        Point a = _triangulation.Place(_triangulation.Origin(3 * t));
        Point b = _triangulation.Place(_triangulation.Origin((3 * t) + 1));
        Point c = _triangulation.Place(_triangulation.Origin((3 * t) + 2));
        double ab = (b - a).SquaredLength, bc = (c - b).SquaredLength, ca = (a - c).SquaredLength;
        (Point o, Point d, Point e) = ab <= bc && ab <= ca ? (a, b, c) : bc <= ca ? (b, c, a) : (c, a, b);
        Point centre = SmallestCircle.Circumcentre(d - o, e - o);
        Point off = (0.5 * (d - o)) + (_offCentre * (d - o).Perpendicular);
        return o + (off.SquaredLength < centre.SquaredLength ? off : centre);
    }
}
