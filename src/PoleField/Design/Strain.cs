using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>M = ∇V at a point: Mᵢⱼ = ∂ᵢVⱼ, 1 per unit of the parameter.</summary>
/// <param name="ByY">∂V/∂y.</param>
/// <param name="ByZ">∂V/∂z.</param>
internal readonly record struct Strain(Point ByY, Point ByZ)
{
    /// <summary>Relative growth of area.</summary>
    public double Trace => ByY.Y + ByZ.Z;

    /// <summary>M x.</summary>
    public Point On(Point x) => new(ByY.Dot(x), ByZ.Dot(x));

    /// <summary>Mᵀ x.</summary>
    public Point TransposedOn(Point x) => (x.Y * ByY) + (x.Z * ByZ);

    /// <summary>Of a velocity by node.</summary>
    public static Strain Of(ReadOnlySpan<int> nodes, ReadOnlySpan<Point> velocity, in ShapeRow row)
    {
        double yXi = 0, yEta = 0, zXi = 0, zEta = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            Point v = velocity[nodes[i]];
            yXi += row.Xi[i] * v.Y;
            yEta += row.Eta[i] * v.Y;
            zXi += row.Xi[i] * v.Z;
            zEta += row.Eta[i] * v.Z;
        }

        Point y = row.Jacobian.Gradient(yXi, yEta);
        Point z = row.Jacobian.Gradient(zXi, zEta);
        return new Strain(new Point(y.Y, z.Y), new Point(y.Z, z.Z));
    }
}

/// <summary>One point of an element: its Jacobian and the derivatives of all shape functions.</summary>
internal readonly ref struct ShapeRow(Jacobian jacobian, ReadOnlySpan<double> xi, ReadOnlySpan<double> eta)
{
    public Jacobian Jacobian { get; } = jacobian;

    public ReadOnlySpan<double> Xi { get; } = xi;

    public ReadOnlySpan<double> Eta { get; } = eta;

    /// <summary>The row of point q of a table for an element.</summary>
    public static ShapeRow Of(FiniteElementSpace space, int element, ShapeTable table, int q) =>
        new(space.JacobianAt(element, table.XiRow(q), table.EtaRow(q)), table.XiRow(q), table.EtaRow(q));

    /// <summary>Gradient of a function by node.</summary>
    public Point Gradient(ReadOnlySpan<int> nodes, double[] nodal)
    {
        double byXi = 0, byEta = 0;
        for (int i = 0; i < nodes.Length; i++)
        {
            byXi += Xi[i] * nodal[nodes[i]];
            byEta += Eta[i] * nodal[nodes[i]];
        }

        return Jacobian.Gradient(byXi, byEta);
    }
}

/// <summary>The field at a point of an element.</summary>
/// <param name="Jacobian">Of the element there.</param>
/// <param name="Gradient">∇A, T.</param>
/// <param name="Turned">∇A − gᵣ, T.</param>
/// <param name="Reluctivity">ν = H/B, m/H.</param>
/// <param name="Excess">(dH/dB − ν)/B².</param>
internal readonly record struct PointState(Jacobian Jacobian, Point Gradient, Point Turned, double Reluctivity, double Excess)
{
    /// <summary>In air, in units of its reluctivity.</summary>
    public static PointState OfAir(Jacobian jacobian, Point gradient) => new(jacobian, gradient, gradient, 1, 0);

    /// <summary>−Dh(M∇A) − Mᵀh + h tr M: what a motion does to the weak form there.</summary>
    public Point Bracket(in Strain m)
    {
        Point stretched = m.On(Gradient);
        Point h = Reluctivity * Turned;
        return ((-Excess * Turned.Dot(stretched)) * Turned) - (Reluctivity * stretched) - m.TransposedOn(h) + (m.Trace * h);
    }
}
