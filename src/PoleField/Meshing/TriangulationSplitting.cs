using PoleField.Geometry;

namespace PoleField.Meshing;

/// <content>Replacing a piece a–b by a–m and m–b, where m lies near the chord a–b but on the curve.</content>
internal sealed partial class Triangulation
{
    /// <summary>Splits a piece that runs from a to b at vertex m: the piece keeps a–m, the new one gets m–b.</summary>
    /// <exception cref="MeshingException">Another piece lies between the chord and the curve.</exception>
    public void SplitPiece(int piece, int a, int b, int m, int newPiece)
    {
        int h = _pieceHalf[piece];
        if (_twin[h] >= 0)
        {
            Release(h);
            InsertBetween(a, m);
            Constrain(a, m, piece);
            Constrain(m, b, newPiece);
            return;
        }

        bool forward = _origin[h] == a;
        if (Orient(_origin[h], Target(h), m) < 0)
        {
            AddOutside(h, m, forward ? piece : newPiece, forward ? newPiece : piece);
            return;
        }

        Unmark(h);
        InsertBetween(a, m);
        Constrain(a, m, piece);
        Constrain(m, b, newPiece);
        RemoveBehind(forward ? a : b, m);
    }

    private void InsertBetween(int a, int m)
    {
        Point p = _places[m];
        if (Locate(p, Towards(a, p), throughPieces: false, out int triangle) != Whereabouts.Inside)
        {
            throw Blocked(a, m, p);
        }

        CollectCavity(p, triangle);
        FillCavity(m);
    }

    // The triangle at a that the ray from a to the place enters.
    private int Towards(int a, Point p)
    {
        int start = FirstSpoke(a);
        int h = start;
        do
        {
            if (Orient(a, Target(h), p) >= 0 && Orient(a, Apex(h), p) <= 0)
            {
                return h / 3;
            }

            h = _twin[Previous(h)];
        }
        while (h != start && h != None);
        return start / 3;
    }

    // The rim bulges outwards: one triangle more, outside the chord.
    private void AddOutside(int h, int m, int firstPiece, int secondPiece)
    {
        int o = _origin[h], t = Target(h);
        Unmark(h);
        int added = 3 * AddTriangle();
        SetHalfEdge(added, t, h, None);
        SetHalfEdge(added + 1, o, None, None);
        SetHalfEdge(added + 2, m, None, None);
        Mark(added + 1, firstPiece);
        Mark(added + 2, secondPiece);
        Changed.Add(added / 3);
        Changed.Add(h / 3);
        _doubtful.Push((o, t));
        Legalise();
    }

    // The rim bulges inwards: what lies right of a–b is outside now.
    private void RemoveBehind(int a, int b)
    {
        int h = Find(b, a);
        if (h == None)
        {
            return;
        }

        _stack.Clear();
        _stack.Add(a);
        _stack.Add(b);
        while (_stack.Count > 0)
        {
            int u = _stack.Pop(), w = _stack.Pop();
            h = Find(u, w);
            if (h == None)
            {
                continue;
            }

            int x = Next(h), y = Previous(h);
            int p = Apex(h);
            bool through = _twin[x] >= 0 && _piece[x] < 0;
            bool throughToo = _twin[y] >= 0 && _piece[y] < 0;
            RemoveTriangle(h / 3);
            if (through)
            {
                _stack.Add(w);
                _stack.Add(p);
            }

            if (throughToo)
            {
                _stack.Add(p);
                _stack.Add(u);
            }
        }
    }

    /// <summary>Removes a triangle; the last one moves into its slot, and is <see cref="Changed"/>.</summary>
    public void RemoveTriangle(int triangle)
    {
        for (int h = 3 * triangle; h < (3 * triangle) + 3; h++)
        {
            int twin = _twin[h];
            if (twin >= 0)
            {
                _twin[twin] = None;
                _spoke[_origin[twin]] = twin;
                _spoke[_origin[Next(twin)]] = Next(twin);
                if (_piece[twin] >= 0)
                {
                    _pieceHalf[_piece[twin]] = twin;
                }
            }
        }

        int last = TriangleCount - 1;
        if (triangle != last)
        {
            for (int c = 0; c < 3; c++)
            {
                int from = (3 * last) + c;
                SetHalfEdge((3 * triangle) + c, _origin[from], _twin[from], _piece[from]);
            }

            Changed.Add(triangle);
        }

        TriangleCount = last;
    }

    /// <summary>Removes every triangle whose entry is <paramref name="unwanted"/> (one entry per triangle).</summary>
    public void RemoveAll(int[] marks, int unwanted)
    {
        for (int t = TriangleCount - 1; t >= 0; t--)
        {
            if (marks[t] == unwanted)
            {
                marks[t] = marks[TriangleCount - 1];
                RemoveTriangle(t);
            }
        }

        for (int h = 0; h < 3 * TriangleCount; h++)
        {
            _spoke[_origin[h]] = h;
        }

        Changed.Clear();
    }
}
