using PoleField.Geometry;
using PoleField.Materials;

namespace PoleField.Magnetostatics;

/// <summary>
/// One element's energy, residual and tangent. Holds scratch memory: one kernel per thread.
/// </summary>
internal sealed class ElementKernel
{
    private const double SmallField = 1e-9; // T; below it the tangent is the law's initial one

    private readonly FieldProblem _problem;
    private readonly PackedTable _fine;
    private readonly (double[] XiXi, double[] XiEta, double[] EtaEta) _constant;
    private readonly double[] _local;

    public ElementKernel(FieldProblem problem)
    {
        _problem = problem;
        int p = problem.Space.Order;
        _fine = new PackedTable(new ShapeTable(problem.Space.Reference, TriangleQuadrature.Collapsed(p + 1)));
        _constant = _fine.Integrated();
        _local = new double[NodeCount];
        Packed = new double[_fine.Stride];
        Residual = new double[NodeCount];
    }

    private ElementKernel(ElementKernel other)
    {
        _problem = other._problem;
        _fine = other._fine;
        _constant = other._constant;
        _local = new double[NodeCount];
        Packed = new double[_fine.Stride];
        Residual = new double[NodeCount];
    }

    /// <summary>Tangent of the last element, packed lower triangle, row by row.</summary>
    public double[] Packed { get; }

    /// <summary>∂W/∂A of the last element, by local node.</summary>
    public double[] Residual { get; }

    /// <summary>∫ w dS − ∫ J A dS of the last element, J/m.</summary>
    public double Energy { get; private set; }

    /// <summary>∫ H·B dS of the last element, J/m: the scale of Newton's decrement.</summary>
    public double FieldProduct { get; private set; }

    private int NodeCount => _problem.Space.Reference.NodeCount;

    /// <summary>Another kernel with its own scratch memory.</summary>
    public ElementKernel Twin() => new(this);

    /// <summary>Evaluates an element at a potential; <paramref name="withTangent"/> fills <see cref="Packed"/>.</summary>
    /// <param name="element">Element.</param>
    /// <param name="potential">A by node, T·m.</param>
    /// <param name="background">A of the background by node, subtracted in the second disc.</param>
    /// <param name="withTangent">Fill <see cref="Packed"/>.</param>
    public void Evaluate(int element, ReadOnlySpan<double> potential, ReadOnlySpan<double> background, bool withTangent)
    {
        FiniteElementSpace space = _problem.Space;
        ReadOnlySpan<int> nodes = space.NodesOf(element);
        bool exterior = space.Mesh.Regions[element] == Meshing.Mesh.Exterior;
        for (int i = 0; i < nodes.Length; i++)
        {
            _local[i] = potential[nodes[i]] - (exterior && !background.IsEmpty ? background[nodes[i]] : 0.0);
        }

        ref readonly RegionPhysics physics = ref _problem.PhysicsOf(element);
        if (physics.IsLinear && !space.IsCurved[element] && physics.RemanentGradient == default)
        {
            EvaluateConstant(element, physics);
        }
        else
        {
            EvaluateByPoints(element, physics, withTangent);
        }

        if (physics.CurrentDensity != 0.0)
        {
            SubtractCurrent(element, physics.CurrentDensity);
        }
    }

    /// <summary>Fills <see cref="Packed"/> with the tangent of a material given by its reluctivity, whatever the solution.</summary>
    public void EvaluateLinear(int element, double reluctivity)
    {
        Array.Clear(Packed);
        FiniteElementSpace space = _problem.Space;
        ShapeTable table = _fine.Shapes;
        if (!space.IsCurved[element])
        {
            FillConstant(space.JacobianAt(element, default, default), reluctivity);
            return;
        }

        for (int q = 0; q < table.Count; q++)
        {
            Jacobian j = space.JacobianAt(element, table.XiRow(q), table.EtaRow(q));
            (double xx, double xe, double ee) = PullTensor(j, reluctivity, 0, default);
            double w = table.Quadrature.Weights[q];
            _fine.Accumulate(q, w * xx, w * xe, w * ee, Packed);
        }
    }

    private void EvaluateConstant(int element, in RegionPhysics physics)
    {
        FillConstant(_problem.Space.JacobianAt(element, default, default), physics.Law.InitialReluctivity);
        MultiplyPacked(Packed, _local, Residual);
        double product = 0;
        for (int i = 0; i < Residual.Length; i++)
        {
            product += Residual[i] * _local[i];
        }

        FieldProduct = product;
        Energy = 0.5 * product;
    }

