namespace PoleField.Magnetostatics;

/// <summary>Shape functions of one element tabulated at the points of one quadrature.</summary>
internal sealed class ShapeTable
{
    public ShapeTable(ReferenceTriangle reference, TriangleQuadrature quadrature)
    {
        Quadrature = quadrature;
        NodeCount = reference.NodeCount;
        int n = NodeCount;
        Values = new double[quadrature.Count * n];
        ByXi = new double[quadrature.Count * n];
        ByEta = new double[quadrature.Count * n];
        for (int q = 0; q < quadrature.Count; q++)
        {
            reference.Values(quadrature.Xi[q], quadrature.Eta[q], Values.AsSpan(q * n, n));
            reference.Gradients(quadrature.Xi[q], quadrature.Eta[q], ByXi.AsSpan(q * n, n), ByEta.AsSpan(q * n, n));
        }
    }

    /// <summary>The quadrature.</summary>
    public TriangleQuadrature Quadrature { get; }

    /// <summary>Nodes per element.</summary>
    public int NodeCount { get; }

    /// <summary>Number of points.</summary>
    public int Count => Quadrature.Count;

    /// <summary>Value of function i at point q at [q·n + i].</summary>
    public double[] Values { get; }

    /// <summary>Derivative by ξ of function i at point q at [q·n + i].</summary>
    public double[] ByXi { get; }

    /// <summary>Derivative by η of function i at point q at [q·n + i].</summary>
    public double[] ByEta { get; }

    /// <summary>Row of <see cref="ByXi"/> at point q.</summary>
    public ReadOnlySpan<double> XiRow(int q) => ByXi.AsSpan(q * NodeCount, NodeCount);

    /// <summary>Row of <see cref="ByEta"/> at point q.</summary>
    public ReadOnlySpan<double> EtaRow(int q) => ByEta.AsSpan(q * NodeCount, NodeCount);

    /// <summary>Row of <see cref="Values"/> at point q.</summary>
    public ReadOnlySpan<double> ValueRow(int q) => Values.AsSpan(q * NodeCount, NodeCount);
}
