// Truth: meshes broken on purpose, each in one way; the oracle must name that way, and must pass the whole mesh.
using PoleField.Drawing;
using PoleField.Geometry;
using PoleField.Meshing;
using Xunit;

namespace PoleField.Tests.Meshing;

public sealed class MeshCheckTests
{
    private static readonly Mesh Sound = Mesher.Mesh(
        ProblemP.Section(box: false), SizeField.FromSources(0.02, 0.5, [(ProblemP.Beam, 1e-3)]));

    [Fact]
    public void AWholeMeshHasNoFindings() => Assert.Empty(MeshCheck.Of(Sound).Select(f => f.What));

    [Fact]
    public void ATriangleTurnedOverIsSeen() => AssertSees("mesh-area", m => (m.Triangles[0], m.Triangles[1]) = (m.Triangles[1], m.Triangles[0]));

    [Fact]
    public void AVertexPulledAcrossItsNeighboursIsSeen() => AssertSees("mesh-area", m =>
    {
        int v = FreeVertex(m);
        m.Vertices[v] += new Point(0.05, 0.03);
    });

    [Fact]
    public void AVertexMovedALittleIsSeen() => AssertSees("mesh-off-curve", m =>
    {
        // Less than any triangle's size; only the curve knows.
        int v = m.CurveEdges.First(e => e.Curve is CircularArc && e.TA > 0).A;
        m.Vertices[v] += new Point(1e-9, 1e-9);
    });

    [Fact]
    public void AMissingTriangleIsSeen() => AssertSees("mesh-hole", m =>
    {
        m.Triangles.RemoveRange(m.Triangles.Count / 6 * 3, 3);
        m.Regions.RemoveAt(m.Regions.Count / 2);
    });

    [Fact]
    public void AMissingTriangleIsMissedInTheArea() => AssertSees("mesh-coverage", m =>
    {
        m.Triangles.RemoveRange(0, 3);
        m.Regions.RemoveAt(0);
    });

    [Fact]
    public void ADoubledTriangleIsSeen() => AssertSees("mesh-overlap", m =>
    {
        m.Triangles.AddRange(m.Triangles.Take(3).ToArray());
        m.Regions.Add(m.Regions[0]);
    });

    [Fact]
    public void AWrongRegionIsSeen() => AssertSees("mesh-region", m =>
    {
        int t = m.Regions.IndexOf(ProblemP.Iron);
        m.Regions[t] = ProblemP.LowerLeftCoil;
    });

    [Fact]
    public void AForgottenCurveEdgeIsSeen() => AssertSees("mesh-region", m => m.CurveEdges.RemoveAt(5));

    [Fact]
    public void ABrokenChainIsSeen() => AssertSees("mesh-chain", m =>
    {
        int i = m.CurveEdges.FindIndex(e => e.TA > 0);
        m.CurveEdges[i] = m.CurveEdges[i] with { SectionEdge = m.CurveEdges[i].SectionEdge == 0 ? 1 : 0 };
    });

    [Fact]
    public void ACurveEdgeListedTwiceIsSeen() => AssertSees("mesh-curve-twice", m => m.CurveEdges.Add(m.CurveEdges[3]));

    [Fact]
    public void AnEdgeFlippedAwayFromDelaunayIsSeen() => AssertSees("mesh-delaunay", FlipSomeFreeEdge);

    [Fact]
    public void AnIndexOutOfRangeIsSeen() => AssertSees("mesh-index", m => m.Triangles[7] = m.Vertices.Count);

    [Fact]
    public void AnUnusedVertexIsSeen() => AssertSees("mesh-unused-vertex", m => m.Vertices.Add(new Point(0, 0)));

    [Fact]
    public void InfinityOffTheCentreIsSeen() => AssertSees("mesh-disc", m => m.Infinity = FreeVertex(m));

