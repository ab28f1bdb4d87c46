using PoleField.Geometry;

namespace PoleField.Beam;

/// <summary>An aperture's outline as a fine polygon, for distances and for placing sample points.</summary>
internal sealed class ApertureShape
{
    private const int PiecesPerCurve = 48;

    private readonly Point[] _corners;
    private readonly Outline _outline;

    public ApertureShape(Aperture aperture)
    {
        _outline = aperture.Outline;
        var corners = new List<Point>();
        foreach (Curve curve in _outline.Curves)
        {
            int pieces = curve is Line ? 1 : PiecesPerCurve;
            for (int k = 0; k < pieces; k++)
            {
                corners.Add(curve.At((double)k / pieces));
            }
        }

        _corners = [.. corners];
    }

    /// <summary>Corners of the polygon, counter-clockwise.</summary>
    public IReadOnlyList<Point> Corners => _corners;

    /// <summary>Distance from a place to the aperture; zero inside.</summary>
    public double DistanceTo(Point p)
    {
        double best = double.PositiveInfinity;
        bool inside = false;
        for (int i = 0; i < _corners.Length; i++)
        {
            Point a = _corners[i];
            Point b = _corners[(i + 1) % _corners.Length];
            Point d = b - a;
            double t = Math.Clamp((p - a).Dot(d) / d.SquaredLength, 0, 1);
            best = Math.Min(best, (a + (t * d) - p).SquaredLength);
            if ((a.Z > p.Z) != (b.Z > p.Z) && p.Y < a.Y + ((p.Z - a.Z) / (b.Z - a.Z) * (b.Y - a.Y)))
            {
                inside = !inside;
            }
        }

        return inside ? 0.0 : Math.Sqrt(best);
    }

    /// <summary>The place of the outline nearest to a place.</summary>
    public Point NearestTo(Point p)
    {
        Point nearest = _corners[0];
        for (int i = 0; i < _corners.Length; i++)
        {
            Point a = _corners[i];
            Point d = _corners[(i + 1) % _corners.Length] - a;
            Point q = a + (Math.Clamp((p - a).Dot(d) / d.SquaredLength, 0, 1) * d);
            nearest = q.DistanceTo(p) < nearest.DistanceTo(p) ? q : nearest;
        }

        return nearest;
    }

    /// <summary>Points along the outline, corners included.</summary>
    public IEnumerable<Point> EdgePoints(int perSide)
    {
        foreach (Curve curve in _outline.Curves)
        {
            for (int k = 0; k < perSide; k++)
            {
                yield return curve.At((double)k / perSide);
            }
        }
    }

    /// <summary>Intervals of y in which the horizontal line at z lies inside, left to right.</summary>
    public IEnumerable<(double From, double To)> Across(double z) => Crossings(z, p => p);

    /// <summary>Intervals of z in which the vertical line at y lies inside, bottom to top.</summary>
    public IEnumerable<(double From, double To)> Along(double y) => Crossings(y, p => new Point(p.Z, p.Y));

    private IEnumerable<(double From, double To)> Crossings(double level, Func<Point, Point> turn)
    {
        var crossings = new List<double>();
        for (int i = 0; i < _corners.Length; i++)
        {
            Point a = turn(_corners[i]);
            Point b = turn(_corners[(i + 1) % _corners.Length]);
            if ((a.Z > level) != (b.Z > level))
            {
                crossings.Add(a.Y + ((level - a.Z) / (b.Z - a.Z) * (b.Y - a.Y)));
            }
        }

        crossings.Sort();
        for (int k = 0; k + 1 < crossings.Count; k += 2)
        {
            yield return (crossings[k], crossings[k + 1]);
        }
    }
}
