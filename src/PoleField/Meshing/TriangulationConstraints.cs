using PoleField.Geometry;

namespace PoleField.Meshing;

/// <content>Making a given edge part of the triangulation, and restoring the Delaunay property around it.</content>
internal sealed partial class Triangulation
{
    private readonly Queue<(int A, int B)> _crossing = new();
    private readonly Stack<(int A, int B)> _doubtful = new();

    /// <summary>Makes a–b an edge that carries the piece (Sloan, Adv. Eng. Software 1993: flip what crosses it).</summary>
    /// <exception cref="MeshingException">Another piece or a vertex is in the way.</exception>
    public void Constrain(int a, int b, int piece)
    {
        int h = FindEither(a, b);
        if (h == None)
        {
            CollectCrossing(a, b);
            FlipCrossing(a, b);
            h = FindEither(a, b);
        }

        if (h == None)
        {
            throw new InvalidOperationException(FormattableString.Invariant(
                $"Edge {a}-{b} at ({_places[a].Y:g9}, {_places[a].Z:g9}) m was not recovered."));
        }

        Mark(h, piece);
        Legalise();
    }

    /// <summary>Frees an edge of its piece and makes its surroundings Delaunay without it.</summary>
    private void Release(int h)
    {
        Unmark(h);
        _doubtful.Push((_origin[h], Target(h)));
        Legalise();
    }

    private int FindEither(int a, int b)
    {
        int h = Find(a, b);
        return h != None ? h : Find(b, a);
    }

    private void CollectCrossing(int a, int b)
    {
        int h = FirstCrossed(a, b);
        _crossing.Clear();
        while (true)
        {
            if (_piece[h] >= 0)
            {
                throw Blocked(a, b, Point.Between(_places[_origin[h]], _places[Target(h)], 0.5));
            }

            _crossing.Enqueue((_origin[h], Target(h)));
            int twin = _twin[h];
            int apex = Apex(twin);
            if (apex == b)
            {
                return;
            }

            double side = Orient(a, b, apex);
            if (side == 0)
            {
                throw Blocked(a, b, _places[apex]);
            }

            // The twin runs from the left of a–b to its right; the apex decides through which edge a–b leaves.
            h = side > 0 ? Next(twin) : Previous(twin);
        }
    }

    // The edge opposite a that a–b crosses first, running from right to left of a–b.
    private int FirstCrossed(int a, int b)
    {
        int start = FirstSpoke(a);
        int h = start;
        do
        {
            int x = Target(h), y = Apex(h);
            double right = Orient(a, b, x), left = Orient(a, b, y);
            if (right == 0 && Ahead(a, b, x))
            {
                throw Blocked(a, b, _places[x]);
            }

            if (right < 0 && left > 0)
            {
                return Next(h);
            }

            h = _twin[Previous(h)];
        }
        while (h != start && h != None);
        throw Blocked(a, b, _places[a]);
    }

    // Spoke from which turning counter-clockwise meets all others: on the rim the first one inside it.
    private int FirstSpoke(int a)
    {
        int h = _spoke[a];
        while (_twin[h] >= 0)
        {
            h = Next(_twin[h]);
            if (h == _spoke[a])
            {
                break;
            }
        }

        return h;
    }

    private bool Ahead(int a, int b, int x) => (_places[b] - _places[a]).Dot(_places[x] - _places[a]) > 0;

    private void FlipCrossing(int a, int b)
    {
        long patience = 1000 + (100L * _crossing.Count * _crossing.Count);
        while (_crossing.Count > 0)
        {
            if (patience-- < 0)
            {
                throw Blocked(a, b, _places[a]);
            }

            (int u, int w) = _crossing.Dequeue();
            int h = FindEither(u, w);
            int c = Apex(h), d = Apex(_twin[h]);
            int o = _origin[h], t = Target(h);
            if (!(Orient(d, c, o) > 0 && Orient(d, c, t) < 0))
            {
                _crossing.Enqueue((u, w));
                continue;
            }

            Flip(h);
            bool stillCrosses = c != a && c != b && d != a && d != b && Orient(a, b, c) > 0 != Orient(a, b, d) > 0;
            if (stillCrosses)
            {
                _crossing.Enqueue((c, d));
            }
            else
            {
                _doubtful.Push((c, d));
            }
        }
    }

    // Lawson's flips until every doubtful edge is Delaunay or a piece.
    private void Legalise()
    {
        while (_doubtful.Count > 0)
        {
            (int u, int w) = _doubtful.Pop();
            int h = FindEither(u, w);
            if (h == None || _piece[h] >= 0 || _twin[h] < 0 || !(InCircle(h / 3, _places[Apex(_twin[h])]) > 0))
            {
                continue;
            }

            int c = Apex(h), d = Apex(_twin[h]), o = _origin[h], t = Target(h);
            Flip(h);
            _doubtful.Push((o, c));
            _doubtful.Push((c, t));
            _doubtful.Push((t, d));
            _doubtful.Push((d, o));
        }
    }

    private MeshingException Blocked(int a, int b, Point at) => new(FormattableString.Invariant(
        $"The curve piece from ({_places[a].Y:g9}, {_places[a].Z:g9}) to ({_places[b].Y:g9}, {_places[b].Z:g9}) m meets another at ({at.Y:g9}, {at.Z:g9}) m; curves may meet only at common end points."), at);
}
