using System.Numerics;

namespace PoleField.Numerics;

/// <summary>
/// Minimum-degree order of a small part of a graph whose surroundings are eliminated later: they count in the degrees.
/// The elimination graph is kept as it is, a row of bits per vertex.
/// </summary>
/// <remarks>
/// Constrained minimum degree: Liu, ACM Trans. Math. Softw. 15 (1989) 310; degrees are exact here, which for parts of a
/// hundred vertices costs less than the bounds of Amestoy, Davis and Duff, SIAM J. Matrix Anal. Appl. 17 (1996) 886
/// (both recalled from memory).
/// </remarks>
internal sealed class MinimumDegree
{
    private const int Bits = 64;

    private readonly WeightedGraph _graph;

    // Place of a vertex of the graph among the bits, −1 for all that are not of the present part or next to it.
    private readonly int[] _bitOf;
    private readonly List<int> _around = [];
    private ulong[] _rows = [];
    private int _words;

    public MinimumDegree(WeightedGraph graph)
    {
        _graph = graph;
        _bitOf = new int[graph.Count];
        Array.Fill(_bitOf, -1);
    }

    /// <summary>Puts the vertices of a part into the order of their elimination.</summary>
    public void Order(Span<int> part)
    {
        if (part.Length < 2)
        {
            return;
        }

        BuildRows(part);
        int[] vertices = part.ToArray();
        var degree = new int[part.Length];
        for (int i = 0; i < degree.Length; i++)
        {
            degree[i] = Count(Row(i));
        }

        for (int k = 0; k < part.Length; k++)
        {
            int least = 0;
            for (int i = 1; i < degree.Length; i++)
            {
                if (degree[i] < degree[least])
                {
                    least = i;
                }
            }

            degree[least] = int.MaxValue;
            part[k] = vertices[least];
            Eliminate(least, degree);
        }
    }

    private void BuildRows(ReadOnlySpan<int> part)
    {
        _around.Clear();
        for (int i = 0; i < part.Length; i++)
        {
            _bitOf[part[i]] = i;
        }

        foreach (int v in part)
        {
            foreach (int u in _graph.Around(v))
            {
                if (_bitOf[u] < 0)
                {
                    _bitOf[u] = part.Length + _around.Count;
                    _around.Add(u);
                }
            }
        }

        _words = (part.Length + _around.Count + Bits - 1) / Bits;
        int length = _words * part.Length;
        if (_rows.Length < length)
        {
            _rows = new ulong[length];
        }

        _rows.AsSpan(0, length).Clear();
        for (int i = 0; i < part.Length; i++)
        {
            Span<ulong> row = Row(i);
            foreach (int u in _graph.Around(part[i]))
            {
                row[_bitOf[u] / Bits] |= 1UL << (_bitOf[u] % Bits);
            }
        }

        foreach (int v in part)
        {
            _bitOf[v] = -1;
        }

        foreach (int u in _around)
        {
            _bitOf[u] = -1;
        }
    }

    // All its neighbours become neighbours of each other.
    private void Eliminate(int pivot, int[] degree)
    {
        ReadOnlySpan<ulong> own = Row(pivot);
        for (int word = 0; word * Bits < degree.Length; word++)
        {
            for (ulong bits = own[word]; bits != 0; bits &= bits - 1)
            {
                int i = (word * Bits) + BitOperations.TrailingZeroCount(bits);
                if (i >= degree.Length)
                {
                    return;
                }

                Span<ulong> row = Row(i);
                for (int w = 0; w < row.Length; w++)
                {
                    row[w] |= own[w];
                }

                row[pivot / Bits] &= ~(1UL << (pivot % Bits));
                row[i / Bits] &= ~(1UL << (i % Bits));
                degree[i] = Count(row);
            }
        }
    }

    private static int Count(ReadOnlySpan<ulong> row)
    {
        int count = 0;
        foreach (ulong word in row)
        {
            count += BitOperations.PopCount(word);
        }

        return count;
    }

    private Span<ulong> Row(int i) => _rows.AsSpan(i * _words, _words);
}
