using PoleField.Geometry;
using PoleField.Magnetostatics;

namespace PoleField.Design;

/// <summary>The places of greatest flux density in iron, one to an element, and how they follow the shape.</summary>
internal sealed class IronPeaks
{
    private readonly FiniteElementSpace _space;
    private readonly ShapeTable _table;
    private readonly FieldSolution _solution;

    private IronPeaks(FieldSolution solution, List<(int Element, int Point, double Field)> highest)
    {
        (_solution, _space) = (solution, solution.Problem.Space);
        _table = TableOf(_space);
        Highest = highest;
    }

    /// <summary>Element, point in it and |B| there, the greatest first.</summary>
    public IReadOnlyList<(int Element, int Point, double Field)> Highest { get; }

    /// <summary>The given number of elements with the greatest flux density in iron.</summary>
    public static IronPeaks Of(FieldSolution solution, int count)
    {
        FiniteElementSpace space = solution.Problem.Space;
        ShapeTable table = TableOf(space);
        var peaks = new PriorityQueue<(int Element, int Point, double Field), double>();
        for (int e = 0; e < space.ElementCount; e++)
        {
            int region = space.Mesh.Regions[e];
            int part = region < 0 ? -1 : solution.Magnet.Section.Regions[region].Part;
            if (part < 0 || solution.Magnet.Roles[part].Kind != "iron")
            {
                continue;
            }

            (int point, double most) = (0, 0);
            for (int q = 0; q < table.Count; q++)
            {
                double b = ShapeRow.Of(space, e, table, q).Gradient(space.NodesOf(e), solution.Potential).Length;
                (point, most) = b > most ? (q, b) : (point, most);
            }

            peaks.Enqueue((e, point, most), most);
            if (peaks.Count > count)
            {
                peaks.Dequeue();
            }
        }

        return new IronPeaks(solution, [.. peaks.UnorderedItems.Select(p => p.Element).OrderByDescending(p => p.Field).ThenBy(p => p.Element)]);
    }

    /// <summary>Change of |B| at a peak that travels with its element, T per unit.</summary>
    public double Change(int peak, MotionResponse response, ReadOnlySpan<Point> velocity)
    {
        (int element, int q, _) = Highest[peak];
        ShapeRow row = ShapeRow.Of(_space, element, _table, q);
        ReadOnlySpan<int> nodes = _space.NodesOf(element);
        Point gradient = row.Gradient(nodes, _solution.Potential);
        Point change = row.Gradient(nodes, response.Potential) - Strain.Of(nodes, velocity, row).On(gradient);
        return gradient.Unit().Dot(change);
    }

    // The report looks at as many points.
    private static ShapeTable TableOf(FiniteElementSpace space) => new(space.Reference, TriangleQuadrature.Collapsed(3));
}
