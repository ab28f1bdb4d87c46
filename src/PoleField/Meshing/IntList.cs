using System.Runtime.CompilerServices;

namespace PoleField.Meshing;

/// <summary>A growing list of integers whose storage is kept when it is cleared: no allocation in loops.</summary>
internal sealed class IntList
{
    private int[] _items = new int[32];

    public int Count { get; private set; }

    public int this[int i]
    {
        get => _items[i];
        set => _items[i] = value;
    }

    public ReadOnlySpan<int> Items => _items.AsSpan(0, Count);

    public void Clear() => Count = 0;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Add(int value)
    {
        if (Count == _items.Length)
        {
            Array.Resize(ref _items, 2 * Count);
        }

        _items[Count++] = value;
    }

    public int Pop() => _items[--Count];
}

/// <summary>First in, first out; each integer at most once at a time.</summary>
internal sealed class IntQueue
{
    private int[] _ring = new int[64];
    private bool[] _waiting = new bool[64];
    private int _head;

    public int Count { get; private set; }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public void Add(int value)
    {
        if (value >= _waiting.Length)
        {
            Array.Resize(ref _waiting, 2 * value);
        }

        if (_waiting[value])
        {
            return;
        }

        _waiting[value] = true;
        if (Count == _ring.Length)
        {
            int[] larger = new int[2 * Count];
            Array.Copy(_ring, _head, larger, 0, Count - _head);
            Array.Copy(_ring, 0, larger, Count - _head, _head);
            _ring = larger;
            _head = 0;
        }

        _ring[(_head + Count) & (_ring.Length - 1)] = value;
        Count++;
    }

    public bool TryTake(out int value)
    {
        if (Count == 0)
        {
            value = 0;
            return false;
        }

        value = _ring[_head];
        _head = (_head + 1) & (_ring.Length - 1);
        Count--;
        _waiting[value] = false;
        return true;
    }
}
