namespace PoleField.Numerics;

/// <summary>Memory for the updates of large fronts, given back and used again; safe for several threads.</summary>
internal sealed class UpdateStore
{
    private readonly Lock _gate = new();
    private readonly List<PinnedNumbers> _free = [];

    /// <summary>Room for at least this many numbers.</summary>
    public PinnedNumbers Take(long length)
    {
        lock (_gate)
        {
            int best = -1;
            for (int i = 0; i < _free.Count; i++)
            {
                if (_free[i].Length >= length && (best < 0 || _free[i].Length < _free[best].Length))
                {
                    best = i;
                }
            }

            if (best >= 0)
            {
                PinnedNumbers found = _free[best];
                _free.RemoveAt(best);
                return found;
            }
        }

        return new PinnedNumbers(length);
    }

    /// <summary>Gives room back.</summary>
    public void Return(PinnedNumbers numbers)
    {
        lock (_gate)
        {
            _free.Add(numbers);
        }
    }
}
