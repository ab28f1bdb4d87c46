using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>
/// A magnet on a finite-element space: find the potential A that minimises
/// W(A) = ∫ w(|∇A − gᵣ|) dS − ∫ J A dS over all A with given values on fixed nodes.
/// </summary>
/// <remarks>
/// gᵣ is the remanence turned by a right angle, w the energy density of the material's law. In the second disc w is that
/// of vacuum, by Kelvin's inversion, and acts on A less the background's potential.
/// </remarks>
internal sealed class FieldProblem
{
    private const double NetCurrentRounding = 1e-12; // of the sum of all sizes

    private FieldProblem(Magnet magnet, FiniteElementSpace space, RegionPhysics[] regions, double netCurrent)
    {
        NetCurrent = netCurrent;
        Magnet = magnet;
        Space = space;
        Regions = regions;
    }

    public Magnet Magnet { get; }

    public FiniteElementSpace Space { get; }

    /// <summary>Physics of each region of the section; the last entry is the second disc's.</summary>
    public RegionPhysics[] Regions { get; }

    /// <summary>Sum of all ampere-turns along the beam, A: it returns at infinity.</summary>
    public double NetCurrent { get; }

    /// <summary>Physics of an element.</summary>
    public ref readonly RegionPhysics PhysicsOf(int element)
    {
        int region = Space.Mesh.Regions[element];
        return ref Regions[region == Mesh.Exterior ? Regions.Length - 1 : region];
    }

    /// <summary>True where A is harmonic: elements of the first disc without material, current or remanence.</summary>
    public bool IsAir(int element)
    {
        ref readonly RegionPhysics physics = ref PhysicsOf(element);
        return Space.Mesh.Regions[element] != Mesh.Exterior && physics.Law is LinearLaw { RelativePermeability: 1.0 }
            && physics.CurrentDensity == 0.0 && physics.RemanentGradient == default;
    }

    /// <summary>Joins a magnet and a space over a mesh of its section.</summary>
    public static FieldProblem Create(Magnet magnet, FiniteElementSpace space)
    {
        CrossSection section = magnet.Section;
        double[] areas = RegionAreas(space, section.Regions.Count);
        var regions = new RegionPhysics[section.Regions.Count + 1];
        double net = 0;
        double size = 0;
        for (int r = 0; r < section.Regions.Count; r++)
        {
            Region region = section.Regions[r];
            if (region.Part < 0)
            {
                regions[r] = new RegionPhysics(LinearLaw.Vacuum, default, 0);
                continue;
            }

            PartRole role = magnet.Roles[region.Part];
            double turns = region.MirrorImage ? -role.AmpereTurns : role.AmpereTurns;

            // The mirror image of a magnetised part, like that of a current, keeps Bz and turns By over.
            Point remanence = region.MirrorImage ? new Point(-role.Remanence.Y, role.Remanence.Z) : role.Remanence;

            net += turns;
            size += Math.Abs(turns);

            // By the elements' own area, so that the ampere-turns are exact whatever the curves' approximation.
            double density = turns == 0 ? 0 : turns / areas[r];
            regions[r] = new RegionPhysics(role.Material.Law, new Point(-remanence.Z, remanence.Y), density);
        }

        regions[^1] = new RegionPhysics(LinearLaw.Vacuum, default, 0);
        return new FieldProblem(magnet, space, regions, Math.Abs(net) <= NetCurrentRounding * size ? 0.0 : net);
    }

    /// <summary>The same magnet and mesh in another order.</summary>
    public FieldProblem InOrder(int order) =>
        Create(Magnet, FiniteElementSpace.Create(Space.Mesh, Space.Edges, order));

    /// <summary>Potential of the uniform background at a place, T·m.</summary>
    public double BackgroundPotential(Point p) =>
        (Magnet.AppliedField.Y * (p.Z - BackgroundOrigin.Z)) - (Magnet.AppliedField.Z * (p.Y - BackgroundOrigin.Y));

    private Point BackgroundOrigin => Space.Mesh.Circle?.Centre ?? default;

    private static double[] RegionAreas(FiniteElementSpace space, int count)
    {
        var areas = new double[count];
        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + 1));
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region < 0)
            {
                continue;
            }

            if (!space.IsCurved[e])
            {
                areas[region] += 0.5 * space.JacobianAt(e, default, default).Determinant;
                continue;
            }

            for (int q = 0; q < table.Count; q++)
            {
                areas[region] += table.Quadrature.Weights[q]
                    * space.JacobianAt(e, table.XiRow(q), table.EtaRow(q)).Determinant;
            }
        }

        return areas;
    }
}

/// <summary>What fills a region.</summary>
/// <param name="Law">Material law.</param>
/// <param name="RemanentGradient">gᵣ = (−Br_z, Br_y), T.</param>
/// <param name="CurrentDensity">J along the beam, A/m².</param>
internal readonly record struct RegionPhysics(MagneticLaw Law, Point RemanentGradient, double CurrentDensity)
{
    /// <summary>True when the element matrix does not depend on the solution.</summary>
    public bool IsLinear => Law.IsLinear;
}
