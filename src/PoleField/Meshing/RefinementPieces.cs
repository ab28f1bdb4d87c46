using PoleField.Geometry;

namespace PoleField.Meshing;

/// <content>Which pieces must be split, and where.</content>
internal sealed partial class Refinement
{
    // Shorter than this share of the coordinates, new vertices would coincide with old ones.
    private const double Resolution = 1e-13;

    private bool MustSplit(int piece)
    {
        CurvePiece p = _mesh.Pieces[piece];
        Point a = _triangulation.Place(p.A), b = _triangulation.Place(p.B);
        double wanted = Stretch * _size.At(Point.Between(a, b, 0.5));
        if ((b - a).SquaredLength > wanted * wanted)
        {
            return true;
        }

        int h = _triangulation.HalfEdgeOf(piece);
        int twin = _triangulation.Twin(h);
        return Encroaches(_triangulation.Place(_triangulation.Apex(h)), piece)
            || (twin >= 0 && Encroaches(_triangulation.Place(_triangulation.Apex(twin)), piece));
    }

    // Inside the circle whose diameter is the chord.
    private bool Encroaches(Point q, int piece)
    {
        CurvePiece p = _mesh.Pieces[piece];
        return (_triangulation.Place(p.A) - q).Dot(_triangulation.Place(p.B) - q) < 0;
    }

    private void SplitPiece(int piece)
    {
        CurvePiece p = _mesh.Pieces[piece];
        BoundaryCurve curve = _mesh.Curves[p.Curve];
        Point a = _triangulation.Place(p.A), b = _triangulation.Place(p.B);
        double length = a.DistanceTo(b);
        if (!(length > Resolution * (Math.Abs(a.Y) + Math.Abs(a.Z) + Math.Abs(b.Y) + Math.Abs(b.Z))))
        {
            throw new MeshingException(FormattableString.Invariant(
                $"Curves come too close for the arithmetic near ({a.Y:g9}, {a.Z:g9}) m; move them apart or join them there."), a);
        }

        SplitPiece(piece, SplitParameter(p, curve, length));
    }

    /// <summary>Splits the curve's pieces at further parameters (those that are ends already stay).</summary>
    public void SplitCurve(int curve, IEnumerable<double> parameters)
    {
        foreach (double t in parameters)
        {
            int piece = _mesh.Pieces.FindIndex(p => p.Curve == curve && p.TA < t && t < p.TB);
            if (piece >= 0)
            {
                SplitPiece(piece, t);
            }
        }
    }

    private void SplitPiece(int piece, double t)
    {
        CurvePiece p = _mesh.Pieces[piece];
        BoundaryCurve curve = _mesh.Curves[p.Curve];
        int m = AddVertex(curve.Curve.At(t), p.Curve);
        int added = _mesh.Pieces.Count;
        _mesh.Pieces[piece] = p with { B = m, TB = t };
        _mesh.Pieces.Add(new CurvePiece(m, p.B, p.Curve, t, p.TB));
        _triangulation.SplitPiece(piece, p.A, p.B, m, added);
        TakeChangesAndPieces();
        _doubtfulPieces.Add(piece);
        _doubtfulPieces.Add(added);
    }

    private static double SplitParameter(in CurvePiece p, BoundaryCurve curve, double length)
    {
        bool sharpAtA = p.TA == 0 && curve.AtStart != Corner.Open;
        bool sharpAtB = p.TB == 1 && curve.AtEnd != Corner.Open;
        return sharpAtA == sharpAtB
            ? PieceSplitting.Middle(curve.Curve, p.TA, p.TB)
            : PieceSplitting.AtDistance(curve.Curve, p.TA, p.TB, sharpAtA, PieceSplitting.ShellDistance(length));
    }
}
