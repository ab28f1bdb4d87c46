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
        int[] regions = raster.Regions.ToArray();
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

    private static Dictionary<int, (double Column, double Row, int Count)> Middles(int[] regions, int columns)
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
    private static double[] DistanceToOther(int[] regions, int columns, int rows)
    {
        double[] d = new double[regions.Length];
        Array.Fill(d, double.MaxValue);
        for (int k = 0; k < d.Length; k++)
        {
            Relax(k, 1);
        }

        for (int k = d.Length - 1; k >= 0; k--)
        {
            Relax(k, -1);
        }

        return d;

        // From the neighbours already visited: to the left and above, then to the right and below.
        void Relax(int pixel, int sign)
        {
            int column = pixel % columns, row = pixel / columns;
            double straight = Math.Min(Through(pixel, column - sign, row, 1), Through(pixel, column, row - sign, 1));
            double slanted = Math.Min(
                Through(pixel, column - sign, row - sign, Math.Sqrt(2)), Through(pixel, column + sign, row - sign, Math.Sqrt(2)));
            d[pixel] = Math.Min(d[pixel], Math.Min(straight, slanted));
        }

        double Through(int pixel, int column, int row, double length)
        {
            if (column < 0 || column >= columns || row < 0 || row >= rows)
            {
                return length;
            }

            int neighbour = (row * columns) + column;
            return regions[neighbour] == regions[pixel] ? d[neighbour] + length : length;
        }
    }
}
