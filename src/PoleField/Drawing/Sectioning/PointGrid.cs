using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>Points in square cells, for finding all within a reach in constant time.</summary>
internal sealed class PointGrid
{
    private readonly Dictionary<long, int> _first; // cell to its latest entry; cells may share a key, distances tell
    private readonly List<(Point At, int Key, int Next)> _entries;
    private readonly double _reach;
    private readonly double _cell;

    /// <param name="reach">Largest distance that will be asked for, &gt; 0.</param>
    /// <param name="capacity">Number of points that are expected.</param>
    public PointGrid(double reach, int capacity)
    {
        _first = new Dictionary<long, int>(capacity);
        _entries = new List<(Point, int, int)>(capacity);
        _reach = reach;
        _cell = 8 * reach; // most circles of the reach then lie in one cell
    }

    public void Add(Point p, int key)
    {
        long cell = Key(Cell(p.Y), Cell(p.Z));
        _entries.Add((p, key, _first.GetValueOrDefault(cell, -1)));
        _first[cell] = _entries.Count - 1;
    }

    /// <summary>Adds the keys of all points within the reach of a place, in no particular order.</summary>
    public void FindNear(Point p, List<int> keys)
    {
        for (long y = Cell(p.Y - _reach); y <= Cell(p.Y + _reach); y++)
        {
            for (long z = Cell(p.Z - _reach); z <= Cell(p.Z + _reach); z++)
            {
                for (int i = _first.GetValueOrDefault(Key(y, z), -1); i >= 0; i = _entries[i].Next)
                {
                    if (_entries[i].At.DistanceTo(p) <= _reach)
                    {
                        keys.Add(_entries[i].Key);
                    }
                }
            }
        }
    }

    // Spreads cells over all keys (the odd multiplier is 2⁶⁴ over the golden ratio).
    private static long Key(long y, long z) => unchecked((y * (long)0x9E3779B97F4A7C15) ^ z);

    private long Cell(double x) => (long)Math.Floor(x / _cell);
}

/// <summary>Sets that grow together.</summary>
internal sealed class UnionFind
{
    private readonly int[] _parent;

    public UnionFind(int count)
    {
        _parent = new int[count];
        for (int i = 0; i < count; i++)
        {
            _parent[i] = i;
        }
    }

    /// <summary>Smallest member of the set.</summary>
    public int Find(int i)
    {
        while (_parent[i] != i)
        {
            _parent[i] = _parent[_parent[i]];
            i = _parent[i];
        }

        return i;
    }

    /// <summary>Makes one set of two; false when they are one already.</summary>
    public bool Union(int i, int j)
    {
        (i, j) = (Find(i), Find(j));
        _parent[Math.Max(i, j)] = Math.Min(i, j);
        return i != j;
    }
}
