using System.Numerics;

namespace PoleField.Magnetostatics;

/// <summary>
/// Energy, residual and tangent of a few elements at once, each in a lane of vectors. Holds scratch memory: one kernel per
/// thread.
/// </summary>
internal sealed class ElementKernel
{
    private const double SmallField = 1e-9; // T; below it the tangent is the law's initial one

    private readonly FieldProblem _problem;
    private readonly StiffnessTable _table;
    private readonly ElementLanes _lanes;
    private readonly Vector<double>[] _local;
    private readonly Vector<double>[] _flux;
    private readonly Vector<double>[] _gY;
    private readonly Vector<double>[] _gZ;
    private readonly Vector<double>[] _b;
    private readonly LaneStates _states;

    public ElementKernel(FieldProblem problem)
        : this(problem, new StiffnessTable(new ShapeTable(
            problem.Space.Reference, TriangleQuadrature.Collapsed(problem.Space.Order + 1))))
    {
    }

    private ElementKernel(FieldProblem problem, StiffnessTable table)
    {
        _problem = problem;
        _table = table;
        _lanes = new ElementLanes(problem);
        int nodes = problem.Space.Reference.NodeCount;
        _local = new Vector<double>[nodes];
        _flux = new Vector<double>[table.FluxLength];
        _gY = new Vector<double>[table.Shapes.Count];
        _gZ = new Vector<double>[table.Shapes.Count];
        _b = new Vector<double>[table.Shapes.Count];
        _states = new LaneStates(table.Shapes.Count);
        Packed = new Vector<double>[table.PackedLength];
        Residual = new Vector<double>[nodes];
    }

    /// <summary>Tangents of the last elements, packed lower triangle, row by row.</summary>
    public Vector<double>[] Packed { get; }

    /// <summary>∂W/∂A of the last elements, by local node.</summary>
    public Vector<double>[] Residual { get; }

    /// <summary>∫ w dS − ∫ J A dS of the last elements, J/m.</summary>
    public Vector<double> Energy { get; private set; }

    /// <summary>∫ H·B dS of the last elements, J/m: the scale of Newton's decrement.</summary>
    public Vector<double> FieldProduct { get; private set; }

    /// <summary>Another kernel with its own scratch memory.</summary>
    public ElementKernel Twin() => new(_problem, _table);

    /// <summary>Evaluates elements at a potential; <paramref name="withTangent"/> fills <see cref="Packed"/>.</summary>
    /// <param name="elements">At most <see cref="Lanes.Count"/> elements; lanes left over repeat the last.</param>
    /// <param name="potential">A by node, T·m.</param>
    /// <param name="background">A of the background by node, subtracted in the second disc.</param>
    /// <param name="withTangent">Fill <see cref="Packed"/>.</param>
    public void Evaluate(
        ReadOnlySpan<int> elements, ReadOnlySpan<double> potential, ReadOnlySpan<double> background, bool withTangent)
    {
        _lanes.Load(elements);
        _lanes.Gather(potential, background, _local);
        if (_lanes.AreConstant)
        {
            EvaluateConstant();
        }
        else
        {
            EvaluateByPoints(withTangent);
        }

        if (_lanes.HaveCurrent)
        {
            SubtractCurrent();
        }
    }

    /// <summary>Fills <see cref="Packed"/> with the tangent of materials of one reluctivity each, whatever the solution.</summary>
    /// <param name="elements">Elements, as for <see cref="Evaluate"/>.</param>
    /// <param name="reluctivity">Reluctivity, m/H; null for the laws' initial ones.</param>
    public void EvaluateLinear(ReadOnlySpan<int> elements, double? reluctivity)
    {
        _lanes.Load(elements);
        Vector<double> nu = reluctivity is { } given ? new Vector<double>(given) : _lanes.InitialReluctivity;
        if (_lanes.AreStraight)
        {
            FillConstant(nu);
            return;
        }

        ShapeTable shapes = _table.Shapes;
        for (int q = 0; q < shapes.Count; q++)
        {
            LaneJacobian j = _lanes.JacobianAt(shapes.XiRow(q), shapes.EtaRow(q));
            (Vector<double> xx, Vector<double> xe, Vector<double> ee) = j.Pull(new Vector<double>(shapes.Quadrature.Weights[q]) * nu);
            _table.SetFlux(_flux, q, xx, xe, ee);
        }

        _table.Multiply(_flux, Packed);
    }

