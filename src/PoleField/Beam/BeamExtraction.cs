using System.Numerics;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Beam;

/// <summary>
/// The extraction of derivatives of a harmonic potential by weighted integrals over a band of air (Babuška and Miller 1984,
/// recalled from memory), once integrated by parts with the cut-off replaced by its finite-element interpolant χ:
/// F⁽ⁿ⁾(ζ₀) = ∫ [Dₙ ∇A·∇χ − A (∂yχ + i ∂zχ) Eₙ] dS with d = ζ − ζ₀, Dₙ = −(n−1)!/(2π dⁿ), Eₙ = n!/(2π dⁿ⁺¹),
/// an identity for every continuous χ that is 1 around ζ₀ and 0 where A is not harmonic.
/// </summary>
internal sealed class BeamExtraction
{
    private const int ExtraPoints = 4; // quadrature points per direction beyond the order

    private readonly FiniteElementSpace _space;
    private readonly ShapeTable _table;
    private readonly int[] _elements;        // elements of the band
    private readonly double[] _y;            // place of point q of band element k at [k·Q + q]
    private readonly double[] _z;
    private readonly double[] _chiY;         // weight·∂yχ there
    private readonly double[] _chiZ;

    private BeamExtraction(FiniteElementSpace space, ShapeTable table, int[] elements, double[] chi)
    {
        _space = space;
        _table = table;
        _elements = elements;
        int points = elements.Length * table.Count;
        (_y, _z, _chiY, _chiZ) = (new double[points], new double[points], new double[points], new double[points]);
        FillPoints(chi);
    }

    /// <summary>Makes the extraction of a space with the nodal cut-off <paramref name="chi"/>.</summary>
    public static BeamExtraction Create(FiniteElementSpace space, double[] chi)
    {
        var band = new List<int>();
        for (int e = 0; e < space.ElementCount; e++)
        {
            ReadOnlySpan<int> nodes = space.NodesOf(e);
            double first = chi[nodes[0]];
            foreach (int node in nodes)
            {
                if (chi[node] != first)
                {
                    band.Add(e);
                    break;
                }
            }
        }

        var table = new ShapeTable(space.Reference, TriangleQuadrature.Collapsed(space.Order + ExtraPoints));
        return new BeamExtraction(space, table, [.. band], chi);
    }

    /// <summary>The beam's field of a potential given by node.</summary>
    public BeamField FieldOf(Aperture aperture, double[] potential)
    {
        var charge = new double[_y.Length];
        var dipoleY = new double[_y.Length];
        var dipoleZ = new double[_y.Length];
        for (int k = 0; k < _elements.Length; k++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[k]);
            for (int q = 0; q < _table.Count; q++)
            {
                int at = (k * _table.Count) + q;
                ReadOnlySpan<double> values = _table.ValueRow(q);
                ReadOnlySpan<double> xi = _table.XiRow(q);
                ReadOnlySpan<double> eta = _table.EtaRow(q);
                double a = 0, byXi = 0, byEta = 0;
                for (int i = 0; i < nodes.Length; i++)
                {
                    double v = potential[nodes[i]];
                    a += values[i] * v;
                    byXi += xi[i] * v;
                    byEta += eta[i] * v;
                }

                Point gradient = _space.JacobianAt(_elements[k], xi, eta).Gradient(byXi, byEta);
                charge[at] = (gradient.Y * _chiY[at]) + (gradient.Z * _chiZ[at]);
                dipoleY[at] = a * _chiY[at];
                dipoleZ[at] = a * _chiZ[at];
            }
        }

        return new BeamField(aperture, _y, _z, charge, dipoleY, dipoleZ);
    }

    /// <summary>Derivative by the nodes' potentials of Re(first·F′ + second·F″) at a place.</summary>
    public double[] Functional(Point at, Complex first, Complex second)
    {
        var derivative = new double[_space.NodeCount];
        for (int k = 0; k < _elements.Length; k++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[k]);
            for (int q = 0; q < _table.Count; q++)
            {
                int p = (k * _table.Count) + q;
                Complex inverse = 1.0 / new Complex(_y[p] - at.Y, _z[p] - at.Z);
                var chi = new Complex(_chiY[p], _chiZ[p]);
                Complex onGradient = -((first * inverse) + (second * inverse * inverse)) / Math.Tau;
                Complex onValue = -((first * inverse * inverse) + (2 * second * inverse * inverse * inverse)) * chi / Math.Tau;
                Jacobian j = _space.JacobianAt(_elements[k], _table.XiRow(q), _table.EtaRow(q));
                (double pullXi, double pullEta) = j.Pull(new Point(_chiY[p], _chiZ[p]));
                double scale = onGradient.Real / j.Determinant;
                ReadOnlySpan<double> values = _table.ValueRow(q);
                ReadOnlySpan<double> xi = _table.XiRow(q);
                ReadOnlySpan<double> eta = _table.EtaRow(q);
                for (int i = 0; i < nodes.Length; i++)
                {
                    derivative[nodes[i]] += (scale * ((pullXi * xi[i]) + (pullEta * eta[i]))) + (onValue.Real * values[i]);
                }
            }
        }

        return derivative;
    }

    /// <summary>
    /// Largest error of the quadrature at the given places, relative: the identity applied to A = 1 (must give 0) and to
    /// A = y (must give F′ = 1, F″ = 0), lengths in units of <paramref name="scale"/>.
    /// </summary>
    public double SelfCheck(Aperture aperture, IEnumerable<Point> places, double scale)
    {
        var ones = new double[_space.NodeCount];
        var linear = new double[_space.NodeCount];
        Point origin = aperture.Centre;
        for (int node = 0; node < ones.Length; node++)
        {
            ones[node] = 1.0;
            linear[node] = _space.Places[node].Y - origin.Y;
        }

        BeamField one = FieldOf(aperture, ones);
        BeamField y = FieldOf(aperture, linear);
        double worst = 0;
        foreach (Point p in places)
        {
            BeamValues v = one.At(p);
            worst = Math.Max(worst, scale * Math.Max(Math.Abs(v.By), Math.Abs(v.Bz)));
            worst = Math.Max(worst, scale * scale * Math.Max(Math.Abs(v.DByDz), Math.Abs(v.DBzDz)));
            v = y.At(p);
            worst = Math.Max(worst, Math.Max(Math.Abs(v.By), Math.Abs(v.Bz + 1)));
            worst = Math.Max(worst, scale * Math.Max(Math.Abs(v.DByDz), Math.Abs(v.DBzDz)));
        }

        return worst;
    }

    private void FillPoints(double[] chi)
    {
        for (int k = 0; k < _elements.Length; k++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[k]);
            for (int q = 0; q < _table.Count; q++)
            {
                ReadOnlySpan<double> xi = _table.XiRow(q);
                ReadOnlySpan<double> eta = _table.EtaRow(q);
                double byXi = 0, byEta = 0;
                for (int i = 0; i < nodes.Length; i++)
                {
                    byXi += xi[i] * chi[nodes[i]];
                    byEta += eta[i] * chi[nodes[i]];
                }

                Jacobian j = _space.JacobianAt(_elements[k], xi, eta);
                double weight = _table.Quadrature.Weights[q] * j.Determinant;
                Point gradient = j.Gradient(byXi, byEta);
                Point place = _space.PlaceAt(_elements[k], _table.ValueRow(q));
                int at = (k * _table.Count) + q;
                (_y[at], _z[at]) = (place.Y, place.Z);
                (_chiY[at], _chiZ[at]) = (weight * gradient.Y, weight * gradient.Z);
            }
        }
    }
}
