using OxyPlot;
using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Output.Figures;

/// <summary>A value and the region at the middle of every pixel of a view, painted from triangles.</summary>
internal sealed class FieldRaster
{
    public const int NoRegion = int.MinValue;

    // Row 0 is the top; column c of row r at [r·Columns + c].
    private readonly double[] _values;
    private readonly int[] _regions;

    private FieldRaster(Box view, int columns, int rows)
    {
        View = view;
        Columns = columns;
        Rows = rows;
        _values = new double[columns * rows];
        _regions = new int[columns * rows];
        Array.Fill(_values, double.NaN);
        Array.Fill(_regions, NoRegion);
    }

    public Box View { get; }

    public int Columns { get; }

    public int Rows { get; }

    public ReadOnlySpan<double> Values => _values;

    public ReadOnlySpan<int> Regions => _regions;

    /// <summary>Paints |B| (T) of the triangles that show in the view.</summary>
    public static FieldRaster OfMagnitude(IEnumerable<FieldTriangle> triangles, Box view, int columns)
    {
        FieldRaster raster = new(view, columns, Math.Max(1, (int)Math.Round(columns * view.Height / view.Width)));
        foreach (FieldTriangle t in triangles)
        {
            raster.Paint(t);
        }

        return raster;
    }

    /// <summary>Evaluates a function at every pixel; not a number leaves the pixel empty.</summary>
    public static FieldRaster OfFunction(Func<Point, double> value, Box view, int columns, int rows)
    {
        FieldRaster raster = new(view, columns, rows);
        for (int row = 0; row < raster.Rows; row++)
        {
            for (int column = 0; column < columns; column++)
            {
                raster._values[(row * columns) + column] = value(raster.Middle(column, row));
            }
        }

        return raster;
    }

    /// <summary>Place of a pixel's middle, metres.</summary>
    public Point Middle(int column, int row) => new(
        View.Min.Y + ((column + 0.5) / Columns * View.Width),
        View.Max.Z - ((row + 0.5) / Rows * View.Height));

    /// <summary>The picture in the colours of a palette spread over a range.</summary>
    public OxyImage Image(double from, double to, IReadOnlyList<OxyColor> palette)
    {
        int last = Math.Min(palette.Count, IndexedPng.Transparent) - 1;
        byte[] pixels = new byte[_values.Length];
        for (int i = 0; i < pixels.Length; i++)
        {
            double place = (_values[i] - from) / (to - from);
            pixels[i] = double.IsNaN(place)
                ? IndexedPng.Transparent
                : (byte)Math.Round(Math.Clamp(place, 0, 1) * last);
        }

        return new OxyImage(IndexedPng.Encode(pixels, Columns, palette));
    }

    /// <summary>The value that the given share of the painted pixels stays below; 0 when nothing is painted.</summary>
    public double Quantile(double share)
    {
        double[] sorted = [.. _values.Where(double.IsFinite).Order()];
        return sorted.Length == 0 ? 0 : sorted[Math.Min(sorted.Length - 1, (int)(share * sorted.Length))];
    }

    private void Paint(in FieldTriangle t)
    {
        double columnsPerMetre = Columns / View.Width;
        double rowsPerMetre = Rows / View.Height;
        Point a = Pixel(t.P0), b = Pixel(t.P1), c = Pixel(t.P2);
        double area = (b - a).Cross(c - a);
        if (area == 0.0)
        {
            return;
        }

        int firstRow = Math.Max(0, (int)Math.Ceiling(Math.Min(a.Z, Math.Min(b.Z, c.Z)) - 0.5));
        int lastRow = Math.Min(Rows - 1, (int)Math.Floor(Math.Max(a.Z, Math.Max(b.Z, c.Z)) - 0.5));
        int firstColumn = Math.Max(0, (int)Math.Ceiling(Math.Min(a.Y, Math.Min(b.Y, c.Y)) - 0.5));
        int lastColumn = Math.Min(Columns - 1, (int)Math.Floor(Math.Max(a.Y, Math.Max(b.Y, c.Y)) - 0.5));
        (double b0, double b1, double b2) = (t.S0.Magnitude, t.S1.Magnitude, t.S2.Magnitude);
        const double rounding = -1e-9;
        for (int row = firstRow; row <= lastRow; row++)
        {
            for (int column = firstColumn; column <= lastColumn; column++)
            {
                Point p = new(column + 0.5, row + 0.5);
                double w1 = (p - a).Cross(c - a) / area;
                double w2 = (b - a).Cross(p - a) / area;
                double w0 = 1 - w1 - w2;
                if (w0 >= rounding && w1 >= rounding && w2 >= rounding)
                {
                    int i = (row * Columns) + column;
                    _values[i] = (w0 * b0) + (w1 * b1) + (w2 * b2);
                    _regions[i] = t.Region;
                }
            }
        }

        Point Pixel(Point p) => new((p.Y - View.Min.Y) * columnsPerMetre, (View.Max.Z - p.Z) * rowsPerMetre);
    }
}
