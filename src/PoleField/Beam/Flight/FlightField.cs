using System.Numerics;
using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>
/// A beam's field over a rectangle as a table: in each cell the polynomial of degree 7 in ζ = y + iz that has the field's value and
/// derivative at the four corners (Hermite). It is a thousand times faster than the sums it is made from, exactly harmonic
/// within a cell, and its error is known: it is measured at the middle of every cell.
/// </summary>
internal sealed class FlightField
{
    private const int Terms = 8;
    private const int FirstCells = 16;       // along the longer side
    private const int MostPlaces = 12_000;   // of the table, each one sum over the band of air
    private const double Wanted = 1e-4;      // of the largest field and derivative: a tenth of what the solve around the beam is held to
    private const double MiddleToWorst = 2;  // |Π(w − corner)|² is largest on the cell's edges, 1.6 times that in a square's middle

    private readonly int _ny;
    private readonly int _nz;
    private readonly double _perY;           // cells per metre
    private readonly double _perZ;
    private readonly double _scale;          // half diagonal of a cell, metres
    private readonly Complex[] _terms;       // term n of cell (i, j) at [((j·ny) + i)·8 + n], powers of (ζ − middle)/scale

    private FlightField(Box room, (int Y, int Z) cells, Complex[] terms)
    {
        Room = room;
        (_ny, _nz) = cells;
        (_perY, _perZ) = (cells.Y / room.Width, cells.Z / room.Height);
        _scale = HalfDiagonal(room, cells);
        _terms = terms;
    }

    /// <summary>Where it holds.</summary>
    public Box Room { get; }

    /// <summary>Error of the table: the larger of field and derivative, each over its largest value in the room.</summary>
    public double Error { get; private init; }

    /// <summary>Tabulates a field, ever finer until the table is right to 1e-4 or large.</summary>
    /// <param name="room">Rectangle of air.</param>
    /// <param name="field">The field in it.</param>
    /// <param name="threads">Processor threads; the table does not depend on it.</param>
    public static FlightField Over(Box room, Func<Point, BeamValues> field, int threads = 1)
    {
        double cell = Math.Max(room.Width, room.Height) / FirstCells;
        while (true)
        {
            (int Y, int Z) cells = (Math.Max(1, (int)Math.Ceiling(room.Width / cell)), Math.Max(1, (int)Math.Ceiling(room.Height / cell)));
            FlightField table = Tabulated(room, cells, field, threads);
            cell *= 0.5;
            if (table.Error <= Wanted || 4.0 * cells.Y * cells.Z > MostPlaces)
            {
                return table;
            }
        }
    }

    /// <summary>Values at a place inside the rectangle.</summary>
    public BeamValues At(Point p)
    {
        int i = Math.Clamp((int)((p.Y - Room.Min.Y) * _perY), 0, _ny - 1);
        int j = Math.Clamp((int)((p.Z - Room.Min.Z) * _perZ), 0, _nz - 1);
        double wy = (p.Y - Room.Min.Y - ((i + 0.5) / _perY)) / _scale;
        double wz = (p.Z - Room.Min.Z - ((j + 0.5) / _perZ)) / _scale;
        ReadOnlySpan<Complex> terms = _terms.AsSpan(((j * _ny) + i) * Terms, Terms);
        (double re, double im) = (terms[Terms - 1].Real, terms[Terms - 1].Imaginary);
        (double slopeRe, double slopeIm) = (0, 0);
        for (int n = Terms - 2; n >= 0; n--)
        {
            (slopeRe, slopeIm) = ((slopeRe * wy) - (slopeIm * wz) + re, (slopeRe * wz) + (slopeIm * wy) + im);
            (re, im) = ((re * wy) - (im * wz) + terms[n].Real, (re * wz) + (im * wy) + terms[n].Imaginary);
        }

        return new BeamValues(p, -im, -re, -slopeRe / _scale, slopeIm / _scale);
    }

