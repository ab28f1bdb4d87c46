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
internal sealed class BeamExtraction : IBeamExtraction
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

    /// <inheritdoc/>
    public FiniteElementSpace Space => _space;

    /// <inheritdoc/>
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

        return new BeamField(aperture, new BandSources(_y, _z, charge, dipoleY, dipoleZ).At, BeamFieldMethod.HarmonicBand);
    }

    /// <inheritdoc/>
    public double[] Functional(IReadOnlyList<BeamTerm> terms)
    {
        var derivative = new double[_space.NodeCount];
        for (int k = 0; k < _elements.Length; k++)
        {
            ReadOnlySpan<int> nodes = _space.NodesOf(_elements[k]);
            for (int q = 0; q < _table.Count; q++)
            {
                int p = (k * _table.Count) + q;
                Complex onGradient = 0;
                Complex onValue = 0;
                foreach (BeamTerm term in terms)
                {
                    Complex inverse = 1.0 / new Complex(_y[p] - term.At.Y, _z[p] - term.At.Z);
                    Complex square = inverse * inverse;
                    onGradient -= (term.First * inverse) + (term.Second * square);
                    onValue -= (term.First * square) + (2 * term.Second * square * inverse);
                }

                double onPotential = (onValue * new Complex(_chiY[p], _chiZ[p])).Real / Math.Tau;
                Jacobian j = _space.JacobianAt(_elements[k], _table.XiRow(q), _table.EtaRow(q));
                (double pullXi, double pullEta) = j.Pull(new Point(_chiY[p], _chiZ[p]));
                double scale = onGradient.Real / (Math.Tau * j.Determinant);
                ReadOnlySpan<double> values = _table.ValueRow(q);
                ReadOnlySpan<double> xi = _table.XiRow(q);
                ReadOnlySpan<double> eta = _table.EtaRow(q);
                for (int i = 0; i < nodes.Length; i++)
                {
                    derivative[nodes[i]] += (scale * ((pullXi * xi[i]) + (pullEta * eta[i]))) + (onPotential * values[i]);
                }
            }
        }

        return derivative;
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
