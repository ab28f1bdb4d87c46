using System.Numerics;
using System.Runtime.CompilerServices;

namespace PoleField.Magnetostatics;

/// <summary>
/// Derivatives of the shape functions at the quadrature points, arranged for stiffness matrices of several elements at once:
/// K = Σ_q ∂ξNᵢ u_qj + ∂ηNᵢ v_qj with (u, v) = w D̂ (∂ξN, ∂ηN), a lane of each vector an element.
/// </summary>
internal sealed unsafe class StiffnessTable
{
    private readonly int _points;
    private readonly double[] _gradients; // ∂ξN at [(2 q) width + i], ∂ηN at [(2 q + 1) width + i]; padded with zeros

    public StiffnessTable(ShapeTable shapes)
    {
        Shapes = shapes;
        int n = shapes.NodeCount;
        _points = shapes.Count;
        Width = (n + 1) & ~1;
        PackedLength = n * (n + 1) / 2;
        _gradients = new double[2 * _points * Width];
        for (int q = 0; q < _points; q++)
        {
            shapes.XiRow(q).CopyTo(_gradients.AsSpan(2 * q * Width));
            shapes.EtaRow(q).CopyTo(_gradients.AsSpan(((2 * q) + 1) * Width));
        }

        XiXi = new double[PackedLength];
        XiEta = new double[PackedLength];
        EtaEta = new double[PackedLength];
        for (int q = 0; q < _points; q++)
        {
            Integrate(shapes.Quadrature.Weights[q], shapes.XiRow(q), shapes.EtaRow(q));
        }
    }

    public ShapeTable Shapes { get; }

    /// <summary>n(n + 1)/2.</summary>
    public int PackedLength { get; }

    /// <summary>Number of nodes, rounded up to even.</summary>
    public int Width { get; }

    /// <summary>Room that <see cref="SetFlux"/> needs, in vectors.</summary>
    public int FluxLength => _gradients.Length;

    /// <summary>∫ ∂ξNᵢ ∂ξNⱼ over the reference triangle, packed lower triangle.</summary>
    public double[] XiXi { get; }

    /// <summary>∫ ∂ξNᵢ ∂ηNⱼ + ∂ηNᵢ ∂ξNⱼ.</summary>
    public double[] XiEta { get; }

    /// <summary>∫ ∂ηNᵢ ∂ηNⱼ.</summary>
    public double[] EtaEta { get; }

    /// <summary>Writes u and v of point q for the pulled-back tensors w D̂ = (xx, xe; xe, ee).</summary>
    public void SetFlux(Vector<double>[] flux, int q, Vector<double> xx, Vector<double> xe, Vector<double> ee)
    {
        ReadOnlySpan<double> xi = _gradients.AsSpan(2 * q * Width, Width);
        ReadOnlySpan<double> eta = _gradients.AsSpan(((2 * q) + 1) * Width, Width);
        Span<Vector<double>> u = flux.AsSpan(2 * q * Width, Width), v = flux.AsSpan(((2 * q) + 1) * Width, Width);
        for (int i = 0; i < xi.Length; i++)
        {
            var x = new Vector<double>(xi[i]);
            var e = new Vector<double>(eta[i]);
            u[i] = Vector.MultiplyAddEstimate(xe, e, xx * x);
            v[i] = Vector.MultiplyAddEstimate(ee, e, xe * x);
        }
    }

    /// <summary>K, packed lower triangle, from the u and v of all points.</summary>
    public void Multiply(Vector<double>[] flux, Vector<double>[] packed)
    {
        int n = Shapes.NodeCount;
        fixed (double* gradients = _gradients)
        fixed (Vector<double>* fluxes = flux)
        {
            for (int i = 0; i < n; i += 2)
            {
                int row = i * (i + 1) / 2, next = row + i + 1;
                for (int j = 0; j <= i; j += 2)
                {
                    Block block = Product(gradients + i, fluxes + j);
                    packed[row + j] = block.K00;
                    if (j < i)
                    {
                        packed[row + j + 1] = block.K01;
                    }

                    if (i + 1 < n)
                    {
                        packed[next + j] = block.K10;
                        packed[next + j + 1] = block.K11;
                    }
                }
            }
        }
    }

    // Two rows times two columns: the sums by ξ and by η apart, so that eight chains of additions run at once.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private Block Product(double* g, Vector<double>* f)
    {
        int width = Width;
        Vector<double> a00 = default, a01 = default, a10 = default, a11 = default;
        Vector<double> b00 = default, b01 = default, b10 = default, b11 = default;
        for (int q = 0; q < _points; q++)
        {
            Vector<double> g0 = new(g[0]), g1 = new(g[1]), f0 = f[0], f1 = f[1];
            a00 = Vector.MultiplyAddEstimate(g0, f0, a00);
            a01 = Vector.MultiplyAddEstimate(g0, f1, a01);
            a10 = Vector.MultiplyAddEstimate(g1, f0, a10);
            a11 = Vector.MultiplyAddEstimate(g1, f1, a11);
            g0 = new Vector<double>(g[width]);
            g1 = new Vector<double>(g[width + 1]);
            f0 = f[width];
            f1 = f[width + 1];
            b00 = Vector.MultiplyAddEstimate(g0, f0, b00);
            b01 = Vector.MultiplyAddEstimate(g0, f1, b01);
            b10 = Vector.MultiplyAddEstimate(g1, f0, b10);
            b11 = Vector.MultiplyAddEstimate(g1, f1, b11);
            g += 2 * width;
            f += 2 * width;
        }

        return new Block(a00 + b00, a01 + b01, a10 + b10, a11 + b11);
    }

    private void Integrate(double weight, ReadOnlySpan<double> xi, ReadOnlySpan<double> eta)
    {
        int k = 0;
        for (int i = 0; i < xi.Length; i++)
        {
            for (int j = 0; j <= i; j++, k++)
            {
                XiXi[k] += weight * xi[i] * xi[j];
                XiEta[k] += weight * ((xi[i] * eta[j]) + (eta[i] * xi[j]));
                EtaEta[k] += weight * eta[i] * eta[j];
            }
        }
    }

    private readonly ref struct Block(Vector<double> k00, Vector<double> k01, Vector<double> k10, Vector<double> k11)
    {
        public Vector<double> K00 { get; } = k00;

        public Vector<double> K01 { get; } = k01;

        public Vector<double> K10 { get; } = k10;

        public Vector<double> K11 { get; } = k11;
    }
}
