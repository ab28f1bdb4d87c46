using PoleField.Drawing;
using PoleField.Geometry;

namespace PoleField.Meshing;

/// <summary>
/// Examines a mesh for everything <see cref="Mesh"/> promises. It shares no code with the mesher but the exact predicates,
/// so that it can serve as its judge.
/// </summary>
/// <remarks>
/// Positive areas, edges that match and areas that add up together exclude overlaps and holes: a closed sheet of positive
/// triangles that covers its polygon once has the polygon's area.
/// </remarks>
public sealed partial class MeshCheck
{
    private readonly Mesh _mesh;
    private readonly List<Finding> _findings = [];
    private readonly Dictionary<(bool Second, int From, int To), int> _triangleAt = []; // triangle left of a directed edge
    private readonly Dictionary<(int, int), int> _curveEdgeAt = []; // curve edge by its vertices, smaller first
    private readonly double _scale;

    private MeshCheck(Mesh mesh)
    {
        _mesh = mesh;
        Box box = Box.Empty;
        foreach (Point p in mesh.Vertices)
        {
            box = box.Including(p);
        }

        _scale = box.Diagonal;
    }

    /// <summary>All faults found; empty when the mesh keeps every promise.</summary>
    public static IReadOnlyList<Finding> Of(Mesh mesh)
    {
        MeshCheck check = new(mesh);
        if (check.IndicesAreInRange())
        {
            check.CheckOrientation();
            check.CollectEdges();
            check.CheckNeighbours();
            check.CheckCurveEdges();
            check.CheckChains();
            check.CheckAreas();
            check.CheckDelaunay();
            check.CheckBentTriangles();
            check.CheckOpenDisc();
        }

        return check._findings;
    }

    private void Report(string what, Point at, FormattableString text) => _findings.Add(new Finding(
        Severity.Fault,
        what,
        FormattableString.Invariant($"At ({at.Y:g9}, {at.Z:g9}) m: ") + FormattableString.Invariant(text),
        "Report this with the drawing: the mesher broke its promise.")
    {
        At = at,
    });

    private int Corner(int triangle, int c) => _mesh.Triangles[(3 * triangle) + (c % 3)];

    private Point Place(int triangle, int c) => _mesh.Vertices[Corner(triangle, c)];

    private bool IsSecond(int triangle) => _mesh.Regions[triangle] == Mesh.Exterior;

    private static (int, int) Key(int a, int b) => a < b ? (a, b) : (b, a);

    private bool IndicesAreInRange()
    {
        bool right = _mesh.Triangles.Count == 3 * _mesh.Regions.Count
            && _mesh.Triangles.All(v => v >= 0 && v < _mesh.Vertices.Count)
            && _mesh.Regions.All(r => r >= Mesh.Exterior && r < _mesh.Section.Regions.Count)
            && _mesh.CurveEdges.All(e => e.SectionEdge >= -1 && e.SectionEdge < _mesh.Section.Edges.Count
                && Math.Min(e.A, e.B) >= 0 && Math.Max(e.A, e.B) < _mesh.Vertices.Count);
        if (!right)
        {
            Report("mesh-index", default, $"an index of a vertex, region or section edge is out of range.");
            return false;
        }

        HashSet<int> used = [.. _mesh.Triangles];
        foreach (int v in Enumerable.Range(0, _mesh.Vertices.Count).Where(v => !used.Contains(v)))
        {
            Report("mesh-unused-vertex", _mesh.Vertices[v], $"vertex {v} belongs to no triangle.");
        }

        return true;
    }

    private void CollectEdges()
    {
        for (int t = 0; t < _mesh.TriangleCount; t++)
        {
            for (int c = 0; c < 3; c++)
            {
                if (!_triangleAt.TryAdd((IsSecond(t), Corner(t, c), Corner(t, c + 1)), t))
                {
                    Report("mesh-overlap", Place(t, c), $"two triangles lie on one side of edge {Corner(t, c)}-{Corner(t, c + 1)}.");
                }
            }
        }

        for (int i = 0; i < _mesh.CurveEdges.Count; i++)
        {
            CurveEdge e = _mesh.CurveEdges[i];
            if (!_curveEdgeAt.TryAdd(Key(e.A, e.B), i))
            {
                Report("mesh-curve-twice", _mesh.Vertices[e.A], $"edge {e.A}-{e.B} is listed on two curves.");
            }
        }
    }

