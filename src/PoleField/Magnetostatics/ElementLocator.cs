using PoleField.Geometry;
using PoleField.Meshing;

namespace PoleField.Magnetostatics;

/// <summary>Finds the element and reference place of a point in one of the two discs, through a grid of buckets.</summary>
internal sealed class ElementLocator
{
    private const double Slack = 1e-9;      // of a reference coordinate
    private const int MostNewtonSteps = 30;

    private readonly FiniteElementSpace _space;
    private readonly Box _box;
    private readonly int _columns;
    private readonly int _rows;
    private readonly int[] _start;    // elements of bucket b are _elements[_start[b]] .. _elements[_start[b + 1] − 1]
    private readonly int[] _elements;

    public ElementLocator(FiniteElementSpace space, bool exterior)
    {
        _space = space;
        var boxes = new List<(int Element, Box Box)>();
        _box = Box.Empty;
        for (int e = 0; e < space.ElementCount; e++)
        {
            if ((space.Mesh.Regions[e] == Mesh.Exterior) == exterior)
            {
                Box box = BoxOf(e);
                boxes.Add((e, box));
                _box = _box.Including(box);
            }
        }

        double cell = Math.Sqrt(Math.Max(_box.Width * _box.Height, double.Epsilon) / Math.Max(1, 4 * boxes.Count));
        _columns = Math.Clamp((int)(_box.Width / cell), 1, 2000);
        _rows = Math.Clamp((int)(_box.Height / cell), 1, 2000);
        (_start, _elements) = Fill(boxes);
    }

    /// <summary>Element that holds a point, and the reference coordinates there; null outside.</summary>
    public (int Element, double Xi, double Eta)? Find(Point p)
    {
        if (!_box.Contains(p))
        {
            return null;
        }

        int bucket = (Row(p.Z) * _columns) + Column(p.Y);
        (int Element, double Xi, double Eta)? best = null;
        double bestOutside = 1e-6;
        for (int k = _start[bucket]; k < _start[bucket + 1]; k++)
        {
            (double xi, double eta) = Invert(_elements[k], p);
            double outside = Math.Max(Math.Max(-xi, -eta), xi + eta - 1);
            if (outside <= Slack)
            {
                return (_elements[k], xi, eta);
            }

            if (outside < bestOutside)
            {
                bestOutside = outside;
                best = (_elements[k], xi, eta);
            }
        }

        return best;
    }

    private (double Xi, double Eta) Invert(int element, Point p)
    {
        ReadOnlySpan<int> nodes = _space.NodesOf(element);
        Point origin = _space.Places[nodes[0]];
        var affine = new Jacobian(_space.Places[nodes[1]] - origin, _space.Places[nodes[2]] - origin);
        (double xi, double eta) = affine.Pull(p - origin);
        double determinant = affine.Determinant;
        xi /= determinant;
        eta /= determinant;
        if (!_space.IsCurved[element] || Math.Abs(xi - (1.0 / 3)) > 1.5 || Math.Abs(eta - (1.0 / 3)) > 1.5)
        {
            return (xi, eta);
        }

        int n = nodes.Length;
        Span<double> values = stackalloc double[n];
        Span<double> byXi = stackalloc double[n];
        Span<double> byEta = stackalloc double[n];
        for (int step = 0; step < MostNewtonSteps; step++)
        {
            _space.Reference.Values(xi, eta, values);
            _space.Reference.Gradients(xi, eta, byXi, byEta);
            Jacobian j = _space.JacobianAt(element, byXi, byEta);
            Point miss = p - _space.PlaceAt(element, values);
            (double moveXi, double moveEta) = j.Pull(miss);
            moveXi /= j.Determinant;
            moveEta /= j.Determinant;
            xi += moveXi;
            eta += moveEta;
            if (!(Math.Abs(moveXi) + Math.Abs(moveEta) > 1e-13) || Math.Abs(xi) + Math.Abs(eta) > 10)
            {
                break;
            }
        }

        return (xi, eta);
    }

    private Box BoxOf(int element)
    {
        Box box = Box.Empty;
        foreach (int node in _space.NodesOf(element))
        {
            box = box.Including(_space.Places[node]);
        }

        // A curved side bulges a little beyond its nodes.
        return _space.IsCurved[element] ? box.Inflated(0.02 * box.Diagonal) : box;
    }

    private (int[] Start, int[] Elements) Fill(List<(int Element, Box Box)> boxes)
    {
        var start = new int[(_columns * _rows) + 1];
        foreach ((_, Box box) in boxes)
        {
            ForBuckets(box, b => start[b + 1]++);
        }

        for (int b = 0; b + 1 < start.Length; b++)
        {
            start[b + 1] += start[b];
        }

        var elements = new int[start[^1]];
        var next = (int[])start.Clone();
        foreach ((int element, Box box) in boxes)
        {
            ForBuckets(box, b => elements[next[b]++] = element);
        }

        return (start, elements);
    }

    private void ForBuckets(Box box, Action<int> visit)
    {
        int lastRow = Row(box.Max.Z);
        int lastColumn = Column(box.Max.Y);
        for (int row = Row(box.Min.Z); row <= lastRow; row++)
        {
            for (int column = Column(box.Min.Y); column <= lastColumn; column++)
            {
                visit((row * _columns) + column);
            }
        }
    }

    private int Column(double y) => Math.Clamp((int)((y - _box.Min.Y) / _box.Width * _columns), 0, _columns - 1);

    private int Row(double z) => Math.Clamp((int)((z - _box.Min.Z) / _box.Height * _rows), 0, _rows - 1);
}