    private void EvaluateConstant()
    {
        FillConstant(_lanes.InitialReluctivity);
        Array.Clear(Residual);
        int k = 0;
        Vector<double> product = default;
        for (int i = 0; i < Residual.Length; i++)
        {
            Vector<double> x = _local[i], sum = Residual[i];
            for (int j = 0; j < i; j++, k++)
            {
                sum = Vector.MultiplyAddEstimate(Packed[k], _local[j], sum);
                Residual[j] = Vector.MultiplyAddEstimate(Packed[k], x, Residual[j]);
            }

            Residual[i] = Vector.MultiplyAddEstimate(Packed[k++], x, sum);
        }

        for (int i = 0; i < Residual.Length; i++)
        {
            product = Vector.MultiplyAddEstimate(Residual[i], _local[i], product);
        }

        FieldProduct = product;
        Energy = new Vector<double>(0.5) * product;
    }

    private void FillConstant(Vector<double> reluctivity)
    {
        (Vector<double> xx, Vector<double> xe, Vector<double> ee) = _lanes.StraightJacobian.Pull(reluctivity);
        for (int k = 0; k < Packed.Length; k++)
        {
            Packed[k] = (xx * new Vector<double>(_table.XiXi[k]))
                + (xe * new Vector<double>(_table.XiEta[k])) + (ee * new Vector<double>(_table.EtaEta[k]));
        }
    }

    private void EvaluateByPoints(bool withTangent)
    {
        FindField();
        _lanes.At(_b, _states);
        Array.Clear(Residual);
        Energy = default;
        FieldProduct = default;
        for (int q = 0; q < _table.Shapes.Count; q++)
        {
            AddPoint(q, withTangent);
        }

        if (withTangent)
        {
            _table.Multiply(_flux, Packed);
        }
    }

    // ∇A less the remanence turned by a right angle, and its size, at all points.
    private void FindField()
    {
        ShapeTable shapes = _table.Shapes;
        for (int q = 0; q < shapes.Count; q++)
        {
            ReadOnlySpan<double> xi = shapes.XiRow(q), eta = shapes.EtaRow(q);
            ReadOnlySpan<Vector<double>> local = _local.AsSpan(0, xi.Length);
            Vector<double> byXi = default, byEta = default;
            for (int i = 0; i < xi.Length; i++)
            {
                byXi = Vector.MultiplyAddEstimate(local[i], new Vector<double>(xi[i]), byXi);
                byEta = Vector.MultiplyAddEstimate(local[i], new Vector<double>(eta[i]), byEta);
            }

            (Vector<double> y, Vector<double> z) = _lanes.JacobianAt(xi, eta).Gradient(byXi, byEta);
            y -= _lanes.RemanentY;
            z -= _lanes.RemanentZ;
            _gY[q] = y;
            _gZ[q] = z;
            _b[q] = Vector.SquareRoot((y * y) + (z * z));
        }
    }

    private void AddPoint(int q, bool withTangent)
    {
        ShapeTable shapes = _table.Shapes;
        ReadOnlySpan<double> xi = shapes.XiRow(q), eta = shapes.EtaRow(q);
        LaneJacobian j = _lanes.JacobianAt(xi, eta);
        Vector<double> b = _b[q], gY = _gY[q], gZ = _gZ[q], h = _states.FieldStrength[q];
        Vector<long> small = Vector.LessThan(b, new Vector<double>(SmallField));
        Vector<double> nu = Vector.ConditionalSelect(small, _lanes.InitialReluctivity, h / b);
        var weight = new Vector<double>(shapes.Quadrature.Weights[q]);
        Vector<double> area = weight * j.Determinant;
        Energy += area * _states.Energy[q];
        FieldProduct += area * h * b;
        (Vector<double> hXi, Vector<double> hEta) = j.Pull(weight * nu * gY, weight * nu * gZ);
        Span<Vector<double>> residual = Residual.AsSpan(0, xi.Length);
        for (int i = 0; i < xi.Length; i++)
        {
            residual[i] = Vector.MultiplyAddEstimate(
                hXi, new Vector<double>(xi[i]), Vector.MultiplyAddEstimate(hEta, new Vector<double>(eta[i]), residual[i]));
        }

        if (withTangent)
        {
            Vector<double> excess = Vector.ConditionalSelect(small, Vector<double>.Zero, (_states.Slope[q] - nu) / (b * b));
            (Vector<double> xx, Vector<double> xe, Vector<double> ee) = j.Pull(weight * nu, weight * excess, gY, gZ);
            _table.SetFlux(_flux, q, xx, xe, ee);
        }
    }

    private void SubtractCurrent()
    {
        ShapeTable shapes = _table.Shapes;
        for (int q = 0; q < shapes.Count; q++)
        {
            ReadOnlySpan<double> values = shapes.ValueRow(q);
            Vector<double> w = new Vector<double>(shapes.Quadrature.Weights[q]) * _lanes.CurrentDensity
                * _lanes.JacobianAt(shapes.XiRow(q), shapes.EtaRow(q)).Determinant;
            for (int i = 0; i < values.Length; i++)
            {
                Vector<double> share = w * new Vector<double>(values[i]);
                Residual[i] -= share;
                Energy -= share * _local[i];
            }
        }
    }
}
