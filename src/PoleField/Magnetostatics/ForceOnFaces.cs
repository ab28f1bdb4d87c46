using PoleField.Geometry;
using PoleField.Materials;
using PoleField.Meshing;
using PoleField.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// Force on a body of iron or magnet by the traction T n of Maxwell's stress on those of its faces that non-magnetic matter
/// covers. Joints to other iron carry a force too, but how it divides there is a question of mechanics, not of the field.
/// </summary>
/// <param name="PerMetre">Sum of the traction over the free faces (y, z), N/m.</param>
/// <param name="HasJoints">True when part of the boundary touches other iron or magnets and was left out.</param>
internal readonly record struct ForceOnFaces(Point PerMetre, bool HasJoints)
{
    private const int ExtraPoints = 2;

    /// <summary>Integrates the traction over the free faces of a body, by region of the section.</summary>
    public static ForceOnFaces Of(FieldSolution solution, bool[] body)
    {
        FiniteElementSpace space = solution.Problem.Space;
        Point force = default;
        bool joints = false;
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            if (region == Mesh.Exterior || !body[region])
            {
                continue;
            }

            for (int side = 0; side < 3; side++)
            {
                switch (FaceAt(solution, body, e, side))
                {
                    case Face.Free:
                        force += OnSide(solution, e, side);
                        break;
                    case Face.Joint:
                        joints = true;
                        break;
                }
            }
        }

        return new ForceOnFaces(force, joints);
    }

    private static Face FaceAt(FieldSolution solution, bool[] body, int element, int side)
    {
        FiniteElementSpace space = solution.Problem.Space;
        int curveEdge = space.Edges.CurveEdgeOf(space.Edges.OfTriangle(element, side));
        if (curveEdge < 0 || space.Mesh.CurveEdges[curveEdge].SectionEdge is not (>= 0 and int index))
        {
            return Face.Inner;
        }

        Drawing.SectionEdge edge = space.Mesh.Section.Edges[index];
        int other = edge.Left == space.Mesh.Regions[element] ? edge.Right : edge.Left;
        if (other == Drawing.CrossSection.Outside)
        {
            return Face.Joint;
        }

        RegionPhysics physics = solution.Problem.Regions[other];
        bool free = physics.Law is LinearLaw { RelativePermeability: 1.0 } && physics.RemanentGradient == default;
        return body[other] ? Face.Inner : free ? Face.Free : Face.Joint;
    }

    // From the body's side: the normal component of B and the tangential one of H are those of the air, and in iron the
    // elements give them far more accurately than the air's elements do.
    private static Point OnSide(FieldSolution solution, int element, int side)
    {
        FiniteElementSpace space = solution.Problem.Space;
        GaussRule rule = GaussRule.Legendre(space.Order + ExtraPoints);
        ReadOnlySpan<(double Xi, double Eta)> corners = [(0, 0), (1, 0), (0, 1)];
        (double x0, double e0) = corners[side];
        (double x1, double e1) = corners[(side + 1) % 3];
        RegionPhysics physics = solution.Problem.PhysicsOf(element);
        var remanence = new Point(physics.RemanentGradient.Z, -physics.RemanentGradient.Y);
        Span<double> byXi = stackalloc double[space.Reference.NodeCount];
        Span<double> byEta = stackalloc double[space.Reference.NodeCount];
        Point force = default;
        for (int i = 0; i < rule.Nodes.Length; i++)
        {
            double xi = x0 + (rule.Nodes[i] * (x1 - x0));
            double eta = e0 + (rule.Nodes[i] * (e1 - e0));
            space.Reference.Gradients(xi, eta, byXi, byEta);
            Jacobian j = space.JacobianAt(element, byXi, byEta);
            Point along = ((x1 - x0) * j.ByXi) + ((e1 - e0) * j.ByEta);
            Point tangent = along.Unit();
            Point normal = -tangent.Perpendicular;
            FieldSample s = solution.Sample(element, xi, eta);
            var b = new Point(s.By, s.Bz);
            Point driven = b - remanence;
            double reluctivity = driven.Length > 0 ? s.FieldStrength / driven.Length : physics.Law.InitialReluctivity;
            double alongTangent = PhysicalConstants.Mu0 * reluctivity * driven.Dot(tangent);
            Point inAir = (b.Dot(normal) * normal) + (alongTangent * tangent);
            force += (rule.Weights[i] * along.Length) * ForceShell.Traction(inAir, normal);
        }

        return force;
    }

    private enum Face
    {
        Inner,
        Free,
        Joint,
    }
}