    [Fact]
    public void ADiscWithAnotherRimIsSeen() => AssertSees("mesh-disc", m =>
    {
        // The second disc gets rim vertices of its own: the sheets no longer hang together.
        int rim = m.CurveEdges.First(e => e.SectionEdge < 0).A;
        m.Vertices.Add(m.Vertices[rim]);
        for (int h = 0; h < m.Triangles.Count; h++)
        {
            if (m.Triangles[h] == rim && m.Regions[h / 3] == Mesh.Exterior)
            {
                m.Triangles[h] = m.Vertices.Count - 1;
            }
        }
    });

    [Fact]
    public void ATriangleFoldedByItsCurvedSideIsSeen()
    {
        // Height 0.2 over a side of length 1 whose arc rises 0.15 towards it: near the side's ends the map turns back.
        Point a = new(0, 0), b = new(1, 0), c = new(0.5, 0.2);
        CircularArc arc = CircularArc.FromBulge(a, b, -0.3);
        SectionFixture s = new();
        s.Edge(arc, 0, -1).Edge(new Line(b, c), 0, -1).Edge(new Line(c, a), 0, -1);
        CrossSection section = s.Build();
        CurveEdge[] edges =
        [
            new(0, 1, arc, 0, 1, 0), new(1, 2, section.Edges[1].Curve, 0, 1, 1), new(2, 0, section.Edges[2].Curve, 0, 1, 2),
        ];

        IReadOnlyList<Finding> findings = MeshCheck.Of(new Mesh(section, [a, b, c], [0, 1, 2], [0], edges, null, -1));

        Assert.Equal(["mesh-bent"], findings.Select(f => f.What));
    }

    private static void AssertSees(string what, Action<Draft> breakIt)
    {
        Draft draft = new(Sound);
        breakIt(draft);

        Assert.Contains(what, MeshCheck.Of(draft.ToMesh()).Where(f => f.Severity == Severity.Fault).Select(f => f.What));
    }

    private static int FreeVertex(Draft m)
    {
        HashSet<int> onCurves = [.. m.CurveEdges.SelectMany(e => new[] { e.A, e.B })];
        return m.Triangles.First(v => !onCurves.Contains(v));
    }

    private static void FlipSomeFreeEdge(Draft m)
    {
        HashSet<(int, int)> onCurves = [.. m.CurveEdges.SelectMany(e => new[] { (e.A, e.B), (e.B, e.A) })];
        Dictionary<(int, int), int> left = [];
        for (int h = 0; h < m.Triangles.Count; h++)
        {
            int a = m.Triangles[h], b = m.Triangles[h - (h % 3) + ((h + 1) % 3)];
            if (m.Regions[h / 3] == ProblemP.Iron)
            {
                left[(a, b)] = h;
            }
        }

        foreach (((int a, int b), int h) in left)
        {
            if (left.TryGetValue((b, a), out int twin) && !onCurves.Contains((a, b)))
            {
                int c = m.Triangles[h - (h % 3) + ((h + 2) % 3)], d = m.Triangles[twin - (twin % 3) + ((twin + 2) % 3)];
                Point axis = m.Vertices[c] - m.Vertices[d];
                bool convex = axis.Cross(m.Vertices[a] - m.Vertices[d]) > 0 && axis.Cross(m.Vertices[b] - m.Vertices[d]) < 0;
                if (convex)
                {
                    int t = h - (h % 3), u = twin - (twin % 3);
                    (m.Triangles[t], m.Triangles[t + 1], m.Triangles[t + 2]) = (d, c, a);
                    (m.Triangles[u], m.Triangles[u + 1], m.Triangles[u + 2]) = (c, d, b);
                    return;
                }
            }
        }
    }

    // A mesh that can be changed.
    private sealed class Draft(Mesh mesh)
    {
        public List<Point> Vertices { get; } = [.. mesh.Vertices];

        public List<int> Triangles { get; } = [.. mesh.Triangles];

        public List<int> Regions { get; } = [.. mesh.Regions];

        public List<CurveEdge> CurveEdges { get; } = [.. mesh.CurveEdges];

        public int Infinity { get; set; } = mesh.Infinity;

        public Mesh ToMesh() => new(
            mesh.Section, [.. Vertices], [.. Triangles], [.. Regions], [.. CurveEdges], mesh.Circle, Infinity);
    }
}
