using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>A converged finite-element field.</summary>
public sealed class FieldSolution
{
    /// <summary>The magnet.</summary>
    public Magnet Magnet => throw new NotImplementedException("seam");

    /// <summary>The mesh.</summary>
    public Mesh Mesh => throw new NotImplementedException("seam");

    /// <summary>Order of the elements.</summary>
    public int Order => throw new NotImplementedException("seam");

    /// <summary>Field at a place, also outside the open circle; null outside a closed model.</summary>
    public FieldSample? At(Point p) => throw new NotImplementedException("seam");

    /// <summary>
    /// The solution inside the model (without the second disc) cut into small straight triangles for drawing, each curved
    /// element into <paramref name="cuts"/>² pieces.
    /// </summary>
    public IEnumerable<FieldTriangle> Triangles(int cuts) => throw new NotImplementedException("seam");

    /// <summary>The element's own nodes for second-order cells: corners then mid-edges 01, 12, 20 of every element inside the model, with the field there.</summary>
    public IEnumerable<(Point[] Nodes, FieldSample[] Samples, int Region)> QuadraticCells() => throw new NotImplementedException("seam");
}
