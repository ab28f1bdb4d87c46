using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Benchmarks;

/// <summary>
/// A square plate with square windows in rows, each with rounded corners and a round pin in the middle; all outlines but
/// the pins are loose lines and arcs, those of one window in no order, as exports of sketches have them.
/// </summary>
internal static class PlateDrawing
{
    private const int PerWindow = 9; // four lines, four arcs, one circle
    private const double Side = 0.8, Fillet = 0.2, Pin = 0.1; // mm, windows stand 1 mm apart
    private const int Seed = 7;

    /// <summary>Which layers are what.</summary>
    public static SectionRequest Request { get; } = new() { PartLayers = ["PLATE", "PIN"], MaterialKeys = ["steel", "copper"] };

    /// <summary>The drawing as a DXF file of about so many entities.</summary>
    public static byte[] Write(int entities)
    {
        int rows = (int)Math.Ceiling(Math.Sqrt((double)entities / PerWindow));
        List<SketchCurve> curves = [.. Box(-1, rows)];
        Random random = new(Seed);
        for (int i = 0; curves.Count + PerWindow <= entities; i++)
        {
            SketchCurve[] window = [.. Window(new Point(i / rows, i % rows))];
            random.Shuffle(window);
            curves.AddRange(window);
        }

        using MemoryStream stream = new();
        DxfWriter.Write(new Sketch("plate", LengthUnit.Millimetre, UnitOrigin.InsertUnits, curves, [], []), stream);
        return stream.ToArray();
    }

    /// <summary>Area of the plate as read from <see cref="Write"/>, m²: squares less windows.</summary>
    public static double Area(int entities)
    {
        int rows = (int)Math.Ceiling(Math.Sqrt((double)entities / PerWindow));
        int windows = (entities - 4) / PerWindow;
        return 1e-6 * (((rows + 1.0) * (rows + 1)) - (windows * ((Side * Side) - ((4 - Math.PI) * Fillet * Fillet))));
    }

    private static IEnumerable<SketchCurve> Box(double from, double to)
    {
        Point[] corners = [new(from, from), new(to, from), new(to, to), new(from, to)];
        return corners.Select((c, i) => On("PLATE", new Line(c, corners[(i + 1) % 4])));
    }

    private static IEnumerable<SketchCurve> Window(Point middle)
    {
        const double half = Side / 2;
        for (int quarter = 0; quarter < 4; quarter++)
        {
            Point along = Turned(new Point(1, 0), quarter), across = along.Perpendicular;
            Point side = middle - (half * across);
            yield return On("PLATE", new Line(side - ((half - Fillet) * along), side + ((half - Fillet) * along)));
            Point centre = side + ((half - Fillet) * along) + (Fillet * across);
            yield return On("PLATE", new CircularArc(centre, Fillet, (quarter - 1) * Math.PI / 2, Math.PI / 2));
        }

        yield return On("PIN", new CircularArc(middle, Pin, 0, Math.Tau));
    }

    private static Point Turned(Point p, int quarters) => quarters == 0 ? p : Turned(p.Perpendicular, quarters - 1);

    private static SketchCurve On(string layer, Curve curve) => new(curve, layer, string.Empty, null, 0);
}
