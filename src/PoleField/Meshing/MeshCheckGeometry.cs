using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Numerics;

namespace PoleField.Meshing;

/// <content>Signs, areas, circles and bent sides.</content>
public sealed partial class MeshCheck
{
    private void CheckOrientation()
    {
        for (int t = 0; t < _mesh.TriangleCount; t++)
        {
            Point a = Place(t, 0), b = Place(t, 1), c = Place(t, 2);
            if (!(Predicates.Orient(a.Y, a.Z, b.Y, b.Z, c.Y, c.Z) > 0))
            {
                Report("mesh-area", a, $"triangle {t} is not counter-clockwise with positive area.");
            }
        }
    }

    // Straight triangles and the slivers between chords and curves add up to each region's exact area.
    private void CheckAreas()
    {
        Point origin = _mesh.Circle?.Centre ?? _mesh.Section.Bounds.Centre;
        double[] triangles = new double[_mesh.Section.Regions.Count + 1]; // region r at [r + 1], second disc at [0]
        double[] chords = new double[triangles.Length];
        double[] curves = new double[triangles.Length];
        for (int t = 0; t < _mesh.TriangleCount; t++)
        {
            triangles[_mesh.Regions[t] + 1] += 0.5 * (Place(t, 1) - Place(t, 0)).Cross(Place(t, 2) - Place(t, 0));
        }

        foreach (CurveEdge e in _mesh.CurveEdges)
        {
            double chord = 0.5 * (_mesh.Vertices[e.A] - origin).Cross(_mesh.Vertices[e.B] - origin);
            (int left, int right) = e.SectionEdge < 0
                ? (CrossSection.Air, Mesh.Exterior)
                : (_mesh.Section.Edges[e.SectionEdge].Left, _mesh.Section.Edges[e.SectionEdge].Right);
            AddBothSides(chords, left, e.SectionEdge < 0 ? CrossSection.Outside : right, chord);
            if (e.SectionEdge < 0)
            {
                chords[Mesh.Exterior + 1] += chord;
            }
        }

        foreach (SectionEdge e in _mesh.Section.Edges)
        {
            AddBothSides(curves, e.Left, e.Right, e.Curve.AreaTerm(origin));
        }

        double tolerance = 1e-11 * _scale * _scale;
        for (int r = 0; r < triangles.Length; r++)
        {
            bool adds = Math.Abs(triangles[r] - chords[r]) <= tolerance;
            bool exact = r == 0 || !double.IsFinite(_mesh.Section.Regions[r - 1].Area)
                || Math.Abs(triangles[r] + (curves[r] - chords[r]) - _mesh.Section.Regions[r - 1].Area) <= tolerance;
            if (!adds || !exact)
            {
                double due = r == 0 ? chords[r] : _mesh.Section.Regions[r - 1].Area;
                Report("mesh-coverage", origin, $"the triangles of region {r - 1} cover {triangles[r]:g12} m²; its chords enclose {chords[r]:g12} m², its curves {due:g12} m².");
            }
        }
    }

    private static void AddBothSides(double[] sums, int left, int right, double term)
    {
        if (left >= 0)
        {
            sums[left + 1] += term;
        }

        if (right >= 0)
        {
            sums[right + 1] -= term;
        }
    }

    // No vertex across a free edge lies inside the triangle's circle.
    private void CheckDelaunay()
    {
        foreach (((bool second, int a, int b), int t) in _triangleAt)
        {
            if (a > b || _curveEdgeAt.ContainsKey(Key(a, b)) || !_triangleAt.TryGetValue((second, b, a), out int neighbour))
            {
                continue;
            }

            int apex = Corner(neighbour, 0) + Corner(neighbour, 1) + Corner(neighbour, 2) - a - b;
            Point p = Place(t, 0), q = Place(t, 1), r = Place(t, 2), s = _mesh.Vertices[apex];
            if (Predicates.InCircle(p.Y, p.Z, q.Y, q.Z, r.Y, r.Z, s.Y, s.Z) > 0)
            {
                Report("mesh-delaunay", s, $"vertex {apex} lies inside the circle of triangle {t} across a free edge.");
            }
        }
    }

    // The blended map keeps its orientation on a fine lattice.
    private void CheckBentTriangles()
    {
        const int lattice = 8;
        const double inset = 1e-3; // the map's derivative has no single value at the corners themselves
        for (int t = 0; t < _mesh.TriangleCount; t++)
        {
            BentTriangle bent = new(_mesh, t, c => _curveEdgeAt.GetValueOrDefault(Key(Corner(t, c), Corner(t, c + 1)), -1));
            double least = double.PositiveInfinity;
            for (int i = 0; bent.IsBent && i <= lattice; i++)
            {
                for (int j = 0; i + j <= lattice; j++)
                {
                    double k = lattice - i - j;
                    double sum = lattice * (1 + (3 * inset));
                    least = Math.Min(least, bent.Jacobian((i + (lattice * inset)) / sum, (j + (lattice * inset)) / sum, (k + (lattice * inset)) / sum));
                }
            }

            if (!(least > 0))
            {
                Report("mesh-bent", Place(t, 0), $"triangle {t} folds over when its sides follow their curves (Jacobian {least:g3} of the straight one).");
            }
        }
    }

    private void CheckOpenDisc()
    {
        if (_mesh.Circle is not OpenCircle circle)
        {
            if (_mesh.Infinity != -1 || _mesh.Regions.Contains(Mesh.Exterior))
            {
                Report("mesh-disc", default, $"a closed model has no second disc.");
            }

            return;
        }

        if (_mesh.Infinity < 0 || _mesh.Infinity >= _mesh.Vertices.Count || _mesh.Vertices[_mesh.Infinity] != circle.Centre)
        {
            Report("mesh-disc", circle.Centre, $"vertex {_mesh.Infinity} for infinity is not at the circle's centre.");
        }

        for (int t = 0; t < _mesh.TriangleCount; t++)
        {
            for (int c = 0; c < 3; c++)
            {
                if (Corner(t, c) == _mesh.Infinity && !IsSecond(t))
                {
                    Report("mesh-disc", circle.Centre, $"triangle {t} of the first disc has a corner at infinity.");
                }

                if (!(Place(t, c).DistanceTo(circle.Centre) <= circle.Radius * (1 + 1e-12)))
                {
                    Report("mesh-disc", Place(t, c), $"triangle {t} leaves the circle.");
                }
            }
        }
    }
}
