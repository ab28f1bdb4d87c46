namespace PoleField.Geometry;

/// <summary>Boxes packed into a tree along a Hilbert curve: finds those that overlap each other or lie on a ray in logarithmic time for each.</summary>
/// <remarks>I. Kamel and C. Faloutsos, On packing R-trees, CIKM 1993 (from memory).</remarks>
internal sealed class BoxTree
{
    private const int Branches = 8;
    private const int HilbertBits = 16; // of each coordinate

    private readonly int[] _items;     // leaf to index of its box
    private readonly Box[][] _levels;  // [0] the boxes by leaf; [l + 1][k] is around [l][8k] to [l][8k + 7]

    /// <param name="boxes">Boxes; their indices are what is found.</param>
    public BoxTree(IReadOnlyList<Box> boxes)
    {
        Box middles = Box.Empty;
        foreach (Box box in boxes)
        {
            middles = middles.Including(box.Centre);
        }

        _items = new int[boxes.Count];
        uint[] keys = new uint[boxes.Count];
        for (int i = 0; i < keys.Length; i++)
        {
            _items[i] = i;
            keys[i] = HilbertKey(boxes[i].Centre - middles.Min, middles);
        }

        Array.Sort(keys, _items);
        List<Box[]> levels = [[.. _items.Select(i => boxes[i])]];
        while (levels[^1].Length > 1)
        {
            levels.Add(Around(levels[^1]));
        }

        _levels = [.. levels];
    }

    /// <summary>All pairs of boxes that share a point after growing by half the margin each, first &lt; second, in increasing order.</summary>
    public IReadOnlyList<(int First, int Second)> Pairs(double margin)
    {
        List<long> pairs = []; // first · 2³² + second: sorts as a number
        if (_items.Length > 0)
        {
            FindPairs(_levels.Length - 1, 0, 0);
        }

        pairs.Sort();
        return pairs.ConvertAll(p => ((int)(p >> 32), (int)(p & int.MaxValue)));

        void FindPairs(int level, int a, int b)
        {
            if (level == 0)
            {
                if (a != b)
                {
                    pairs.Add(((long)Math.Min(_items[a], _items[b]) << 32) | (long)Math.Max(_items[a], _items[b]));
                }

                return;
            }

            Box[] below = _levels[level - 1];
            (int endA, int endB) = (Math.Min((a + 1) * Branches, below.Length), Math.Min((b + 1) * Branches, below.Length));
            Box aroundB = _levels[level][b].Inflated(margin);
            for (int i = a * Branches; i < endA; i++)
            {
                Box around = below[i].Inflated(margin);
                if (a != b && !below[i].Overlaps(aroundB))
                {
                    continue;
                }

                for (int j = a == b ? i : b * Branches; j < endB; j++)
                {
                    if (around.Overlaps(below[j]))
                    {
                        FindPairs(level - 1, i, j);
                    }
                }
            }
        }
    }

    /// <summary>Indices of the boxes that a ray from a place towards −y meets, by falling right edges; found as they are asked for.</summary>
    public IEnumerable<int> TowardsLeft(Point from)
    {
        PriorityQueue<(int Level, int At), (double, int, int)> waiting = new();
        Wait(_levels.Length - 1, 0);
        while (waiting.TryDequeue(out (int Level, int At) node, out _))
        {
            if (node.Level == 0)
            {
                yield return _items[node.At];
                continue;
            }

            for (int child = node.At * Branches; child < (node.At + 1) * Branches; child++)
            {
                Wait(node.Level - 1, child);
            }
        }

        void Wait(int level, int at)
        {
            if (at < _levels[level].Length && _levels[level][at] is Box box
                && box.Min.Z <= from.Z && from.Z <= box.Max.Z && box.Min.Y <= from.Y)
            {
                waiting.Enqueue((level, at), (-box.Max.Y, level, at));
            }
        }
    }

    private static Box[] Around(Box[] below)
    {
        Box[] above = new Box[(below.Length + Branches - 1) / Branches];
        Array.Fill(above, Box.Empty);
        for (int i = 0; i < below.Length; i++)
        {
            above[i / Branches] = above[i / Branches].Including(below[i]);
        }

        return above;
    }

    private static uint HilbertKey(Point offset, Box all)
    {
        const uint cells = 1u << HilbertBits;
        uint y = Cell(offset.Y, all.Width), z = Cell(offset.Z, all.Height);
        uint key = 0;
        for (uint half = cells / 2; half > 0; half /= 2)
        {
            uint right = (y & half) > 0 ? 1u : 0u, up = (z & half) > 0 ? 1u : 0u;
            key = (key << 2) | ((3 * right) ^ up);

            // The curve enters the lower quarters turned.
            if (up == 0)
            {
                (y, z) = right == 1 ? (cells - 1 - z, cells - 1 - y) : (z, y);
            }
        }

        return key;

        static uint Cell(double along, double extent) => extent > 0 ? (uint)Math.Min(cells - 1, cells * (along / extent)) : 0;
    }
}
