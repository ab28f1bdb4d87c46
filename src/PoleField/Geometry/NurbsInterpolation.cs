namespace PoleField.Geometry;

/// <summary>
/// The cubic spline with continuous curvature through given points, parametrised by chord length. Its ends follow given
/// tangents, or else the third derivative is continuous at the last inner points ("not a knot"); a closed one is periodic.
/// </summary>
/// <remarks>C. de Boor, A Practical Guide to Splines, Springer 1978, chapters IV and XIII (from memory).</remarks>
public static class NurbsInterpolation
{
    private const int Degree = 3;

    /// <summary>Curve through points, in their order.</summary>
    /// <param name="points">Two points or more; neighbours differ.</param>
    /// <param name="startTangent">Direction at the first point; null or zero to leave it open.</param>
    /// <param name="endTangent">Direction at the last point; null or zero to leave it open.</param>
    /// <exception cref="ArgumentException">Fewer than two points, or neighbours coincide.</exception>
    public static Curve Through(IReadOnlyList<Point> points, Point? startTangent = null, Point? endTangent = null)
    {
        double[] sites = ChordLengths(points);
        Point? first = Direction(startTangent);
        Point? last = Direction(endTangent);
        if (points.Count == 2 && first is null && last is null)
        {
            return new Line(points[0], points[1]);
        }

        if (points.Count == 2 && (first is null || last is null))
        {
            // A parabola leaves along the one tangent that is given.
            Point middle = first is { } d
                ? points[0] + (0.5 * sites[1] * d)
                : points[1] - (0.5 * sites[1] * (last ?? default));
            return new Nurbs(2, [0, 0, 0, sites[1], sites[1], sites[1]], [points[0], middle, points[1]]);
        }

        if (points.Count == 3 && first is null && last is null)
        {
            return Parabola(points, sites);
        }

        return Cubic(points, sites, first, last);
    }

    /// <summary>Smooth closed curve through points; the last one is joined to the first.</summary>
    /// <exception cref="ArgumentException">Fewer than three different points, or neighbours coincide.</exception>
    public static Curve ThroughClosed(IReadOnlyList<Point> points)
    {
        Point[] loop = points[0] == points[^1] ? [.. points] : [.. points, points[0]];
        if (loop.Length < 4)
        {
            throw new ArgumentException("A closed spline needs three different points.");
        }

        // The jump of the second derivative at the seam is affine in the seam's tangent; the right tangent makes it zero.
        double[] sites = ChordLengths(loop);
        Point jump = SeamJump(Cubic(loop, sites, default(Point), default(Point)));
        Point[] still = new Point[loop.Length];
        Array.Fill(still, loop[0]);
        double perUnit = SeamJump(Cubic(still, sites, new Point(1, 0), new Point(1, 0))).Y;
        Point tangent = (-1 / perUnit) * jump;
        return Cubic(loop, sites, tangent, tangent);
    }

    private static Point SeamJump(Curve curve) => curve.SecondDerivative(0) - curve.SecondDerivative(1);

    private static Point? Direction(Point? tangent) =>
        tangent is { } d && d.Length > 0.0 ? d.Unit() : null;

    private static double[] ChordLengths(IReadOnlyList<Point> points)
    {
        if (points.Count < 2)
        {
            throw new ArgumentException("A spline through points needs two points or more.");
        }

        var sites = new double[points.Count];
        for (int i = 1; i < sites.Length; i++)
        {
            sites[i] = sites[i - 1] + points[i].DistanceTo(points[i - 1]);
            if (!(sites[i] > sites[i - 1]) || !double.IsFinite(sites[i]))
            {
                throw new ArgumentException("Neighbouring points of a spline coincide or are not finite.");
            }
        }

        return sites;
    }

    private static Nurbs Parabola(IReadOnlyList<Point> points, double[] sites)
    {
        double s = sites[1] / sites[2];
        Point onChord = Point.Between(points[0], points[2], s);
        Point middle = Point.Between(points[0], points[2], 0.5) + (0.25 / (s * (1 - s)) * 2 * (points[1] - onChord));
        return new Nurbs(2, [0, 0, 0, sites[2], sites[2], sites[2]], [points[0], middle, points[2]]);
    }

    private static Nurbs Cubic(IReadOnlyList<Point> points, double[] sites, Point? first, Point? last)
    {
        int n = sites.Length;
        double[] inner = sites[(first is null ? 2 : 1)..(last is null ? n - 2 : n - 1)];
        double from = sites[0], to = sites[^1];
        double[] knots = [from, from, from, from, .. inner, to, to, to, to];
        int count = knots.Length - Degree - 1;
        var system = new Collocation(count);
        system.Add(0, [1.0], points[0]);
        if (first is { } d)
        {
            double speed = Degree / (knots[4] - from);
            system.Add(0, [-speed, speed], d);
        }

        for (int i = 1; i < n - 1; i++)
        {
            int span = Array.FindLastIndex(knots, count, k => k <= sites[i]);
            system.Add(span - Degree, Basis(knots, span, sites[i]), points[i]);
        }

        if (last is { } e)
        {
            double speed = Degree / (to - knots[count - 1]);
            system.Add(count - 2, [-speed, speed], e);
        }

        system.Add(count - 1, [1.0], points[^1]);
        return new Nurbs(Degree, knots, system.Solve());
    }

    // The four cubic B-splines that are not zero on a span (The NURBS Book, algorithm A2.2).
    private static double[] Basis(double[] knots, int span, double u)
    {
        var values = new double[Degree + 1];
        values[0] = 1;
        for (int j = 1; j <= Degree; j++)
        {
            double saved = 0;
            for (int r = 0; r < j; r++)
            {
                double right = knots[span + r + 1] - u;
                double left = u - knots[span + 1 - j + r];
                double share = values[r] / (right + left);
                values[r] = saved + (right * share);
                saved = left * share;
            }

            values[j] = saved;
        }

        return values;
    }

    /// <summary>Banded equations for control points. Collocation matrices of B-splines need no pivoting (de Boor, chapter XIII).</summary>
    private sealed class Collocation(int size)
    {
        private const int Band = 3;
        private readonly double[][] _rows = new double[size][]; // row i, column j at [i][j - i + Band]
        private readonly Point[] _right = new Point[size];
        private int _filled;

        public void Add(int firstColumn, ReadOnlySpan<double> values, Point right)
        {
            var row = new double[(2 * Band) + 1];
            values.CopyTo(row.AsSpan(firstColumn - _filled + Band));
            _rows[_filled] = row;
            _right[_filled++] = right;
        }

        public Point[] Solve()
        {
            for (int k = 0; k < size; k++)
            {
                for (int i = k + 1; i < Math.Min(size, k + Band + 1); i++)
                {
                    double factor = _rows[i][k - i + Band] / _rows[k][Band];
                    for (int j = k; j < Math.Min(size, k + Band + 1); j++)
                    {
                        _rows[i][j - i + Band] -= factor * _rows[k][j - k + Band];
                    }

                    _right[i] -= factor * _right[k];
                }
            }

            for (int i = size - 1; i >= 0; i--)
            {
                Point sum = _right[i];
                for (int j = i + 1; j < Math.Min(size, i + Band + 1); j++)
                {
                    sum -= _rows[i][j - i + Band] * _right[j];
                }

                _right[i] = (1 / _rows[i][Band]) * sum;
            }

            return _right;
        }
    }
}
