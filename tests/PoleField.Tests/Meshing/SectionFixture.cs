using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Tests.Meshing;

/// <summary>Builds cross-sections edge by edge, for tests that need no drawing.</summary>
internal sealed class SectionFixture
{
    private readonly List<Point> _vertices = [];
    private readonly List<SectionEdge> _edges = [];
    private readonly List<string> _parts = [];
    private readonly List<(int Part, bool Mirrored)> _regions = [(-1, false)];

    public int Part(string name)
    {
        _parts.Add(name);
        return _parts.Count - 1;
    }

    public int Region(int part, bool mirrored = false)
    {
        _regions.Add((part, mirrored));
        return _regions.Count - 1;
    }

    /// <summary>One more region of a part of its own.</summary>
    public int Region(string name) => Region(Part(name));

    public SectionFixture Edge(Curve curve, int left, int right)
    {
        _edges.Add(new SectionEdge(Vertex(curve.Start), Vertex(curve.End), curve, left, right));
        return this;
    }

    /// <summary>Straight edges from place to place and back to the first.</summary>
    public SectionFixture Polygon(int left, int right, params Point[] places)
    {
        for (int i = 0; i < places.Length; i++)
        {
            Edge(new Line(places[i], places[(i + 1) % places.Length]), left, right);
        }

        return this;
    }

    public SectionFixture Rectangle(int left, int right, Point min, Point max) =>
        Polygon(left, right, min, new Point(max.Y, min.Z), max, new Point(min.Y, max.Z));

    public SectionFixture Circle(int left, int right, Point centre, double radius, double startAngle = 0) =>
        Edge(new CircularArc(centre, radius, startAngle, Math.Tau), left, right);

    public CrossSection Build()
    {
        bool hasRim = _edges.Exists(e => e.Left == CrossSection.Outside || e.Right == CrossSection.Outside);
        double[] areas = new double[_regions.Count];
        Box[] boxes = new Box[_regions.Count];
        Array.Fill(boxes, Box.Empty);
        foreach (SectionEdge e in _edges)
        {
            double area = e.Curve.AreaTerm(default);
            foreach ((int region, int sign) in new[] { (e.Left, 1), (e.Right, -1) })
            {
                if (region >= 0)
                {
                    areas[region] += sign * area;
                    boxes[region] = boxes[region].Including(e.Curve.Bounds);
                }
            }
        }

        if (!hasRim)
        {
            areas[CrossSection.Air] = double.PositiveInfinity;
        }

        return new CrossSection(
            _vertices,
            _edges,
            [.. _regions.Select((r, i) => new Region(r.Part, areas[i], boxes[i], r.Mirrored))],
            _parts,
            hasRim);
    }

    private int Vertex(Point p)
    {
        int i = _vertices.IndexOf(p);
        if (i < 0)
        {
            _vertices.Add(p);
            i = _vertices.Count - 1;
        }

        return i;
    }
}
