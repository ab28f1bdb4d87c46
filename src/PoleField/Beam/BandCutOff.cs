using PoleField.Geometry;
using PoleField.Magnetostatics;
using PoleField.Meshing;

namespace PoleField.Beam;

/// <summary>
/// The cut-off χ of the extraction as nodal values: 1 on every element that touches the aperture (inflated a little), 0 on
/// every node of iron, conductors, magnets and the second disc, a smooth step in the air between.
/// </summary>
internal static class BandCutOff
{
    private const double Inflation = 0.25;  // of the gap between aperture and obstacles
    private const double Reach = 2.0;       // the band ends at this many gaps
    private const double StepEnd = 0.4;     // χ = 1 from this share of the way on
    private const int TouchSamples = 4;     // lattice per element edge on which touching is tested

    /// <summary>Nodal values of χ; null when the mesh leaves no band of air between aperture and obstacles.</summary>
    public static double[]? Nodal(FieldProblem problem, ApertureShape aperture)
    {
        FiniteElementSpace space = problem.Space;
        bool[] obstacle = Obstacles(problem);
        bool[] outside = InsideOfSecondDisc(space);
        var distance = new double[space.NodeCount];
        double gap = double.PositiveInfinity;
        for (int node = 0; node < space.NodeCount; node++)
        {
            distance[node] = outside[node] ? double.PositiveInfinity : aperture.DistanceTo(space.Places[node]);
            if (obstacle[node])
            {
                gap = Math.Min(gap, distance[node]);
            }
        }

        if (!(gap > 0.0) || !double.IsFinite(gap))
        {
            return null;
        }

        double inflation = Inflation * gap;
        double cap = Reach * gap;
        List<Point> near = NearObstacles(space, obstacle, distance, inflation + (3 * cap));
        var chi = new double[space.NodeCount];
        for (int node = 0; node < space.NodeCount; node++)
        {
            double toAperture = Math.Max(0, distance[node] - inflation);
            if (!obstacle[node] && toAperture < cap)
            {
                double toObstacle = Math.Min(NearestDistance(near, space.Places[node]), cap - toAperture);
                chi[node] = SmoothStep(toObstacle / (toObstacle + toAperture) / StepEnd);
            }
        }

        return RaiseTouching(space, aperture, inflation, obstacle, chi) ? chi : null;
    }

    private static bool[] Obstacles(FieldProblem problem)
    {
        FiniteElementSpace space = problem.Space;
        var obstacle = new bool[space.NodeCount];
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (!problem.IsAir(e))
            {
                foreach (int node in space.NodesOf(e))
                {
                    obstacle[node] = true;
                }
            }

            MarkRim(space, e, obstacle);
        }

        return obstacle;
    }

    // Beyond the rim of a closed model there is no air that the band could end in.
    private static void MarkRim(FiniteElementSpace space, int element, bool[] obstacle)
    {
        ReadOnlySpan<int> nodes = space.NodesOf(element);
        for (int side = 0; side < 3; side++)
        {
            int c = space.Edges.CurveEdgeOf(space.Edges.OfTriangle(element, side));
            if (c < 0 || space.Mesh.CurveEdges[c].SectionEdge is not (>= 0 and int index))
            {
                continue;
            }

            Drawing.SectionEdge edge = space.Mesh.Section.Edges[index];
            if (edge.Left == Drawing.CrossSection.Outside || edge.Right == Drawing.CrossSection.Outside)
            {
                obstacle[nodes[side]] = true;
                obstacle[nodes[(side + 1) % 3]] = true;
                for (int m = 1; m < space.Order; m++)
                {
                    obstacle[nodes[space.Reference.EdgeNode(side, m)]] = true;
                }
            }
        }
    }

    // The second disc lies over the first in the plane; only the rim, which both share, is near anything.
    private static bool[] InsideOfSecondDisc(FiniteElementSpace space)
    {
        var outside = new bool[space.NodeCount];
        Array.Fill(outside, true);
        for (int e = 0; e < space.ElementCount; e++)
        {
            if (space.Mesh.Regions[e] != Mesh.Exterior)
            {
                foreach (int node in space.NodesOf(e))
                {
                    outside[node] = false;
                }
            }
        }

        return outside;
    }

    private static List<Point> NearObstacles(FiniteElementSpace space, bool[] obstacle, double[] distance, double reach)
    {
        var near = new List<Point>();
        for (int node = 0; node < space.SkeletonCount; node++)
        {
            if (obstacle[node] && distance[node] <= reach)
            {
                near.Add(space.Places[node]);
            }
        }

        return near;
    }

    private static double NearestDistance(List<Point> places, Point p)
    {
        double best = double.PositiveInfinity;
        foreach (Point q in places)
        {
            best = Math.Min(best, (q - p).SquaredLength);
        }

        return Math.Sqrt(best);
    }

    // Quintic step, twice continuously differentiable.
    private static double SmoothStep(double t)
    {
        t = Math.Clamp(t, 0, 1);
        return t * t * t * (10 + (t * ((6 * t) - 15)));
    }

    private static bool RaiseTouching(
        FiniteElementSpace space, ApertureShape aperture, double inflation, bool[] obstacle, double[] chi)
    {
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            if (space.Mesh.Regions[e] == Mesh.Exterior || !Touches(space, nodes, aperture, inflation))
            {
                continue;
            }

            foreach (int node in nodes)
            {
                if (obstacle[node])
                {
                    return false;
                }

                chi[node] = 1.0;
            }
        }

        return true;
    }

    private static bool Touches(FiniteElementSpace space, ReadOnlySpan<int> nodes, ApertureShape aperture, double inflation)
    {
        Point a = space.Places[nodes[0]];
        Point b = space.Places[nodes[1]];
        Point c = space.Places[nodes[2]];
        double size = Math.Max(a.DistanceTo(b), Math.Max(b.DistanceTo(c), c.DistanceTo(a)));
        if (aperture.DistanceTo(a) > inflation + size)
        {
            return false;
        }

        for (int i = 0; i <= TouchSamples; i++)
        {
            for (int j = 0; j <= TouchSamples - i; j++)
            {
                double u = (double)i / TouchSamples;
                double v = (double)j / TouchSamples;
                if (aperture.DistanceTo(((1 - u - v) * a) + (u * b) + (v * c)) <= inflation)
                {
                    return true;
                }
            }
        }

        foreach (Point p in aperture.Corners)
        {
            if ((b - a).Cross(p - a) >= 0 && (c - b).Cross(p - b) >= 0 && (a - c).Cross(p - c) >= 0)
            {
                return true;
            }
        }

        return false;
    }
}
