using System.Runtime.CompilerServices;
using PoleField.Geometry;
using PoleField.Numerics;

namespace PoleField.Meshing;

/// <summary>
/// Triangles in flat half-edge arrays, changed only by steps that keep them counter-clockwise and constrained Delaunay.
/// </summary>
/// <remarks>
/// Half-edge h = 3·t + c leaves corner c of triangle t and runs to the next corner, the triangle on its left.
/// Lawson 1977 (flips), Bowyer 1981 and Watson 1981 (cavities), Chew 1989 (constraints).
/// </remarks>
internal sealed partial class Triangulation
{
    /// <summary>Mark of "no half-edge", "no piece".</summary>
    public const int None = -1;

    private Point[] _places; // place of vertex v
    private int[] _spoke; // a half-edge that leaves vertex v
    private int[] _origin; // vertex that half-edge h leaves
    private int[] _twin; // opposite half-edge of h, or None on the outer rim
    private int[] _piece; // piece of a curve that h lies on, or None
    private int[] _pieceHalf; // a half-edge on piece s

    /// <summary>Empty, with room for the given number of vertices.</summary>
    public Triangulation(int expectedVertices)
    {
        int n = Math.Max(16, expectedVertices);
        _places = new Point[n];
        _spoke = new int[n];
        _origin = new int[6 * n];
        _twin = new int[6 * n];
        _piece = new int[6 * n];
        _pieceHalf = new int[n];
    }

    public int VertexCount { get; private set; }

    public int TriangleCount { get; private set; }

    /// <summary>Slots of triangles made or changed by the last step.</summary>
    public IntList Changed { get; } = new();

    public static int Next(int h) => h % 3 == 2 ? h - 2 : h + 1;

    public static int Previous(int h) => h % 3 == 0 ? h + 2 : h - 1;

    public Point Place(int v) => _places[v];

    public int Origin(int h) => _origin[h];

    public int Target(int h) => _origin[Next(h)];

    public int Apex(int h) => _origin[Previous(h)];

    public int Twin(int h) => _twin[h];

    public int PieceOf(int h) => _piece[h];

    /// <summary>A half-edge on the piece; its other side is the twin.</summary>
    public int HalfEdgeOf(int piece) => _pieceHalf[piece];

    public int AddVertex(Point p)
    {
        if (VertexCount == _places.Length)
        {
            Array.Resize(ref _places, 2 * VertexCount);
            Array.Resize(ref _spoke, 2 * VertexCount);
        }

        _places[VertexCount] = p;
        _spoke[VertexCount] = None;
        return VertexCount++;
    }

    /// <summary>Starts with a square of four vertices far around the given box.</summary>
    public void StartAround(Box box)
    {
        double reach = 8 * Math.Max(box.Width, box.Height);
        Point c = box.Centre;
        int a = AddVertex(c + new Point(-reach, -reach));
        int b = AddVertex(c + new Point(reach, -reach));
        int d = AddVertex(c + new Point(reach, reach));
        int e = AddVertex(c + new Point(-reach, reach));
        int first = 3 * AddTriangle(), second = 3 * AddTriangle();
        SetHalfEdge(first, a, None, None);
        SetHalfEdge(first + 1, b, None, None);
        SetHalfEdge(first + 2, d, second, None);
        SetHalfEdge(second, a, first + 2, None);
        SetHalfEdge(second + 1, d, None, None);
        SetHalfEdge(second + 2, e, None, None);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public double Orient(int a, int b, Point p)
    {
        Point pa = _places[a], pb = _places[b];
        return Predicates.Orient(pa.Y, pa.Z, pb.Y, pb.Z, p.Y, p.Z);
    }

    public double Orient(int a, int b, int c) => Orient(a, b, _places[c]);

    /// <summary>Positive when the place is inside the circle of the triangle.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private double InCircle(int triangle, Point p)
    {
        Point a = _places[_origin[3 * triangle]];
        Point b = _places[_origin[(3 * triangle) + 1]];
        Point c = _places[_origin[(3 * triangle) + 2]];
        return Predicates.InCircle(a.Y, a.Z, b.Y, b.Z, c.Y, c.Z, p.Y, p.Z);
    }

    private int AddTriangle()
    {
        if (3 * (TriangleCount + 1) > _origin.Length)
        {
            Array.Resize(ref _origin, 2 * _origin.Length);
            Array.Resize(ref _twin, _origin.Length);
            Array.Resize(ref _piece, _origin.Length);
        }

        return TriangleCount++;
    }

    // Writes one half-edge and the links that point back at it.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void SetHalfEdge(int h, int origin, int twin, int piece)
    {
        _origin[h] = origin;
        _twin[h] = twin;
        _piece[h] = piece;
        _spoke[origin] = h;
        if (twin >= 0)
        {
            _twin[twin] = h;
        }

        if (piece >= 0)
        {
            _pieceHalf[piece] = h;
        }
    }

    /// <summary>Lays the piece on the edge, both sides.</summary>
    private void Mark(int h, int piece)
    {
        if (piece >= _pieceHalf.Length)
        {
            Array.Resize(ref _pieceHalf, 2 * Math.Max(piece, _pieceHalf.Length));
        }

        _piece[h] = piece;
        _pieceHalf[piece] = h;
        if (_twin[h] >= 0)
        {
            _piece[_twin[h]] = piece;
        }
    }

    private void Unmark(int h)
    {
        _piece[h] = None;
        if (_twin[h] >= 0)
        {
            _piece[_twin[h]] = None;
        }
    }

    // Replaces edge a→b of triangles (a, b, c) and (b, a, d) by d→c: triangles (d, c, a) and (c, d, b).
    private void Flip(int h)
    {
        int tw = _twin[h];
        int hn = Next(h), hp = Previous(h), tn = Next(tw), tp = Previous(tw);
        int a = _origin[h], b = _origin[tw], c = _origin[hp], d = _origin[tp];
        (int twinHn, int pieceHn) = (_twin[hn], _piece[hn]);
        (int twinHp, int pieceHp) = (_twin[hp], _piece[hp]);
        (int twinTn, int pieceTn) = (_twin[tn], _piece[tn]);
        (int twinTp, int pieceTp) = (_twin[tp], _piece[tp]);
        SetHalfEdge(h, d, tw, None);
        SetHalfEdge(hn, c, twinHp, pieceHp);
        SetHalfEdge(hp, a, twinTn, pieceTn);
        SetHalfEdge(tw, c, h, None);
        SetHalfEdge(tn, d, twinTp, pieceTp);
        SetHalfEdge(tp, b, twinHn, pieceHn);
        Changed.Add(h / 3);
        Changed.Add(tw / 3);
    }

    // Half-edge from a to b, or None; looks all the way round a.
    public int Find(int a, int b)
    {
        int start = _spoke[a];
        int h = start;
        do
        {
            if (_origin[Next(h)] == b)
            {
                return h;
            }

            int previous = Previous(h);
            if (_twin[previous] < 0)
            {
                return FindClockwise(a, b, start);
            }

            h = _twin[previous];
        }
        while (h != start);
        return None;
    }

    private int FindClockwise(int a, int b, int start)
    {
        // The rim's last spoke enters a and leaves nothing; an edge b→a there has no twin and counts as not found.
        int h = start;
        while (_twin[h] >= 0)
        {
            h = Next(_twin[h]);
            if (_origin[Next(h)] == b)
            {
                return h;
            }
        }

        return None;
    }
}
