using PoleField.Geometry;

namespace PoleField.Output.Figures;

/// <summary>The roomiest place of a region in a view.</summary>
/// <param name="Region">The region.</param>
/// <param name="At">Middle of the largest disc that fits into what is seen of it, metres.</param>
/// <param name="Radius">Radius of that disc, metres.</param>
internal readonly record struct LabelPlace(int Region, Point At, double Radius);

/// <summary>Finds where a region's name fits best, on the pixels of a raster.</summary>
internal static class LabelPlaces
{
    /// <summary>One place per region that shows, in the order of the regions.</summary>
    public static IReadOnlyList<LabelPlace> Find(FieldRaster raster)
    {
        int columns = raster.Columns, rows = raster.Rows;
        ReadOnlySpan<int> regions = raster.Regions;
        double[] distance = DistanceToOther(regions, columns, rows);
        SortedDictionary<int, (double Radius, double Balance, int Pixel)> best = [];
        Dictionary<int, (double Column, double Row, int Count)> middles = Middles(regions, columns);
        for (int i = 0; i < regions.Length; i++)
        {
            if (regions[i] == FieldRaster.NoRegion)
            {
                continue;
            }

            // Of several equally roomy places the one nearest the middle of what is seen.
            (double column, double row, int count) = middles[regions[i]];
            double balance = -Math.Sqrt(Square((i % columns) - (column / count)) + Square((i / columns) - (row / count)));
            double radius = Math.Round(distance[i]);
            if (!best.TryGetValue(regions[i], out (double Radius, double Balance, int Pixel) so)
                || radius > so.Radius || (radius == so.Radius && balance > so.Balance))
            {
                best[regions[i]] = (radius, balance, i);
            }
        }

        double pixel = raster.View.Width / columns;
        return
        [
            .. best.Select(b => new LabelPlace(
                b.Key, raster.Middle(b.Value.Pixel % columns, b.Value.Pixel / columns), distance[b.Value.Pixel] * pixel)),
        ];
    }

    private static double Square(double x) => x * x;

    private static Dictionary<int, (double Column, double Row, int Count)> Middles(ReadOnlySpan<int> regions, int columns)
    {
        Dictionary<int, (double Column, double Row, int Count)> sums = [];
        for (int i = 0; i < regions.Length; i++)
        {
            (double column, double row, int count) = sums.GetValueOrDefault(regions[i]);
            sums[regions[i]] = (column + (i % columns), row + (i / columns), count + 1);
        }

        return sums;
    }

    // Two-pass chamfer distance (Borgefors 1986, weights 1 and √2) to a pixel of another region or the edge of the view.
    private static double[] DistanceToOther(ReadOnlySpan<int> regions, int columns, int rows)
    {
        double[] d = new double[regions.Length];
        Array.Fill(d, double.MaxValue);
        for (int pass = 0; pass < 2; pass++)
        {
            int sign = pass == 0 ? 1 : -1;
            for (int k = 0; k < d.Length; k++)
            {
                int i = pass == 0 ? k : d.Length - 1 - k;
                int column = i % columns, row = i / columns;
                double near = d[i];
                near = Math.Min(near, Step(regions, d, i, column - sign, row, 1, columns, rows));
                near = Math.Min(near, Step(regions, d, i, column, row - sign, 1, columns, rows));
                near = Math.Min(near, Step(regions, d, i, column - sign, row - sign, Math.Sqrt(2), columns, rows));
                near = Math.Min(near, Step(regions, d, i, column + sign, row - sign, Math.Sqrt(2), columns, rows));
                d[i] = near;
            }
        }

        return d;
    }

    private static double Step(
        ReadOnlySpan<int> regions, double[] d, int from, int column, int row, double length, int columns, int rows)
    {
        if (column < 0 || column >= columns || row < 0 || row >= rows)
        {
            return length;
        }

        int to = (row * columns) + column;
        return regions[to] != regions[from] ? length : d[to] == double.MaxValue ? double.MaxValue : d[to] + length;
    }
}
