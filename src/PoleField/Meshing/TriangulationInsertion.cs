using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Where a walk through triangles ended.</summary>
internal enum Whereabouts
{
    /// <summary>In the triangle that is returned, or on its edge.</summary>
    Inside,

    /// <summary>At a piece of a curve or the outer rim, which the walk may not cross: the half-edge is returned.</summary>
    BehindEdge,
}

/// <content>Finding the triangle of a place, and putting a vertex there.</content>
internal sealed partial class Triangulation
{
    private readonly IntList _stack = new();
    private readonly IntList _rimOrigin = new(); // cavity rim in counter-clockwise order: origin ...
    private readonly IntList _rimTwin = new(); // ... twin ...
    private readonly IntList _rimPiece = new(); // ... and piece of each edge
    private uint _coin = 1;

    /// <summary>Triangles that the last cavity removes.</summary>
    public IntList Cavity { get; } = new();

    /// <summary>Pieces on the rim of the last cavity.</summary>
    public IntList CavityPieces { get; } = new();

    /// <summary>
    /// Walks from a triangle towards a place (Devillers, Pion, Teillaud 2002: visibility walk with a coin, which ends in
    /// any triangulation). Pieces stop the walk unless <paramref name="throughPieces"/>.
    /// </summary>
    public Whereabouts Locate(Point p, int triangle, bool throughPieces, out int found)
    {
        int came = None;
        while (true)
        {
            _coin = (_coin * 1664525) + 1013904223;
            int turn = (int)((_coin >> 16) % 3);
            int exit = None;
            for (int i = 0; i < 3; i++)
            {
                int h = (3 * triangle) + ((i + turn) % 3);
                if (h != came && Orient(_origin[h], _origin[Next(h)], p) < 0)
                {
                    exit = h;
                    break;
                }
            }

            if (exit == None)
            {
                found = triangle;
                return Whereabouts.Inside;
            }

            if (_twin[exit] < 0 || (_piece[exit] >= 0 && !throughPieces))
            {
                found = exit;
                return Whereabouts.BehindEdge;
            }

            came = _twin[exit];
            triangle = came / 3;
        }
    }

    /// <summary>
    /// Collects the triangles whose circle holds the place, connected to the one that holds it and not behind a piece.
    /// They see the place: each step adds a triangle over an edge that is not locally Delaunay with it, so the union stays
    /// star-shaped and its rim comes out in order.
    /// </summary>
    public void CollectCavity(Point p, int triangle)
    {
        Cavity.Clear();
        CavityPieces.Clear();
        _rimOrigin.Clear();
        _rimTwin.Clear();
        _rimPiece.Clear();
        Cavity.Add(triangle);
        _stack.Clear();
        _stack.Add((3 * triangle) + 2);
        _stack.Add((3 * triangle) + 1);
        _stack.Add(3 * triangle);
        while (_stack.Count > 0)
        {
            int h = _stack.Pop();
            int twin = _twin[h], piece = _piece[h];
            if (twin >= 0 && piece < 0 && InCircle(twin / 3, p) > 0)
            {
                Cavity.Add(twin / 3);
                _stack.Add(Previous(twin));
                _stack.Add(Next(twin));
                continue;
            }

            _rimOrigin.Add(_origin[h]);
            _rimTwin.Add(twin);
            _rimPiece.Add(piece);
            if (piece >= 0)
            {
                CavityPieces.Add(piece);
            }
        }
    }

    /// <summary>Fills the collected cavity with a fan around the vertex; the new triangles are <see cref="Changed"/>.</summary>
    public void FillCavity(int vertex)
    {
        int n = _rimOrigin.Count;
        int old = Cavity.Count;
        int firstSlot = Cavity[0];
        int previousSlot = None;
        int slot = None;
        for (int i = 0; i < n; i++)
        {
            slot = i < old ? Cavity[i] : AddTriangle();
            int next = i + 1 < n ? i + 1 : 0;
            SetHalfEdge(3 * slot, _rimOrigin[i], _rimTwin[i], _rimPiece[i]);
            SetHalfEdge((3 * slot) + 1, _rimOrigin[next], None, None);
            SetHalfEdge((3 * slot) + 2, vertex, None, None);
            if (i > 0)
            {
                Join((3 * previousSlot) + 1, (3 * slot) + 2);
            }

            Changed.Add(slot);
            previousSlot = slot;
        }

        Join((3 * slot) + 1, (3 * firstSlot) + 2);
    }

    private void Join(int h, int k)
    {
        _twin[h] = k;
        _twin[k] = h;
    }

    /// <summary>Puts an existing vertex into the triangulation, starting the search at a triangle.</summary>
    /// <returns>A triangle at the vertex.</returns>
    public int Insert(int vertex, int near)
    {
        Point p = _places[vertex];
        if (Locate(p, near, throughPieces: true, out int triangle) != Whereabouts.Inside)
        {
            throw new MeshingException(FormattableString.Invariant(
                $"The place ({p.Y:g9}, {p.Z:g9}) m lies outside the model."), p);
        }

        for (int c = 0; c < 3; c++)
        {
            if (_places[_origin[(3 * triangle) + c]] == p)
            {
                throw new MeshingException(FormattableString.Invariant(
                    $"Two vertices of the section lie at ({p.Y:g9}, {p.Z:g9}) m; each place may be there once."), p);
            }
        }

        CollectCavity(p, triangle);
        FillCavity(vertex);
        return Cavity[0];
    }
}
