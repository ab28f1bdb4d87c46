using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace PoleField.Numerics;

/// <summary>
/// Dense arithmetic on tiles of 8 × 8. A <em>slab</em> is eight rows of a matrix, stored column after column; so eight
/// rows of A and eight rows of B are streams of eight numbers a step, and C −= A Bᵀ needs no packing. A tile is 64 numbers
/// (row i, column j at [8 j + i]).
/// </summary>
/// <remarks>
/// Register blocking after Goto and van de Geijn, ACM Trans. Math. Softw. 34 (2008) 12, recalled from memory. The 512-bit and
/// the 256-bit form add in the same order; without fused multiply-add the 256-bit form rounds twice.
/// </remarks>
internal static unsafe class FrontKernels
{
    /// <summary>Rows of a slab, rows and columns of a tile.</summary>
    public const int Slab = 8;

    /// <summary>Numbers in a tile.</summary>
    public const int Tile = Slab * Slab;

    // Numbers in a 256-bit vector.
    private const int Half = 4;

    /// <summary>tile −= A Bᵀ over <paramref name="depth"/> columns, for the first <paramref name="columns"/> columns of the tile.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    public static void Subtract(double* tile, double* a, double* b, int depth, int columns = Slab)
    {
        if (Vector512.IsHardwareAccelerated && columns == Slab)
        {
            Subtract512(tile, a, b, depth);
            return;
        }

        Subtract256(tile, a, b, depth, Math.Min(columns, Half));
        if (columns > Half)
        {
            Subtract256(tile + (Half * Slab), a, b + Half, depth, columns - Half);
        }
    }

