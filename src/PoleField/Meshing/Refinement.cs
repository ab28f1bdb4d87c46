using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Adds vertices until every triangle is small and well shaped (Ruppert 1995; off-centres: Üngör 2009; exemption at sharp
/// corners: Miller, Pav, Walkington 2003).
/// </summary>
internal sealed partial class Refinement
{
    /// <summary>An edge may be this much longer than wanted: splits halve lengths, so that they end around the wanted one.</summary>
    public const double Stretch = 1.3;

    private const int CancellationStride = 1024;

    private readonly PlanarMesh _mesh;
    private readonly Triangulation _triangulation;
    private readonly SizeField _size;
    private readonly RefinementLimits _limits;
    private readonly IntQueue _triangles = new();
    private readonly IntQueue _doubtfulPieces = new();
    private readonly IntQueue _condemnedPieces = new();
    private double[] _sizeAt; // wanted length at vertex v
    private int[] _curveOf; // boundary curve vertex v was put on, or None for corners and free vertices

    private Refinement(PlanarMesh mesh, SizeField size, RefinementLimits limits)
    {
        _mesh = mesh;
        _triangulation = mesh.Triangulation;
        _size = size;
        _limits = limits;
        (_sinSquared, _offCentre) = limits.Shape();
        int n = _triangulation.VertexCount;
        _sizeAt = new double[n];
        _curveOf = new int[n];
        Array.Fill(_curveOf, Triangulation.None);
        for (int v = 0; v < n; v++)
        {
            _sizeAt[v] = size.At(_triangulation.Place(v));
        }

        foreach (CurvePiece p in mesh.Pieces.Where(p => p.TB < 1))
        {
            _curveOf[p.B] = p.Curve;
        }
    }

    /// <summary>Prepares to refine a mesh in place.</summary>
    public static Refinement Of(PlanarMesh mesh, SizeField size, RefinementLimits limits)
    {
        Refinement r = new(mesh, size, limits);
        for (int s = 0; s < mesh.Pieces.Count; s++)
        {
            r._doubtfulPieces.Add(s);
        }

        // First in, first out then keeps neighbours together in memory and in time.
        foreach (int t in HilbertOrder.OfTriangles(r._triangulation))
        {
            r._triangles.Add(t);
        }

        return r;
    }

    /// <summary>Refines until nothing is left to better.</summary>
    /// <exception cref="MeshingException">More triangles than allowed, or curves too close for the arithmetic.</exception>
    public void Run(CancellationToken cancellation)
    {
        for (long step = 0; ; step++)
        {
            if (step % CancellationStride == 0)
            {
                cancellation.ThrowIfCancellationRequested();
            }

            if (_condemnedPieces.TryTake(out int piece))
            {
                SplitPiece(piece);
            }
            else if (_doubtfulPieces.TryTake(out piece))
            {
                if (!_limits.PiecesFixed && MustSplit(piece))
                {
                    SplitPiece(piece);
                }
            }
            else if (!_triangles.TryTake(out int triangle))
            {
                return;
            }
            else if (triangle < _triangulation.TriangleCount && IsBad(triangle))
            {
                SplitTriangle(triangle);
            }
        }
    }

    private void SplitTriangle(int t)
    {
        Point p = NewPlace(t);
        if (_triangulation.Locate(p, t, throughPieces: false, out int found) == Whereabouts.BehindEdge)
        {
            Condemn(_triangulation.PieceOf(found), t);
            return;
        }

        if (IsCorner(found, p))
        {
            return;
        }

        _triangulation.CollectCavity(p, found);
        bool free = true;
        foreach (int piece in _triangulation.CavityPieces.Items)
        {
            if (Encroaches(p, piece))
            {
                free = false;
                Condemn(piece, t);
            }
        }

        if (free)
        {
            int v = AddVertex(p, Triangulation.None);
            _triangulation.FillCavity(v);
            TakeChanges();
        }
    }

    // The triangle waits until the piece in its way is split.
    private void Condemn(int piece, int triangle)
    {
        if (!_limits.PiecesFixed)
        {
            _condemnedPieces.Add(piece);
            _triangles.Add(triangle);
        }
    }

    private bool IsCorner(int triangle, Point p)
    {
        for (int h = 3 * triangle; h < (3 * triangle) + 3; h++)
        {
            if (_triangulation.Place(_triangulation.Origin(h)) == p)
            {
                return true;
            }
        }

        return false;
    }

    private int AddVertex(Point p, int curve)
    {
        int v = _triangulation.AddVertex(p);
        if (v == _sizeAt.Length)
        {
            Array.Resize(ref _sizeAt, 2 * v);
            Array.Resize(ref _curveOf, 2 * v);
        }

        _sizeAt[v] = _size.At(p);
        _curveOf[v] = curve;
        if (_triangulation.TriangleCount > _limits.MostTriangles)
        {
            throw new MeshingException(FormattableString.Invariant(
                $"More than {_limits.MostTriangles} triangles are needed; the last went to ({p.Y:g6}, {p.Z:g6}) m, where {_sizeAt[v]:g3} m is wanted. Ask for larger triangles there, or raise the limit."), p);
        }

        return v;
    }

    private void TakeChanges()
    {
        foreach (int t in _triangulation.Changed.Items)
        {
            _triangles.Add(t);
        }

        _triangulation.Changed.Clear();
    }

    private void TakeChangesAndPieces()
    {
        foreach (int t in _triangulation.Changed.Items)
        {
            if (t >= _triangulation.TriangleCount)
            {
                continue;
            }

            for (int h = 3 * t; h < (3 * t) + 3; h++)
            {
                if (_triangulation.PieceOf(h) >= 0)
                {
                    _doubtfulPieces.Add(_triangulation.PieceOf(h));
                }
            }
        }

        TakeChanges();
    }
}

/// <summary>What refinement may and must do.</summary>
/// <param name="SmallestAngleDegrees">Smallest angle, degrees.</param>
/// <param name="MostTriangles">Most triangles.</param>
/// <param name="PiecesFixed">True when pieces may not be split.</param>
internal sealed record RefinementLimits(double SmallestAngleDegrees, int MostTriangles, bool PiecesFixed)
{
    // Square of the sine of the smallest angle, and height of the off-centre over the shortest edge's length: a little less
    // than where the apex angle is just large enough, so that rounding does not make the new triangle bad (Üngör 2009).
    public (double SinSquared, double OffCentre) Shape()
    {
        const double safety = 0.95;
        (double sin, double cos) = Math.SinCos(SmallestAngleDegrees * Math.PI / 180);
        return (sin * sin, safety * 0.5 * Math.Sqrt((1 + cos) / (1 - cos)));
    }
}