    // Every edge has its other side, but on the rim; regions change only across curves.
    private void CheckNeighbours()
    {
        foreach (((bool second, int a, int b), int t) in _triangleAt)
        {
            bool onCurve = _curveEdgeAt.TryGetValue(Key(a, b), out int i);
            if (_triangleAt.TryGetValue((second, b, a), out int neighbour))
            {
                if (_mesh.Regions[t] != _mesh.Regions[neighbour] && !onCurve)
                {
                    Report("mesh-region", _mesh.Vertices[a], $"regions {_mesh.Regions[t]} and {_mesh.Regions[neighbour]} meet at edge {a}-{b}, which is on no curve.");
                }
            }
            else if (!onCurve || !IsRim(_mesh.CurveEdges[i]))
            {
                Report("mesh-hole", _mesh.Vertices[a], $"edge {a}-{b} inside the model has a triangle on one side only.");
            }
        }
    }

    private bool IsRim(CurveEdge e) => e.SectionEdge < 0
        || _mesh.Section.Edges[e.SectionEdge].Left == CrossSection.Outside
        || _mesh.Section.Edges[e.SectionEdge].Right == CrossSection.Outside;

    private void CheckCurveEdges()
    {
        foreach (CurveEdge e in _mesh.CurveEdges)
        {
            (int left, int right) = e.SectionEdge < 0
                ? (CrossSection.Air, CrossSection.Outside)
                : (_mesh.Section.Edges[e.SectionEdge].Left, _mesh.Section.Edges[e.SectionEdge].Right);
            CheckSide(e.A, e.B, left);
            CheckSide(e.B, e.A, right);
            if (e.SectionEdge < 0 && !_triangleAt.ContainsKey((true, e.A, e.B)))
            {
                Report("mesh-disc", _mesh.Vertices[e.A], $"rim edge {e.A}-{e.B} is missing in the second disc.");
            }

            double tolerance = 1e-12 * _scale;
            if (!(e.TA < e.TB)
                || !(e.Curve.At(e.TA).DistanceTo(_mesh.Vertices[e.A]) <= tolerance)
                || !(e.Curve.At(e.TB).DistanceTo(_mesh.Vertices[e.B]) <= tolerance))
            {
                Report("mesh-off-curve", _mesh.Vertices[e.A], $"edge {e.A}-{e.B} does not lie on its curve at parameters {e.TA} and {e.TB}.");
            }
        }
    }

    private void CheckSide(int a, int b, int region)
    {
        bool there = _triangleAt.TryGetValue((false, a, b), out int t);
        if (region == CrossSection.Outside ? there : !there || _mesh.Regions[t] != region)
        {
            int found = there ? _mesh.Regions[t] : CrossSection.Outside;
            Report("mesh-region", _mesh.Vertices[a], $"region {region} belongs left of {a}-{b}, region {found} is there.");
        }
    }

    // The pieces of each section edge follow one another from its start to its end.
    private void CheckChains()
    {
        ILookup<int, CurveEdge> chains = _mesh.CurveEdges.ToLookup(e => e.SectionEdge);
        for (int s = 0; s < _mesh.Section.Edges.Count; s++)
        {
            CurveEdge[] chain = [.. chains[s]];
            SectionEdge edge = _mesh.Section.Edges[s];
            bool whole = chain.Length > 0
                && _mesh.Vertices[chain[0].A] == _mesh.Section.Vertices[edge.Start]
                && _mesh.Vertices[chain[^1].B] == _mesh.Section.Vertices[edge.End];
            for (int i = 1; whole && i < chain.Length; i++)
            {
                whole = chain[i].A == chain[i - 1].B;
            }

            if (!whole)
            {
                Report("mesh-chain", edge.Curve.Start, $"section edge {s} is not followed from its start to its end.");
            }
        }
    }
}