    /// <summary>As <see cref="Subtract"/> with vectors of eight.</summary>
    public static void Subtract512(double* tile, double* a, double* b, int depth)
    {
        Vector512<double> c0 = Vector512.Load(tile), c1 = Vector512.Load(tile + 8), c2 = Vector512.Load(tile + 16);
        Vector512<double> c3 = Vector512.Load(tile + 24), c4 = Vector512.Load(tile + 32), c5 = Vector512.Load(tile + 40);
        Vector512<double> c6 = Vector512.Load(tile + 48), c7 = Vector512.Load(tile + 56);
        for (double* end = a + ((nint)depth * Slab); a != end; a += Slab, b += Slab)
        {
            Vector512<double> x = -Vector512.Load(a);
            c0 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[0]), c0);
            c1 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[1]), c1);
            c2 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[2]), c2);
            c3 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[3]), c3);
            c4 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[4]), c4);
            c5 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[5]), c5);
            c6 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[6]), c6);
            c7 = Vector512.MultiplyAddEstimate(x, Vector512.Create(b[7]), c7);
        }

        c0.Store(tile);
        c1.Store(tile + 8);
        c2.Store(tile + 16);
        c3.Store(tile + 24);
        c4.Store(tile + 32);
        c5.Store(tile + 40);
        c6.Store(tile + 48);
        c7.Store(tile + 56);
    }

    /// <summary>The left or right half of a tile with vectors of four; only the first <paramref name="columns"/> are stored.</summary>
    public static void Subtract256(double* tile, double* a, double* b, int depth, int columns)
    {
        Vector256<double> l0 = default, l1 = default, l2 = default, l3 = default;
        Vector256<double> h0 = default, h1 = default, h2 = default, h3 = default;
        for (double* end = a + ((nint)depth * Slab); a != end; a += Slab, b += Slab)
        {
            Vector256<double> low = Vector256.Load(a), high = Vector256.Load(a + Half);
            Vector256<double> y = Vector256.Create(b[0]);
            l0 = Vector256.MultiplyAddEstimate(low, y, l0);
            h0 = Vector256.MultiplyAddEstimate(high, y, h0);
            y = Vector256.Create(b[1]);
            l1 = Vector256.MultiplyAddEstimate(low, y, l1);
            h1 = Vector256.MultiplyAddEstimate(high, y, h1);
            y = Vector256.Create(b[2]);
            l2 = Vector256.MultiplyAddEstimate(low, y, l2);
            h2 = Vector256.MultiplyAddEstimate(high, y, h2);
            y = Vector256.Create(b[3]);
            l3 = Vector256.MultiplyAddEstimate(low, y, l3);
            h3 = Vector256.MultiplyAddEstimate(high, y, h3);
        }

        Take(tile, l0, h0);
        if (columns > 1)
        {
            Take(tile + 8, l1, h1);
        }

        if (columns > 2)
        {
            Take(tile + 16, l2, h2);
        }

        if (columns > 3)
        {
            Take(tile + 24, l3, h3);
        }
    }

    /// <summary>
    /// Cholesky factor of the leading <paramref name="size"/> rows and columns of a tile, in place (lower triangle, the rest
    /// becomes zero); <paramref name="inverse"/> receives one over its diagonal.
    /// </summary>
    /// <returns>The first column whose pivot is not a positive number, its pivot left in place; −1 when there is none.</returns>
    public static int Factor(double* tile, int size, double* inverse)
    {
        for (int j = 0; j < size; j++)
        {
            double* column = tile + (j * Slab);
            double pivot = column[j];
            if (!(pivot > 0.0) || double.IsPositiveInfinity(pivot))
            {
                return j;
            }

            double root = Math.Sqrt(pivot);
            inverse[j] = 1.0 / root;
            Vector256<double> scale = Vector256.Create(inverse[j]);
            Vector256<double> low = Vector256.Load(column) * scale, high = Vector256.Load(column + Half) * scale;
            low.Store(column);
            high.Store(column + Half);
            column[j] = root;
            for (int i = 0; i < j; i++)
            {
                column[i] = 0.0;
            }

            for (int k = j + 1; k < size; k++)
            {
                Vector256<double> factor = Vector256.Create(-column[k]);
                double* other = tile + (k * Slab);
                Vector256.MultiplyAddEstimate(low, factor, Vector256.Load(other)).Store(other);
                Vector256.MultiplyAddEstimate(high, factor, Vector256.Load(other + Half)).Store(other + Half);
            }
        }

        return -1;
    }

    /// <summary>tile = tile · L⁻ᵀ for the factor of a diagonal tile and one over its diagonal.</summary>
    public static void SolveRight(double* tile, double* factor, double* inverse, int size)
    {
        if (size == Slab)
        {
            SolveRight(tile, factor, inverse);
            SolveRight(tile + Half, factor, inverse);
            return;
        }

        for (int j = 0; j < size; j++)
        {
            double* column = tile + (j * Slab);
            Vector256<double> low = Vector256.Load(column), high = Vector256.Load(column + Half);
            for (int k = 0; k < j; k++)
            {
                Vector256<double> y = Vector256.Create(-factor[(k * Slab) + j]);
                low = Vector256.MultiplyAddEstimate(Vector256.Load(tile + (k * Slab)), y, low);
                high = Vector256.MultiplyAddEstimate(Vector256.Load(tile + (k * Slab) + Half), y, high);
            }

            Vector256<double> scale = Vector256.Create(inverse[j]);
            (low * scale).Store(column);
            (high * scale).Store(column + Half);
        }
    }

    private static void SolveRight(double* tile, double* factor, double* inverse)
    {
        Vector256<double> x0 = Vector256.Load(tile) * Vector256.Create(inverse[0]);
        x0.Store(tile);
        Vector256<double> x1 = Minus(Vector256.Load(tile + 8), x0, factor[1]) * Vector256.Create(inverse[1]);
        x1.Store(tile + 8);
        Vector256<double> x2 = Minus(Minus(Vector256.Load(tile + 16), x0, factor[2]), x1, factor[10]);
        x2 *= Vector256.Create(inverse[2]);
        x2.Store(tile + 16);
        Vector256<double> x3 = Minus(Minus(Vector256.Load(tile + 24), x0, factor[3]), x1, factor[11]);
        x3 = Minus(x3, x2, factor[19]) * Vector256.Create(inverse[3]);
        x3.Store(tile + 24);
        Vector256<double> x4 = Minus(Minus(Vector256.Load(tile + 32), x0, factor[4]), x1, factor[12]);
        x4 = Minus(Minus(x4, x2, factor[20]), x3, factor[28]) * Vector256.Create(inverse[4]);
        x4.Store(tile + 32);
        Vector256<double> x5 = Minus(Minus(Vector256.Load(tile + 40), x0, factor[5]), x1, factor[13]);
        x5 = Minus(Minus(Minus(x5, x2, factor[21]), x3, factor[29]), x4, factor[37]) * Vector256.Create(inverse[5]);
        x5.Store(tile + 40);
        Vector256<double> x6 = Minus(Minus(Vector256.Load(tile + 48), x0, factor[6]), x1, factor[14]);
        x6 = Minus(Minus(Minus(Minus(x6, x2, factor[22]), x3, factor[30]), x4, factor[38]), x5, factor[46]);
        x6 *= Vector256.Create(inverse[6]);
        x6.Store(tile + 48);
        Vector256<double> x7 = Minus(Minus(Vector256.Load(tile + 56), x0, factor[7]), x1, factor[15]);
        x7 = Minus(Minus(Minus(Minus(x7, x2, factor[23]), x3, factor[31]), x4, factor[39]), x5, factor[47]);
        x7 = Minus(x7, x6, factor[55]) * Vector256.Create(inverse[7]);
        x7.Store(tile + 56);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Vector256<double> Minus(Vector256<double> from, Vector256<double> x, double factor) =>
        Vector256.MultiplyAddEstimate(x, Vector256.Create(-factor), from);

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Take(double* column, Vector256<double> low, Vector256<double> high)
    {
        (Vector256.Load(column) - low).Store(column);
        (Vector256.Load(column + Half) - high).Store(column + Half);
    }
}
