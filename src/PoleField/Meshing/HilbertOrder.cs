using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>Order of places along Hilbert's curve: neighbours in the order are neighbours in the plane, so walks stay short.</summary>
internal static class HilbertOrder
{
    /// <summary>Indices of the places in order.</summary>
    public static int[] Of(ReadOnlySpan<Point> places)
    {
        Box box = Box.Around(places);
        const int bits = 20;
        double cells = (1 << bits) - 1;
        double scale = cells / Math.Max(Math.Max(box.Width, box.Height), double.Epsilon);
        ulong[] keys = new ulong[places.Length];
        int[] order = new int[places.Length];
        for (int i = 0; i < places.Length; i++)
        {
            uint y = (uint)Math.Clamp((places[i].Y - box.Min.Y) * scale, 0, cells);
            uint z = (uint)Math.Clamp((places[i].Z - box.Min.Z) * scale, 0, cells);
            keys[i] = Key(y, z, bits);
            order[i] = i;
        }

        Array.Sort(keys, order);
        return order;
    }

    /// <summary>Triangles in the order of their middles.</summary>
    public static int[] OfTriangles(Triangulation sheet)
    {
        var middles = new Point[sheet.TriangleCount];
        for (int t = 0; t < middles.Length; t++)
        {
            int h = 3 * t;
            middles[t] = (1.0 / 3)
                * (sheet.Place(sheet.Origin(h)) + sheet.Place(sheet.Origin(h + 1)) + sheet.Place(sheet.Origin(h + 2)));
        }

        return Of(middles);
    }

    // Distance along the curve; the quadrant's turn is applied on the way down (Butz 1971).
    private static ulong Key(uint y, uint z, int bits)
    {
        ulong key = 0;
        for (uint s = 1u << (bits - 1); s > 0; s >>= 1)
        {
            uint ry = (y & s) > 0 ? 1u : 0u;
            uint rz = (z & s) > 0 ? 1u : 0u;
            key = (key << 2) | ((3 * ry) ^ rz);
            if (rz == 0)
            {
                if (ry == 1)
                {
                    y = ~y;
                    z = ~z;
                }

                (y, z) = (z, y);
            }
        }

        return key;
    }
}
