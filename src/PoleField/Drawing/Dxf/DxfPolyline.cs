using PoleField.Geometry;

namespace PoleField.Drawing;

/// <summary>A POLYLINE while its vertices arrive, and the common making of curves from vertices with bulges.</summary>
internal sealed class DxfPolyline
{
    // Flags of POLYLINE and VERTEX (format reference).
    private const long Closed = 1, Spatial = 8, SurfaceMesh = 16, PolyfaceMesh = 64;
    private const long ControlFrame = 16;

    // Below this height over the chord, drawing units relative to the chord's place, an arc is a straight line.
    private const double StraightHeight = 1e-13;
    private const double Rounding = 1e-14;

    private readonly DxfShape _shape;
    private readonly DxfFrame _frame;
    private readonly long _flags;
    private readonly List<(Point Place, double Bulge)> _vertices = [];
    private (double Low, double High) _heights = (double.PositiveInfinity, double.NegativeInfinity);
    private (string What, string Text, string Fix)? _problem;
    private bool _isIncomplete;

    /// <summary>Starts from the POLYLINE entity.</summary>
    public DxfPolyline(DxfRecord record)
    {
        _shape = DxfShapes.With(record, []);
        _frame = DxfFrame.Of(record);
        _flags = record.Integer(70);
        _shape = _shape with { Height = _frame.IsMirrored ? -record.Real(30, 0) : record.Real(30, 0) };
        _problem = IsSpatial ? null : _frame.Problem(record);
    }

    private bool IsSpatial => (_flags & Spatial) != 0;

    private bool IsSurface => (_flags & (SurfaceMesh | PolyfaceMesh)) != 0;

    /// <summary>The shape of an LWPOLYLINE.</summary>
    public static DxfShape Light(DxfRecord record, DxfFrame frame)
    {
        var vertices = new List<(Point Place, double Bulge)>();
        double x = double.NaN;
        bool open = false;
        foreach ((int code, double value) in record.Numbers)
        {
            switch (code)
            {
                case 10 when !open:
                    (x, open) = (value, true);
                    break;
                case 20 when open:
                    vertices.Add((new Point(x, value), 0.0));
                    open = false;
                    break;
                case 10 or 20:
                    throw new ArgumentException("the coordinates of its vertices do not come in pairs; the entity is damaged");
                case 42 when !open && vertices.Count > 0:
                    vertices[^1] = (vertices[^1].Place, value);
                    break;
            }
        }

        if (open)
        {
            throw new ArgumentException("its last vertex has no y; the entity is damaged");
        }

        bool isClosed = (record.Integer(70) & Closed) != 0;
        return FromVertices(DxfShapes.With(record, []), vertices, isClosed, frame) with { Height = record.Real(38, 0) };
    }

    /// <summary>Takes a VERTEX.</summary>
    public void Add(DxfRecord vertex)
    {
        if (IsSurface || (vertex.Integer(70) & ControlFrame) != 0)
        {
            return;
        }

        double z = vertex.Real(30, 0);
        _heights = (Math.Min(_heights.Low, z), Math.Max(_heights.High, z));
        double bulge = IsSpatial ? 0.0 : vertex.Real(42, 0);
        Point place = vertex.RequiredPoint(10);
        if (IsSpatial && DxfShapes.Differ(_heights.Low, _heights.High, 0))
        {
            _problem ??= DxfShapes.Climbs(vertex, _heights.Low, _heights.High);
        }

        _isIncomplete |= vertex.IsIncomplete;
        _vertices.Add((place, bulge));
    }

    /// <summary>The finished shape.</summary>
    public DxfItem Finish()
    {
        if (IsSurface)
        {
            return new DxfOther("POLYFACE", _shape.Place) { IsInvisible = _shape.IsInvisible, IsOnPaper = _shape.IsOnPaper };
        }

        if (_problem is not null || _isIncomplete)
        {
            return _shape with { Problem = _problem };
        }

        try
        {
            DxfFrame frame = IsSpatial ? default : _frame;
            DxfShape shape = FromVertices(_shape, _vertices, (_flags & Closed) != 0, frame);
            return IsSpatial && _vertices.Count > 0 ? shape with { Height = _heights.Low } : shape;
        }
        catch (ArgumentException e)
        {
            return _shape with
            {
                Problem = ("bad-curve", $"POLYLINE on layer {DxfReport.Shown(_shape.Layer)}: {e.Message.TrimEnd('.')}.", "Draw it anew."),
            };
        }
    }

    private static DxfShape FromVertices(
        DxfShape shape, List<(Point Place, double Bulge)> vertices, bool isClosed, DxfFrame frame)
    {
        int dropped = MergeRepeated(vertices, isClosed);
        int pieces = isClosed && vertices.Count > 1 ? vertices.Count : vertices.Count - 1;
        if (pieces < 1)
        {
            return shape with { Dropped = Math.Max(1, dropped) };
        }

        var curves = new Curve[pieces];
        for (int i = 0; i < pieces; i++)
        {
            (Point start, double bulge) = vertices[i];
            Point end = vertices[(i + 1) % vertices.Count].Place;
            curves[i] = frame.Place(Piece(start, end, bulge));
        }

        return shape with { Curves = curves, Dropped = dropped };
    }

    // Neighbours at one place become one vertex, which keeps the bulge of the piece that follows.
    private static int MergeRepeated(List<(Point Place, double Bulge)> vertices, bool isClosed)
    {
        int before = vertices.Count;
        int kept = 0;
        for (int i = 0; i < vertices.Count; i++)
        {
            if (kept > 0 && Coincide(vertices[kept - 1].Place, vertices[i].Place))
            {
                vertices[kept - 1] = (vertices[kept - 1].Place, vertices[i].Bulge);
            }
            else
            {
                vertices[kept++] = vertices[i];
            }
        }

        vertices.RemoveRange(kept, vertices.Count - kept);
        if (isClosed && vertices.Count > 1 && Coincide(vertices[^1].Place, vertices[0].Place))
        {
            vertices.RemoveAt(vertices.Count - 1);
        }

        return before - vertices.Count;
    }

    private static bool Coincide(Point a, Point b) =>
        a.DistanceTo(b) <= Rounding * Math.Max(Math.Max(Math.Abs(a.Y), Math.Abs(a.Z)), Math.Max(Math.Abs(b.Y), Math.Abs(b.Z)));

    private static Curve Piece(Point start, Point end, double bulge)
    {
        double chord = start.DistanceTo(end);
        double height = 0.5 * Math.Abs(bulge) * chord;
        return height <= StraightHeight * Math.Max(chord, Math.Max(start.Length, end.Length))
            ? new Line(start, end)
            : CircularArc.FromBulge(start, end, bulge);
    }
}
