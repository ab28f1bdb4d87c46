namespace PoleField.Magnetostatics;

/// <summary>
/// Lagrange element of order p on the reference triangle with equispaced nodes: corners 0, 1, 2; then p − 1 nodes along
/// each of the edges 0→1, 1→2, 2→0; then the interior nodes.
/// </summary>
internal sealed class ReferenceTriangle
{
    public const int LowestOrder = 1;
    public const int HighestOrder = 6;

    private readonly int[] _lattice; // node i has barycentric coordinates lattice[3·i + c] / order

    public ReferenceTriangle(int order)
    {
        ArgumentOutOfRangeException.ThrowIfLessThan(order, LowestOrder);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(order, HighestOrder);
        Order = order;
        NodeCount = (order + 1) * (order + 2) / 2;
        BoundaryCount = 3 * order;
        _lattice = Lattice(order, NodeCount);
    }

    /// <summary>Order p.</summary>
    public int Order { get; }

    /// <summary>(p + 1)(p + 2)/2.</summary>
    public int NodeCount { get; }

    /// <summary>Nodes on the edges, 3p; the interior ones follow.</summary>
    public int BoundaryCount { get; }

    /// <summary>Nodes inside.</summary>
    public int InteriorCount => NodeCount - BoundaryCount;

    /// <summary>Reference coordinates of node i.</summary>
    public (double Xi, double Eta) Node(int i) =>
        ((double)_lattice[(3 * i) + 1] / Order, (double)_lattice[(3 * i) + 2] / Order);

    /// <summary>Barycentric coordinate c of node i.</summary>
    public double Barycentric(int i, int c) => (double)_lattice[(3 * i) + c] / Order;

    /// <summary>Local node m (1 … p − 1) along the edge from corner e to corner (e + 1) mod 3.</summary>
    public int EdgeNode(int edge, int m) => 3 + (edge * (Order - 1)) + m - 1;

    /// <summary>Values of all shape functions at a reference place.</summary>
    public void Values(double xi, double eta, Span<double> values)
    {
        Span<double> factors = stackalloc double[3 * (HighestOrder + 1)];
        Factors(xi, eta, factors, default);
        int stride = Order + 1;
        for (int i = 0; i < NodeCount; i++)
        {
            values[i] = factors[_lattice[3 * i]] * factors[stride + _lattice[(3 * i) + 1]]
                * factors[(2 * stride) + _lattice[(3 * i) + 2]];
        }
    }

    /// <summary>Derivatives of all shape functions by ξ and η at a reference place.</summary>
    public void Gradients(double xi, double eta, Span<double> byXi, Span<double> byEta)
    {
        Span<double> f = stackalloc double[3 * (HighestOrder + 1)];
        Span<double> d = stackalloc double[3 * (HighestOrder + 1)];
        Factors(xi, eta, f, d);
        int stride = Order + 1;
        for (int i = 0; i < NodeCount; i++)
        {
            int a = _lattice[3 * i];
            int b = stride + _lattice[(3 * i) + 1];
            int c = (2 * stride) + _lattice[(3 * i) + 2];
            double by0 = d[a] * f[b] * f[c];
            byXi[i] = (f[a] * d[b] * f[c]) - by0;
            byEta[i] = (f[a] * f[b] * d[c]) - by0;
        }
    }

    // P_m(λ) = ∏_{l<m} (pλ − l)/(l + 1) and its derivative, for the three barycentric coordinates.
    private void Factors(double xi, double eta, Span<double> values, Span<double> derivatives)
    {
        int stride = Order + 1;
        Span<double> lambda = [1 - xi - eta, xi, eta];
        for (int c = 0; c < 3; c++)
        {
            double p = 1;
            double dp = 0;
            for (int m = 0; m <= Order; m++)
            {
                values[(c * stride) + m] = p;
                if (!derivatives.IsEmpty)
                {
                    derivatives[(c * stride) + m] = dp;
                }

                double factor = ((Order * lambda[c]) - m) / (m + 1);
                dp = (dp * factor) + (p * Order / (m + 1));
                p *= factor;
            }
        }
    }

    private static int[] Lattice(int order, int count)
    {
        var lattice = new int[3 * count];
        int next = 0;
        void Add(int a, int b, int c)
        {
            lattice[next++] = a;
            lattice[next++] = b;
            lattice[next++] = c;
        }

        Add(order, 0, 0);
        Add(0, order, 0);
        Add(0, 0, order);
        for (int m = 1; m < order; m++)
        {
            Add(order - m, m, 0);
        }

        for (int m = 1; m < order; m++)
        {
            Add(0, order - m, m);
        }

        for (int m = 1; m < order; m++)
        {
            Add(m, 0, order - m);
        }

        for (int c = 1; c < order - 1; c++)
        {
            for (int b = 1; b < order - c; b++)
            {
                Add(order - b - c, b, c);
            }
        }

        return lattice;
    }
}