    private void FillConstant(Jacobian j, double reluctivity)
    {
        (double xx, double xe, double ee) = PullTensor(j, reluctivity, 0, default);
        for (int k = 0; k < Packed.Length; k++)
        {
            Packed[k] = (xx * _constant.XiXi[k]) + (xe * _constant.XiEta[k]) + (ee * _constant.EtaEta[k]);
        }
    }

    private void EvaluateByPoints(int element, in RegionPhysics physics, bool withTangent)
    {
        Array.Clear(Packed);
        Array.Clear(Residual);
        FieldProduct = 0;
        Energy = 0;
        FiniteElementSpace space = _problem.Space;
        ShapeTable table = _fine.Shapes;
        Jacobian j = space.IsCurved[element] ? default : space.JacobianAt(element, default, default);
        for (int q = 0; q < table.Count; q++)
        {
            ReadOnlySpan<double> xi = table.XiRow(q);
            ReadOnlySpan<double> eta = table.EtaRow(q);
            if (space.IsCurved[element])
            {
                j = space.JacobianAt(element, xi, eta);
            }

            double byXi = 0, byEta = 0;
            for (int i = 0; i < _local.Length; i++)
            {
                byXi += _local[i] * xi[i];
                byEta += _local[i] * eta[i];
            }

            Point g = j.Gradient(byXi, byEta) - physics.RemanentGradient;
            double b = g.Length;
            MagneticState state = physics.Law.At(b);
            double nu = b > SmallField ? state.FieldStrength / b : physics.Law.InitialReluctivity;
            double weight = table.Quadrature.Weights[q];
            double area = weight * j.Determinant;
            Energy += area * state.Energy;
            FieldProduct += area * state.FieldStrength * b;
            (double hXi, double hEta) = j.Pull(nu * g);
            for (int i = 0; i < Residual.Length; i++)
            {
                Residual[i] += weight * ((hXi * xi[i]) + (hEta * eta[i]));
            }

            if (withTangent)
            {
                double excess = b > SmallField ? (state.Slope - nu) / (b * b) : 0.0;
                (double xx, double xe, double ee) = PullTensor(j, nu, excess, g);
                _fine.Accumulate(q, weight * xx, weight * xe, weight * ee, Packed);
            }
        }
    }

    private void SubtractCurrent(int element, double density)
    {
        FiniteElementSpace space = _problem.Space;
        ShapeTable table = _fine.Shapes;
        double determinant = space.IsCurved[element] ? 0 : space.JacobianAt(element, default, default).Determinant;
        for (int q = 0; q < table.Count; q++)
        {
            ReadOnlySpan<double> values = table.ValueRow(q);
            if (space.IsCurved[element])
            {
                determinant = space.JacobianAt(element, table.XiRow(q), table.EtaRow(q)).Determinant;
            }

            double w = table.Quadrature.Weights[q] * determinant * density;
            for (int i = 0; i < values.Length; i++)
            {
                Residual[i] -= w * values[i];
                Energy -= w * values[i] * _local[i];
            }
        }
    }

    // det·J⁻¹ D J⁻ᵀ for D = ν I + excess g gᵀ.
    private static (double XX, double XE, double EE) PullTensor(Jacobian j, double nu, double excess, Point g)
    {
        double inverse = 1.0 / j.Determinant;
        double xx = nu * j.ByEta.SquaredLength;
        double xe = -nu * j.ByEta.Dot(j.ByXi);
        double ee = nu * j.ByXi.SquaredLength;
        if (excess != 0.0)
        {
            (double gXi, double gEta) = j.Pull(g);
            xx += excess * gXi * gXi;
            xe += excess * gXi * gEta;
            ee += excess * gEta * gEta;
        }

        return (inverse * xx, inverse * xe, inverse * ee);
    }

    private static void MultiplyPacked(ReadOnlySpan<double> packed, ReadOnlySpan<double> x, Span<double> y)
    {
        y.Clear();
        int k = 0;
        for (int i = 0; i < x.Length; i++)
        {
            double sum = 0;
            for (int j = 0; j < i; j++, k++)
            {
                sum += packed[k] * x[j];
                y[j] += packed[k] * x[i];
            }

            y[i] += sum + (packed[k++] * x[i]);
        }
    }
}
