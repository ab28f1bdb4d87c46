using PoleField.Beam;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>What one parameter of the shape does to the field.</summary>
/// <param name="Potential">Change of A by node, travelling with the node, T·m per unit.</param>
/// <param name="Field">Change of the beam's field at places that stay, exactly harmonic, per unit.</param>
internal sealed record MotionResponse(double[] Potential, BeamField Field);

/// <summary>
/// The derivative of a solved field by motions of its mesh. With V the velocity of places and M = ∇V (Mᵢⱼ = ∂ᵢVⱼ), gradients change by
/// −M∇A and areas by tr M, so that the potential that travels with the nodes changes by
/// ∫ Dh∇Ȧ·∇v = −∫ { [−Dh(M∇A) − Mᵀh + h tr M]·∇v − J (tr M − mean tr M) v } dS.
/// At places that stay, in the air around the beam, it brings F⁽ⁿ⁾ of Ȧ and, from the moving elements in which χ is not 0,
/// ∫ u·∇(χDₙ) with u the bracket of air over ν0.
/// </summary>
/// <remarks>
/// This is the volume form of the shape derivative (Hiptmair, Paganini and Sargheini, BIT 55 (2015) 459, recalled from memory): it needs no
/// traces at faces and is as accurate at sharp corners as the field itself.
/// </remarks>
internal sealed class MotionResponses
{
    private const int ExtraPoints = 4; // quadrature points per direction beyond the order where the extraction's kernels are met

    private readonly FieldSolution _solution;
    private readonly FiniteElementSpace _space;
    private readonly MeshMotion _motion;
    private readonly ShapeTable _table;
    private readonly PointState[] _states; // at point q of element e at [e·Q + q]

    private MotionResponses(FieldSolution solution, MeshMotion motion)
    {
        (_solution, _space, _motion) = (solution, solution.Problem.Space, motion);
        _table = new ShapeTable(_space.Reference, TriangleQuadrature.Collapsed(_space.Order + 1));
        _states = new PointState[_space.ElementCount * _table.Count];
    }

    /// <summary>The responses to every parameter of a motion.</summary>
    /// <param name="linear">The solved field with its factored tangent and extraction.</param>
    /// <param name="motion">Motion of its mesh.</param>
    /// <param name="threads">Threads, at least 1; the result does not depend on it.</param>
    public static MotionResponse[] Of(LinearisedField linear, MeshMotion motion, int threads)
    {
        var responses = new MotionResponses(linear.Solution, motion);
        responses.FillStates();
        var loads = new double[motion.Count][];
        var transports = new BeamField[motion.Count];
        int[] band = responses.ElementsOf(linear.Chi);
        var fine = new ShapeTable(responses._space.Reference, TriangleQuadrature.Collapsed(responses._space.Order + ExtraPoints));
        Parallel.For(0, motion.Count, new ParallelOptions { MaxDegreeOfParallelism = threads }, k =>
        {
            loads[k] = responses.Load(k);
            transports[k] = responses.Transport(k, (linear, band, fine));
        });
        double[][] changes = linear.Tangent.Solve(loads);
        var result = new MotionResponse[motion.Count];
        Parallel.For(0, motion.Count, new ParallelOptions { MaxDegreeOfParallelism = threads }, k =>
            result[k] = new MotionResponse(
                changes[k], linear.Extraction.FieldOf(linear.Field.Aperture, changes[k]).Plus(transports[k])));
        return result;
    }

    private void FillStates()
    {
        for (int e = 0; e < _space.ElementCount; e++)
        {
            ref readonly RegionPhysics physics = ref _solution.Problem.PhysicsOf(e);
            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            for (int q = 0; q < _table.Count; q++)
            {
                ShapeRow row = ShapeRow.Of(_space, e, _table, q);
                Point gradient = row.Gradient(nodes, _solution.Potential);
                Point turned = gradient - physics.RemanentGradient;
                (double reluctivity, double excess) = Tangent.Of(physics.Law, turned.Length);
                _states[(e * _table.Count) + q] = new PointState(row.Jacobian, gradient, turned, reluctivity, excess);
            }
        }
    }