    private static FlightField Tabulated(Box room, (int Y, int Z) cells, Func<Point, BeamValues> field, int threads)
    {
        var corners = new BeamValues[(cells.Y + 1) * (cells.Z + 1)];
        var middles = new BeamValues[cells.Y * cells.Z];
        var parallel = new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) };
        Parallel.For(0, corners.Length, parallel, k => corners[k] = field(Place(k % (cells.Y + 1), k / (cells.Y + 1))));
        Parallel.For(0, middles.Length, parallel, k => middles[k] = field(Place((k % cells.Y) + 0.5, (k / cells.Y) + 0.5)));
        var table = new FlightField(room, cells, Fit(room, cells, corners));
        return new FlightField(room, cells, table._terms) { Error = table.ErrorAt(middles, corners) };

        Point Place(double i, double j) => new(room.Min.Y + (room.Width * i / cells.Y), room.Min.Z + (room.Height * j / cells.Z));
    }

    // F′ = −(Bz + i By), F″ = −∂By/∂z + i ∂Bz/∂z.
    private static (Complex Value, Complex Slope) Analytic(BeamValues v) => (new(-v.Bz, -v.By), new(-v.DByDz, v.DBzDz));

    private static double HalfDiagonal(Box room, (int Y, int Z) cells) =>
        0.5 * new Point(room.Width / cells.Y, room.Height / cells.Z).Length;

    private static Complex[] Fit(Box room, (int Y, int Z) cells, BeamValues[] corners)
    {
        double scale = HalfDiagonal(room, cells);
        var corner = new Complex(0.5 * room.Width / cells.Y / scale, 0.5 * room.Height / cells.Z / scale);
        Complex[] at = [-corner, Complex.Conjugate(corner), corner, -Complex.Conjugate(corner)];
        var matrix = MathNet.Numerics.LinearAlgebra.Complex.DenseMatrix.Create(Terms, Terms, (row, n) => row % 2 == 0
            ? Complex.Pow(at[row / 2], n)
            : n == 0 ? 0 : n * Complex.Pow(at[row / 2], n - 1));
        MathNet.Numerics.LinearAlgebra.Matrix<Complex> inverse = matrix.Inverse();
        var terms = new Complex[cells.Y * cells.Z * Terms];
        Span<Complex> given = stackalloc Complex[Terms];
        for (int cell = 0; cell < cells.Y * cells.Z; cell++)
        {
            int low = (cell / cells.Y * (cells.Y + 1)) + (cell % cells.Y);
            int high = low + cells.Y + 1;
            int k = 0;
            foreach (int node in (ReadOnlySpan<int>)[low, low + 1, high + 1, high])
            {
                (given[k], Complex slope) = Analytic(corners[node]);
                given[k + 1] = scale * slope;
                k += 2;
            }

            for (int n = 0; n < Terms; n++)
            {
                Complex sum = 0;
                for (int row = 0; row < Terms; row++)
                {
                    sum += inverse[n, row] * given[row];
                }

                terms[(cell * Terms) + n] = sum;
            }
        }

        return terms;
    }

    private double ErrorAt(BeamValues[] middles, BeamValues[] corners)
    {
        (double value, double slope, double worstValue, double worstSlope) = (0, 0, 0, 0);
        foreach (BeamValues corner in corners)
        {
            (Complex f, Complex g) = Analytic(corner);
            (value, slope) = (Math.Max(value, Complex.Abs(f)), Math.Max(slope, Complex.Abs(g)));
        }

        foreach (BeamValues middle in middles)
        {
            (Complex f, Complex g) = Analytic(middle);
            (Complex foundF, Complex foundG) = Analytic(At(middle.At));
            (worstValue, worstSlope) = (Math.Max(worstValue, Complex.Abs(f - foundF)), Math.Max(worstSlope, Complex.Abs(g - foundG)));
        }

        return MiddleToWorst * Math.Max(value > 0 ? worstValue / value : 0, slope > 0 ? worstSlope / slope : 0);
    }
}
