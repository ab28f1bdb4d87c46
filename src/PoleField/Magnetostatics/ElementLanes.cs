using System.Numerics;
using System.Runtime.CompilerServices;
using PoleField.Geometry;
using PoleField.Materials;

namespace PoleField.Magnetostatics;

/// <summary>A few elements side by side: their nodes, shape and physics, each in a lane.</summary>
internal sealed class ElementLanes
{
    private readonly FieldProblem _problem;
    private readonly FiniteElementSpace _space;
    private readonly int[] _elements = new int[Lanes.Count];
    private readonly MagneticLaw[] _laws = new MagneticLaw[Lanes.Count];
    private readonly Vector<double>[] _y;
    private readonly Vector<double>[] _z;
    private bool _oneLaw;

    public ElementLanes(FieldProblem problem)
    {
        _problem = problem;
        _space = problem.Space;
        _y = new Vector<double>[_space.Reference.NodeCount];
        _z = new Vector<double>[_y.Length];
    }

    /// <summary>No element has a curved side.</summary>
    public bool AreStraight { get; private set; }

    /// <summary>No element has a curved side, a law that is not linear or a remanence.</summary>
    public bool AreConstant { get; private set; }

    /// <summary>Some element carries current.</summary>
    public bool HaveCurrent { get; private set; }

    /// <summary>Limits of H/B at B = 0, m/H.</summary>
    public Vector<double> InitialReluctivity { get; private set; }

    /// <summary>Current densities, A/m².</summary>
    public Vector<double> CurrentDensity { get; private set; }

    /// <summary>Remanent gradients, T.</summary>
    public Vector<double> RemanentY { get; private set; }

    /// <summary>Remanent gradients, T.</summary>
    public Vector<double> RemanentZ { get; private set; }

    /// <summary>Jacobians of elements without curved sides.</summary>
    public LaneJacobian StraightJacobian { get; private set; }

    /// <summary>Takes up to <see cref="Lanes.Count"/> elements; lanes left over repeat the last.</summary>
    public void Load(ReadOnlySpan<int> elements)
    {
        Span<double> reluctivity = stackalloc double[Lanes.Count], current = stackalloc double[Lanes.Count];
        Span<double> remanentY = stackalloc double[Lanes.Count], remanentZ = stackalloc double[Lanes.Count];
        bool straight = true, linear = true, remanent = false, carrying = false, oneLaw = true;
        for (int lane = 0; lane < Lanes.Count; lane++)
        {
            int element = elements[Math.Min(lane, elements.Length - 1)];
            _elements[lane] = element;
            ref readonly RegionPhysics physics = ref _problem.PhysicsOf(element);
            _laws[lane] = physics.Law;
            reluctivity[lane] = physics.Law.InitialReluctivity;
            current[lane] = physics.CurrentDensity;
            remanentY[lane] = physics.RemanentGradient.Y;
            remanentZ[lane] = physics.RemanentGradient.Z;
            straight &= !_space.IsCurved[element];
            linear &= physics.IsLinear;
            remanent |= physics.RemanentGradient != default;
            carrying |= physics.CurrentDensity != 0.0;
            oneLaw &= ReferenceEquals(_laws[lane], _laws[0]);
        }

        _oneLaw = oneLaw;
        AreStraight = straight;
        AreConstant = straight && linear && !remanent;
        HaveCurrent = carrying;
        InitialReluctivity = new Vector<double>(reluctivity);
        CurrentDensity = new Vector<double>(current);
        RemanentY = new Vector<double>(remanentY);
        RemanentZ = new Vector<double>(remanentZ);
        LoadPlaces(straight ? 3 : _y.Length);
    }

    /// <summary>Potentials of the elements' nodes, less the background in the second disc.</summary>
    public void Gather(ReadOnlySpan<double> potential, ReadOnlySpan<double> background, Vector<double>[] local)
    {
        Span<double> numbers = Lanes.Numbers(local);
        for (int lane = 0; lane < _elements.Length; lane++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[lane]);
            bool less = !background.IsEmpty && _space.Mesh.Regions[_elements[lane]] == Meshing.Mesh.Exterior;
            for (int i = 0; i < nodes.Length; i++)
            {
                numbers[(i * Lanes.Count) + lane] = potential[nodes[i]] - (less ? background[nodes[i]] : 0.0);
            }
        }
    }

    /// <summary>Jacobians where the shape functions have these derivatives.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public LaneJacobian JacobianAt(ReadOnlySpan<double> byXi, ReadOnlySpan<double> byEta) =>
        AreStraight ? StraightJacobian : CurvedJacobian(byXi, byEta);

    /// <summary>States of the elements' laws at their flux densities in all points.</summary>
    public void At(Vector<double>[] fluxDensity, LaneStates states)
    {
        ReadOnlySpan<double> b = Lanes.Numbers(fluxDensity);
        Span<double> h = Lanes.Numbers(states.FieldStrength), slope = Lanes.Numbers(states.Slope);
        Span<double> energy = Lanes.Numbers(states.Energy);
        if (_oneLaw)
        {
            _laws[0].At(b, h, slope, energy);
            return;
        }

        for (int i = 0; i < b.Length; i++)
        {
            (h[i], slope[i], energy[i]) = _laws[i % Lanes.Count].At(b[i]);
        }
    }

    private LaneJacobian CurvedJacobian(ReadOnlySpan<double> byXi, ReadOnlySpan<double> byEta)
    {
        Vector<double> yXi = default, zXi = default, yEta = default, zEta = default;
        for (int i = 0; i < _y.Length; i++)
        {
            Vector<double> xi = new(byXi[i]), eta = new(byEta[i]);
            yXi = Vector.MultiplyAddEstimate(_y[i], xi, yXi);
            zXi = Vector.MultiplyAddEstimate(_z[i], xi, zXi);
            yEta = Vector.MultiplyAddEstimate(_y[i], eta, yEta);
            zEta = Vector.MultiplyAddEstimate(_z[i], eta, zEta);
        }

        return new LaneJacobian(yXi, zXi, yEta, zEta);
    }

    private void LoadPlaces(int count)
    {
        Span<double> y = Lanes.Numbers(_y), z = Lanes.Numbers(_z);
        for (int lane = 0; lane < _elements.Length; lane++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[lane]);
            for (int i = 0; i < count; i++)
            {
                Point p = _space.Places[nodes[i]];
                y[(i * Lanes.Count) + lane] = p.Y;
                z[(i * Lanes.Count) + lane] = p.Z;
            }
        }

        StraightJacobian = new LaneJacobian(_y[1] - _y[0], _z[1] - _z[0], _y[2] - _y[0], _z[2] - _z[0]);
    }
}
