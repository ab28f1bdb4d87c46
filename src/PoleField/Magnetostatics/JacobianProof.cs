namespace PoleField.Magnetostatics;

/// <summary>
/// Proof that curved elements do not fold over: det J is a polynomial of degree 2(p − 1), and the smallest of its Bernstein
/// coefficients on a triangle is a lower bound for it there (convex hull; Farin 1986, recalled from memory). Where the bound
/// does not decide, the triangle is cut in four.
/// </summary>
internal sealed class JacobianProof
{
    private const int DeepestCut = 8;

    private readonly FiniteElementSpace _space;
    private readonly (double Xi, double Eta)[] _lattice; // of degree 2(p − 1) over the whole element
    private readonly double[,] _toBernstein;             // coefficients from the values at the lattice
    private readonly double[] _values;
    private readonly double[] _byXi;
    private readonly double[] _byEta;

    public JacobianProof(FiniteElementSpace space)
    {
        _space = space;
        int degree = Math.Max(1, 2 * (space.Order - 1));
        _lattice = Lattice(degree);
        _toBernstein = Inverse(BernsteinAt(_lattice, degree));
        _values = new double[_lattice.Length];
        _byXi = new double[space.Reference.NodeCount];
        _byEta = new double[space.Reference.NodeCount];
    }

    /// <summary>True when det J &gt; 0 all over an element; false when it is not, or so little that it cannot be told.</summary>
    public bool IsPositive(int element) => IsPositive(element, new Piece((0, 0), (1, 0), (0, 1)), 0);

    private bool IsPositive(int element, Piece piece, int depth)
    {
        double least = double.PositiveInfinity;
        for (int k = 0; k < _lattice.Length; k++)
        {
            _values[k] = DeterminantAt(element, piece.At(_lattice[k]));
            least = Math.Min(least, _values[k]);
        }

        if (!(least > 0.0))
        {
            return false;
        }

        return LeastCoefficient() > 0.0
            || (depth < DeepestCut && Array.TrueForAll(piece.Quarters(), q => IsPositive(element, q, depth + 1)));
    }

    private double DeterminantAt(int element, (double Xi, double Eta) at)
    {
        _space.Reference.Gradients(at.Xi, at.Eta, _byXi, _byEta);
        return _space.JacobianAt(element, _byXi, _byEta).Determinant;
    }

    private double LeastCoefficient()
    {
        double least = double.PositiveInfinity;
        for (int i = 0; i < _values.Length; i++)
        {
            double coefficient = 0;
            for (int k = 0; k < _values.Length; k++)
            {
                coefficient += _toBernstein[i, k] * _values[k];
            }

            least = Math.Min(least, coefficient);
        }

        return least;
    }

    private static (double Xi, double Eta)[] Lattice(int degree)
    {
        var lattice = new List<(double, double)>();
        for (int i = 0; i <= degree; i++)
        {
            for (int j = 0; j <= degree - i; j++)
            {
                lattice.Add(((double)i / degree, (double)j / degree));
            }
        }

        return [.. lattice];
    }

    // B_ij = n!/(i! j! k!) ξⁱ ηʲ λᵏ, numbered like the lattice: value of polynomial c at place r at [r, c].
    private static double[,] BernsteinAt((double Xi, double Eta)[] lattice, int degree)
    {
        var values = new double[lattice.Length, lattice.Length];
        for (int r = 0; r < lattice.Length; r++)
        {
            (double xi, double eta) = lattice[r];
            int c = 0;
            for (int i = 0; i <= degree; i++)
            {
                for (int j = 0; j <= degree - i; j++, c++)
                {
                    int k = degree - i - j;
                    values[r, c] = Choose(degree, i) * Choose(degree - i, j)
                        * Math.Pow(xi, i) * Math.Pow(eta, j) * Math.Pow(1 - xi - eta, k);
                }
            }
        }

        return values;
    }

    private static double Choose(int n, int k)
    {
        double result = 1;
        for (int i = 1; i <= k; i++)
        {
            result *= (double)(n - k + i) / i;
        }

        return Math.Round(result);
    }

    // Gauss and Jordan with pivoting; the matrix is small and well conditioned.
    private static double[,] Inverse(double[,] matrix)
    {
        int n = matrix.GetLength(0);
        var inverse = new double[n, n];
        for (int i = 0; i < n; i++)
        {
            inverse[i, i] = 1;
        }

        for (int column = 0; column < n; column++)
        {
            int pivot = Enumerable.Range(column, n - column).MaxBy(r => Math.Abs(matrix[r, column]));
            for (int k = 0; k < n; k++)
            {
                (matrix[column, k], matrix[pivot, k]) = (matrix[pivot, k], matrix[column, k]);
                (inverse[column, k], inverse[pivot, k]) = (inverse[pivot, k], inverse[column, k]);
            }

            double scale = 1 / matrix[column, column];
            for (int row = 0; row < n; row++)
            {
                double factor = matrix[row, column] * scale;
                for (int k = 0; row != column && k < n; k++)
                {
                    matrix[row, k] -= factor * matrix[column, k];
                    inverse[row, k] -= factor * inverse[column, k];
                }
            }

            for (int k = 0; k < n; k++)
            {
                matrix[column, k] *= scale;
                inverse[column, k] *= scale;
            }
        }

        return inverse;
    }

    /// <summary>A triangle of reference places.</summary>
    private readonly record struct Piece((double Xi, double Eta) A, (double Xi, double Eta) B, (double Xi, double Eta) C)
    {
        public (double Xi, double Eta) At((double Xi, double Eta) p) => (
            A.Xi + (p.Xi * (B.Xi - A.Xi)) + (p.Eta * (C.Xi - A.Xi)),
            A.Eta + (p.Xi * (B.Eta - A.Eta)) + (p.Eta * (C.Eta - A.Eta)));

        public Piece[] Quarters()
        {
            (double, double) ab = At((0.5, 0)), bc = At((0.5, 0.5)), ca = At((0, 0.5));
            return [new(A, ab, ca), new(ab, B, bc), new(ca, bc, C), new(bc, ca, ab)];
        }
    }
}