    private double[] Load(int parameter)
    {
        ReadOnlySpan<Point> velocity = _motion.Of(parameter);
        var load = new double[_space.NodeCount];
        double[] spreads = Spreads(velocity);
        for (int e = 0; e < _space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            double current = _solution.Problem.PhysicsOf(e).CurrentDensity;
            double spread = current == 0 ? 0 : spreads[_space.Mesh.Regions[e]];
            if (!Moves(nodes, velocity) && spread == 0)
            {
                continue;
            }

            for (int q = 0; q < _table.Count; q++)
            {
                PointState at = _states[(e * _table.Count) + q];
                ReadOnlySpan<double> values = _table.ValueRow(q);
                var row = new ShapeRow(at.Jacobian, _table.XiRow(q), _table.EtaRow(q));
                Strain m = Strain.Of(nodes, velocity, row);
                double weight = _table.Quadrature.Weights[q];
                (double pullXi, double pullEta) = at.Jacobian.Pull(weight * at.Bracket(m));
                double source = weight * at.Jacobian.Determinant * current * (m.Trace - spread);
                for (int i = 0; i < nodes.Length; i++)
                {
                    load[nodes[i]] -= (pullXi * row.Xi[i]) + (pullEta * row.Eta[i]) - (source * values[i]);
                }
            }
        }

        return load;
    }

    // Mean of tr M over each region that carries current: its ampere-turns stay.
    private double[] Spreads(ReadOnlySpan<Point> velocity)
    {
        var traces = new double[_solution.Problem.Regions.Length];
        var areas = new double[traces.Length];
        for (int e = 0; e < _space.ElementCount; e++)
        {
            if (_solution.Problem.PhysicsOf(e).CurrentDensity == 0)
            {
                continue;
            }

            int region = _space.Mesh.Regions[e];
            for (int q = 0; q < _table.Count; q++)
            {
                Jacobian j = _states[(e * _table.Count) + q].Jacobian;
                double area = _table.Quadrature.Weights[q] * j.Determinant;
                areas[region] += area;
                traces[region] += area * Strain.Of(_space.NodesOf(e), velocity, new ShapeRow(j, _table.XiRow(q), _table.EtaRow(q))).Trace;
            }
        }

        return [.. traces.Select((t, r) => areas[r] > 0 ? t / areas[r] : 0)];
    }

    // Elements in which the cut-off is not zero everywhere.
    private int[] ElementsOf(double[] chi)
    {
        var band = new List<int>();
        for (int e = 0; e < _space.ElementCount; e++)
        {
            foreach (int node in _space.NodesOf(e))
            {
                if (chi[node] != 0)
                {
                    band.Add(e);
                    break;
                }
            }
        }

        return [.. band];
    }

    private BeamField Transport(int parameter, (LinearisedField Linear, int[] Band, ShapeTable Table) of)
    {
        ReadOnlySpan<Point> velocity = _motion.Of(parameter);
        List<double> y = [], z = [], charge = [], dipoleY = [], dipoleZ = [];
        foreach (int e in of.Band)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(e);
            for (int q = 0; q < of.Table.Count && Moves(nodes, velocity); q++)
            {
                ShapeRow row = ShapeRow.Of(_space, e, of.Table, q);
                Point gradient = row.Gradient(nodes, _solution.Potential);
                Point slope = row.Gradient(nodes, of.Linear.Chi);
                Point u = (of.Table.Quadrature.Weights[q] * row.Jacobian.Determinant)
                    * PointState.OfAir(row.Jacobian, gradient).Bracket(Strain.Of(nodes, velocity, row));
                double chi = 0;
                ReadOnlySpan<double> values = of.Table.ValueRow(q);
                for (int i = 0; i < nodes.Length; i++)
                {
                    chi += values[i] * of.Linear.Chi[nodes[i]];
                }

                Point place = _space.PlaceAt(e, values);
                y.Add(place.Y);
                z.Add(place.Z);
                charge.Add(u.Dot(slope));
                dipoleY.Add(-chi * u.Y);
                dipoleZ.Add(-chi * u.Z);
            }
        }

        return new BeamField(
            of.Linear.Field.Aperture, new BandSources([.. y], [.. z], [.. charge], [.. dipoleY], [.. dipoleZ]).At, BeamFieldMethod.HarmonicBand);
    }

    private static bool Moves(ReadOnlySpan<int> nodes, ReadOnlySpan<Point> velocity)
    {
        foreach (int node in nodes)
        {
            if (velocity[node] != default)
            {
                return true;
            }
        }

        return false;
    }
}
