namespace PoleField.Numerics;

/// <summary>Vertices by gain, the largest first: a binary heap that knows where each vertex is.</summary>
internal sealed class GainQueue(int vertices)
{
    private readonly int[] _heap = new int[vertices];
    private readonly int[] _placePlusOne = new int[vertices];
    private readonly int[] _gain = new int[vertices];

    public int Count { get; private set; }

    /// <summary>The vertex of the largest gain.</summary>
    public int Top => _heap[0];

    public void Clear()
    {
        for (int i = 0; i < Count; i++)
        {
            _placePlusOne[_heap[i]] = 0;
        }

        Count = 0;
    }

    public void Add(int vertex, int gain)
    {
        _gain[vertex] = gain;
        Up(Count++, vertex);
    }

    /// <summary>Changes the gain of a vertex if it is in the queue.</summary>
    public void Change(int vertex, int difference)
    {
        int place = _placePlusOne[vertex] - 1;
        if (place < 0)
        {
            return;
        }

        _gain[vertex] += difference;
        if (difference > 0)
        {
            Up(place, vertex);
        }
        else
        {
            Down(place, vertex);
        }
    }

    /// <summary>Takes a vertex out if it is in the queue.</summary>
    public void Remove(int vertex)
    {
        int place = _placePlusOne[vertex] - 1;
        if (place < 0)
        {
            return;
        }

        _placePlusOne[vertex] = 0;
        int last = _heap[--Count];
        if (place == Count)
        {
            return;
        }

        if (place > 0 && _gain[last] > _gain[_heap[(place - 1) >> 1]])
        {
            Up(place, last);
        }
        else
        {
            Down(place, last);
        }
    }

    private void Up(int place, int vertex)
    {
        int gain = _gain[vertex];
        while (place > 0)
        {
            int above = (place - 1) >> 1;
            if (_gain[_heap[above]] >= gain)
            {
                break;
            }

            Put(place, _heap[above]);
            place = above;
        }

        Put(place, vertex);
    }

    private void Down(int place, int vertex)
    {
        int gain = _gain[vertex];
        for (int below; (below = (2 * place) + 1) < Count; place = below)
        {
            if (below + 1 < Count && _gain[_heap[below + 1]] > _gain[_heap[below]])
            {
                below++;
            }

            if (_gain[_heap[below]] <= gain)
            {
                break;
            }

            Put(place, _heap[below]);
        }

        Put(place, vertex);
    }

    private void Put(int place, int vertex)
    {
        _heap[place] = vertex;
        _placePlusOne[vertex] = place + 1;
    }
}
