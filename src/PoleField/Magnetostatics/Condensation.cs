using System.Numerics;
using System.Runtime.InteropServices;

namespace PoleField.Magnetostatics;

/// <summary>
/// Elimination of the unknowns inside each element: K_ii⁻¹ and K_ii⁻¹K_ib are kept, the element's matrix is reduced to its
/// boundary nodes.
/// </summary>
internal sealed class Condensation
{
    private readonly int _interior;
    private readonly int _boundary;
    private readonly double[] _inverse; // K_ii⁻¹ of element e at [e·ni² + ...], row by row
    private readonly double[] _link;    // K_ii⁻¹ K_ib of element e at [e·ni·nb + ...], row by row

    public Condensation(FiniteElementSpace space)
    {
        _interior = space.Reference.InteriorCount;
        _boundary = space.Reference.BoundaryCount;
        _inverse = new double[space.ElementCount * _interior * _interior];
        _link = new double[space.ElementCount * _interior * _boundary];
    }

    private Condensation(Condensation other)
    {
        _interior = other._interior;
        _boundary = other._boundary;
        _inverse = (double[])other._inverse.Clone();
        _link = (double[])other._link.Clone();
    }

    public Condensation Clone() => new(this);

    /// <summary>Reduces packed lower triangles, a lane an element, to their boundary parts, in place at their beginning.</summary>
    public void Reduce(ReadOnlySpan<int> elements, Span<Vector<double>> packed)
    {
        int ni = _interior;
        int nb = _boundary;
        if (ni == 0)
        {
            return;
        }

        Span<Vector<double>> inverse = stackalloc Vector<double>[ni * ni];
        for (int i = 0; i < ni; i++)
        {
            int row = RowStart(nb + i);
            for (int j = 0; j <= i; j++)
            {
                inverse[(i * ni) + j] = packed[row + nb + j];
                inverse[(j * ni) + i] = packed[row + nb + j];
            }
        }

        InvertPositive(inverse, ni);
        Keep(elements, inverse, _inverse);
        Span<Vector<double>> link = stackalloc Vector<double>[ni * nb];
        for (int i = 0; i < ni; i++)
        {
            for (int b = 0; b < nb; b++)
            {
                Vector<double> sum = default;
                for (int k = 0; k < ni; k++)
                {
                    sum += inverse[(i * ni) + k] * packed[RowStart(nb + k) + b];
                }

                link[(i * nb) + b] = sum;
            }
        }

        Keep(elements, link, _link);
        for (int k = 0; k < ni; k++)
        {
            ReadOnlySpan<Vector<double>> inner = packed.Slice(RowStart(nb + k), nb);
            for (int a = 0; a < nb; a++)
            {
                Vector<double> factor = link[(k * nb) + a];
                Span<Vector<double>> row = packed.Slice(RowStart(a), a + 1);
                for (int b = 0; b < row.Length; b++)
                {
                    row[b] -= factor * inner[b];
                }
            }
        }
    }

    /// <summary>Takes an element's interior right side over to its boundary: r_b −= (K_ii⁻¹K_ib)ᵀ r_i.</summary>
    public void ReduceRightSide(int element, ReadOnlySpan<int> nodes, ReadOnlySpan<double> full, Span<double> skeleton)
    {
        for (int i = 0; i < _interior; i++)
        {
            double r = full[nodes[_boundary + i]];
            if (r == 0.0)
            {
                continue;
            }

            ReadOnlySpan<double> link = _link.AsSpan(((element * _interior) + i) * _boundary, _boundary);
            for (int b = 0; b < _boundary; b++)
            {
                skeleton[nodes[b]] -= link[b] * r;
            }
        }
    }

    /// <summary>Interior part of the solution: x_i = K_ii⁻¹ r_i − K_ii⁻¹K_ib x_b.</summary>
    public void Recover(int element, ReadOnlySpan<int> nodes, ReadOnlySpan<double> rightSide, Span<double> solution)
    {
        for (int i = 0; i < _interior; i++)
        {
            double sum = 0;
            for (int k = 0; k < _interior; k++)
            {
                sum += _inverse[(((element * _interior) + i) * _interior) + k] * rightSide[nodes[_boundary + k]];
            }

            ReadOnlySpan<double> link = _link.AsSpan(((element * _interior) + i) * _boundary, _boundary);
            for (int b = 0; b < _boundary; b++)
            {
                sum -= link[b] * solution[nodes[b]];
            }

            solution[nodes[_boundary + i]] = sum;
        }
    }

    private static int RowStart(int row) => row * (row + 1) / 2;

    private static void Keep(ReadOnlySpan<int> elements, Span<Vector<double>> lanes, double[] kept)
    {
        ReadOnlySpan<double> numbers = MemoryMarshal.Cast<Vector<double>, double>(lanes);
        for (int lane = 0; lane < elements.Length; lane++)
        {
            Span<double> own = kept.AsSpan(elements[lane] * lanes.Length, lanes.Length);
            for (int i = 0; i < own.Length; i++)
            {
                own[i] = numbers[(i * Lanes.Count) + lane];
            }
        }
    }

    // Gauss-Jordan without pivoting: the block is symmetric positive definite.
    private static void InvertPositive(Span<Vector<double>> m, int n)
    {
        for (int k = 0; k < n; k++)
        {
            Vector<double> pivot = Vector<double>.One / m[(k * n) + k];
            m[(k * n) + k] = Vector<double>.One;
            for (int j = 0; j < n; j++)
            {
                m[(k * n) + j] *= pivot;
            }

            for (int i = 0; i < n; i++)
            {
                if (i == k)
                {
                    continue;
                }

                Vector<double> factor = m[(i * n) + k];
                m[(i * n) + k] = default;
                for (int j = 0; j < n; j++)
                {
                    m[(i * n) + j] -= factor * m[(k * n) + j];
                }
            }
        }
    }
}
