namespace PoleField.Magnetostatics;

/// <summary>Takes nodal functions between two orders of elements on one mesh.</summary>
internal sealed class OrderLift
{
    private readonly FiniteElementSpace _low;
    private readonly FiniteElementSpace _high;
    private readonly double[] _values; // value of low function j at high node i at [i·nLow + j]

    public OrderLift(FiniteElementSpace low, FiniteElementSpace high)
    {
        _low = low;
        _high = high;
        int nLow = low.Reference.NodeCount;
        _values = new double[high.Reference.NodeCount * nLow];
        for (int i = 0; i < high.Reference.NodeCount; i++)
        {
            (double xi, double eta) = high.Reference.Node(i);
            low.Reference.Values(xi, eta, _values.AsSpan(i * nLow, nLow));
        }
    }

    /// <summary>The same function (by reference coordinates) on the higher order's nodes.</summary>
    public double[] Up(double[] low)
    {
        var high = new double[_high.NodeCount];
        int nLow = _low.Reference.NodeCount;
        for (int e = 0; e < _low.ElementCount; e++)
        {
            ReadOnlySpan<int> from = _low.NodesOf(e);
            ReadOnlySpan<int> to = _high.NodesOf(e);
            for (int i = 0; i < to.Length; i++)
            {
                double sum = 0;
                for (int j = 0; j < nLow; j++)
                {
                    sum += _values[(i * nLow) + j] * low[from[j]];
                }

                high[to[i]] = sum;
            }
        }

        return high;
    }

    /// <summary>Interpolant of a higher-order function in the lower order's nodes.</summary>
    public double[] Down(double[] high)
    {
        var low = new double[_low.NodeCount];
        int nHigh = _high.Reference.NodeCount;
        int nLow = _low.Reference.NodeCount;
        var atLow = new double[nLow * nHigh];
        for (int i = 0; i < nLow; i++)
        {
            (double xi, double eta) = _low.Reference.Node(i);
            _high.Reference.Values(xi, eta, atLow.AsSpan(i * nHigh, nHigh));
        }

        for (int e = 0; e < _low.ElementCount; e++)
        {
            ReadOnlySpan<int> from = _high.NodesOf(e);
            ReadOnlySpan<int> to = _low.NodesOf(e);
            for (int i = 0; i < nLow; i++)
            {
                double sum = 0;
                for (int j = 0; j < nHigh; j++)
                {
                    sum += atLow[(i * nHigh) + j] * high[from[j]];
                }

                low[to[i]] = sum;
            }
        }

        return low;
    }
}
