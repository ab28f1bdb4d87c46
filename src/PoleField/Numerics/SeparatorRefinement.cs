namespace PoleField.Numerics;

/// <summary>
/// Makes a vertex separator lighter: a vertex of the separator moves to one side and draws its neighbours of the other side
/// in. Moves may make it heavier for a while; what follows the best state is taken back.
/// </summary>
/// <remarks>
/// Fiduccia and Mattheyses, 19th Design Automation Conference (1982) 175, in the form for vertex separators of
/// Ashcraft and Liu, SIAM J. Matrix Anal. Appl. 19 (1998) 325 (both recalled from memory).
/// </remarks>
internal sealed class SeparatorRefinement(int vertices)
{
    /// <summary>State of a vertex of the separator; 0 and 1 are the sides.</summary>
    public const byte Separator = 2;

    private readonly GainQueue[] _queues = [new(vertices), new(vertices)];
    private readonly int[] _movedInPass = new int[vertices];
    private readonly List<int> _separator = [];
    private readonly List<int> _moves = [];
    private readonly int[] _weights = new int[3];
    private int _pass;
    private WeightedGraph _graph = null!;
    private byte[] _side = [];

    /// <summary>Weights of side 0, side 1 and the separator after the last refinement.</summary>
    public ReadOnlySpan<int> Weights => _weights;

    /// <summary>Refines in place; neither side grows beyond <paramref name="largestSide"/>.</summary>
    public void Refine(WeightedGraph graph, byte[] side, int largestSide, int passes)
    {
        _graph = graph;
        _side = side;
        Array.Clear(_weights);
        _separator.Clear();
        for (int v = 0; v < graph.Count; v++)
        {
            _weights[side[v]] += graph.Weights[v];
            if (side[v] == Separator)
            {
                _separator.Add(v);
            }
        }

        for (int pass = 0; pass < passes && Pass(largestSide); pass++)
        {
            KeepSeparator();
        }
    }

    private bool Pass(int largestSide)
    {
        _pass++;
        _moves.Clear();
        _queues[0].Clear();
        _queues[1].Clear();
        foreach (int v in _separator)
        {
            Enqueue(v);
        }

        int best = _weights[Separator], bestDifference = Math.Abs(_weights[0] - _weights[1]);
        int startWeight = best, startDifference = bestDifference, kept = 0;
        int patience = Math.Clamp(_separator.Count, 12, 150), since = 0;
        while (since < patience)
        {
            int to = Choose(largestSide);
            if (to < 0)
            {
                break;
            }

            Move(_queues[to].Top, to);
            int weight = _weights[Separator], difference = Math.Abs(_weights[0] - _weights[1]);
            since++;
            if (weight < best || (weight == best && difference < bestDifference))
            {
                best = weight;
                bestDifference = difference;
                kept = _moves.Count;
                since = 0;
            }
        }

        TakeBack(kept);
        return best < startWeight || bestDifference < startDifference / 2;
    }

    private int Choose(int largestSide)
    {
        bool can0 = Fits(0, largestSide), can1 = Fits(1, largestSide);
        if (!can0 || !can1)
        {
            return can0 ? 0 : can1 ? 1 : -1;
        }

        int g0 = _queues[0].TopGain, g1 = _queues[1].TopGain;
        return g0 != g1 ? (g0 > g1 ? 0 : 1) : (_weights[0] <= _weights[1] ? 0 : 1);
    }

    private bool Fits(int to, int largestSide) =>
        _queues[to].Count > 0
        && (_weights[to] + _graph.Weights[_queues[to].Top] <= largestSide || _weights[to] < _weights[1 - to]);

    private void Enqueue(int v)
    {
        int weight = _graph.Weights[v], gain0 = weight, gain1 = weight;
        foreach (int u in _graph.Around(v))
        {
            if (_side[u] == 1)
            {
                gain0 -= _graph.Weights[u];
            }
            else if (_side[u] == 0)
            {
                gain1 -= _graph.Weights[u];
            }
        }

        _queues[0].Add(v, gain0);
        _queues[1].Add(v, gain1);
    }

    private void Move(int v, int to)
    {
        int other = 1 - to, weight = _graph.Weights[v];
        _queues[0].Remove(v);
        _queues[1].Remove(v);
        _side[v] = (byte)to;
        _weights[to] += weight;
        _weights[Separator] -= weight;
        _movedInPass[v] = _pass;
        _moves.Add(v);
        foreach (int u in _graph.Around(v))
        {
            if (_side[u] == Separator)
            {
                _queues[other].Change(u, -weight);
            }
            else if (_side[u] == other)
            {
                DrawIn(u, to);
            }
        }
    }

    // A vertex of the side other than `to` becomes part of the separator. Logged as its complement.
    private void DrawIn(int u, int to)
    {
        int weight = _graph.Weights[u];
        _side[u] = Separator;
        _weights[1 - to] -= weight;
        _weights[Separator] += weight;
        _moves.Add(~u);
        foreach (int x in _graph.Around(u))
        {
            if (_side[x] == Separator)
            {
                _queues[to].Change(x, weight);
            }
        }

        if (_movedInPass[u] != _pass)
        {
            Enqueue(u);
        }

        _separator.Add(u);
    }

    private void TakeBack(int kept)
    {
        for (int i = _moves.Count - 1, first = i; i >= kept; i = first = i - 1)
        {
            while (_moves[first] < 0)
            {
                first--;
            }

            int v = _moves[first], to = _side[v];
            for (; i > first; i--)
            {
                int u = ~_moves[i];
                _side[u] = (byte)(1 - to);
                _weights[1 - to] += _graph.Weights[u];
                _weights[Separator] -= _graph.Weights[u];
            }

            _side[v] = Separator;
            _weights[to] -= _graph.Weights[v];
            _weights[Separator] += _graph.Weights[v];
        }
    }

    // The list holds all that ever were in the separator, some twice.
    private void KeepSeparator()
    {
        _pass++;
        int count = 0;
        for (int i = 0; i < _separator.Count; i++)
        {
            int v = _separator[i];
            if (_side[v] == Separator && _movedInPass[v] != _pass)
            {
                _movedInPass[v] = _pass;
                _separator[count++] = v;
            }
        }

        _separator.RemoveRange(count, _separator.Count - count);
    }
}
