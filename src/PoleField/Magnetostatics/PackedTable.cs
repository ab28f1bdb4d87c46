using System.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// Products of shape-function derivatives at the quadrature points, packed lower triangles, so that an element's stiffness
/// is a sum of three packed rows per point: K = Σ D̂₁₁ ∂ξNᵢ∂ξNⱼ + D̂₁₂ (∂ξNᵢ∂ηNⱼ + ∂ηNᵢ∂ξNⱼ) + D̂₂₂ ∂ηNᵢ∂ηNⱼ.
/// </summary>
internal sealed class PackedTable
{
    private readonly double[] _xiXi;
    private readonly double[] _xiEta;
    private readonly double[] _etaEta;

    public PackedTable(ShapeTable table)
    {
        Shapes = table;
        int n = table.NodeCount;
        PackedLength = n * (n + 1) / 2;

        // Rows are padded to whole vectors; the padding stays zero.
        int width = Vector<double>.Count;
        Stride = (PackedLength + width - 1) / width * width;
        _xiXi = new double[table.Count * Stride];
        _xiEta = new double[table.Count * Stride];
        _etaEta = new double[table.Count * Stride];
        for (int q = 0; q < table.Count; q++)
        {
            ReadOnlySpan<double> xi = table.XiRow(q);
            ReadOnlySpan<double> eta = table.EtaRow(q);
            int k = q * Stride;
            for (int i = 0; i < n; i++)
            {
                for (int j = 0; j <= i; j++, k++)
                {
                    _xiXi[k] = xi[i] * xi[j];
                    _xiEta[k] = (xi[i] * eta[j]) + (eta[i] * xi[j]);
                    _etaEta[k] = eta[i] * eta[j];
                }
            }
        }
    }

    public ShapeTable Shapes { get; }

    /// <summary>n(n + 1)/2.</summary>
    public int PackedLength { get; }

    /// <summary>Length of a padded packed matrix.</summary>
    public int Stride { get; }

    /// <summary>Adds the contribution of point q with the pulled-back tensor (xx, xe, ee) to a padded packed matrix.</summary>
    public void Accumulate(int q, double xx, double xe, double ee, Span<double> packed)
    {
        int width = Vector<double>.Count;
        ReadOnlySpan<double> a = _xiXi.AsSpan(q * Stride, Stride);
        ReadOnlySpan<double> b = _xiEta.AsSpan(q * Stride, Stride);
        ReadOnlySpan<double> c = _etaEta.AsSpan(q * Stride, Stride);
        var vxx = new Vector<double>(xx);
        var vxe = new Vector<double>(xe);
        var vee = new Vector<double>(ee);
        for (int k = 0; k < Stride; k += width)
        {
            Vector<double> sum = new Vector<double>(packed[k..])
                + (vxx * new Vector<double>(a[k..]))
                + (vxe * new Vector<double>(b[k..]))
                + (vee * new Vector<double>(c[k..]));
            sum.CopyTo(packed[k..]);
        }
    }

    /// <summary>The sums of all points' rows with their weights: the reference matrices of elements with constant tensor.</summary>
    public (double[] XiXi, double[] XiEta, double[] EtaEta) Integrated()
    {
        var xiXi = new double[Stride];
        var xiEta = new double[Stride];
        var etaEta = new double[Stride];
        for (int q = 0; q < Shapes.Count; q++)
        {
            double w = Shapes.Quadrature.Weights[q];
            Accumulate(q, w, 0, 0, xiXi);
            Accumulate(q, 0, w, 0, xiEta);
            Accumulate(q, 0, 0, w, etaEta);
        }

        return (xiXi, xiEta, etaEta);
    }
}
