using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>Force on conductors, ∫ J × B dS = ∫ J ∇A dS.</summary>
internal static class ForceOnCurrent
{
    /// <summary>Force per metre on the currents of a body (y, z), N/m, by region of the section.</summary>
    public static Point Of(FieldSolution solution, bool[] body)
    {
        FiniteElementSpace space = solution.Problem.Space;
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + 1));
        Point force = default;
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region == Mesh.Exterior || !body[region])
            {
                continue;
            }

            double density = solution.Problem.PhysicsOf(e).CurrentDensity;
            for (int q = 0; q < table.Count; q++)
            {
                FieldSample s = solution.Sample(e, table.Quadrature.Xi[q], table.Quadrature.Eta[q]);
                double area = table.Quadrature.Weights[q] * space.JacobianAt(e, table.XiRow(q), table.EtaRow(q)).Determinant;
                force += (area * density) * new Point(-s.Bz, s.By);
            }
        }

        return force;
    }
}
